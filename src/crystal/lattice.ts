import type { Mat3, Vec3, VecCart, VecFrac } from '#src/base/matrix3.ts';
import {
  apply,
  determinant,
  inverse,
  matrixFromRows,
  multiply,
  rowsOf,
  transpose,
} from '#src/base/matrix3.ts';
import { cross, dot, length, scale, subtract } from '#src/base/vector3.ts';
import { cosDegrees, degreesFromCosine, sinDegrees } from './exact-angles.ts';
import type { LatticeSetting, LatticeSettingName } from './settings.ts';
import { defaultLatticeSetting, latticeSetting, latticeSettings } from './settings.ts';

/** Lengths in Å, angles in degrees. */
export interface CellConstants {
  readonly a: number;
  readonly b: number;
  readonly c: number;
  readonly alpha: number;
  readonly beta: number;
  readonly gamma: number;
}

/**
 * A lattice with the Cartesian frame it was given in. `rows` holds a, b, c as rows (Å); `toCartesian` = rowsᵀ takes
 * fractional to Cartesian columns, `toFractional` is its inverse.
 */
export interface Lattice {
  readonly rows: Mat3;
  readonly cell: CellConstants;
  /** Å³; positive also for a left-handed set of vectors. */
  readonly volume: number;
  readonly toCartesian: Mat3;
  readonly toFractional: Mat3;
  /** In words, where the Cartesian frame came from: "as given", "a ∥ x, b in xy", … */
  readonly frame: string;
}

/** Shortest and longest cell vector that is believed, Å. */
const shortestVector = 0.01;
const longestVector = 1e6;
/** Least volume over abc, a pure number: below it the three vectors count as lying in a plane. */
const flattest = 1e-4;

/**
 * The lattice of three vectors as they stand, Å, rows a, b, c. The rows are kept bit by bit, left-handed sets too; they
 * must have passed `rowsProblem`, else the numbers derived here are not finite.
 */
export function latticeFromRows(rows: Mat3, frame: string): Lattice {
  return latticeWith(rows, cellFromRows(rows), frame);
}

/**
 * The right-handed lattice of cell constants in one of the named Cartesian settings; without one c is along z and b in
 * the yz plane. Angles of exactly 60°, 90° and 120° leave no rounding noise: zeros are zeros and halves are halves.
 * The constants must have passed `cellProblem`.
 *
 * `latticeFromCell({a: 5, b: 5, c: 6, alpha: 90, beta: 90, gamma: 120}).rows` → [4.33…, −2.5, 0, 0, 5, 0, 0, 0, 6]
 */
export function latticeFromCell(
  cell: CellConstants,
  setting: LatticeSettingName = defaultLatticeSetting,
): Lattice {
  const chosen = latticeSetting(setting);
  return latticeWith(rowsInSetting(cell, chosen), { ...cell }, chosen.sentence);
}

/** Cell constants of rows a, b, c (Å): lengths in Å, angles in degrees, the same for left-handed rows. */
export function cellFromRows(rows: Mat3): CellConstants {
  const [a, b, c] = rowsOf(rows);
  return {
    a: length(a),
    b: length(b),
    c: length(c),
    alpha: angleBetween(b, c),
    beta: angleBetween(c, a),
    gamma: angleBetween(a, b),
  };
}

/** Cartesian coordinates, Å, in the frame of the lattice, of a fractional position. */
export function toCartesian(lattice: Lattice, position: VecFrac): VecCart {
  return apply(lattice.toCartesian, position);
}

/** Fractional coordinates of a Cartesian position (Å) given in the frame of the lattice; not reduced to [0, 1). */
export function toFractional(lattice: Lattice, position: VecCart): VecFrac {
  return apply(lattice.toFractional, position);
}

/** Metric tensor G, Å², Gᵢⱼ = aᵢ·aⱼ: the squared length of a fractional vector x is xᵀ G x (International Tables A, 1.5). */
export function metricTensor(lattice: Lattice): Mat3 {
  return multiply(lattice.rows, transpose(lattice.rows));
}

/** Reciprocal vectors a*, b*, c* as rows, Å⁻¹, in the lattice's frame, without the factor 2π: aᵢ·aⱼ* = δᵢⱼ. */
export function reciprocalRows(lattice: Lattice): Mat3 {
  return lattice.toFractional;
}

