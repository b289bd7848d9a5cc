import type { Mat3, Vec3 } from '#src/base/matrix3.ts';
import { apply, determinant, identity3, multiply, rowsOf, scaleMatrix, trace } from '#src/base/matrix3.ts';
import { withFixedSign } from '#src/base/symmetric-eigen.ts';
import { cross, length, normalize } from '#src/base/vector3.ts';
import type { Lattice } from '#src/crystal/lattice.ts';

/** A direction that site symmetry makes a principal axis. */
export interface ForcedDirection {
  /** Unit vector in the frame of the lattice (or of the rotations, without one). */
  readonly cartesian: Vec3;
  /** `[010]`, or Cartesian components without a lattice. */
  readonly label: string;
  /** Which symmetry element forces it, in words. */
  readonly element: string;
}

/** What a site symmetry forces on a second-rank tensor. */
export interface ForcedShape {
  /** Independent components of the symmetric part: 6, 4, 3, 2 or 1. */
  readonly symmetricCount: number;
  /** Independent components of the antisymmetric part: 3, 1 or 0. */
  readonly antisymmetricCount: number;
  readonly kind: 'free' | 'one axis' | 'three axes' | 'axial' | 'isotropic';
  readonly directions: readonly ForcedDirection[];
  /** One or two plain sentences. */
  readonly sentence: string;
}

/** A rotation axis of the group with inversion taken out of every operation. */
interface SymmetryAxis {
  /** In the basis of the matrices: lattice directions or Cartesian. */
  readonly direction: Vec3;
  readonly fold: number;
  /** Whether the operations of highest order about it occur as rotations, as rotoinversions (mirrors), or both. */
  readonly proper: boolean;
  readonly improper: boolean;
}

const near = 1e-6;

/**
 * What the site group forces on shielding and EFG (Nye, Physical Properties of Crystals, 1957; antisymmetric part: Buckingham
 * & Malm, Mol. Phys. 22, 1127, 1971). With a lattice, `rotations` are the fractional matrices W of the stabiliser and
 * directions are named [uvw]; without one they are Cartesian. The whole group is needed, identity included; its order does not
 * matter and inversion makes no difference. An empty list counts as the identity.
 *
 * @example forcedBySiteSymmetry([identity3, twoAlongB], lattice).sentence → 'One principal axis lies along the two-fold axis [010]; …'
 */
export function forcedBySiteSymmetry(rotations: readonly Mat3[], lattice: Lattice | null): ForcedShape {
  const group = rotations.length > 0 ? rotations : [identity3];
  const { symmetricCount, antisymmetricCount } = independentComponents(group);
  const kind = kindOf(symmetricCount);
  const axes = symmetryAxes(group);
  const forcing = kind === 'isotropic' ? [] : kind === 'axial' ? axes.filter(({ fold }) => fold > 2) : axes;
  const directions = forcing.map((axis) => describeAxis(axis, lattice));
  return { symmetricCount, antisymmetricCount, kind, directions, sentence: sentenceOf(kind, directions) };
}

/**
 * Numbers of independent components of the symmetric and antisymmetric parts of a second-rank tensor under a group of 3×3
 * matrices in any basis: means over the group of [χ² + χ(R²)]/2 and [χ² − χ(R²)]/2.
 */
export function independentComponents(group: readonly Mat3[]): {
  symmetricCount: number;
  antisymmetricCount: number;
} {
  let symmetric = 0;
  let antisymmetric = 0;
  for (const rotation of group) {
    const squared = trace(rotation) ** 2;
    const ofSquare = trace(multiply(rotation, rotation));
    symmetric += (squared + ofSquare) / 2;
    antisymmetric += (squared - ofSquare) / 2;
  }
  return {
    symmetricCount: Math.round(symmetric / group.length) + 0,
    antisymmetricCount: Math.round(antisymmetric / group.length) + 0,
  };
}

function kindOf(symmetricCount: number): ForcedShape['kind'] {
  if (symmetricCount <= 1) return 'isotropic';
  if (symmetricCount === 2) return 'axial';
  if (symmetricCount === 3) return 'three axes';
  return symmetricCount < 6 ? 'one axis' : 'free';
}

/** Axes of the proper parts ±R, each with its fold; one entry a line through the site. */
function symmetryAxes(group: readonly Mat3[]): SymmetryAxis[] {
  const lines: { direction: Vec3; parts: { part: Mat3; sign: number }[] }[] = [];
  for (const rotation of group) {
    const sign = determinant(rotation) < 0 ? -1 : 1;
    const part = scaleMatrix(sign, rotation);
    const direction = axisOf(part);
    if (!direction) continue;
    const known = lines.find((line) => length(cross(normalize(line.direction), normalize(direction))) < near);
    if (known) known.parts.push({ part, sign });
    else lines.push({ direction, parts: [{ part, sign }] });
  }
  return lines.map(({ direction, parts }) => {
    const distinct = parts.filter(({ part }, i) => parts.findIndex((other) => alike(other.part, part)) === i);
    const fold = distinct.length + 1;
    const smallestTurn = Math.max(...parts.map(({ part }) => trace(part)));
    const highest = parts.filter(({ part }) => trace(part) > smallestTurn - near);
    const has = (sign: number) => highest.some((entry) => entry.sign === sign);
    return { direction, fold, proper: has(1), improper: has(-1) };
  });
}

