import { describe, expect, it } from 'vitest';
import type { Problem } from '#src/base/problem.ts';
import type { VecCart } from '#src/base/matrix3.ts';
import type { Bond, BondAtom } from '#src/crystal/bonds.ts';
import { findBonds } from '#src/crystal/bonds.ts';
import { latticeFromCell } from '#src/crystal/lattice.ts';

const atom = (element: string, x: number, y: number, z: number, more: Partial<BondAtom> = {}): BondAtom => ({
  element,
  cartesian: [x, y, z],
  ...more,
});
const at = (element: string, cartesian: VecCart): BondAtom => ({ element, cartesian });
const pairs = (atoms: readonly BondAtom[], kind: Bond['kind'] = 'bond'): string[] =>
  findBonds(atoms, null)
    .filter((bond) => bond.kind === kind)
    .map(({ from, to }) => `${from}-${to}`);
const cube = (a: number): ReturnType<typeof latticeFromCell> =>
  latticeFromCell({ a, b: a, c: a, alpha: 90, beta: 90, gamma: 90 });

/** Corners of a tetrahedron about the origin. */
const corners = (radius: number): VecCart[] =>
  [
    [1, 1, 1],
    [1, -1, -1],
    [-1, 1, -1],
    [-1, -1, 1],
  ].map((v) => v.map((x) => (x * radius) / Math.sqrt(3)) as unknown as VecCart);

describe('bonds of molecules', () => {
  it('come with length, kind and no shift', () => {
    expect(findBonds([atom('O', 0, 0, 0), atom('O', 0, 0, 1.21)], null)).toEqual([
      { from: 0, to: 1, shift: [0, 0, 0], lengthAngstrom: 1.21, kind: 'bond' },
    ]);
  });

  it('join hydrogens only in H₂, deuterium alike', () => {
    expect(pairs([atom('H', 0, 0, 0), atom('H', 0, 0, 0.74)])).toEqual(['0-1']);
    expect(pairs([atom('D', 0, 0, 0), atom('H', 0, 0, 0.74)])).toEqual(['0-1']);
    const crowded = [atom('C', 0, 0, 0), atom('H', 1.0, 0.3, 0), atom('H', 1.0, -0.3, 0)];
    expect(pairs(crowded)).toEqual(['0-1', '0-2']);
  });

  it('let a hydrogen bridge two boron or two fluorine atoms', () => {
    const bridge = [atom('B', 0, 0, 0.88), atom('B', 0, 0, -0.88), atom('H', 0.99, 0, 0)];
    expect(pairs(bridge)).toEqual(['0-1', '0-2', '1-2']);
    expect(pairs([atom('F', 0, 0, 0), atom('H', 0, 0, 1.14), atom('F', 0, 0, 2.28)])).toEqual(['0-1', '1-2']);
  });

  it('give a hydrogen to the nearer of two atoms otherwise', () => {
    const water = [atom('O', 0, 0, 0), atom('H', 0, 0, 0.98), atom('O', 0, 0, 2.3)];
    expect(pairs(water)).toEqual(['0-1']);
    expect(pairs(water, 'hydrogen')).toEqual(['1-2']);
  });

  it('know no bonds of unknown atoms, dummies and noble gases but xenon', () => {
    expect(pairs([atom('X', 0, 0, 0), atom('C', 0, 0, 1.5)])).toEqual([]);
    expect(pairs([atom('Ar', 0, 0, 0), atom('C', 0, 0, 1.5)])).toEqual([]);
    expect(pairs([atom('Xe', 0, 0, 0), atom('F', 0, 0, 1.95)])).toEqual(['0-1']);
  });

  it('ignore atoms on top of each other', () => {
    expect(pairs([atom('Si', 0, 0, 0), atom('Al', 0, 0, 0), atom('O', 0, 0, 1.65)])).toEqual(['0-2', '1-2']);
    expect(pairs([atom('C', 0, 0, 0), atom('C', 0, 0, 0.7)])).toEqual([]);
  });
});

