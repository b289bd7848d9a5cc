import { componentOf } from './component-name.ts';
import type { PrintedValue } from './raw-tensor.ts';
import type { TextLine } from './text-line.ts';

export type ColumnKind =
  | { readonly is: 'component'; readonly place: number; readonly prefix: string }
  | { readonly is: 'printed'; readonly kind: PrintedValue['kind'] }
  | { readonly is: 'label' | 'element' | 'index' | 'other' };

export interface HeaderColumn {
  readonly kind: ColumnKind;
  readonly text: string;
  readonly start: number;
  readonly end: number;
}

/** A line that names the columns under it. */
export interface TableHeader {
  readonly columns: readonly HeaderColumn[];
  /** Columns of components, in their order. */
  readonly places: readonly number[];
  /** Mark between cells; null where blanks part them. */
  readonly delimiter: string | null;
  readonly line: number;
  readonly text: string;
}

const printedNames: readonly (readonly [RegExp, PrintedValue['kind']])[] = [
  [/^(?:.*_)?(?:an_?iso\w*|δaniso|csa)$|anisotrop/i, 'anisotropy'],
  [/^(?:.*[_ ])?iso(?:tropic|tropy)?(?:[_ ].*)?$|^[σδ]_?iso/i, 'isotropic'],
  [/^(?:eta|η|asymm?(?:etry)?|etaq?|eta_q)$|asymmetry/i, 'asymmetry'],
  [/^(?:span|Ω|omega)$/i, 'span'],
  [/^(?:skew|κ|kappa)$/i, 'skew'],
  [/^(?:\|?c_?q\|?|qcc|nqcc|chi|coupling)$/i, 'coupling'],
  [/^q$/i, 'moment'],
];

function kindOf(cell: string): ColumnKind {
  const words = cell.replace(/[([{].*$/, ' ').match(/[\p{L}_][\p{L}\p{N}_'-]*|\d+[\p{L}-]+/gu) ?? [];
  for (let at = words.length - 1; at >= 0; at--) {
    const found = componentOf(words[at] ?? '');
    if (found)
      return {
        is: 'component',
        place: found.row * 3 + found.column,
        prefix: found.prefix || words.slice(0, at).join(' ').toLowerCase(),
      };
  }
  const digits = /^\D*\b([123])([123])\b\D*$/.exec(cell);
  if (digits)
    return { is: 'component', place: (Number(digits[1]) - 1) * 3 + Number(digits[2]) - 1, prefix: '' };
  const pairs = /[([{]\s*([123xyz])\s*[,;]?\s*([123xyz])\s*[)\]}]/i.exec(cell);
  if (pairs) {
    const [row, column] = [pairs[1], pairs[2]].map((text) =>
      ('123'.includes(text!) ? '123' : 'xyz').indexOf(text!.toLowerCase()),
    );
    return { is: 'component', place: row! * 3 + column!, prefix: words[0]?.toLowerCase() ?? '' };
  }
  const plain = (words[0] ?? cell).trim();
  const printed = printedNames.find(([pattern]) => pattern.test(plain) || pattern.test(words.join(' ')));
  if (printed) return { is: 'printed', kind: printed[1] };
  if (/^(?:label|site|atom|name|id|nucleus|center|centre|ion)s?$/i.test(plain)) return { is: 'label' };
  if (/^(?:element|symbol|species|type|el|elem|kind)$/i.test(plain)) return { is: 'element' };
  if (/^(?:#|no|nr|n|index|idx|i|num|number)$/i.test(plain) || cell.trim() === '#') return { is: 'index' };
  return { is: 'other' };
}

/** Cells of a line parted by a mark; quotes around a cell are dropped. */
export function cellsOf(text: string, delimiter: string): string[] {
  const cells =
    delimiter === ',' ? (text.match(/(?:"[^"]*"|[^,])+|(?<=,)(?=,|$)/g) ?? []) : text.split(delimiter);
  return cells.map((cell) =>
    cell
      .trim()
      .replace(/^"(.*)"$/, '$1')
      .trim(),
  );
}

/** `$V_{xx}$` as `V_xx`: marks of typesetting dropped. */
export function withoutTypesetting(text: string): string {
  return text.replace(/\\(?:mathrm|text|rm|sigma|delta)?|[${}]/g, (mark) =>
    /sigma|delta/.test(mark) ? mark.slice(1) : '',
  );
}

function delimiterOf(text: string): string | null {
  for (const mark of ['&', ';', '\t', '|', ',']) {
    const count = text.split(mark).length - 1;
    if (count >= (mark === ',' || mark === '|' ? 3 : 2)) return mark;
  }
  return null;
}

/** The header that a line is; null where it names fewer than three components or printed values, or holds numbers of its own. */
export function tableHeader(line: TextLine): TableHeader | null {
  const { tokens } = line;
  const text = line.text.includes('$') ? withoutTypesetting(line.text) : line.text;
  let named = 0;
  let decimals = 0;
  for (const { kind, text: piece } of tokens) {
    if (kind === 'word' && componentOf(piece)) named++;
    else if (kind === 'number' && /^[123]{2}$/.test(piece)) named++;
    else if (kind === 'number' && /[.*]/.test(piece)) decimals++;
  }
  if (decimals > 0) return null;
  const marked = named < 2 && /[([{]\s*[123xyz]\s*[,;]?\s*[123xyz]\s*[)\]}]/i.test(text);
  const values = named < 3 && /\bc_?q\b|asymm|\beta\b|η|aniso|\biso/i.test(text) && !/[=:]/.test(text);
  if (named < 3 && !marked && !values) return null;
  const delimiter = delimiterOf(text);
  const columns = withoutFormulas(delimiter === null ? spacedColumns(line) : cellColumns(text, delimiter));
  const places = columns.flatMap(({ kind }) => (kind.is === 'component' ? [kind.place] : []));
  const printed = columns.filter(({ kind }) => kind.is === 'printed').length;
  if (places.length < 3 && printed < 2) return null;
  const words = tokens.filter(({ kind }) => kind === 'word').length;
  if (places.length < 3 && words > 12) return null;
  return { columns, places, delimiter, line: line.number, text };
}

/** A component that comes again stands in a formula, such as that of the asymmetry. */
function withoutFormulas(columns: readonly HeaderColumn[]): HeaderColumn[] {
  const seen = new Set<number>();
  const end = columns.findIndex(({ kind }) => {
    if (kind.is !== 'component') return false;
    if (seen.has(kind.place)) return true;
    seen.add(kind.place);
    return false;
  });
  return end < 0 ? [...columns] : columns.slice(0, end).filter(({ text }) => !/^[({[]/.test(text));
}

function cellColumns(text: string, delimiter: string): HeaderColumn[] {
  return cellsOf(text, delimiter).map((cell) => ({ kind: kindOf(cell), text: cell, start: 0, end: 0 }));
}

/** Columns parted by blanks: each word with the unit in brackets after it is one. */
function spacedColumns({ text }: TextLine): HeaderColumn[] {
  const columns: HeaderColumn[] = [];
  for (const match of text.matchAll(/[^\s([{]*[([{][^)\]}]*[)\]}]\S*|\S+/g)) {
    const cell = match[0];
    const isUnit = /^[([{].*[)\]}]$/.test(cell) && !/[([{]\s*[123xyz]\s*,?\s*[123xyz]\s*[)\]}]/i.test(cell);
    const last = columns[columns.length - 1];
    if (isUnit && last) columns[columns.length - 1] = { ...last, end: match.index + cell.length };
    else columns.push({ kind: kindOf(cell), text: cell, start: match.index, end: match.index + cell.length });
  }
  return columns;
}
