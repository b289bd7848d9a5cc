import { countOf, wordFor } from '#src/base/count-of.ts';
import type { Vec3 } from '#src/base/matrix3.ts';
import type { Place, ProblemLog } from '#src/base/problem.ts';
import type { BlockView } from './block-view.ts';
import { placeOfValue, textOf } from './block-view.ts';
import type { CategoryColumn, CategoryTable } from './category-table.ts';
import { categoryTable, tableOfLoops } from './category-table.ts';
import { readNumber } from './tolerant-number.ts';
import { isDummy } from './site-species.ts';

/** One row of the atom list as it stands, before elements and coordinates are worked out. */
export interface SiteRow {
  readonly row: number;
  readonly label: string;
  /** Key of displacement tensors: the macromolecular `id`, else the label. */
  readonly key: string;
  readonly typeText: string | null;
  /** Fractional coordinates, where given. */
  readonly fractional: Vec3 | null;
  /** Cartesian coordinates of the file, Å, where given. */
  readonly cartesian: Vec3 | null;
  readonly occupancy: number;
  readonly place: Place;
}

/** The atom list of a block: its table, the rows that hold atoms, and what was left out. */
export interface SiteRows {
  readonly table: CategoryTable;
  readonly rows: readonly SiteRow[];
  /** Rows without usable coordinates, and rows that stand for no atom. */
  readonly withoutPosition: number;
  readonly dummies: number;
}

export const coordinateKeys = ['_atom_site_fract_x', '_atom_site_cartn_x'] as const;
const axes = ['x', 'y', 'z'] as const;
/** Cells or Å from the origin; further out no digits are left to place an atom by. */
const largestCoordinate = 1e6;

/**
 * Rows of the atom list. Left out, each with a problem: rows with a coordinate `?` or `.` (`cif-missing-coordinates`) or one
 * that is no number (`cif-bad-number`), points that are no atoms (`cif-dummy-atoms`), further models (`cif-several-models`).
 * Numbers with a repair are reported (`cif-odd-number`); a missing occupancy is 1; one above 1 is taken as given with a
 * warning, a negative one as 1 with an error (`cif-occupancy`). null where the block has no atom list.
 */
export function readSiteRows(view: BlockView, known: ReadonlySet<string>, log: ProblemLog): SiteRows | null {
  const table = atomTable(view, log);
  if (!table) return null;
  const reader = rowReader(view, table, known, log);
  const rows: SiteRow[] = [];
  for (let row = 0; row < table.rows; row++) {
    const read = reader.read(row);
    if (read) rows.push(read);
  }
  reader.close();
  reportFarOut(rows, log);
  return { table, rows, withoutPosition: reader.withoutPosition(), dummies: reader.dummies() };
}

/**
 * The atom list, also where it is cut into several loops (which CIF forbids): a further loop belongs to it where none of its labels
 * came before; one that repeats labels is another list and is left out (`cif-several-atom-lists`).
 */
function atomTable(view: BlockView, log: ProblemLog): CategoryTable | null {
  const table = categoryTable(view, coordinateKeys);
  if (!table || table.loops.length < 2) return table;
  const seen = new Set<string>();
  const kept = table.loops.filter((loop) => {
    const part = tableOfLoops(view, [loop]);
    const column = part.column('_atom_site_label', '_atom_site_id');
    const labels = Array.from({ length: part.rows }, (_, row) => textOf(column?.at(row)) ?? '');
    const fresh = labels.every((label) => !seen.has(label));
    if (fresh) for (const label of labels) seen.add(label);
    return fresh;
  });
  const left = table.loops.length - kept.length;
  const what = left === 0 ? 'were read as one list' : `repeat labels: ${left} of them were left out`;
  log.add(
    'warning',
    'cif-several-atom-lists',
    `The block holds ${table.loops.length} loops of atoms, which ${what}.`,
    {
      place: placeOfValue(view, table.loops[1]!),
      allowed: 'one loop of atoms a block',
    },
  );
  return tableOfLoops(view, kept);
}

