import type { ProblemLog } from '#src/base/problem.ts';
import type { CellConstants } from '#src/crystal/lattice.ts';
import { cellProblem } from '#src/crystal/lattice.ts';
import type { SymmetryOperation } from '#src/crystal/symmetry-operation.ts';
import type { BlockView } from './block-view.ts';
import { knownItem, placeOfBlock, placeOfValue } from './block-view.ts';
import { readNumber } from './tolerant-number.ts';

const lengthNames = ['a', 'b', 'c'] as const;
const angleNames = ['alpha', 'beta', 'gamma'] as const;
type CellName = (typeof lengthNames)[number] | (typeof angleNames)[number];

/** Levelled names of the constants, lengths first. */
export const cellItems: readonly string[] = [...lengthNames, ...angleNames].map(itemName);

/** How far a stated volume may be from that of the constants before it is reported, relative. */
const volumeTolerance = 0.02;

/**
 * Cell constants of a block, Å and degrees. Missing angles are 90° as the core dictionary has it (or 120° where only that
 * fits the operations), missing lengths those of the axes the operations make equal, each with a warning. null where the
 * file names no cell (no problem), where lengths stay unknown (`cif-cell-incomplete`) or where the constants cannot be a
 * cell (`cif-cell-impossible`). A stated volume that is off by more than 2 % is reported (`cif-volume-disagrees`).
 */
export function readCell(
  view: BlockView,
  operations: readonly SymmetryOperation[],
  log: ProblemLog,
): CellConstants | null {
  const found = new Map<CellName, number>();
  for (const name of [...lengthNames, ...angleNames]) {
    const value = readConstant(view, name, log);
    if (value !== null) found.set(name, value);
  }
  if (!lengthNames.some((name) => found.has(name))) return null;
  fillLengths(view, found, operations, log);
  if (!lengthNames.every((name) => found.has(name))) {
    log.add('error', 'cif-cell-incomplete', `The cell lacks ${missing(found)}.`, {
      place: placeOfBlock(view),
      allowed: 'three lengths and three angles',
      hint: 'Add the missing cell constants to the file.',
    });
    return null;
  }
  fillAngles(view, found, operations, log);
  const cell = Object.fromEntries(found) as unknown as CellConstants;
  const impossible = cellProblem(cell);
  if (impossible !== null) {
    const { a, b, c, alpha, beta, gamma } = cell;
    log.add('error', 'cif-cell-impossible', impossible, {
      place: placeOfCell(view),
      got: `${a} ${b} ${c} Å, ${alpha} ${beta} ${gamma}°`,
      hint: 'Compare the cell constants with the publication: one is mistyped or missing.',
    });
    return null;
  }
  return cell;
}

function readConstant(view: BlockView, name: CellName, log: ProblemLog): number | null {
  const item = knownItem(view, itemName(name));
  if (!item) return null;
  const place = placeOfValue(view, item.value);
  const read = readNumber(item.text);
  if (read === null) {
    log.add('error', 'cif-bad-number', `${item.name} is “${item.text}”, which is no number.`, {
      place,
      got: item.text,
      allowed: 'a number, with an uncertainty in parentheses if known',
    });
    return null;
  }
  if (read.repair !== null) {
    log.add('warning', 'cif-odd-number', `${item.name} has ${read.repair}; read as ${read.value}.`, {
      place,
      got: item.text,
    });
  }
  return read.value;
}

function itemName(name: CellName): string {
  return name.length === 1 ? `_cell_length_${name}` : `_cell_angle_${name}`;
}

function missing(found: ReadonlyMap<CellName, number>): string {
  return [...lengthNames, ...angleNames].filter((name) => !found.has(name)).join(', ');
}

/** Axes that an operation carries into one another are equally long. */
function fillLengths(
  view: BlockView,
  found: Map<CellName, number>,
  operations: readonly SymmetryOperation[],
  log: ProblemLog,
): void {
  for (const { rotation } of operations) {
    for (let column = 0; column < 3; column++) {
      const entries = [rotation[column]!, rotation[column + 3]!, rotation[column + 6]!];
      const row = entries.findIndex((entry) => entry !== 0);
      if (entries.filter((entry) => entry !== 0).length !== 1 || row === column) continue;
      const [from, to] = [lengthNames[row]!, lengthNames[column]!];
      const known = found.get(from);
      if (known === undefined || found.has(to)) continue;
      found.set(to, known);
      log.add(
        'warning',
        'cif-cell-completed',
        `${to} is not given; taken as ${from} = ${known} Å, which the symmetry demands.`,
        {
          place: placeOfCell(view),
        },
      );
    }
  }
}

function fillAngles(
  view: BlockView,
  found: Map<CellName, number>,
  operations: readonly SymmetryOperation[],
  log: ProblemLog,
): void {
  const absent = angleNames.filter((name) => !found.has(name));
  if (absent.length === 0) return;
  const hexagonal = operations.some(
    ({ rotation: r }) => r[0] + r[4] === -1 && r[8] === 1 && r[1] * r[3] === -1,
  );
  for (const name of absent) found.set(name, name === 'gamma' && hexagonal ? 120 : 90);
  const taken = absent.map((name) => `${name} = ${found.get(name)}°`).join(', ');
  log.add('warning', 'cif-cell-completed', `Cell angles are not given; taken as ${taken}.`, {
    place: placeOfCell(view),
    hint: 'Add the angles to the file if they differ.',
  });
}

function placeOfCell(view: BlockView): ReturnType<typeof placeOfBlock> {
  const item = knownItem(view, '_cell_length_a', '_cell_length_b', '_cell_length_c');
  return item ? placeOfValue(view, item.value) : placeOfBlock(view);
}

/** Reports a stated cell volume (Å³) that the constants do not give. */
export function checkVolume(view: BlockView, volume: number, log: ProblemLog): void {
  const item = knownItem(view, '_cell_volume');
  const stated = item && readNumber(item.text);
  if (!item || !stated || stated.value <= 0) return;
  if (Math.abs(stated.value - volume) <= volumeTolerance * volume) return;
  log.add(
    'warning',
    'cif-volume-disagrees',
    `The file states a cell volume of ${item.text} Å³; the cell constants give ${volume.toFixed(2)} Å³.`,
    {
      place: placeOfValue(view, item.value),
      got: item.text,
      hint: 'One of the cell constants may be mistyped.',
    },
  );
}
