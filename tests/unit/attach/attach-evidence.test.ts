import { describe, expect, it } from 'vitest';
import { attachTensors } from '#src/attach/attach.ts';
import type { AttachTarget } from '#src/attach/attach.ts';
import type { AtomImage } from '#src/attach/attachment.ts';
import { matchMolecule } from '#src/attach/match-molecule.ts';
import { apply, identity3, transpose } from '#src/base/matrix3.ts';
import type { Mat3, Vec3, VecCart } from '#src/base/matrix3.ts';
import { ProblemLog } from '#src/base/problem.ts';
import { latticeFromCell, latticeFromRows } from '#src/crystal/lattice.ts';
import type { Lattice } from '#src/crystal/lattice.ts';
import type { TensorSet } from '#src/tensor/tensor-set.ts';

const cell = { a: 5.1, b: 6.2, c: 7.3, alpha: 90, beta: 107, gamma: 90 };
const lattice = latticeFromCell(cell, 'a-x-b-xy');
const tensor: Mat3 = [10, 2, 0, 2, 20, 0, 0, 0, 40];

/** Invented atoms of P 1. */
const atoms = [
  ['Al', [0.1, 0.2, 0.3]],
  ['O', [0.4, 0.1, 0.7]],
  ['O', [0.8, 0.6, 0.2]],
  ['Si', [0.55, 0.85, 0.45]],
  ['O', [0.2, 0.7, 0.9]],
] as const;

const images = atoms.map(([element, fractional], siteIndex): AtomImage => ({
  siteIndex,
  element,
  label: `${element}${siteIndex}`,
  fractional,
  cartesian: apply(lattice.toCartesian, fractional) as VecCart,
  rotation: identity3,
  own: true,
}));
const target: AttachTarget = {
  ...{ lattice, images, siteCount: images.length, rows: null },
  stabiliserOf: () => [identity3],
};

function setOf(
  rows: readonly { label?: string; element: string; at?: Vec3 }[],
  of: Lattice | null,
): TensorSet {
  const entries = rows.map(({ label = null, element, at = null }, row) => ({
    ...{ label, element, atomIndex: null, cartesian: at as VecCart | null, tensor },
    place: { file: 't.txt', line: row + 2 },
  }));
  return {
    ...{ name: 't', quantity: 'shielding', unitGiven: 'ppm', lattice: of },
    ...{ structureIndex: null, entries, file: 't.txt' },
  } as const;
}

const codes = (log: ProblemLog): string[] => log.list().map(({ code }) => code);

describe('weaker evidence', () => {
  it('binds by labels written otherwise, and marks the frame as undetectable in P 1', () => {
    const log = new ProblemLog();
    const set = setOf(
      [
        { label: 'AL(0)', element: 'Al' },
        { label: 'O1', element: 'O' },
      ],
      null,
    );
    const found = attachTensors(set, target, log)!;
    expect(found.method).toBe('labels');
    expect(found.bySite.map((list) => list.length)).toEqual([1, 1, 0, 0, 0]);
    expect(found.frame).toMatchObject({ decided: false, by: 'nothing' });
    expect(codes(log)).toEqual(['attach-by-label', 'frame-undecided']);
    expect(log.list()[1]!.message).toContain('undetectable by symmetry');
  });

  it('takes a frame that the user names as decided', () => {
    const set = setOf([{ label: 'O1', element: 'O' }], null);
    const found = attachTensors(set, { ...target, chosenFrame: 'a-x-b-xy' }, new ProblemLog())!;
    expect(found.frame).toMatchObject({ decided: true, by: 'user' });
    expect(found.rotation).toEqual(identity3);
  });

  it('binds by order within each element where the counts agree, and refuses where they do not', () => {
    const log = new ProblemLog();
    const order = ['O', 'O', 'Si', 'O'].map((element) => ({ element }));
    const found = attachTensors(setOf(order, null), target, log)!;
    expect(found.method).toBe('order');
    expect([1, 2, 3, 4].map((site) => found.bySite[site]![0]!.entry.place.line)).toEqual([2, 3, 4, 5]);
    expect(codes(log)[0]).toBe('attach-by-order');
    expect(attachTensors(setOf(order.slice(1), null), target, log)).toBeNull();
    expect(codes(log).at(-1)).toBe('attach-order-counts');
  });
});

