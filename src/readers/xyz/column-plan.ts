import { countOf } from '#src/base/count-of.ts';
import type { Quantity } from '#src/tensor/tensor-set.ts';
import type { CommentLine } from './comment-line.ts';
import type { ProblemLog } from '#src/base/problem.ts';
import type { Place } from '#src/base/problem.ts';
import { efgUnitOf, efgUnitsPerAtomicUnit } from '#src/tensor/units.ts';
import type { Column, Properties } from './properties.ts';

/** Takes a proposed column as a quantity in a unit: the user's answer to a proposal, by column name. */
export type AcceptedColumns = Readonly<
  Record<string, { readonly quantity: Quantity; readonly unit?: string | null }>
>;

/** A nine-component column that is read as a tensor, with the factor to the canonical unit. */
export interface TensorColumn {
  readonly column: Column;
  readonly quantity: Quantity;
  /** As the file or the user names it. */
  readonly unitGiven: string;
  readonly toCanonical: number;
}

/** Which column of a row is what. */
export interface ColumnPlan {
  /** Fields a row must have. */
  readonly fields: number;
  readonly species: Column | null;
  readonly position: Column | null;
  readonly site: Column | null;
  readonly tensors: readonly TensorColumn[];
  /** Nine real numbers a row, but not one of our names. */
  readonly candidates: readonly Column[];
}

const speciesNames = ['species', 'symbol', 'symbols', 'element', 'elements'];
const numberNames = ['z', 'number', 'numbers', 'atomic_number', 'atomic_numbers'];
const positionNames = ['pos', 'position', 'positions'];
const ownQuantities: readonly Quantity[] = ['shielding', 'shift', 'efg'];

/**
 * Finds species, position, `site` and tensor columns by name, in any case and order. Reports `xyz-no-species`,
 * `xyz-species-guessed`, `xyz-no-positions`, `xyz-tensor-shape`, `xyz-unknown-unit`, `xyz-column-not-found`.
 */
export function planColumns(
  properties: Properties,
  comment: CommentLine,
  accept: AcceptedColumns,
  place: Place,
  log: ProblemLog,
): ColumnPlan {
  const { columns, fields } = properties;
  const site = named(columns, ['site'], ({ type, count }) => type === 'S' && count === 1);
  const tensors: TensorColumn[] = [];
  const candidates: Column[] = [];
  for (const column of columns) {
    const accepted = Object.hasOwn(accept, column.name) ? accept[column.name] : undefined;
    const own = ownQuantities.find((quantity) => quantity === column.key);
    const nine = column.count === 9 && (column.type === 'R' || column.type === 'I');
    const quantity = accepted?.quantity ?? own;
    if (quantity === undefined) {
      if (nine && column.type === 'R') candidates.push(column);
    } else if (!nine) reportShape(column, place, log);
    else {
      const unit = accepted?.unit ?? comment.byKey.get(`${column.key}_unit`)?.value ?? null;
      const tensor = tensorColumn(column, quantity, unit, place, log);
      if (tensor !== null) tensors.push(tensor);
    }
  }
  const position = findPosition(columns, place, log);
  const species = findSpecies(columns, site, place, log);
  return { fields, species, position, site, tensors, candidates };
}

function named(
  columns: readonly Column[],
  names: readonly string[],
  fits: (column: Column) => boolean,
): Column | null {
  return columns.find((column) => names.includes(column.key) && fits(column)) ?? null;
}

function findPosition(columns: readonly Column[], place: Place, log: ProblemLog): Column | null {
  const found = named(columns, positionNames, ({ type, count }) => count === 3 && /[RI]/.test(type));
  if (found === null) {
    log.add('error', 'xyz-no-positions', 'Properties names no column of positions; no structure was made.', {
      place,
      got: columns.map(({ name }) => name).join(', ') || 'no column',
      allowed: 'pos:R:3',
      hint: 'Tensors in the file are kept: open the structure they belong to beside them.',
    });
  }
  return found;
}

function findSpecies(
  columns: readonly Column[],
  site: Column | null,
  place: Place,
  log: ProblemLog,
): Column | null {
  const single = ({ count }: Column): boolean => count === 1;
  const found = named(columns, speciesNames, single) ?? named(columns, numberNames, single);
  if (found !== null) return found;
  const text = columns.find((column) => column.type === 'S' && column.count === 1 && column !== site);
  if (text !== undefined) {
    log.add(
      'warning',
      'xyz-species-guessed',
      `No column is named species; the elements were taken from ${text.name}.`,
      { place, got: text.name, allowed: 'species:S:1 or Z:I:1' },
    );
    return text;
  }
  const noElements = 'No column names the elements; they were read from the site labels where there are any.';
  log.add('error', 'xyz-no-species', noElements, { place, allowed: 'species:S:1 or Z:I:1' });
  return null;
}

function reportShape(column: Column, place: Place, log: ProblemLog): void {
  log.add(
    'error',
    'xyz-tensor-shape',
    `The column ${column.name} has ${countOf(column.count, 'field')} of type ${column.type}; a tensor has nine real ones. It was not read.`,
    {
      place,
      got: `${column.name}:${column.type}:${column.count}`,
      allowed: `${column.name}:R:9, row by row`,
      hint: 'Write all nine components, or give the column another name if it is no tensor.',
    },
  );
}

function tensorColumn(
  column: Column,
  quantity: Quantity,
  unit: string | null,
  place: Place,
  log: ProblemLog,
): TensorColumn | null {
  if (quantity === 'efg') {
    const known = unit === null ? 'au' : efgUnitOf(unit);
    if (known === null) return reportUnit(column, unit ?? '', 'a.u., 1e21V/m2, V/A2, V/m2', place, log);
    const toCanonical = 1 / efgUnitsPerAtomicUnit[known];
    return { column, quantity, unitGiven: unit ?? 'a.u.', toCanonical };
  }
  if (unit !== null && !/^\s*(?:ppm|1e-6|10\^-6)\s*$/i.test(unit)) {
    return reportUnit(column, unit, 'ppm', place, log);
  }
  return { column, quantity, unitGiven: unit ?? 'ppm', toCanonical: 1 };
}

function reportUnit(column: Column, unit: string, allowed: string, place: Place, log: ProblemLog): null {
  log.add(
    'error',
    'xyz-unknown-unit',
    `The unit "${unit.slice(0, 40)}" of ${column.name} is not known; the column was not read.`,
    { place, got: unit.slice(0, 80), allowed, hint: `Write one of them as ${column.key}_unit.` },
  );
  return null;
}