interface RowReader {
  read(row: number): SiteRow | null;
  close(): void;
  withoutPosition(): number;
  dummies(): number;
}

function rowReader(
  view: BlockView,
  table: CategoryTable,
  known: ReadonlySet<string>,
  log: ProblemLog,
): RowReader {
  const labelOf = labelReader(table, view.macromolecular);
  const type = table.column('_atom_site_type_symbol');
  const id = view.macromolecular ? table.column('_atom_site_id') : null;
  const calcFlag = table.column('_atom_site_calc_flag');
  const occupancy = table.column('_atom_site_occupancy');
  const model = table.column('_atom_site_pdbx_pdb_model_num');
  const fractional = axes.map((axis) => table.column(`_atom_site_fract_${axis}`));
  const cartesian = axes.map((axis) => table.column(`_atom_site_cartn_${axis}`));
  const firstModel = model ? textOf(model.at(0)) : null;
  const dummyLabels: string[] = [];
  let withoutPosition = 0;
  let otherModels = 0;
  const read = (row: number): SiteRow | null => {
    if (model && textOf(model.at(row)) !== firstModel) {
      otherModels++;
      return null;
    }
    const label = labelOf(row) ?? textOf(type?.at(row)) ?? `row ${row + 1}`;
    const typeText = textOf(type?.at(row));
    if (isDummy(typeText, label, textOf(calcFlag?.at(row)), known)) {
      dummyLabels.push(label);
      return null;
    }
    const place = placeOfRow(view, table, row);
    const positions = [fractional, cartesian].map((columns) => position(view, columns, row, label, log));
    if (!positions.some((found) => Array.isArray(found))) {
      withoutPosition++;
      if (!positions.includes('bad')) reportMissing(label, place, log);
      return null;
    }
    const [frac, cart] = positions.map((found) => (Array.isArray(found) ? (found as unknown as Vec3) : null));
    return {
      row,
      label,
      key: textOf(id?.at(row)) ?? label,
      typeText,
      fractional: frac ?? null,
      cartesian: cart ?? null,
      occupancy: readOccupancy(view, occupancy, row, label, log),
      place,
    };
  };
  const close = (): void => {
    if (otherModels > 0) reportModels(firstModel, otherModels, placeOfRow(view, table, 0), log);
    if (dummyLabels.length > 0) reportDummies(dummyLabels, placeOfRow(view, table, 0), log);
  };
  return { read, close, withoutPosition: () => withoutPosition, dummies: () => dummyLabels.length };
}

function labelReader(table: CategoryTable, macromolecular: boolean): (row: number) => string | null {
  const plain = table.column('_atom_site_label');
  if (plain || !macromolecular) return (row) => textOf(plain?.at(row));
  const atom = table.column('_atom_site_auth_atom_id', '_atom_site_label_atom_id');
  const residue = table.column('_atom_site_auth_comp_id', '_atom_site_label_comp_id');
  const chain = table.column('_atom_site_auth_asym_id', '_atom_site_label_asym_id');
  const number = table.column('_atom_site_auth_seq_id', '_atom_site_label_seq_id');
  return (row) => {
    const name = textOf(atom?.at(row));
    if (name === null) return null;
    const before = [chain, residue, number].map((column) => textOf(column?.at(row)) ?? '');
    return before.every((part) => part === '') ? name : `${before[0]}:${before[1]}${before[2]}:${name}`;
  };
}

/** Three numbers; `absent` where a column or a value is missing, `bad` where a value is no number (reported). */
function position(
  view: BlockView,
  columns: readonly (CategoryColumn | null)[],
  row: number,
  label: string,
  log: ProblemLog,
): number[] | 'absent' | 'bad' {
  const numbers: number[] = [];
  for (const column of columns) {
    const value = column?.at(row);
    const text = textOf(value);
    if (!column || !value || text === null) return 'absent';
    const read = readNumber(text);
    if (!read || Math.abs(read.value) > largestCoordinate) {
      log.add(
        'error',
        'cif-bad-number',
        `${column.name} of ${label} is “${text}”, which is no usable number; the row was left out.`,
        {
          place: placeOfValue(view, value),
          got: text,
          allowed: `a number of at most ${largestCoordinate}, with an uncertainty in parentheses if known, or a fraction such as 1/3`,
        },
      );
      return 'bad';
    }
    if (read.repair !== null) {
      log.add(
        'warning',
        'cif-odd-number',
        `${column.name} of ${label} has ${read.repair}; read as ${read.value}.`,
        {
          place: placeOfValue(view, value),
          got: text,
        },
      );
    }
    numbers.push(read.value);
  }
  return numbers;
}

