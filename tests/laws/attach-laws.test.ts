import { describe, expect, it } from 'vitest';
import { believedCost, chanceLaw, chanceWithin, toleratedChance } from '#src/attach/chance-agreement.ts';
import { matchStructure, rotationOfFit } from '#src/attach/match-structure.ts';
import type { StructureAtoms } from '#src/attach/structure-atoms.ts';
import type { Mat3, Vec3, VecFrac } from '#src/base/matrix3.ts';
import {
  addMatrices,
  apply,
  determinant,
  frobeniusNorm,
  identity3,
  inverse,
  multiply,
  scaleMatrix,
  subtractMatrices,
  transpose,
} from '#src/base/matrix3.ts';
import { seededRandom } from '#src/base/seeded-random.ts';
import { length, subtract } from '#src/base/vector3.ts';
import { operationsFromHall } from '#src/crystal/hall-symbol.ts';
import type { CellConstants } from '#src/crystal/lattice.ts';
import { latticeFromCell, latticeFromRows } from '#src/crystal/lattice.ts';
import { nearestOrthogonal } from '#src/attach/frame-rotation.ts';
import type { SymmetryOperation } from '#src/crystal/symmetry-operation.ts';
import type { CellModel } from '#tests/support/supercell-models.ts';
import { modelOfGroup, repeated } from '#tests/support/supercell-models.ts';

/** Cells and groups of every crystal system, centred ones too; atoms in general and special places, all invented. */
const systems: readonly (readonly [name: string, hall: string, cell: CellConstants])[] = [
  ['triclinic', '-P 1', { a: 6.1, b: 7.4, c: 8.3, alpha: 83, beta: 98, gamma: 104 }],
  ['triclinic, no centre', 'P 1', { a: 6.4, b: 7.1, c: 7.9, alpha: 95, beta: 101, gamma: 88 }],
  ['monoclinic', '-P 2ybc', { a: 7.2, b: 8.9, c: 9.6, alpha: 90, beta: 107, gamma: 90 }],
  ['monoclinic, centred', '-C 2yc', { a: 9.7, b: 8.9, c: 5.3, alpha: 90, beta: 106, gamma: 90 }],
  ['orthorhombic', '-P 2ac 2n', { a: 8.1, b: 6.3, c: 9.2, alpha: 90, beta: 90, gamma: 90 }],
  ['orthorhombic, polar', 'P 2c -2n', { a: 9.4, b: 7.1, c: 5.6, alpha: 90, beta: 90, gamma: 90 }],
  ['tetragonal', '-I 4bd 2', { a: 7.2, b: 7.2, c: 9.9, alpha: 90, beta: 90, gamma: 90 }],
  ['trigonal', 'P 32 2"', { a: 7.1, b: 7.1, c: 8.4, alpha: 90, beta: 90, gamma: 120 }],
  ['rhombohedral', '-R 3 2"c', { a: 8.2, b: 8.2, c: 15.5, alpha: 90, beta: 90, gamma: 120 }],
  ['hexagonal', 'P 6c', { a: 8.4, b: 8.4, c: 7.7, alpha: 90, beta: 90, gamma: 120 }],
  ['cubic', 'P 2ac 2ab 3', { a: 9.6, b: 9.6, c: 9.6, alpha: 90, beta: 90, gamma: 90 }],
  ['cubic, centred', '-F 4vw 2vw 3', { a: 14.5, b: 14.5, c: 14.5, alpha: 90, beta: 90, gamma: 90 }],
];

/** Atoms well apart (1.4 Å), so that a displacement of 0.3 Å leaves no doubt which is which. */
function crystalOf(hall: string, cell: CellConstants, seed: number): CellModel {
  const random = seededRandom(seed);
  const lattice = latticeFromCell(cell);
  const operations = operationsFromHall(hall)!.length;
  const room = Math.max(1, Math.min(4, Math.floor(lattice.volume / operations / 30)));
  for (;;) {
    const sites = Array.from({ length: room }, (_none, i): [string, VecFrac] => [
      ['Al', 'O', 'O', 'Si'][i % 4]!,
      [random(), random(), random()] as VecFrac,
    ]);
    const model = modelOfGroup(cell, hall, sites);
    if (model.atoms.length === room * operations && leastDistance(model) > 1.4) return model;
  }
}

