import type { CifBlock, CifLoop, CifValue } from './cif-document.ts';
import type { NameAt } from './loop.ts';
import type { CifReport } from './report.ts';

/** A block or save frame while it is filled. */
export interface OpenBlock extends CifBlock {
  readonly items: Map<string, CifValue>;
  readonly loops: CifLoop[];
  readonly loopOf: Map<string, CifLoop>;
  readonly frames: OpenBlock[];
}

export function openBlock(name: string, offset: number): OpenBlock {
  return { name, offset, items: new Map(), loops: [], loopOf: new Map(), frames: [] };
}

/** Stores an item. Of a repeated name the first known value stays. */
export function addItem(block: OpenBlock, at: NameAt, value: CifValue, report: CifReport): void {
  const { name } = at;
  const earlier = block.items.get(name);
  if (earlier === undefined && !block.loopOf.has(name)) {
    block.items.set(name, value);
    return;
  }
  if (earlier === undefined) {
    block.items.set(name, value);
    reportLooped(at, report);
    return;
  }
  const replaces = !isKnown(earlier) && isKnown(value);
  if (replaces) block.items.set(name, value);
  const same = earlier.kind === 'text' && value.kind === 'text' && earlier.text === value.text;
  report.add(
    same ? 'note' : 'warning',
    'cif-repeated-item',
    at.offset,
    `${shortName(name)} is given twice in this block; the ${replaces ? 'second value was taken, since the first is unknown' : 'first value was kept'}.`,
    { got: name.slice(0, 80), allowed: 'each name once a block', hint: 'Take one of the two out.' },
  );
}

/** Stores a loop. A column whose name stands in an earlier loop stays with the earlier one, unless that is empty. */
export function addLoop(block: OpenBlock, loop: CifLoop, names: readonly NameAt[], report: CifReport): void {
  block.loops.push(loop);
  for (const at of names) {
    const earlier = block.loopOf.get(at.name);
    if (earlier === undefined) {
      block.loopOf.set(at.name, loop);
      if (block.items.has(at.name)) reportLooped(at, report);
      continue;
    }
    const replaces = earlier !== loop && isEmpty(earlier);
    if (replaces) block.loopOf.set(at.name, loop);
    report.add(
      'warning',
      'cif-repeated-column',
      at.offset,
      `${shortName(at.name)} heads ${earlier === loop ? 'two columns of this loop' : 'a column of two loops in this block'}; the ${replaces ? 'second' : 'first'} was taken.`,
      { got: at.name.slice(0, 80), allowed: 'each name once a block' },
    );
  }
}

function isEmpty({ values, rowsPassedOver = 0 }: CifLoop): boolean {
  return values.length === 0 && rowsPassedOver === 0;
}

function reportLooped(at: NameAt, report: CifReport): void {
  report.add(
    'warning',
    'cif-repeated-item',
    at.offset,
    `${shortName(at.name)} stands in this block both alone and in a loop; both were kept.`,
    { got: at.name.slice(0, 80), allowed: 'each name once a block' },
  );
}

export function shortName(name: string): string {
  return name.length > 80 ? `${name.slice(0, 80)}…` : name;
}

/** False for `?`, `.` and empty text. */
function isKnown(value: CifValue): boolean {
  if (value.kind === 'text') return value.text.trim() !== '';
  return value.kind === 'list' || value.kind === 'table';
}
