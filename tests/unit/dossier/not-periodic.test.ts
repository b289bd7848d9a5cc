import { describe, expect, it } from 'vitest';
import { dossierOfText } from '#tests/support/derive.ts';

/** A square net of carbon, 1.5 Å in all three directions, made up for this test. */
function net(pbc: string, rows: readonly string[] = ['C 0 0 0']): string {
  return `${rows.length}\nLattice="1.5 0 0 0 1.5 0 0 0 1.5" pbc="${pbc}" Properties=species:S:1:pos:R:3\n${rows.join('\n')}\n`;
}

const codes = (pbc: string, rows?: readonly string[]): string[] =>
  dossierOfText('net.xyz', net(pbc, rows), { symmetry: 'none' }).problems.map(({ code }) => code);

describe('a cell that does not repeat along c', () => {
  it('is searched for no space group, and says so', () => {
    const { symmetry, bonds, periodic, problems } = dossierOfText('slab.xyz', net('T T F'));
    expect(symmetry.operations).toHaveLength(1);
    expect(bonds.map(({ shift }) => shift[2])).toEqual([0, 0]);
    expect(periodic).toEqual([true, true, false]);
    const found = problems.find(({ code }) => code === 'cell-not-periodic');
    expect(found).toMatchObject({ severity: 'warning', got: 'not periodic along c' });
    expect(found?.message).toContain('atoms stand there as the file has them');
  });

  it('leaves an atom where it stands, with its bonds there', () => {
    const { sites, bonds } = dossierOfText('slab.xyz', net('T T F', ['C 0 0 -1.5', 'C -0.3 0 0', 'H 0 0 4']));
    const [lower, middle, far] = sites.map(({ equivalents }) => equivalents[0]!);
    expect(lower!.fractional).toEqual([0, 0, -1]);
    expect(lower!.cartesian[2]).toBeCloseTo(-1.5, 12);
    expect(middle!.cartesian[0]).toBeCloseTo(1.2, 12);
    expect(far!.cartesian[2]).toBeCloseTo(4, 12);
    expect(bonds.some(({ from, to }) => from === lower!.id && to === middle!.id)).toBe(true);
    expect(bonds.some(({ from, to }) => from === far!.id || to === far!.id)).toBe(false);
    expect(sites.map(({ multiplicity }) => multiplicity)).toEqual([1, 1, 1]);
  });
});

it('a cell that repeats nowhere keeps its lattice and bonds nothing across its faces', () => {
  const { lattice, bonds, periodic, atomsInCell, symmetry } = dossierOfText('box.xyz', net('F F F'));
  expect(lattice?.cell).toMatchObject({ a: 1.5, b: 1.5, c: 1.5 });
  expect([bonds, periodic, atomsInCell]).toEqual([[], [false, false, false], 1]);
  expect(symmetry).toMatchObject({ number: 1, source: 'none' });
});

it('a cell that repeats along all three is searched', () => {
  const { symmetry, bonds, periodic } = dossierOfText('cube.xyz', net('T T T'));
  expect([symmetry.number, bonds.length, periodic]).toEqual([221, 3, undefined]);
  expect(codes('T T T')).not.toContain('cell-not-periodic');
});

describe('crowding', () => {
  /** 500 carbons 1.5 Å apart in a row along z: 0.3 in each Å³ of a net, but 150 in that of the cell. */
  const row = Array.from({ length: 500 }, (_, k) => `C 0 0 ${1.5 * k}`);
  /** 1000 within 1.5 Å. */
  const heap = Array.from({ length: 1000 }, (_, k) => `C 0 0 ${0.0015 * k}`);

  it('is judged beside an atom, not by a cell that says nothing', () => {
    expect(codes('F F F', row)).not.toContain('cell-too-crowded');
    expect(codes('T T F', row)).not.toContain('cell-too-crowded');
    expect(codes('T T T', row)).toContain('cell-too-crowded');
  });

  it('is still seen', () => {
    expect(codes('T T F', heap)).toContain('cell-too-crowded');
  });
});
