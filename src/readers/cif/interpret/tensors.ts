import { countOf, wordFor } from '#src/base/count-of.ts';
import type { Mat3 } from '#src/base/matrix3.ts';
import { asMat3 } from '#src/base/matrix3.ts';
import type { Place, ProblemLog } from '#src/base/problem.ts';
import type { Lattice } from '#src/crystal/lattice.ts';
import type { Site } from '#src/crystal/crystal.ts';
import { componentBeyondLimit, componentLimitText, componentText } from '#src/tensor/component-limit.ts';
import type { Quantity, TensorEntry, TensorSet } from '#src/tensor/tensor-set.ts';
import { unitOf } from '#src/tensor/tensor-set.ts';
import { efgTensorToAtomicUnits, efgUnitOf } from '#src/tensor/units.ts';
import type { CifValue } from '../cif-document.ts';
import type { BlockView } from './block-view.ts';
import { placeOfValue, textOf } from './block-view.ts';
import type { CategoryTable } from './category-table.ts';
import { categoryTable } from './category-table.ts';
import { readNumber } from './tolerant-number.ts';
import { isMissingMark } from '../../xyz/real-number.ts';

/** Our own loop for tensors in a CIF: label of the site, quantity, unit, nine components row by row. */
const prefix = '_ellipsite_tensor_';
const componentNames = [11, 12, 13, 21, 22, 23, 31, 32, 33].map((index) => `${prefix}${index}`);
const quantities: readonly Quantity[] = ['shielding', 'shift', 'efg'];

/** What the tensors of a block are bound to. */
export interface TensorGround {
  readonly sites: readonly Site[];
  readonly lattice: Lattice | null;
  /** False where the Cartesian frame is the dictionary's default and not written in the file. */
  readonly frameGiven: boolean;
  readonly structureIndex: number;
}

/**
 * Tensor sets of a block, one a quantity, from the loop `_ellipsite_tensor_…`: shielding and shift in ppm, EFG in
 * `a.u.` (also without a unit), `1e21V/m2` or `V/A2`, converted to atomic units; frame = that of the Cartesian transform of the
 * file, else the default frame (`cif-tensor-frame-assumed`). Rows with a faulty quantity, unit or component, also one beyond `largestComponent`, are left out,
 * and only these (`cif-bad-tensor`, one for all faulty components); a label that no site has, or several have, or that came before is reported (`cif-tensor-label`).
 */
export function readTensorSets(view: BlockView, ground: TensorGround, log: ProblemLog): TensorSet[] {
  const table = categoryTable(view, [`${prefix}site_label`, ...componentNames, `${prefix}quantity`]);
  if (!table) return [];
  const sites = sitesByLabel(ground.sites);
  const sets = new Map<Quantity, { quantity: Quantity; unitGiven: string; entries: TensorEntry[] }>();
  const seen = new Set<string>();
  const broken: BrokenRow[] = [];
  for (let row = 0; row < table.rows; row++) {
    const read = readRow(view, table, row, broken, log);
    if (!read) continue;
    const index = siteOf(read, sites, seen, log);
    if (index === 'repeated') continue;
    const site = index === null ? null : ground.sites[index]!;
    const set = sets.get(read.quantity) ?? {
      quantity: read.quantity,
      unitGiven: read.unitGiven,
      entries: [],
    };
    sets.set(read.quantity, set);
    set.entries.push({
      label: read.label,
      element: site?.element ?? 'X',
      atomIndex: index,
      cartesian: site?.cartesian ?? null,
      tensor: read.tensor,
      place: read.place,
    });
  }
  reportBroken(broken, table.rows, log);
  if (sets.size > 0 && ground.lattice && !ground.frameGiven) reportFrame(view, table, ground.lattice, log);
  return [...sets.values()].map(({ quantity, unitGiven, entries }) => ({
    name: `${view.block.name}, ${quantity}`,
    quantity,
    unitGiven,
    lattice: ground.lattice,
    structureIndex: ground.structureIndex,
    entries,
    file: view.source.name,
  }));
}

interface TensorRow {
  readonly label: string;
  readonly quantity: Quantity;
  readonly unitGiven: string;
  readonly tensor: Mat3;
  readonly place: Place;
}

/** A row with a component that is missing or no number. */
interface BrokenRow {
  readonly label: string;
  /** The texts that are no numbers. */
  readonly got: readonly string[];
  readonly place: Place;
}