function alike(a: Mat3, b: Mat3): boolean {
  return a.every((element, i) => Math.abs(element - b[i]!) < near);
}

/** Direction u with P u = u of a proper rotation in any basis; null for the identity. */
function axisOf(part: Mat3): Vec3 | null {
  if (alike(part, identity3)) return null;
  const [a, b, c] = rowsOf(part.map((element, i) => element - identity3[i]!) as unknown as Mat3);
  const normals = [cross(a, b), cross(b, c), cross(c, a)];
  const best = normals.reduce((x, y) => (length(y) > length(x) + near ? y : x));
  return length(best) < near ? null : best;
}

function describeAxis(axis: SymmetryAxis, lattice: Lattice | null): ForcedDirection {
  const element = elementName(axis);
  if (!lattice) {
    const unit = withFixedSign(normalize(axis.direction));
    return { cartesian: unit, label: `(${unit.map((c) => c.toFixed(3)).join(', ')})`, element };
  }
  const indices = lowestIndices(axis.direction);
  const cartesian = normalize(apply(lattice.toCartesian, indices));
  return { cartesian, label: directionLabel(indices), element };
}

const foldWords: Readonly<Record<number, string>> = { 2: 'two', 3: 'three', 4: 'four', 5: 'five', 6: 'six' };

function elementName({ fold, proper, improper }: SymmetryAxis): string {
  const word = `${foldWords[fold] ?? fold}-fold`;
  if (fold > 2) return proper ? `${word} axis` : `${word} rotoinversion axis`;
  if (!proper) return 'mirror plane';
  return improper ? 'two-fold axis and mirror normal' : 'two-fold axis';
}

/** Indices have no larger common denominator than a cell repeats the primitive one where symmetry is searched. */
const largestFactor = 128;

/** Smallest integers along a rational direction, the first that is not zero positive. */
function lowestIndices(direction: Vec3): Vec3 {
  const smallest = Math.min(...direction.map(Math.abs).filter((component) => component > near));
  for (let factor = 1; factor <= largestFactor; factor += 1) {
    const scaled = direction.map((component) => (component / smallest) * factor);
    if (scaled.some((component) => Math.abs(component - Math.round(component)) > near)) continue;
    const sign = Math.sign(scaled.find((component) => Math.abs(component) > near) ?? 1);
    return scaled.map((component) => Math.round(component) * sign + 0) as unknown as Vec3;
  }
  return withFixedSign(direction);
}

/** `[010]`; indices are set apart where one is negative or has two digits. */
export function directionLabel(indices: Vec3): string {
  const plain = indices.every((index) => index >= 0 && index <= 9);
  return `[${indices.map((index) => String(index).replace('-', '−')).join(plain ? '' : ' ')}]`;
}

/**
 * The sentence of a site, for the equivalent atom that an operation with this fractional matrix W makes of it: each
 * direction [uvw] that it names becomes W[uvw], in lowest indices, the first that is not zero positive.
 */
export function turnedSentence(sentence: string, rotation: Mat3): string {
  return sentence.replaceAll(/\[([\d− ]+)\]/g, (_label, inside: string) => {
    const parts = inside.includes(' ') ? inside.split(' ') : [...inside];
    const indices = parts.map((part) => Number(part.replace('−', '-'))) as unknown as Vec3;
    return directionLabel(lowestIndices(apply(rotation, indices)));
  });
}

function sentenceOf(kind: ForcedShape['kind'], directions: readonly ForcedDirection[]): string {
  const [first] = directions;
  if (kind === 'isotropic') {
    return 'The tensor is isotropic: all three principal values are equal and the field gradient is zero.';
  }
  if (kind === 'free' || !first) return 'Nothing is forced: all principal axes and values are free.';
  if (kind === 'axial') {
    return `The tensor is axial: its unique axis lies along the ${first.element} ${first.label}, and the other two principal values are equal.`;
  }
  if (kind === 'three axes') {
    return `The principal axes lie along ${listed(directions.map(({ label }) => label))}; their three values are free.`;
  }
  if (first.element === 'mirror plane') {
    return `One principal axis stands on the mirror plane, along ${first.label}; the other two lie in the plane.`;
  }
  return `One principal axis lies along the ${first.element} ${first.label}; the other two are free in the plane across it.`;
}

function listed(words: readonly string[]): string {
  return words.length < 2 ? words.join('') : `${words.slice(0, -1).join(', ')} and ${words.at(-1) ?? ''}`;
}
