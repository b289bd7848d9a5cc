import type { Mat3, Vec3 } from '#src/base/matrix3.ts';
import { determinant, identity3, inverse, multiply, scaleMatrix } from '#src/base/matrix3.ts';
import { add, scale } from '#src/base/vector3.ts';
import { readAffineExpressions } from './affine-text.ts';
import { changeBasis, translationOperation } from './basis-change.ts';
import { closeGroup } from './group.ts';
import type { SymmetryOperation } from './symmetry-operation.ts';
import { normalizeOperation, rotationOrder } from './symmetry-operation.ts';

const third = 1 / 3;
const half = 1 / 2;
const quarter = 1 / 4;

/** Centring translations of the lattice letters, beyond 0,0,0 (Hall 1981, table 1; International Tables B, table A1.4.2.2). */
export const centringVectors: Readonly<Record<string, readonly Vec3[]>> = {
  P: [],
  A: [[0, half, half]],
  B: [[half, 0, half]],
  C: [[half, half, 0]],
  I: [[half, half, half]],
  R: [
    [2 * third, third, third],
    [third, 2 * third, 2 * third],
  ],
  S: [
    [third, third, 2 * third],
    [2 * third, 2 * third, third],
  ],
  T: [
    [third, 2 * third, third],
    [2 * third, third, 2 * third],
  ],
  H: [
    [2 * third, third, 0],
    [third, 2 * third, 0],
  ],
  F: [
    [0, half, half],
    [half, 0, half],
    [half, half, 0],
  ],
};

const translationLetters: Readonly<Record<string, Vec3>> = {
  a: [half, 0, 0],
  b: [0, half, 0],
  c: [0, 0, half],
  n: [half, half, half],
  u: [quarter, 0, 0],
  v: [0, quarter, 0],
  w: [0, 0, quarter],
  d: [quarter, quarter, quarter],
};

/** Rotations about c; those about a and b follow by cyclic exchange of the axes. */
const aboutC: Readonly<Record<number, Mat3>> = {
  1: identity3,
  2: [-1, 0, 0, 0, -1, 0, 0, 0, 1],
  3: [0, -1, 0, 1, -1, 0, 0, 0, 1],
  4: [0, -1, 0, 1, 0, 0, 0, 0, 1],
  6: [1, -1, 0, 1, 0, 0, 0, 0, 1],
};
/** Two-folds along a − b (′) and a + b (″). */
const diagonalToC: Readonly<Record<string, Mat3>> = {
  "'": [0, -1, 0, -1, 0, 0, 0, 0, -1],
  '"': [0, 1, 0, 1, 0, 0, 0, 0, -1],
};
/** Three-fold along a + b + c, which takes a to b to c. */
const bodyDiagonal: Mat3 = [0, 0, 1, 1, 0, 0, 0, 1, 0];

type Axis = 'x' | 'y' | 'z';

/** Turns a matrix that belongs to c into the one that belongs to the axis. */
function onAxis(matrix: Mat3, axis: Axis): Mat3 {
  if (axis === 'z') return matrix;
  const once = multiply(multiply(bodyDiagonal, matrix), inverse(bodyDiagonal));
  return axis === 'x' ? once : onAxis(once, 'x');
}

function onAxisRounded(matrix: Mat3, axis: Axis): Mat3 {
  return onAxis(matrix, axis).map((entry) => Math.round(entry) + 0) as unknown as Mat3;
}

/** One rotation symbol of the string, such as `-2"c` or `31`. */
interface RotationSymbol {
  readonly improper: boolean;
  readonly order: number;
  readonly axis: string | null;
  readonly screw: number;
  readonly letters: string;
}

