import type { VecCart } from '#src/base/matrix3.ts';
import type { AtomTable } from './atom-table.ts';
import { atomTable } from './atom-table.ts';
import type { FoundAtom, FoundStructure } from './found-structure.ts';
import type { LatticeChoice } from './lattice-choices.ts';
import { latticeChoices, latticeFor } from './lattice-choices.ts';
import { LatticeLines } from './lattice-lines.ts';
import { numericRow } from './numeric-row.ts';
import type { RowRun } from './row-runs.ts';
import { RowRuns } from './row-runs.ts';
import type { ScaleFinding } from './scale-lines.ts';
import { scaleOfLine } from './scale-lines.ts';
import { SpeciesLists } from './species-lists.ts';
import type { PositionReading } from './structure-reading.ts';
import { positionReading } from './structure-reading.ts';
import type { LineFinder, TextLine } from './text-line.ts';

export type { FoundAtom, FoundStructure } from './found-structure.ts';

/** Atom lists that are kept of one text; of more, the earliest of a long relaxation are dropped. */
const mostTables = 400;
const mostScales = 60;

/**
 * Finds structures by their shape: lattices as vectors or as lengths and angles, lists of atoms with fractional or
 * Cartesian coordinates, in Å, bohr, nm or multiples of a length given elsewhere. Several geometries come back in their
 * order, the same one printed again only once. The lists of species that are filled on the way can be asked afterwards
 * for the elements of rows that carry only a number.
 */
export function structureFinder(species = new SpeciesLists()): LineFinder<FoundStructure[]> {
  const tables: AtomTable[] = [];
  const scales: ScaleFinding[] = [];
  const lattices = new LatticeLines();
  const runs = new RowRuns((run: RowRun) => {
    const table = atomTable(run);
    if (table) tables.push(table);
    if (tables.length > mostTables) tables.splice(1, 1);
  });
  return {
    take(line: TextLine): void {
      const row = numericRow(line);
      lattices.take(line, row);
      species.take(line);
      const scale = scaleOfLine(line);
      if (scale && scales.length < mostScales) scales.push(scale);
      if (row) runs.passRow(row);
      else runs.passText(line);
    },
    finish(): FoundStructure[] {
      runs.finish();
      const findings = lattices.finish();
      const taken = new Set(findings.flatMap(({ line, lastLine }) => [line, lastLine]));
      const choices = latticeChoices(findings, scales);
      const lists = withoutReprints(tables.filter(({ line }) => !taken.has(line)));
      const drafts = lists.flatMap((table) => draftOf(table, species, choices) ?? []);
      const kept = withoutRepeats(drafts);
      return kept.map((draft, i) => finished(draft, i === kept.length - 1));
    },
  };
}

/** Lists in their order; one without a word about its unit that repeats the numbers of an earlier one is left out. */
function withoutReprints(tables: AtomTable[]): AtomTable[] {
  const kept: AtomTable[] = [];
  for (const table of tables.sort((p, q) => p.line - q.line)) {
    const says = table.evidence.frame !== null || table.evidence.units.length > 0;
    const again = !says && kept.slice(-4).some((earlier) => reprints(table, earlier));
    if (!again) kept.push(table);
  }
  return kept;
}

function reprints(table: AtomTable, earlier: AtomTable): boolean {
  if (table.rows.length !== earlier.rows.length) return false;
  const tolerance = 0.6 * (10 ** -table.decimals[0]! + 10 ** -earlier.decimals[0]!);
  return table.rows.every(({ triples }, i) =>
    triples[0]!.every((value, k) => Math.abs(value - earlier.rows[i]!.triples[0]![k]!) <= tolerance),
  );
}

interface Draft {
  readonly table: AtomTable;
  readonly elements: readonly string[];
  readonly reading: PositionReading;
  readonly latticeLine: number | null;
  readonly words: string;
}

function draftOf(table: AtomTable, species: SpeciesLists, choices: readonly LatticeChoice[]): Draft | null {
  const named = withoutOverflow(table, elementsOf(table, species));
  if (!named || named.elements.every((element) => element === 'X')) return null;
  const rows = table.rows;
  if (rows.length < 3 && table.evidence.areCoordinates !== 'yes') return null;
  const choice = latticeFor(choices, table.line, rows.at(-1)!.line);
  const reading = positionReading(table, named.elements, choice);
  if (!reading) return null;
  const words = [table.evidence.words, reading.words, named.words].filter((w) => w !== '').join('; ');
  return { table, elements: named.elements, reading, latticeLine: choice?.line ?? null, words };
}

interface NamedRows {
  /** `X` where a row is left out. */
  readonly elements: readonly string[];
  readonly words: string;
}

/** Longest coordinate that is believed, as printed. */
const longestCoordinate = 1e6;