/**
 * Why cell constants cannot be a cell, as a sentence with what was found and what is allowed; null for a sound cell.
 * Allowed: lengths of 0.01 to 1,000,000 Å, angles between 0° and 180°, every angle smaller than the sum of the other
 * two, all three together less than 360°, and a volume above 0.0001 abc.
 */
export function cellProblem(cell: CellConstants): string | null {
  const { a, b, c, alpha, beta, gamma } = cell;
  for (const [name, size] of Object.entries({ a, b, c })) {
    if (!(size >= shortestVector && size <= longestVector)) {
      return `The cell length ${name} is ${size} Å; a length is between ${shortestVector} and ${longestVector} Å.`;
    }
  }
  for (const [name, angle] of Object.entries({ alpha, beta, gamma })) {
    if (!(angle > 0 && angle < 180)) {
      return `The cell angle ${name} is ${angle}°; an angle is larger than 0° and smaller than 180°.`;
    }
  }
  const sum = alpha + beta + gamma;
  if (sum >= 360) return `The cell angles add up to ${sum}°; together they are smaller than 360°.`;
  const largest = Math.max(alpha, beta, gamma);
  if (2 * largest >= sum) {
    return `The cell angle of ${largest}° is not smaller than the sum of the other two (${sum - largest}°), so no such cell exists.`;
  }
  const flatness = volumeShare(cell);
  if (flatness > flattest) return null;
  return `The cell is flat: its vectors lie ${isFlat(flatness)} in one plane. Its volume is ${shown(flatness * a * b * c)} Å³; with these lengths it is more than ${shown(flattest * a * b * c)} Å³.`;
}

/** The same for three vectors as rows (Å): finite, of sensible length and not in one plane; null where they span a cell. */
export function rowsProblem(rows: Mat3): string | null {
  if (!rows.every(Number.isFinite)) return 'The lattice vectors hold something that is not a finite number.';
  const lengths = rowsOf(rows).map(length);
  for (const [index, size] of lengths.entries()) {
    if (!(size >= shortestVector && size <= longestVector)) {
      return `Lattice vector ${index + 1} is ${size} Å long; a length is between ${shortestVector} and ${longestVector} Å.`;
    }
  }
  const product = lengths.reduce((all, size) => all * size, 1);
  const flatness = Math.abs(determinant(rows)) / product;
  if (flatness > flattest) return null;
  const where = parallelVectors(rows) ?? `the three vectors lie ${isFlat(flatness)} in one plane`;
  return `The cell is flat: ${where}. Its volume is ${shown(flatness * product)} Å³; vectors of ${lengths.map(shown).join(', ')} Å span more than ${shown(flattest * product)} Å³.`;
}

/** “vectors 1 and 2 are parallel”, where two are (within 0.006°). */
function parallelVectors(rows: Mat3): string | null {
  const vectors = rowsOf(rows);
  const pair = (
    [
      [0, 1],
      [0, 2],
      [1, 2],
    ] as const
  ).find(([i, j]) => {
    const [p, q] = [vectors[i], vectors[j]];
    return length(cross(p, q)) <= flattest * length(p) * length(q);
  });
  return pair ? `vectors ${pair[0] + 1} and ${pair[1] + 1} are parallel` : null;
}

function isFlat(flatness: number): string {
  return flatness < 1e-9 ? 'exactly' : 'almost';
}

function shown(value: number): string {
  return String(Number(value.toPrecision(3)));
}

/**
 * Names of all settings whose rows agree with the given ones within a tolerance in Å for each of the nine numbers;
 * several where settings coincide for this cell, none for a frame of another kind or a left-handed set.
 */
export function settingsOfRows(rows: Mat3, toleranceAngstrom = 1e-3): LatticeSettingName[] {
  const cell = cellFromRows(rows);
  return latticeSettings
    .filter((setting) =>
      rowsInSetting(cell, setting).every((value, i) => Math.abs(value - rows[i]!) <= toleranceAngstrom),
    )
    .map(({ name }) => name);
}

function latticeWith(rows: Mat3, cell: CellConstants, frame: string): Lattice {
  const columns = transpose(rows);
  return {
    rows,
    cell,
    volume: Math.abs(determinant(rows)),
    toCartesian: columns,
    toFractional: withoutNegativeZeros(inverse(columns)),
    frame,
  };
}

