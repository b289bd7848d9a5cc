import { ProblemLog } from '#src/base/problem.ts';
import type { Problem } from '#src/base/problem.ts';
import { sourceFromText } from '#src/bytes/source-from-text.ts';
import type { CifBlock, CifDocument, CifValue } from '#src/readers/cif/cif-document.ts';
import { parseCif } from '#src/readers/cif/parse.ts';

/** A value in short: bare text, `?` and `.` as they stand, delimited text in « », lists as arrays, tables as objects. */
export type Shown = string | readonly Shown[] | { readonly [key: string]: Shown };

export interface ShownBlock {
  readonly name: string;
  readonly items: { readonly [name: string]: Shown };
  /** Each loop as its names and its rows. */
  readonly loops: readonly {
    readonly names: readonly string[];
    readonly rows: readonly (readonly Shown[])[];
  }[];
  readonly frames?: readonly ShownBlock[];
}

export interface SyntaxReading {
  readonly document: CifDocument;
  readonly problems: readonly Problem[];
  readonly codes: readonly string[];
}

export function readSyntax(text: string, name = 'test.cif'): SyntaxReading {
  const log = new ProblemLog();
  const document = parseCif(sourceFromText(name, text), log);
  const problems = log.list();
  return { document, problems, codes: problems.map(({ code }) => code) };
}

export function show(value: CifValue): Shown {
  switch (value.kind) {
    case 'unknown':
      return '?';
    case 'inapplicable':
      return '.';
    case 'list':
      return value.items.map(show);
    case 'table':
      return Object.fromEntries([...value.entries].map(([key, entry]) => [key, show(entry)]));
    default:
      return value.delimited ? `«${value.text}»` : value.text;
  }
}

export function showBlock(block: CifBlock): ShownBlock {
  const loops = block.loops.map(({ names, values }) => ({
    names,
    rows: Array.from({ length: values.length / names.length }, (_, row) =>
      values.slice(row * names.length, (row + 1) * names.length).map(show),
    ),
  }));
  const items = Object.fromEntries([...block.items].map(([name, value]) => [name, show(value)]));
  const shown = { name: block.name, items, loops };
  return block.frames.length === 0 ? shown : { ...shown, frames: block.frames.map(showBlock) };
}

/** The one item `_v` of the first block, in short, with the codes of all problems. */
export function readOne(
  value: string,
  version: '1.1' | '2.0' = '1.1',
): { value: Shown | null; codes: readonly string[] } {
  const magic = version === '2.0' ? '#\\#CIF_2.0\n' : '';
  const { document, codes } = readSyntax(`${magic}data_t\n_v ${value}\n_after 1\n`);
  const found = document.blocks[0]?.items.get('_v');
  return { value: found ? show(found) : null, codes };
}