function leastDistance({ rows, atoms }: CellModel): number {
  let least = Infinity;
  for (const [i, p] of atoms.entries()) {
    for (const q of atoms.slice(0, i)) {
      const d = subtract(p.fractional, q.fractional).map((x) => x - Math.round(x));
      for (const u of [-1, 0, 1])
        for (const v of [-1, 0, 1])
          for (const w of [-1, 0, 1])
            least = Math.min(least, length(apply(transpose(rows), [d[0]! + u, d[1]! + v, d[2]! + w])));
    }
  }
  return least;
}

interface Planted {
  readonly source: StructureAtoms;
  /** Of each source atom: its tensor in the source's frame. */
  readonly tensors: readonly Mat3[];
  readonly rms: number;
}

function randomRotation(random: () => number): Mat3 {
  const rough = Array.from({ length: 9 }, () => random() - 0.5) as unknown as Mat3;
  const q = nearestOrthogonal(rough);
  return determinant(q) < 0 ? scaleMatrix(-1, q) : q;
}

/** The crystal on other axes, elsewhere, turned, strained by up to the share, with moved and shuffled atoms. */
function disguised(
  model: CellModel,
  axes: Mat3,
  how: { strain: number; moved: number; mirrored?: boolean },
  random: () => number,
): Planted {
  const cell = repeated(model, axes);
  const origin: Vec3 = [random(), random(), random()];
  const strain = Array.from({ length: 9 }, () => (2 * random() - 1) * how.strain) as unknown as Mat3;
  const symmetric = addMatrices(identity3, scaleMatrix(0.5, addMatrices(strain, transpose(strain))));
  const turn = scaleMatrix(how.mirrored ? -1 : 1, randomRotation(random));
  const frame = multiply(turn, symmetric);
  const rows = transpose(multiply(frame, transpose(cell.rows)));
  const lattice = latticeFromRows(rows, 'as given');
  const steps = cell.atoms.map((): Vec3 => {
    const way: Vec3 = [random() - 0.5, random() - 0.5, random() - 0.5];
    const size = (how.moved * random()) / (length(way) || 1);
    return [way[0] * size, way[1] * size, way[2] * size];
  });
  const mean = [0, 1, 2].map((k) => steps.reduce((sum, s) => sum + s[k]!, 0) / steps.length);
  const centred = steps.map((s): Vec3 => [s[0] - mean[0]!, s[1] - mean[1]!, s[2] - mean[2]!]);
  const atoms = cell.atoms
    .map((atom, i) => {
      const off = apply(lattice.toFractional, apply(frame, centred[i]!));
      const at = atom.fractional.map((x, k) => x + origin[k]! + off[k]! + Math.floor(3 * random() - 1));
      const tensor = multiply(multiply(turn, atom.tensor), transpose(turn));
      return { key: random(), at: at as unknown as VecFrac, element: atom.element, tensor };
    })
    .sort((p, q) => p.key - q.key);
  return {
    source: { lattice, positions: atoms.map(({ at }) => at), elements: atoms.map(({ element }) => element) },
    tensors: atoms.map(({ tensor }) => tensor),
    rms: Math.sqrt(centred.reduce((sum, s) => sum + length(s) ** 2, 0) / centred.length),
  };
}

/** A unimodular matrix of small numbers. */
function unimodular(random: () => number): Mat3 {
  let m: Mat3 = identity3;
  for (let step = 0; step < 4; step += 1) {
    const [i, j] = [Math.floor(3 * random()), Math.floor(3 * random())];
    if (i === j) continue;
    const e = [...identity3];
    e[3 * i + j] = random() < 0.5 ? 1 : -1;
    m = multiply(e as unknown as Mat3, m);
  }
  return m;
}

function targetOf({ rows, atoms }: CellModel): StructureAtoms {
  return {
    lattice: latticeFromRows(rows, 'as given'),
    positions: atoms.map(({ fractional }) => fractional as VecFrac),
    elements: atoms.map(({ element }) => element),
  };
}