/** Occupancies are printed to three digits: so far outside 0 to 1 is rounding. */
const occupancyRounding = 0.0005;

function readOccupancy(
  view: BlockView,
  column: CategoryColumn | null,
  row: number,
  label: string,
  log: ProblemLog,
): number {
  const value = column?.at(row);
  const text = textOf(value);
  if (!value || text === null) return 1;
  const place = placeOfValue(view, value);
  const read = readNumber(text);
  const allowed = 'a number from 0 to 1';
  if (!read || !Number.isFinite(read.value)) {
    log.add(
      'warning',
      'cif-occupancy',
      `The occupancy of ${label} is “${text}”, which is no number; taken as 1.`,
      {
        place,
        got: text,
        allowed,
      },
    );
    return 1;
  }
  if (read.value < -occupancyRounding) {
    const message = `The occupancy of ${label} is ${text}, below nothing; taken as 1.`;
    log.add('error', 'cif-occupancy', message, { place, got: text, allowed });
    return 1;
  }
  if (read.value > 1 + occupancyRounding) {
    log.add('warning', 'cif-occupancy', `The occupancy of ${label} is ${text}; taken as given.`, {
      place,
      got: text,
      allowed,
    });
  }
  return Math.max(0, read.value);
}

function placeOfRow(view: BlockView, table: CategoryTable, row: number): Place {
  const first = table.column(
    '_atom_site_label',
    '_atom_site_id',
    '_atom_site_type_symbol',
    ...coordinateKeys,
  );
  const value = first?.at(row);
  return value ? placeOfValue(view, value) : placeOfValue(view, view.block);
}

/** A warning, for the file itself says that it does not know. */
function reportMissing(label: string, place: Place, log: ProblemLog): void {
  log.add(
    'warning',
    'cif-missing-coordinates',
    `${label} has no complete coordinates; the row was left out.`,
    {
      place,
      got: '? or .',
      allowed: 'three numbers',
      hint: 'The atom exists in the crystal but was not located: composition and pictures lack it.',
    },
  );
}

/** Cells from the origin beyond which a list is hardly one of fractions. */
const farOut = 10;

function reportFarOut(rows: readonly SiteRow[], log: ProblemLog): void {
  const far = rows.filter(({ fractional }) => fractional?.some((value) => Math.abs(value) > farOut));
  const [first] = far;
  if (!first) return;
  log.add(
    'warning',
    'cif-coordinates-far-out',
    `${far.length} of ${countOf(rows.length, 'atom')} ${wordFor(far.length, 'lies', 'lie')} more than ${farOut} cells from the origin: the coordinates may be per cent, ten-thousandths or Å and not fractions. They were read as fractions.`,
    {
      place: first.place,
      got: first.fractional!.join(' '),
      allowed: 'fractions of the cell edges, mostly between -1 and 2',
    },
  );
}

function reportModels(first: string | null, others: number, place: Place, log: ProblemLog): void {
  log.add(
    'warning',
    'cif-several-models',
    `The atom list holds several models; model ${first ?? '1'} was read, ${countOf(others, 'row of others was', 'rows of others were')} left out.`,
    {
      place,
    },
  );
}

function reportDummies(labels: readonly string[], place: Place, log: ProblemLog): void {
  const named = labels.slice(0, 10).join(', ') + (labels.length > 10 ? ', …' : '');
  log.add(
    'note',
    'cif-dummy-atoms',
    `${countOf(labels.length, 'row stands for no atom and was', 'rows stand for no atom and were')} left out: ${named}.`,
    {
      place,
    },
  );
}
