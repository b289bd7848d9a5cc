import { describe, expect, it } from 'vitest';
import type { Vec3 } from '#src/base/matrix3.ts';
import type { Bond } from '#src/crystal/bonds.ts';
import { findMolecules, wholeMolecules } from '#src/crystal/molecules.ts';

const bond = (from: number, to: number, shift: Vec3 = [0, 0, 0], kind: Bond['kind'] = 'bond'): Bond => ({
  from,
  to,
  shift,
  lengthAngstrom: 1.5,
  kind,
});

describe('whole molecules', () => {
  it('bring each atom beside its partner', () => {
    const bonds = [bond(0, 1, [1, 0, 0]), bond(1, 2, [0, -1, 0]), bond(2, 3)];
    expect(wholeMolecules(4, bonds)).toEqual([
      [0, 0, 0],
      [1, 0, 0],
      [1, -1, 0],
      [1, -1, 0],
    ]);
  });

  it('do not depend on the direction in which bonds are written', () => {
    expect(wholeMolecules(3, [bond(1, 0, [-1, 0, 0]), bond(2, 1, [0, 1, 0])])).toEqual([
      [0, 0, 0],
      [1, 0, 0],
      [1, -1, 0],
    ]);
  });

  it('close rings that cross faces', () => {
    const ring = [bond(0, 1), bond(1, 2, [1, 0, 0]), bond(2, 0, [-1, 0, 0])];
    const { shifts, endless } = findMolecules(3, ring);
    expect(endless).toEqual([false]);
    expect(shifts).toEqual([
      [0, 0, 0],
      [0, 0, 0],
      [1, 0, 0],
    ]);
  });

  it('leave chains, and atoms bonded to their own image, where they are', () => {
    const chain = findMolecules(3, [bond(0, 1), bond(1, 0, [0, 0, 1]), bond(1, 2, [1, 0, 0])]);
    expect(chain.endless).toEqual([true]);
    expect(chain.shifts.flat()).toEqual(new Array(9).fill(0));
    expect(findMolecules(1, [bond(0, 0, [0, 1, 0])]).endless).toEqual([true]);
  });

  it('treat each component on its own and skip hydrogen bonds', () => {
    const bonds = [
      bond(0, 2, [0, 0, 1]),
      bond(1, 3),
      bond(3, 1, [1, 0, 0]),
      bond(0, 1, [5, 0, 0], 'hydrogen'),
    ];
    const { molecule, endless, shifts } = findMolecules(5, bonds);
    expect([...molecule]).toEqual([0, 1, 0, 1, 2]);
    expect(endless).toEqual([false, true, false]);
    expect(shifts[2]).toEqual([0, 0, 1]);
    expect(shifts[3]).toEqual([0, 0, 0]);
  });

  it('put the middle of the molecule into the cell where positions are given', () => {
    const positions: Vec3[] = [
      [0.95, 0.1, 0.1],
      [0.15, 0.1, 0.1],
      [0.25, 0.1, 0.1],
    ];
    const shifts = wholeMolecules(3, [bond(0, 1, [1, 0, 0]), bond(1, 2)], positions);
    expect(shifts).toEqual([
      [-1, 0, 0],
      [0, 0, 0],
      [0, 0, 0],
    ]);
  });

  it('walk a chain of 200,000 atoms without recursion', () => {
    const count = 200_000;
    const bonds = Array.from({ length: count - 1 }, (_, i) =>
      bond(i, i + 1, i === 7 ? [1, 0, 0] : [0, 0, 0]),
    );
    const shifts = wholeMolecules(count, bonds);
    expect(shifts[7]).toEqual([0, 0, 0]);
    expect(shifts[count - 1]).toEqual([1, 0, 0]);
  });
});