describe('lattices and positions that are not as they should be', () => {
  it('catches rows and columns exchanged by the cell constants', () => {
    const log = new ProblemLog();
    const exchanged = latticeFromRows(transpose(lattice.rows), 'as given');
    const rows = images.map(({ element, cartesian }) => ({ element, at: cartesian! }));
    const found = attachTensors(setOf(rows, exchanged), target, log)!;
    expect(codes(log)).toContain('attach-lattice-transposed');
    expect(found.mapping.matched).toBe(atoms.length);
    expect(found.mapping.rmsDisplacementAngstrom).toBeLessThan(1e-9);
  });

  it('reads the frame from positions without a lattice', () => {
    const other = latticeFromCell(cell, 'c-z-b-yz');
    const rows = atoms.map(([element, at]) => ({ element, at: apply(other.toCartesian, at) }));
    const found = attachTensors(setOf(rows, null), target, new ProblemLog())!;
    expect(found.frame).toMatchObject({ decided: true, by: 'positions' });
    const turned = apply(found.rotation, apply(other.toCartesian, [0, 0, 1]));
    apply(lattice.toCartesian, [0, 0, 1]).forEach((x, i) => expect(turned[i]).toBeCloseTo(x, 9));
  });

  it('leaves out the tensors of a molecule', () => {
    const log = new ProblemLog();
    const rows = [0, 1, 2, 3].map((k) => ({ element: 'O', at: [1.1 * k, k * k, 0] as const }));
    expect(attachTensors(setOf(rows, null), target, log)).toBeNull();
    expect(codes(log)).toEqual(['attach-molecule']);
  });
});

describe('molecules', () => {
  const elements = ['C', 'O', 'H', 'H', 'N', 'H'];
  const flat: Vec3[] = [
    [0, 0, 0],
    [1.2, 0.1, 0],
    [-0.6, 0.9, 0],
    [-1.5, -1.9, 0],
    [-0.7, -1.2, 0],
    [0.1, -2.1, 0.5],
  ];
  const turn = (v: Vec3): Vec3 => [3 - v[1], 1 + v[2], 2 - v[0]];

  it('are laid on each other turned, moved and in another order', () => {
    const order = [5, 3, 1, 0, 4, 2];
    const source = { positions: order.map((i) => turn(flat[i]!)), elements: order.map((i) => elements[i]!) };
    const fit = matchMolecule(source, { positions: flat, elements })!;
    expect(fit.rmsAngstrom).toBeLessThan(1e-6);
    expect(fit.isMirrored).toBe(false);
    for (const { source: from, target: onto } of fit.links) expect(onto).toBe(order[from]);
  });

  it('are told when mirrored, and refused when they are others', () => {
    const mirrored = { positions: flat.map((v): Vec3 => [-v[0], -v[1], -v[2]]), elements };
    const chiral = flat.map((v, i): Vec3 => [v[0], v[1], i === 1 ? 1.1 : v[2]]);
    const image = chiral.map((v): Vec3 => [v[0], v[1], -v[2]]);
    expect(matchMolecule({ positions: image, elements }, { positions: chiral, elements })?.isMirrored).toBe(
      true,
    );
    expect(matchMolecule(mirrored, { positions: flat, elements })).not.toBeNull();
    const other = { positions: flat.map((v, i): Vec3 => [2.1 * v[0], v[1] + i, 1.7 * v[2]]), elements };
    expect(matchMolecule(other, { positions: flat, elements })).toBeNull();
  });
});