describe('bonds of metals', () => {
  it('reach the oxygens of a carboxylate but not its carbon', () => {
    const acetate = [
      atom('Na', 0, 0, 0),
      atom('O', 2.2, 1.1, 0),
      atom('O', 2.2, -1.1, 0),
      atom('C', 2.8, 0, 0),
      atom('C', 4.3, 0, 0),
    ];
    expect(pairs(acetate)).toEqual(['0-1', '0-2', '1-3', '2-3', '3-4']);
  });

  it('reach a carbene and a cyclopentadienyl carbon', () => {
    const carbene = [
      atom('Au', 0, 0, 0),
      atom('C', 2.0, 0, 0),
      atom('N', 2.7, 1.1, 0),
      atom('N', 2.7, -1.1, 0),
    ];
    expect(pairs(carbene)).toEqual(['0-1', '1-2', '1-3']);
    const ring = Array.from({ length: 5 }, (_, k) =>
      atom('C', 1.21 * Math.cos((k * 2 * Math.PI) / 5), 1.21 * Math.sin((k * 2 * Math.PI) / 5), 1.66),
    );
    const bonds = pairs([atom('Fe', 0, 0, 0), ...ring]);
    expect(bonds.filter((bond) => bond.startsWith('0-'))).toHaveLength(5);
  });

  it('reach the phosphorus of a phosphite but not of a phosphate', () => {
    const [first, ...rest] = corners(1.6) as [VecCart, VecCart, VecCart, VecCart];
    const away = first.map((x) => (x / 1.6) * 2.2) as unknown as VecCart;
    const phosphite = [atom('P', 0, 0, 0), ...rest.map((v) => at('O', v)), at('Pt', away)];
    expect(pairs(phosphite)).toContain('0-4');
    const near = rest[0].map((x) => (-x / 1.6) * 2.9) as unknown as VecCart;
    const phosphate = [atom('P', 0, 0, 0), ...corners(1.54).map((v) => at('O', v)), at('Ca', near)];
    expect(pairs(phosphate).filter((bond) => bond === '0-5')).toEqual([]);
  });

  it('do not reach the nitrogen of ammonium or the hydrogens of water', () => {
    const ammonium = [atom('N', 0, 0, 0), ...corners(1.03).map((v) => at('H', v)), atom('K', 0, 0, 3.0)];
    expect(pairs(ammonium)).toEqual(['0-1', '0-2', '0-3', '0-4']);
    const aqua = [
      atom('Li', 0, 0, 0),
      atom('O', 1.95, 0, 0),
      atom('H', 2.1, 0.8, 0),
      atom('H', 2.1, -0.8, 0),
    ];
    expect(pairs(aqua)).toEqual(['0-1', '1-2', '1-3']);
  });

  it('join bare metals only where no non-metal is nearer', () => {
    expect(pairs([atom('La', 0, 0, 0), atom('La', 4.16, 0, 0)])).toEqual(['0-1']);
    const borideLike = [atom('La', 0, 0, 0), atom('La', 4.16, 0, 0), atom('B', 0, 3.4, 0)];
    expect(pairs(borideLike)).toEqual([]);
  });

  it('join ligated metals only when clearly short', () => {
    const dimer = (metal: string, apart: number): string[] =>
      pairs([
        atom(metal, 0, 0, 0),
        atom(metal, apart, 0, 0),
        atom('O', -1.0, 1.7, 0),
        atom('O', apart + 1.0, 1.7, 0),
      ]).filter((bond) => bond === '0-1');
    expect(dimer('Mo', 2.1)).toEqual(['0-1']);
    expect(dimer('Re', 2.24)).toEqual(['0-1']);
    expect(dimer('Fe', 2.95)).toEqual([]);
    expect(dimer('Al', 2.65)).toEqual([]);
    expect(dimer('Na', 2.8)).toEqual([]);
    expect(dimer('Ti', 2.6)).toEqual([]);
  });
});

describe('bonds across cell faces', () => {
  it('keep the shift of an atom bonded to its own image', () => {
    const bonds = findBonds([atom('Fe', 0.1, 0, 0)], cube(2.4));
    expect(bonds.map(({ from, to, shift }) => [from, to, ...shift])).toEqual([
      [0, 0, 0, 0, 1],
      [0, 0, 0, 1, 0],
      [0, 0, 1, 0, 0],
    ]);
  });

  it('are left out along directions that do not repeat', () => {
    const bonds = findBonds([atom('Fe', 0, 0, 0)], cube(2.4), { periodic: [true, false, false] });
    expect(bonds.map(({ shift }) => shift)).toEqual([[1, 0, 0]]);
  });

  it('point from an atom to the moved partner', () => {
    const close = findBonds([atom('O', 0.2, 5, 5), atom('O', 9.0, 5, 5)], cube(10));
    expect(close).toMatchObject([{ from: 0, to: 1, shift: [-1, 0, 0] }]);
    expect(close[0]!.lengthAngstrom).toBeCloseTo(1.2, 10);
  });
});