/** Places the setting's first vector on its axis, the second in its half-plane, the third by its cosines with both. */
function rowsInSetting(cell: CellConstants, setting: LatticeSetting): Mat3 {
  if (setting.along === 'a+b') return rowsAlongSum(cell, setting);
  const third = (['a', 'b', 'c'] as const).find((v) => v !== setting.along && v !== setting.inPlane)!;
  const placed = placeTriple(cell, [setting.along, setting.inPlane, third], setting);
  return matrixFromRows(placed.a, placed.b, placed.c);
}

/** a + b, b and c span the same volume with the same hand as a, b, c; a follows as the difference. */
function rowsAlongSum(cell: CellConstants, setting: LatticeSetting): Mat3 {
  const { a, b, c, alpha, beta, gamma } = cell;
  const sum = Math.sqrt(a * a + b * b + 2 * a * b * cosDegrees(gamma));
  const derived: CellConstants = {
    a: sum,
    b,
    c,
    alpha,
    beta: degreesFromCosine((a * cosDegrees(beta) + b * cosDegrees(alpha)) / sum),
    gamma: degreesFromCosine((a * cosDegrees(gamma) + b) / sum),
  };
  const placed = placeTriple(derived, ['a', 'b', 'c'], setting);
  return matrixFromRows(subtract(placed.a, placed.b), placed.b, placed.c);
}

type VectorName = 'a' | 'b' | 'c';

function placeTriple(
  cell: CellConstants,
  [first, second, third]: readonly [VectorName, VectorName, VectorName],
  setting: LatticeSetting,
): Record<VectorName, Vec3> {
  const along = 'xyz'.indexOf(setting.alongAxis);
  const plane = 'xyz'.indexOf(setting.planeAxis);
  const rest = 3 - along - plane;
  const between = angleOf(cell, first, second);
  const u = cosDegrees(angleOf(cell, first, third));
  const v = (cosDegrees(angleOf(cell, second, third)) - u * cosDegrees(between)) / sinDegrees(between);
  const w = volumeShare(cell) / sinDegrees(between);
  const hand = parity('abc'.indexOf(first), 'abc'.indexOf(second)) * parity(along, plane);
  const direction = (x: number, y: number, z: number): Vec3 => {
    const out: [number, number, number] = [0, 0, 0];
    out[along] = x;
    out[plane] = y;
    out[rest] = z;
    return out;
  };
  const directions = {
    [first]: direction(1, 0, 0),
    [second]: direction(cosDegrees(between), sinDegrees(between), 0),
    [third]: direction(u, v, hand * w),
  } as Record<VectorName, Vec3>;
  return {
    a: scale(cell.a, directions.a),
    b: scale(cell.b, directions.b),
    c: scale(cell.c, directions.c),
  };
}

/** +1 where (first, second, the remaining one) is an even permutation of (0, 1, 2), else −1. */
function parity(first: number, second: number): number {
  return (second - first + 3) % 3 === 1 ? 1 : -1;
}

function angleOf(cell: CellConstants, p: VectorName, q: VectorName): number {
  const other = [...'abc'].find((v) => v !== p && v !== q);
  return other === 'a' ? cell.alpha : other === 'b' ? cell.beta : cell.gamma;
}

/**
 * V / abc = 2 √(sin s · sin(s−α) · sin(s−β) · sin(s−γ)), s half the sum of the angles (International Tables C, 1.1);
 * unlike the cosine form it keeps its digits for flat cells. With two right angles it is the sine of the third.
 */
function volumeShare({ alpha, beta, gamma }: CellConstants): number {
  const oblique = [alpha, beta, gamma].filter((angle) => angle !== 90);
  if (oblique.length <= 1) return sinDegrees(oblique[0] ?? 90);
  const s = (alpha + beta + gamma) / 2;
  const product = [s, s - alpha, s - beta, s - gamma].reduce((p, angle) => p * sinDegrees(angle), 1);
  return product > 0 ? 2 * Math.sqrt(product) : 0;
}

function angleBetween(p: Vec3, q: Vec3): number {
  return degreesFromCosine(dot(p, q) / (length(p) * length(q)));
}

function withoutNegativeZeros(m: Mat3): Mat3 {
  return m.map((value) => value + 0) as unknown as Mat3;
}
