import type { Mat3, Vec3 } from '#src/base/matrix3.ts';
import { apply, inverse, multiply, transpose } from '#src/base/matrix3.ts';

/**
 * Crystal geometry as plainly as it can be written, apart from src/crystal on purpose: the samples are made by it and
 * checked by the other.
 */
export interface PlainOperation {
  readonly rotation: Mat3;
  readonly translation: Vec3;
}

/** Text such as `-x+y,-x,z+1/3`. */
export function plainOperation(text: string): PlainOperation {
  const rotation: number[] = [];
  const translation: number[] = [];
  for (const part of text.split(',')) {
    for (const axis of 'xyz') {
      const sign = new RegExp(`(-?)${axis}`).exec(part);
      rotation.push(sign === null ? 0 : sign[1] === '-' ? -1 : 1);
    }
    const shift = /([+-])(\d)\/(\d)$/.exec(part);
    translation.push(shift === null ? 0 : (Number(`${shift[1]}1`) * Number(shift[2])) / Number(shift[3]));
  }
  return { rotation: rotation as unknown as Mat3, translation: translation as unknown as Vec3 };
}

/** Rows a, b, c with a along x and b in the xy plane, Å. */
export function rowsAlongX([a, b, c, alpha, beta, gamma]: readonly number[]): Mat3 {
  const [ca, cb, cg] = [cosine(alpha!), cosine(beta!), cosine(gamma!)];
  const sg = Math.sqrt(1 - cg * cg);
  const cy = (ca - cb * cg) / sg;
  return rounded([a!, 0, 0, b! * cg, b! * sg, 0, c! * cb, c! * cy, c! * Math.sqrt(1 - cb * cb - cy * cy)], 8);
}

/** Rows a, b, c with c along z and b in the yz plane, Å: the default frame of the core dictionary. */
export function rowsAlongZ([a, b, c, alpha, beta, gamma]: readonly number[]): Mat3 {
  const [ca, cb, cg] = [cosine(alpha!), cosine(beta!), cosine(gamma!)];
  const sa = Math.sqrt(1 - ca * ca);
  const ay = (cg - ca * cb) / sa;
  return rounded([a! * Math.sqrt(1 - cb * cb - ay * ay), a! * ay, a! * cb, 0, b! * sa, b! * ca, 0, 0, c!], 8);
}

/** The same vectors turned by an angle about an axis (Rodrigues' formula). */
export function turnedRows(rows: Mat3, axis: Vec3, degrees: number): Mat3 {
  const size = Math.hypot(...axis);
  const [x, y, z] = axis.map((part) => part / size) as unknown as Vec3;
  const angle = (degrees * Math.PI) / 180;
  const [c, s] = [Math.cos(angle), Math.sin(angle)];
  const v = 1 - c;
  const turn: Mat3 = [
    c + x * x * v,
    x * y * v - z * s,
    x * z * v + y * s,
    y * x * v + z * s,
    c + y * y * v,
    y * z * v - x * s,
    z * x * v - y * s,
    z * y * v + x * s,
    c + z * z * v,
  ];
  return rounded(multiply(rows, transpose(turn)), 8);
}

/** Cartesian orthogonal matrix of an operation in the frame of the rows. */
export function cartesianOf(operation: PlainOperation, rows: Mat3): Mat3 {
  const columns = transpose(rows);
  return multiply(multiply(columns, operation.rotation), inverse(columns));
}

export function imageOf(operation: PlainOperation, position: Vec3): Vec3 {
  const turned = apply(operation.rotation, position);
  return turned.map((value, i) => value + operation.translation[i]!) as unknown as Vec3;
}

/** Shortest distance between two fractional positions modulo the lattice, Å; sound for distances below half a cell. */
export function nearestDistance(a: Vec3, b: Vec3, rows: Mat3): number {
  return Math.hypot(...apply(transpose(rows), nearestStep(a, b)));
}

/** Fractional step from b to a, each component brought into ±½. */
export function nearestStep(a: Vec3, b: Vec3): Vec3 {
  return a.map((value, i) => value - b[i]! - Math.round(value - b[i]!)) as unknown as Vec3;
}

/** R T Rᵀ */
export function turned(rotation: Mat3, tensor: Mat3): Mat3 {
  return multiply(multiply(rotation, tensor), transpose(rotation));
}

/** Numbers as they are printed: so many decimals, no negative zero. */
export function rounded(matrix: Mat3, decimals: number): Mat3 {
  return matrix.map((value) => Number(value.toFixed(decimals)) + 0) as unknown as Mat3;
}

function cosine(degrees: number): number {
  return Math.cos((degrees * Math.PI) / 180);
}
