import { rowsOf } from '#src/base/matrix3.ts';
import type { ProblemLog } from '#src/base/problem.ts';
import type { Displacement } from '#src/crystal/crystal.ts';
import { displacementMatrix } from '#src/crystal/crystal.ts';
import type { Lattice } from '#src/crystal/lattice.ts';
import { metricTensor, reciprocalRows } from '#src/crystal/lattice.ts';
import { length } from '#src/base/vector3.ts';
import type { BlockView } from './block-view.ts';
import { placeOfBlock, textOf } from './block-view.ts';
import type { CategoryColumn, CategoryTable } from './category-table.ts';
import { categoryTable } from './category-table.ts';
import type { SiteRow } from './site-rows.ts';
import { readNumber } from './tolerant-number.ts';

type Six = NonNullable<Displacement['uAniso']>;
type Kind = Displacement['given'];

const indices = ['11', '22', '33', '12', '13', '23'] as const;
const squarePi = Math.PI * Math.PI;
/** No mean-square displacement is this large, Å²: what a file calls U beyond it is a B where the file says so too. */
const eightSquarePi = 8 * squarePi;

/**
 * Displacement of every row, converted to U: B = 8π²U; β^ij = 2π² a*ᵢ a*ⱼ U^ij (Trueblood et al. 1996). Tensors stand in a loop
 * of their own, keyed by label (repeated labels match in order), or beside the coordinates; the order in the file does not
 * matter. Where the displacement type says `Biso` in a column of U, the number is a B (`cif-b-called-u`).
 */
export function readDisplacements(
  view: BlockView,
  table: CategoryTable,
  rows: readonly SiteRow[],
  lattice: Lattice | null,
  log: ProblemLog,
): (Displacement | null)[] {
  const isotropic = isotropicReader(view, table, log);
  const anisotropic = anisotropicReader(view, table, lattice);
  return rows.map((row) => {
    const tensor = anisotropic(row);
    const single = isotropic(row.row);
    if (!tensor && single === null) return null;
    const uEquivalent = single?.value ?? (tensor && lattice ? equivalentU(tensor.six, lattice) : null);
    return { uAniso: tensor?.six ?? null, uEquivalent, given: tensor?.kind ?? single?.kind ?? 'U' };
  });
}

/** ⅓ Σ U^ij a*ᵢ a*ⱼ aᵢ·aⱼ, Å²: a third of the trace in Cartesian axes (Fischer & Tillmanns 1988). */
export function equivalentU(six: Six, lattice: Lattice): number {
  const metric = metricTensor(lattice);
  const lengths = reciprocalLengths(lattice);
  const u = displacementMatrix(six);
  let sum = 0;
  for (let i = 0; i < 3; i++)
    for (let j = 0; j < 3; j++) sum += u[3 * i + j]! * lengths[i]! * lengths[j]! * metric[3 * i + j]!;
  return sum / 3;
}

interface Isotropic {
  readonly value: number;
  readonly kind: Kind;
}

function isotropicReader(
  view: BlockView,
  table: CategoryTable,
  log: ProblemLog,
): (row: number) => Isotropic | null {
  const u = table.column('_atom_site_u_iso_or_equiv', '_atom_site_u_equiv_geom_mean');
  const b = table.column('_atom_site_b_iso_or_equiv', '_atom_site_b_equiv_geom_mean');
  const type = table.column('_atom_site_adp_type', '_atom_site_thermal_displace_type');
  let reported = false;
  return (row) => {
    const fromU = numberAt(u, row);
    if (fromU !== null && !/^b/i.test(textOf(type?.at(row)) ?? '')) return { value: fromU, kind: 'U' };
    if (fromU !== null) {
      if (!reported) reportCalledU(view, u!.name, log);
      reported = true;
      return { value: fromU / eightSquarePi, kind: 'B' };
    }
    const fromB = numberAt(b, row);
    return fromB === null ? null : { value: fromB / eightSquarePi, kind: 'B' };
  };
}

function reportCalledU(view: BlockView, name: string, log: ProblemLog): void {
  log.add(
    'warning',
    'cif-b-called-u',
    `Numbers in ${name} are marked as B by the displacement type; they were divided by 8π².`,
    {
      place: placeOfBlock(view),
    },
  );
}

interface Anisotropic {
  readonly six: Six;
  readonly kind: Kind;
}

/** Columns of six components under each of the three conventions, levelled names without the index. */
const conventions: readonly { readonly prefix: string; readonly kind: Kind }[] = [
  { prefix: '_atom_site_aniso_u_', kind: 'U' },
  { prefix: '_atom_site_anisotrop_u_', kind: 'U' },
  { prefix: '_atom_site_aniso_b_', kind: 'B' },
  { prefix: '_atom_site_anisotrop_b_', kind: 'B' },
  { prefix: '_atom_site_aniso_beta_', kind: 'beta' },
];

function anisotropicReader(
  view: BlockView,
  sites: CategoryTable,
  lattice: Lattice | null,
): (row: SiteRow) => Anisotropic | null {
  const beside = sixReader(sites, lattice);
  const keys = ['_atom_site_aniso_label', '_atom_site_anisotrop_id'];
  const own = categoryTable(view, keys);
  const key = own?.column(...keys);
  const ownSix = own && sixReader(own, lattice);
  if (!own || !key || !ownSix) return (row) => beside?.(row.row) ?? null;
  const queues = new Map<string, number[]>();
  for (let row = 0; row < own.rows; row++) {
    const label = textOf(key.at(row));
    if (label === null) continue;
    const queue = queues.get(label);
    if (queue) queue.push(row);
    else queues.set(label, [row]);
  }
  const used = new Map<string, number>();
  return (row) => {
    const queue = queues.get(row.key) ?? queues.get(row.label);
    if (!queue) return beside?.(row.row) ?? null;
    const turn = used.get(row.key) ?? 0;
    used.set(row.key, turn + 1);
    const at = queue[turn];
    return at === undefined ? null : ownSix(at);
  };
}

function sixReader(
  table: CategoryTable,
  lattice: Lattice | null,
): ((row: number) => Anisotropic | null) | null {
  const found = conventions
    .map(({ prefix, kind }) => ({ kind, columns: indices.map((index) => table.column(prefix + index)) }))
    .filter(({ columns }) => columns.every((column) => column !== null));
  if (found.length === 0) return null;
  return (row) => {
    for (const { kind, columns } of found) {
      const numbers = columns.map((column) => numberAt(column, row));
      if (numbers.some((number) => number === null)) continue;
      const six = toU(numbers as unknown as Six, kind, lattice);
      if (six) return { six, kind };
    }
    return null;
  };
}

/** null for β without a cell, which then has no meaning. */
function toU(six: Six, kind: Kind, lattice: Lattice | null): Six | null {
  if (kind === 'U') return six;
  if (kind === 'B') return six.map((value) => value / eightSquarePi) as unknown as Six;
  if (!lattice) return null;
  const [a, b, c] = reciprocalLengths(lattice);
  const factors = [a * a, b * b, c * c, a * b, a * c, b * c];
  return six.map((value, i) => value / (2 * squarePi * factors[i]!)) as unknown as Six;
}

function reciprocalLengths(lattice: Lattice): [number, number, number] {
  const [a, b, c] = rowsOf(reciprocalRows(lattice)).map(length);
  return [a!, b!, c!];
}

function numberAt(column: CategoryColumn | null, row: number): number | null {
  const text = textOf(column?.at(row));
  const value = text === null ? null : (readNumber(text)?.value ?? null);
  return value !== null && Number.isFinite(value) ? value : null;
}