const rotationPattern = /^(-?)([12346])([1-5]?)([xyz'"*=]?)([1-5]?)([abcnuvwd]*)([xyz'"*=]?)/;

function readRotation(text: string): { symbol: RotationSymbol; length: number } | null {
  const match = rotationPattern.exec(text);
  if (!match) return null;
  const [whole, bar, order = '', before, axisBefore, after, letters = '', axisAfter] = match;
  if ((before && after) || (axisBefore && axisAfter)) return null;
  const screw = Number(before || after || 0);
  if (screw >= Number(order)) return null;
  const axis = (axisBefore || axisAfter || '').replace('=', '"');
  return {
    symbol: { improper: bar === '-', order: Number(order), axis: axis || null, screw, letters },
    length: whole.length,
  };
}

function readRotations(text: string): RotationSymbol[] | null {
  const symbols: RotationSymbol[] = [];
  for (let rest = text.trim(); rest !== ''; rest = rest.trim()) {
    const read = readRotation(rest);
    if (!read) return null;
    symbols.push(read.symbol);
    rest = rest.slice(read.length);
  }
  return symbols.length > 0 && symbols.length <= 4 ? symbols : null;
}

/** Axis of a rotation symbol that does not name one, by place and by the rotation before it. */
function impliedAxis(place: number, order: number, before: RotationSymbol | undefined): string | null {
  if (order === 1) return 'z';
  if (place === 0) return 'z';
  if (place === 1 && order === 2) return before && (before.order === 3 || before.order === 6) ? "'" : 'x';
  if (order === 3) return '*';
  return null;
}

/** Lattice vector along the axis, for screw subscripts. */
function axisVector(axis: string, principal: Axis): Vec3 | null {
  const vectors: Readonly<Record<string, Vec3>> = {
    x: [1, 0, 0],
    y: [0, 1, 0],
    z: [0, 0, 1],
    '*': [1, 1, 1],
  };
  if (axis in vectors) return vectors[axis]!;
  const minus = axis === "'" ? -1 : 1;
  if (principal === 'x') return [0, 1, minus];
  return principal === 'y' ? [1, 0, minus] : [1, minus, 0];
}

function rotationMatrix(order: number, axis: string, principal: Axis): Mat3 | null {
  if (axis === '*') return order === 3 ? bodyDiagonal : null;
  if (axis === "'" || axis === '"') return order === 2 ? onAxisRounded(diagonalToC[axis]!, principal) : null;
  return onAxisRounded(aboutC[order]!, axis as Axis);
}

function generatorsOf(symbols: readonly RotationSymbol[]): SymmetryOperation[] | null {
  const generators: SymmetryOperation[] = [];
  let principal: Axis = 'z';
  for (const [place, symbol] of symbols.entries()) {
    const axis = symbol.axis ?? impliedAxis(place, symbol.order, symbols[place - 1]);
    const proper = axis && rotationMatrix(symbol.order, axis, principal);
    const along = axis && axisVector(axis, principal);
    if (!proper || !along) return null;
    const translation = [...symbol.letters]
      .map((letter) => translationLetters[letter]!)
      .reduce(add, scale(symbol.screw / symbol.order, along));
    generators.push({ rotation: symbol.improper ? scaleMatrix(-1, proper) : proper, translation });
    if (axis === 'x' || axis === 'y' || axis === 'z') principal = axis;
  }
  return generators;
}

/** More of them than the lattice letter names show that the letter and the rotations do not go together. */
function pureTranslations(group: readonly SymmetryOperation[]): number {
  return group.filter(({ rotation }) => rotationOrder(rotation) === 1).length;
}

/** New basis and origin of the bracketed part: `(0 0 -1)` in twelfths, or `(x-y,x+y,z)` with x′ = V x. */
function readChange(text: string): { basis: Mat3; origin: Vec3 } | null {
  const numbers = /^\s*([+-]?\d+)[\s,]+([+-]?\d+)[\s,]+([+-]?\d+)\s*$/.exec(text);
  if (numbers) {
    const shift = numbers.slice(1).map((value) => Number(value) / 12) as unknown as Vec3;
    return { basis: identity3, origin: scale(-1, shift) };
  }
  const read = readAffineExpressions(text, 'xyz');
  if (!read || Math.abs(determinant(read.linear)) < 1e-6) return null;
  const basis = inverse(read.linear);
  const [c1, c2, c3] = read.constant;
  const origin: Vec3 = [
    -(basis[0] * c1 + basis[1] * c2 + basis[2] * c3),
    -(basis[3] * c1 + basis[4] * c2 + basis[5] * c3),
    -(basis[6] * c1 + basis[7] * c2 + basis[8] * c3),
  ];
  return { basis, origin };
}

/** Parts of a symbol, in a plain spelling. */
function splitSymbol(
  symbol: string,
): { bar: boolean; lattice: string; rotations: string; change: string } | null {
  const plain = symbol
    .replace(/[\u2018\u2019\u2032\u00B4`]/g, "'")
    .replace(/[\u201C\u201D\u2033]|''/g, '"')
    .replace(/[\u2010-\u2015\u2212]/g, '-')
    .replace(/_/g, ' ')
    .replace(/-\s+/g, '-')
    .trim();
  const match = /^(-?)\s*([A-Za-z])([^()]*)(?:\(([^()]*)\)\s*)?$/.exec(plain);
  if (!match || plain.length > 120) return null;
  const [, bar, lattice = '', rotations = '', change = ''] = match;
  return { bar: bar === '-', lattice: lattice.toUpperCase(), rotations: rotations.toLowerCase(), change };
}

/** Quotation marks of a file left around the symbol; a closing `"` alone is a double prime. */
function unquoted(symbol: string): string {
  const match = /^\s*(['"])(.*)\1\s*$/s.exec(symbol);
  return (match ? match[2]! : symbol).replace(/^\s*['"]/, '');
}

/**
 * All operations of the space group that a Hall symbol describes, centring included, identity first. Built from the
 * published rules (Hall, Acta Cryst. A37, 517 (1981); International Tables B, section 1.4, appendix A1.4.2): lattice
 * letter, up to four rotations with axis, screw and translation subscripts, origin shift in twelfths or a full change
 * of basis. Any case, `_` for blanks, missing blanks and surplus blanks are understood, `=` counts as `"`. Null where the text is no
 * Hall symbol or generates no finite group.
 *
 * `operationsFromHall('-P 2yn')` → x,y,z; -x+1/2,y+1/2,-z+1/2; -x,-y,-z; x+1/2,-y+1/2,z+1/2
 */
export function operationsFromHall(symbol: string): SymmetryOperation[] | null {
  const bare = unquoted(symbol);
  const operations = operationsOfParts(bare);
  const strayQuote = operations === null && /['"]\s*$/.test(bare);
  return strayQuote ? operationsOfParts(bare.replace(/['"]\s*$/, '')) : operations;
}

function operationsOfParts(symbol: string): SymmetryOperation[] | null {
  const parts = splitSymbol(symbol);
  const centring = parts && (centringVectors[parts.lattice] ?? null);
  const rotations = parts && readRotations(parts.rotations);
  const generators = rotations && generatorsOf(rotations);
  if (!parts || !centring || !generators) return null;
  if (parts.bar) generators.unshift({ rotation: scaleMatrix(-1, identity3), translation: [0, 0, 0] });
  if (generators.some(({ rotation }) => rotationOrder(rotation) === null)) return null;
  const group = closeGroup([...centring.map(translationOperation), ...generators].map(normalizeOperation));
  if (!group || pureTranslations(group) !== 1 + centring.length) return null;
  if (parts.change.trim() === '') return group;
  const change = readChange(parts.change);
  return change && changeBasis(group, change.basis, change.origin);
}
