import type { ProblemLog } from '#src/base/problem.ts';
import type { SourceText } from '#src/bytes/source-text.ts';
import { placeOf } from '#src/bytes/source-text.ts';
import type { Crystal } from '#src/crystal/crystal.ts';
import type { CifDocument } from '../cif-document.ts';
import { levelName } from './block-view.ts';

/** Names that tell what a block without atoms holds instead. */
const contents: readonly { readonly start: RegExp; readonly what: string }[] = [
  { start: /^_(definition_id|item_name|name$|dictionary)/, what: 'a dictionary' },
  { start: /^_refln_/, what: 'reflection data' },
  { start: /^_diffrn_refln_/, what: 'raw diffraction data' },
  { start: /^_pd_/, what: 'a powder pattern' },
  { start: /^_cell_length_a/, what: 'a cell without atoms' },
];

/**
 * Says why a text gave no structure: it is another kind of text (`cif-not-a-cif`), it is empty, or its blocks hold no usable atoms
 * (`cif-no-atoms`), with what they hold instead.
 */
export function reportNoStructure(source: SourceText, document: CifDocument, log: ProblemLog): void {
  const place = placeOf(source, 0);
  const what = otherKind(source.text);
  const isNameless = document.blocks.every(
    ({ items, loops, frames }) => items.size + loops.length + frames.length === 0,
  );
  if (isNameless || what !== null) {
    const lack =
      document.blocks.length === 0
        ? 'it has no line that starts with data_'
        : 'after its data_ line comes no name that starts with _';
    const message = what === 'empty' ? 'The file is empty.' : `The file is ${what ?? 'no CIF'}: ${lack}.`;
    log.add('error', 'cif-not-a-cif', message, {
      place,
      got: source.text.slice(0, 60).trim() || null,
      allowed: 'a text with a data_ line, names that start with _ and values',
      hint: 'Open the CIF itself; this may be a page, a letter or a list saved under its name.',
    });
    return;
  }
  if (log.list().some(({ code }) => code === 'cif-no-cell')) return;
  const held = whatBlocksHold(document);
  log.add(
    'error',
    'cif-no-atoms',
    `No block holds atoms with coordinates${held === '' ? '' : `; the file holds ${held}`}.`,
    {
      place,
      allowed: '_atom_site_fract_x, _y, _z (or _atom_site_Cartn_x, _y, _z) with numbers',
      hint: 'Take the file that holds the structure.',
    },
  );
}

/** Notes that a text holds several structures and names them; the first is the one shown first. */
export function reportSeveral(structures: readonly Crystal[], log: ProblemLog): void {
  const names = structures.slice(0, 20).map(({ name }) => name);
  const more = structures.length > 20 ? `, and ${structures.length - 20} more` : '';
  log.add(
    'note',
    'several-structures',
    `The file holds ${structures.length} structures: ${names.join(', ')}${more}.`,
    {
      place: structures[0]!.place,
      hint: 'Choose one by the name of its block.',
    },
  );
}

function otherKind(text: string): string | null {
  const start = text.slice(0, 400).trimStart();
  if (start === '') return 'empty';
  if (/^%PDF/.test(start)) return 'a PDF document';
  if (/^<(!doctype|html|\?xml|head|body)/i.test(start)) return 'a web page (HTML or XML)';
  if (/^[{[]/.test(start)) return 'JSON or a similar notation';
  // eslint-disable-next-line no-control-regex
  if (/[\0-\x08\x0e-\x1f\ufffd]{3}/.test(start)) return 'binary data';
  return null;
}

function whatBlocksHold({ blocks }: CifDocument): string {
  const names = new Set(
    blocks
      .flatMap((block) => [
        ...[...block.items.keys()].slice(0, 2000),
        ...[...block.loopOf.keys()].slice(0, 2000),
        ...block.frames.slice(0, 3).flatMap((frame) => [...frame.items.keys()]),
      ])
      .map(levelName),
  );
  const found = contents
    .filter(({ start }) => [...names].some((name) => start.test(name)))
    .map(({ what }) => what);
  if ([...names].some((name) => name.startsWith('_atom_site_')))
    found.push('an atom list without coordinates');
  return found.join(', ');
}