/** The planted map up to the crystal's symmetry: every tensor, turned, is that of the atom it came to. */
function expectRight(model: CellModel, planted: Planted, operations: readonly SymmetryOperation[]): void {
  const target = targetOf(model);
  const match = matchStructure(planted.source, target, operations);
  if (match.kind !== 'match') throw new Error(`refused: ${match.kind}`);
  const { fit } = match;
  expect(fit.missing).toEqual([]);
  expect(fit.rmsAngstrom).toBeLessThan(planted.rms * 1.02 + 1e-6);
  expect(fit.rmsAngstrom).toBeGreaterThan(planted.rms * 0.98 - 1e-6);
  const rotation = rotationOfFit(planted.source, fit.basis, target);
  for (const { source, target: atom } of fit.links) {
    const turned = multiply(multiply(rotation, planted.tensors[source]!), transpose(rotation));
    const off = frobeniusNorm(subtractMatrices(turned, model.atoms[atom]!.tensor));
    // a strained frame has its rotation by polar decomposition: equal to the planted one
    expect(off).toBeLessThan(1e-3 * frobeniusNorm(turned));
  }
}

describe.each(systems)('a structure laid on a %s crystal', (_name, hall, cell) => {
  const operations = operationsFromHall(hall)!;

  it('is found on other axes of the same cell, shifted, turned, shuffled', () => {
    const random = seededRandom(11);
    const model = crystalOf(hall, cell, 1);
    for (let run = 0; run < 3; run += 1) {
      expectRight(model, disguised(model, unimodular(random), { strain: 0, moved: 0 }, random), operations);
    }
  });

  it('is found strained by 2 % with atoms moved by up to 0.3 Å, residual as planted', () => {
    const random = seededRandom(12);
    const model = crystalOf(hall, cell, 2);
    for (let run = 0; run < 3; run += 1) {
      const axes = unimodular(random);
      expectRight(model, disguised(model, axes, { strain: 0.01, moved: 0.3 }, random), operations);
    }
  });

  it('is found as a supercell and as its own mirror image', () => {
    const random = seededRandom(13);
    const model = crystalOf(hall, cell, 3);
    const axes: Mat3 = [1, 1, 0, 0, 1, 0, 0, 0, 2];
    expectRight(model, disguised(model, axes, { strain: 0.01, moved: 0.2 }, random), operations);
    const mirrored = disguised(model, identity3, { strain: 0, moved: 0.1, mirrored: true }, random);
    expectRight(model, mirrored, operations);
  });

  it('refuses another structure in the same cell, and another cell', () => {
    const random = seededRandom(14);
    const model = crystalOf(hall, cell, 4);
    // another draw of one independent atom may fall on the same place: 'trust in a match' counts how often
    const { source } = disguised(crystalOf(hall, cell, 9), identity3, { strain: 0, moved: 0 }, random);
    if (model.atoms.length > 3) {
      expect(matchStructure(source, targetOf(model), operations).kind).toBe('other-atoms');
    }
    const larger = { ...cell, a: cell.a * 1.2, c: cell.c * 0.91 };
    const strange = { ...targetOf(model), lattice: latticeFromCell(larger) };
    expect(matchStructure(strange, targetOf(model), operations).kind).not.toBe('match');
  });
});