/** Rows with a coordinate that did not fit its field are left out, and counted. */
function withoutOverflow({ rows }: AtomTable, named: NamedRows | null): NamedRows | null {
  if (!named) return null;
  const bad = rows.map(({ triples }) => triples.flat().some((v) => !(Math.abs(v) < longestCoordinate)));
  const count = bad.filter(Boolean).length;
  if (count === 0) return named;
  const elements = named.elements.map((element, i) => (bad[i] ? 'X' : element));
  const words = [named.words, `${count} rows without a readable coordinate left out`];
  return { elements, words: words.filter((w) => w !== '').join('; ') };
}

function elementsOf({ rows, line }: AtomTable, species: SpeciesLists): NamedRows | null {
  const first = rows[0]!.element;
  const isByHeading = rows.every(
    ({ label, element }) => label === null && element === first && first !== null,
  );
  const listed = isByHeading ? species.resolve(rows.length, line) : null;
  if (listed && new Set(listed.elements).size > 1) return listed;
  if (rows.every(({ element }) => element !== null)) {
    return { elements: rows.map(({ element }) => element!), words: '' };
  }
  const numbers = rows.map((row) => row.species);
  if (numbers.every((n) => n !== null && n >= 1)) {
    const list = species.species(Math.max(...(numbers as number[])), line);
    if (list)
      return { elements: numbers.map((n) => list[n! - 1] ?? 'X'), words: 'elements by species number' };
  }
  return species.resolve(rows.length, line);
}

/** Drafts in their order, without those that only print earlier atoms again; of two such the finer numbers stay. */
function withoutRepeats(drafts: readonly Draft[]): Draft[] {
  const kept: Draft[] = [];
  for (const draft of drafts) {
    const at = kept.findLastIndex((earlier, i) => i >= kept.length - 3 && repeats(draft, earlier));
    if (at < 0) kept.push(draft);
    else if (isFiner(draft, kept[at]!)) kept[at] = draft;
  }
  return kept;
}

function isFiner(p: Draft, q: Draft): boolean {
  return p.elements.length === q.elements.length && p.reading.stepAngstrom < 0.5 * q.reading.stepAngstrom;
}

function repeats(draft: Draft, earlier: Draft): boolean {
  const here = draft.reading.cartesian ?? draft.reading.fractional!;
  const there = earlier.reading.cartesian ?? earlier.reading.fractional!;
  if (here.length > there.length) return false;
  const tolerance = 0.6 * (draft.reading.stepAngstrom + earlier.reading.stepAngstrom) + 1e-6;
  const same = (i: number, j: number): boolean =>
    draft.elements[i] === earlier.elements[j] &&
    here[i]!.every((v, k) => Math.abs(v - there[j]![k]!) <= tolerance);
  if (here.length === there.length) return here.every((_, i) => same(i, i));
  if (here.length * there.length > 1e6) return false;
  return here.every((_, i) => there.some((__, j) => same(i, j)));
}

function finished({ table, elements, reading, latticeLine, words }: Draft, isLast: boolean): FoundStructure {
  const { indices, withinElement } = indicesOf(table, elements);
  const atoms: FoundAtom[] = [];
  for (const [i, row] of table.rows.entries()) {
    const element = elements[i]!;
    if (element === 'X') continue;
    atoms.push({
      label: row.label !== null && /\d/.test(row.label) ? row.label : `${element}${indices[i]}`,
      element,
      index: indices[i]!,
      fractional: reading.fractional?.[i] ?? null,
      cartesian: (reading.cartesian?.[i] as VecCart | undefined) ?? null,
      line: row.line,
    });
  }
  return {
    line: table.line,
    lattice: reading.lattice,
    latticeLine: reading.lattice ? latticeLine : null,
    atoms,
    countsWithinElement: withinElement,
    evidence: words,
    isLast,
  };
}

/** Printed numbers, counted from 1; the order of the rows where none are printed. */
function indicesOf(
  { rows }: AtomTable,
  elements: readonly string[],
): { indices: number[]; withinElement: boolean } {
  const order = rows.map((_, i) => i + 1);
  if (rows.some(({ number }) => number === null)) return { indices: order, withinElement: false };
  const printed = rows.map(({ number }) => number!);
  const shift = printed.includes(0) ? 1 : 0;
  const indices = printed.map((n) => n + shift);
  const seen = new Map<string, number>();
  const running = elements.map((element) => {
    const next = (seen.get(element) ?? 0) + 1;
    seen.set(element, next);
    return next;
  });
  const overall = indices.every((n, i) => n === order[i]);
  if (new Set(indices.map((n, i) => `${elements[i]} ${n}`)).size < indices.length) {
    return { indices: order, withinElement: false };
  }
  return { indices, withinElement: !overall && indices.every((n, i) => n === running[i]) };
}