describe('disorder', () => {
  const group = (name: string, assembly: string | null = null): Partial<BondAtom> => ({
    disorder: { assembly, group: name },
    occupancy: 0.5,
  });

  it('keeps alternatives of one assembly apart', () => {
    const atoms = [
      atom('C', 0, 0, 0),
      atom('C', 1.5, 0, 0, group('1')),
      atom('C', 1.4, 1.3, 0, group('2')),
      atom('O', 2.7, 0, 0, group('1')),
    ];
    expect(pairs(atoms)).toEqual(['0-1', '0-2', '1-3']);
  });

  it('lets groups of different assemblies meet', () => {
    expect(pairs([atom('C', 0, 0, 0, group('1', 'A')), atom('C', 1.5, 0, 0, group('2', 'B'))])).toEqual([
      '0-1',
    ]);
    expect(pairs([atom('C', 0, 0, 0, group('.')), atom('C', 1.5, 0, 0, group('2'))])).toEqual(['0-1']);
  });

  it('bonds a group with a minus sign only within one symmetry copy', () => {
    const copy = (operationIndex: number, shift = 0): Partial<BondAtom> => ({
      ...group('-1'),
      operationIndex,
      cellShift: [shift, 0, 0],
    });
    const meet = (p: Partial<BondAtom>, q: Partial<BondAtom>): boolean =>
      pairs([atom('C', 0, 0, 0, p), atom('C', 1.5, 0, 0, q)]).length === 1;
    expect(meet(copy(0), copy(0))).toBe(true);
    expect(meet(copy(0), copy(3))).toBe(false);
    expect(meet(copy(0), copy(0, 1))).toBe(false);
    expect(meet({}, copy(3))).toBe(true);
    const ring = findBonds([atom('C', 0.2, 0, 0, copy(0)), atom('C', 9, 0, 0, copy(0, -1))], cube(10));
    expect(ring).toHaveLength(0);
    const whole = findBonds([atom('C', 0.2, 0, 0, copy(0)), atom('C', 8.8, 0, 0, copy(0, 1))], cube(10));
    expect(whole).toMatchObject([{ shift: [-1, 0, 0] }]);
  });

  it('sees the alternatives of an atom that the file does not mark as such', () => {
    const half = { occupancy: 0.5 };
    const perchlorate = [
      atom('Cl', 0, 0, 0),
      ...corners(1.44).map((cartesian) => ({ element: 'O', cartesian, ...half })),
      ...corners(-1.44).map((cartesian) => ({ element: 'O', cartesian, ...half })),
    ];
    expect(pairs(perchlorate)).toHaveLength(8);
    expect(pairs(perchlorate).every((bond) => bond.startsWith('0-'))).toBe(true);
  });

  it('does not bond halves of one split atom that carry no group', () => {
    const halves = [atom('O', 0, 0, 0, { occupancy: 0.5 }), atom('O', 0.85, 0, 0, { occupancy: 0.5 })];
    expect(pairs(halves)).toEqual([]);
    expect(pairs(halves.map((half) => ({ ...half, occupancy: 1 })))).toEqual(['0-1']);
  });
});

describe('hydrogen bonds', () => {
  const donor = [atom('N', 0, 0, 0), atom('H', 1.01, 0, 0)];

  it('need an angle above 110° and a contact below the van der Waals radii', () => {
    const towards = (x: number, y: number, element = 'O'): string[] =>
      pairs([...donor, atom(element, x, y, 0)], 'hydrogen');
    expect(towards(2.9, 0)).toEqual(['1-2']);
    expect(towards(3.7, 0)).toEqual([]);
    expect(towards(3.7, 0, 'I')).toEqual(['1-2']);
    expect(towards(1.8, 1.9)).toEqual(['1-2']);
    expect(towards(1.3, 2.2)).toEqual([]);
  });

  it('come only from N, O and F, and go not to halogen on carbon or the centre of a sulfate', () => {
    expect(pairs([atom('C', 0, 0, 0), atom('H', 1.09, 0, 0), atom('O', 3, 0, 0)], 'hydrogen')).toEqual([]);
    const chloride = [...donor, atom('Cl', 3.3, 0, 0)];
    expect(pairs(chloride, 'hydrogen')).toEqual(['1-2']);
    expect(pairs([...chloride, atom('C', 5.0, 0, 0)], 'hydrogen')).toEqual([]);
  });

  it('start at the hydrogen wherever it stands in the list', () => {
    const found = findBonds([atom('O', 2.9, 0, 0), ...donor], null).filter((b) => b.kind === 'hydrogen');
    expect(found).toMatchObject([{ from: 2, to: 0 }]);
    expect(found[0]!.lengthAngstrom).toBeCloseTo(1.89, 10);
  });
});

describe('a heap of atoms on one spot', () => {
  it('stops with a problem that names the limit', () => {
    const problems: Problem[] = [];
    const heap = Array.from({ length: 3000 }, () => atom('C', 1, 1, 1));
    expect(findBonds(heap, null, { report: (found) => problems.push(found) })).toEqual([]);
    expect(problems).toMatchObject([
      { code: 'bonds-incomplete', allowed: expect.stringContaining('900000') },
    ]);
  });
});