describe('trust in a match', () => {
  /** Wrong structures of the same elements, atoms and group in the same cell, strained: how many are believed. */
  const believed = (hall: string, cell: CellConstants, runs: number): number => {
    const operations = operationsFromHall(hall)!;
    const random = seededRandom(16);
    let count = 0;
    for (let run = 0; run < runs; run += 1) {
      const model = crystalOf(hall, cell, 500 + 2 * run);
      const other = crystalOf(hall, cell, 90_000 + 2 * run);
      const { source } = disguised(other, unimodular(random), { strain: 0.01, moved: 0 }, random);
      if (matchStructure(source, targetOf(model), operations).kind === 'match') count += 1;
    }
    return count;
  };

  it('believes no wrong structure of three or four independent atoms', () => {
    for (const index of [0, 1, 2, 5]) {
      const [, hall, cell] = systems[index]!;
      expect(believed(hall, cell, 15)).toBe(0);
    }
  });

  it('believes wrong structures of one independent atom as seldom as chance has it', () => {
    for (const index of [3, 4, 6, 8]) {
      const [, hall, cell] = systems[index]!;
      const law = chanceLaw(targetOf(crystalOf(hall, cell, 1)), operationsFromHall(hall)!);
      const expected = 40 * chanceWithin(law, believedCost(law));
      // three standard deviations of rare events above what is expected
      expect(believed(hall, cell, 40)).toBeLessThanOrEqual(expected + 3 * Math.sqrt(expected) + 1);
    }
  });

  it('refuses no right structure with atoms moved by up to 0.3 Å and strained by 2 %', () => {
    const random = seededRandom(17);
    for (const [, hall, cell] of systems.slice(0, 11)) {
      const operations = operationsFromHall(hall)!;
      for (let seed = 700; seed < 704; seed += 1) {
        const model = crystalOf(hall, cell, seed);
        const moved = disguised(model, unimodular(random), { strain: 0.02, moved: 0.3 }, random);
        expect(matchStructure(moved.source, targetOf(model), operations).kind).toBe('match');
      }
    }
  });

  it('takes the same crystal made twice for what it is', () => {
    // two seeds whose only independent atom fell on one place of I 41/a c d, 0.039 Å apart: all 32 atoms agree, as they must
    const [, hall, cell] = systems[6]!;
    const [one, two] = [crystalOf(hall, cell, 4), crystalOf(hall, cell, 5)];
    const match = matchStructure(targetOf(two), targetOf(one), operationsFromHall(hall)!);
    if (match.kind !== 'match') throw new Error(match.kind);
    expect(match.fit.links).toHaveLength(32);
    expect(match.chance).toBeLessThan(toleratedChance);
    const spread = match.fit.links.map(({ distanceAngstrom }) => distanceAngstrom);
    expect(Math.max(...spread) - Math.min(...spread)).toBeLessThan(1e-6);
  });

  it('counts chance as elementary geometry has it', () => {
    // one independent atom of 8 in 480 Å³ and a fixed origin: 8 origins × 8/480 Å⁻³ × 4π/3 c³
    const operations = operationsFromHall('-P 2ac 2n')!;
    const lattice = latticeFromCell({ a: 8, b: 6, c: 10, alpha: 90, beta: 90, gamma: 90 });
    const positions = Array.from({ length: 8 }, () => [0, 0, 0] as unknown as VecFrac);
    const law = chanceLaw({ lattice, positions, elements: positions.map(() => 'O') }, operations);
    expect(chanceWithin(law, 0.3)).toBeCloseTo(8 * (8 / 480) * ((4 * Math.PI) / 3) * 0.027, 9);
  });
});

describe('cells of each other', () => {
  it('finds the primitive cell of a centred crystal, and the centred crystal from it', () => {
    const [, hall, cell] = systems[11]!;
    const model = crystalOf(hall, cell, 7);
    const operations = operationsFromHall(hall)!;
    const half: Mat3 = [0, 0.5, 0.5, 0.5, 0, 0.5, 0.5, 0.5, 0];
    const toPrimitive = transpose(inverse(half));
    const inside = model.atoms.map((atom) => ({
      ...atom,
      fractional: apply(toPrimitive, atom.fractional).map((x) => x - Math.floor(x + 1e-9)) as unknown as Vec3,
    }));
    const primitive: CellModel = {
      rows: multiply(half, model.rows),
      atoms: inside.filter(
        (atom, i) =>
          inside.findIndex((other) =>
            subtract(other.fractional, atom.fractional).every((x) => Math.abs(x - Math.round(x)) < 1e-6),
          ) === i,
      ),
    };
    expect(primitive.atoms).toHaveLength(model.atoms.length / 4);
    const random = seededRandom(15);
    expectRight(model, disguised(primitive, identity3, { strain: 0, moved: 0.2 }, random), operations);
    expectRight(primitive, disguised(model, identity3, { strain: 0.01, moved: 0 }, random), []);
  });
});