function readRow(
  view: BlockView,
  table: CategoryTable,
  row: number,
  broken: BrokenRow[],
  log: ProblemLog,
): TensorRow | null {
  const cell = (name: string): CifValue | undefined => table.column(prefix + name)?.at(row);
  const label = textOf(cell('site_label'));
  const place = placeOfTensor(view, table, row);
  const bad = (what: string, got: string, allowed: string): null => {
    log.add(
      'error',
      'cif-bad-tensor',
      `Tensor row ${row + 1} (${label ?? 'no label'}): ${what}; the row was left out.`,
      {
        place,
        got,
        allowed,
      },
    );
    return null;
  };
  if (label === null) return bad('no site label', '?', 'a label of the atom list');
  const named = textOf(cell('quantity')) ?? '?';
  const quantity = quantities.find((one) => one === named.toLowerCase());
  if (!quantity) return bad(`the quantity is “${named}”`, named, quantities.join(', '));
  const unitText = textOf(cell('unit'));
  const components = componentNames.map((name) => textOf(table.column(name)?.at(row)));
  const numbers = components.map((text) => (text === null ? null : (readNumber(text)?.value ?? null)));
  if (!numbers.every((number) => number !== null && Number.isFinite(number))) {
    const got = components.map((text) => text ?? '?').filter((_, k) => !Number.isFinite(numbers[k]));
    broken.push({ label, got, place });
    return null;
  }
  const unitGiven = unitText ?? unitOf[quantity];
  const tensor = inCanonicalUnit(asMat3(numbers as number[]), quantity, unitGiven);
  if (!tensor)
    return bad(`the unit is “${unitGiven}”`, unitGiven, quantity === 'efg' ? 'a.u., 1e21V/m2, V/A2' : 'ppm');
  const beyond = componentBeyondLimit(tensor, quantity);
  if (beyond !== null) {
    const why = 'a component is larger than any tensor of this quantity has';
    return bad(why, componentText(beyond, quantity), componentLimitText(quantity));
  }
  return { label, quantity, unitGiven, tensor, place };
}

/** null where the unit is none of the quantity. */
function inCanonicalUnit(given: Mat3, quantity: Quantity, unitGiven: string): Mat3 | null {
  if (quantity !== 'efg') return /^(ppm|1e-6)$/i.test(unitGiven) ? given : null;
  const unit = efgUnitOf(unitGiven);
  return unit && efgTensorToAtomicUnits(given, unit);
}

const namedRows = 5;

function reportBroken(broken: readonly BrokenRow[], rows: number, log: ProblemLog): void {
  const [first] = broken;
  if (!first) return;
  const marked = broken.every(({ got }) => got.every(isMissingMark));
  const named = broken.slice(0, namedRows).map(({ label, place }) => `${label} in line ${place.line}`);
  const more = broken.length > namedRows ? ', …' : '';
  log.add(
    marked ? 'warning' : 'error',
    'cif-bad-tensor',
    `${broken.length} of ${countOf(rows, 'tensor row')} ${wordFor(broken.length, 'has', 'have')} a component that is missing or no number (${named.join(', ')}${more}); ${wordFor(broken.length, 'it was', 'they were')} left out, the other rows were kept.`,
    { place: first.place, got: first.got.join(' ').slice(0, 60), allowed: 'nine numbers' },
  );
}

function sitesByLabel(sites: readonly Site[]): Map<string, number[]> {
  const found = new Map<string, number[]>();
  for (const { label, index } of sites) {
    const before = found.get(label);
    if (before) before.push(index);
    else found.set(label, [index]);
  }
  return found;
}

function siteOf(
  { label, quantity, place }: TensorRow,
  sites: ReadonlyMap<string, readonly number[]>,
  seen: Set<string>,
  log: ProblemLog,
): number | null | 'repeated' {
  const key = `${quantity} ${label}`;
  if (seen.has(key)) {
    log.add('error', 'cif-tensor-label', `${label} has a second ${quantity} tensor; the first was kept.`, {
      place,
      got: label,
    });
    return 'repeated';
  }
  seen.add(key);
  const indices = sites.get(label) ?? [];
  if (indices.length === 1) return indices[0]!;
  const message =
    indices.length === 0
      ? `No site is called ${label}; its ${quantity} tensor stands alone.`
      : `${indices.length} sites are called ${label}; its ${quantity} tensor cannot be told to one of them.`;
  log.add('warning', 'cif-tensor-label', message, {
    place,
    got: label,
    allowed: 'a label of exactly one site',
  });
  return null;
}

function reportFrame(view: BlockView, table: CategoryTable, lattice: Lattice, log: ProblemLog): void {
  log.add(
    'warning',
    'cif-tensor-frame-assumed',
    `The file does not say in which Cartesian frame its tensors are; assumed: ${lattice.frame}.`,
    {
      place: placeOfTensor(view, table, 0),
      hint: 'Give _atom_sites_Cartn_tran_matrix_11 to _33, whose columns are a, b and c in that frame.',
    },
  );
}

function placeOfTensor(view: BlockView, table: CategoryTable, row: number): Place {
  const value = table.column(`${prefix}site_label`, componentNames[0]!)?.at(row);
  return placeOfValue(view, value ?? view.block);
}
