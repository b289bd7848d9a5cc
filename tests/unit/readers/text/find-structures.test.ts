import { describe, expect, it } from 'vitest';
import { tokenise } from '#src/readers/text/tokenise.ts';
import { unfinishedFinder } from '#src/readers/text/unfinished-lines.ts';
import {
  atoms,
  bohr,
  cartesian,
  expectCrystal,
  expectFrame,
  find,
  fractional,
  inAngstrom,
  inBohr,
  latticeRows,
  n,
  perElement,
  rows,
  vector,
} from '#tests/support/text-crystal.ts';

/** Layouts of our own invention, one a trap. */
const layouts: Record<string, string[]> = {
  'fractional list below vectors in bohr': [
    ...inBohr,
    'Fractional coordinates',
    ...atoms.map(([symbol], i) => `${symbol} ${vector(fractional[i]!)}`),
  ],
  'Cartesian list, numbers within the element': [
    ...inAngstrom,
    'Atomic positions, Cartesian, Angstrom',
    ...atoms.map(([symbol], i) => `  ${symbol} ${perElement[i]}  ${vector(cartesian[i]!)}`),
  ],
  'vectors beside reciprocal ones': [
    'real-space lattice            reciprocal lattice (1/Å)',
    ...reciprocalBeside(),
    'coordinates in fractions of the cell vectors; relative',
    ...atoms.map(([symbol], i) => `| ${symbol} | ${i + 1} | ${vector(fractional[i]!)} |`),
  ],
  'nine numbers on a row': [
    `lattice [bohr] ${vector(rows, 1 / bohr)}`,
    ...atoms.map(([symbol], i) => `position ${symbol} ${vector(cartesian[i]!, 1 / bohr)} bohr`),
  ],
  'multiples of a lattice parameter': [
    `lattice parameter (alat) = ${n(4.1 / bohr)} a.u.`,
    'lattice vectors in units of alat',
    ...latticeRows(1 / 4.1).map((row, i) => `v(${i + 1}) = (${row} )`),
    'positions of the atoms (alat)',
    ...atoms.map(([symbol], i) => `${i + 1} ${symbol} at (${vector(cartesian[i]!, 1 / 4.1)} )`),
  ],
  'scale, vectors, species, counts and bare rows': [
    'invented title',
    '  1.02',
    ...latticeRows(1 / 1.02),
    'Ti Sr O',
    '1 1 3',
    'direct',
    ...fractional.map((f) => vector(f)),
  ],
  'species one a line, counts later, bare Cartesian rows beside forces': [
    'kind: Ti',
    'kind: Sr',
    'kind: O',
    'atoms per kind = 1 1 3',
    ...inAngstrom,
    'coordinates                      forces (eV/Å)',
    '-'.repeat(60),
    ...cartesian.map((p, i) => `${vector(p)} ${vector([0.01 * i, -0.02, 0.003])}`),
  ],
  'nuclear charges in place of symbols, numbers from 0': [
    ...inAngstrom,
    'centre  atomic no.   x   y   z  (Å)',
    ...atoms.map(([, z], i) => `${i} ${z} ${vector(cartesian[i]!)}`),
  ],
  'species numbers after the coordinates': [
    'species 1 Ti',
    'species 2 Sr',
    'species 3 O',
    ...inAngstrom,
    'coordinates (Ang), species',
    ...atoms.map((_, i) => `${vector(cartesian[i]!)} ${[1, 2, 3, 3, 3][i]}`),
  ],
  'glued labels and both kinds of coordinates': [
    ...inAngstrom,
    'site   fractional    Cartesian (Å)',
    ...atoms.map(
      ([symbol], i) => `${symbol}${perElement[i]} ${vector(fractional[i]!)} ${vector(cartesian[i]!)}`,
    ),
  ],
  'names of elements': [
    ...inAngstrom,
    'fractional positions',
    ...atoms.map(
      (_, i) => `${['titanium', 'strontium', 'oxygen', 'oxygen', 'oxygen'][i]} ${vector(fractional[i]!)}`,
    ),
  ],
  'one line an atom, far apart': [
    ...inAngstrom,
    ...atoms.flatMap(([symbol], i) => [
      `=== nucleus ${symbol} ${perElement[i]} ===`,
      `${symbol} ${perElement[i]} located at ${vector(cartesian[i]!, 1)} Å, its position`,
      'tensor',
      vector([100.25 + i, 2.5, -3.5]),
      vector([2.25, 130.5, 4.75]),
      vector([-3.25, 4.5, 90.125]),
    ]),
  ],
  'coordinates named x, y, z on the line': [
    ...inAngstrom,
    'Atoms, fractional:',
    ...atoms.map(
      ([symbol], i) =>
        `${symbol}: x= ${n(fractional[i]![0]!)} y= ${n(fractional[i]![1]!)} z= ${n(fractional[i]![2]!)}`,
    ),
  ],
  'bare rows below the name of their species': [
    ...inAngstrom,
    'atomic positions (fractional)',
    'species 1: Ti',
    vector(fractional[0]!),
    'species 2: Sr',
    vector(fractional[1]!),
    'species 3: O',
    ...fractional.slice(2).map((f) => vector(f)),
  ],
  'a keyword before each vector and each atom': [
    ...latticeRows().map((row) => `cellvector ${row}`),
    ...atoms.map(([symbol], i) => `atom_fractional ${vector(fractional[i]!)} ${symbol}`),
  ],
  'coordinates before symbol and charge': [
    ...inBohr,
    'Cartesian coordinates (bohr), symbol, nuclear charge',
    ...atoms.map(([symbol, z], i) => `${vector(cartesian[i]!, 1 / bohr)} ${symbol.toLowerCase()} ${z}.000`),
  ],
  'charge before the coordinates': [
    ...inAngstrom,
    ' no   tag   charge   X   Y   Z   [Å]',
    ...atoms.map(([symbol, z], i) => `${i + 1} ${symbol} ${z}.0000 ${vector(cartesian[i]!)}`),
  ],
  'vector rows with their length after': [
    ...['a', 'b', 'c'].map(
      (name, i) =>
        `cell vector ${name} [nm]: ${vector(rows.slice(3 * i, 3 * i + 3), 0.1)}  |${name}| = ${n(Math.hypot(...rows.slice(3 * i, 3 * i + 3)) / 10)}`,
    ),
    'scaled coordinates, fractional',
    ...atoms.map(([symbol], i) => `${i + 1} ${symbol} ${vector(fractional[i]!)}`),
  ],
  'separate reciprocal block, D exponents': [
    ...inAngstrom.map((line) => line.replace(/(\d\.\d+)/g, '$1D+00')),
    'reciprocal vectors, 2 pi/Å',
    ...latticeRows(0.31),
    'Fractional',
    ...atoms.map(
      ([symbol], i) => `${symbol} ${vector(fractional[i]!).replace(/(\d\.\d+)/g, '$1D+00')} position`,
    ),
  ],
};

function reciprocalBeside(): string[] {
  const [a, b, c] = [rows.slice(0, 3), rows.slice(3, 6), rows.slice(6, 9)] as [number[], number[], number[]];
  const cross = (p: number[], q: number[]): number[] => [
    p[1]! * q[2]! - p[2]! * q[1]!,
    p[2]! * q[0]! - p[0]! * q[2]!,
    p[0]! * q[1]! - p[1]! * q[0]!,
  ];
  const volume = a[0]! * cross(b, c)[0]! + a[1]! * cross(b, c)[1]! + a[2]! * cross(b, c)[2]!;
  const stars = [cross(b, c), cross(c, a), cross(a, b)].map((v) => v.map((x) => x / volume));
  return latticeRows().map((row, i) => `${row}    ${vector(stars[i]!)}`);
}

describe('structures in a text', () => {
  it.each(Object.entries(layouts))('%s', (_, lines) => {
    expectFrame(expectCrystal(lines.join('\n')));
  });

  it('takes lengths and angles where no vectors are printed, and says that the frame is assumed', () => {
    const list = [
      'fractional coordinates',
      ...atoms.map(([symbol], i) => `${symbol} ${vector(fractional[i]!)}`),
    ];
    const named = [
      'a = 4.10000  alpha = 84.5',
      'b = 4.21070  beta = 92.6',
      'c = 4.42267  gamma = 85.9',
      ...list,
    ];
    const row = ['a b c alpha beta gamma, Å and degrees', '4.1 4.2107 4.42267 84.5 92.6 85.9', ...list];
    for (const text of [named, row]) {
      const { lattice } = expectCrystal(text.join('\n'));
      expect(lattice!.cell.b).toBeCloseTo(4.2107, 4);
      expect(lattice!.cell.beta).toBeCloseTo(92.6, 4);
      expect(lattice!.frame).toContain('assumed');
    }
  });

  it('keeps the steps of a relaxation apart and marks the last', () => {
    const step = (shift: number): string[] => [
      ...inAngstrom,
      'fractional coordinates of this step',
      ...atoms.map(
        ([symbol], i) =>
          `${symbol} ${vector([fractional[i]![0]! + shift * i, fractional[i]![1]!, fractional[i]![2]!])}`,
      ),
      'Forces (eV/Å)',
      ...atoms.map(([symbol]) => `${symbol} ${vector([0.1, 0.2, 0.3])}`),
    ];
    const found = find([...step(0), ...step(0.003), ...step(0.005), ...step(0.005)].join('\n'));
    expect(found.map(({ isLast }) => isLast)).toEqual([false, false, true]);
    expect(found[2]!.atoms[4]!.fractional![0]).toBeCloseTo(0.03, 6);
  });

  it('leaves out points without a nucleus, and counts them', () => {
    const found = find(
      [
        'Coordinates (Angstrom)',
        'C 1 0.0 0.0 0.0',
        'Bq 2 0.7 0.1 0.0',
        'O 3 1.13 0.1 0.0',
        'H 4 -0.9 0.5 0.1',
      ].join('\n'),
    );
    expect(found[0]!.atoms.map(({ element, index }) => [element, index])).toEqual([
      ['C', 1],
      ['O', 3],
      ['H', 4],
    ]);
  });

  it('reads bohr and Å side by side once, and a molecule without a lattice', () => {
    const rowsOfBoth = [
      [0, 0, 0],
      [0, 0.757, 0.586],
      [0, -0.757, 0.586],
    ].map((p, i) => `${i + 1} ${'OHH'[i]} ${vector(p, 1 / bohr)} ${vector(p)}`);
    const [water] = find(['atom   coordinates (bohr)     coordinates (Å)', ...rowsOfBoth].join('\n'));
    expect(water!.lattice).toBeNull();
    expect(water!.atoms[1]!.cartesian![1]).toBeCloseTo(0.757, 6);
    expect(water!.atoms[1]!.fractional).toBeNull();
  });

  it('takes tensors, forces, charges and stresses for no structure', () => {
    const text = [
      'Shielding tensors, ppm',
      ...atoms.flatMap(([symbol], i) => [
        `${symbol} ${i + 1}`,
        vector([101, 2, 3]),
        vector([4, 95, 6]),
        vector([7, 8, 99]),
      ]),
      'Principal values (ppm)',
      ...atoms.map(([symbol], i) => `${symbol} ${i + 1} ${vector([90 + i, 100, 120])}`),
      'Forces on the atoms',
      ...atoms.map(([symbol], i) => `${symbol} ${i + 1} ${vector([0.5 + i, 1, -1.2])}`),
      'Stress of the cell (GPa)',
      ...latticeRows(),
      'V_xx V_yy V_zz',
      ...atoms.map(([symbol], i) => `${symbol} ${i + 1} ${vector([0.5 + i, 1, -1.2])}`),
    ];
    expect(find(text.join('\n'))).toEqual([]);
  });
});

describe('unfinished runs', () => {
  const problems = (text: string): number[] => {
    const finder = unfinishedFinder('log.txt');
    text.split('\n').forEach((line, i) => finder.take(tokenise(line, i + 1)));
    return finder.finish().map(({ line }) => line!);
  };

  it('reports lines that say so, with their place', () => {
    const bad = [
      'cycle 7: SCF NOT CONVERGED',
      'failed to reach convergence',
      'Maximum number of iterations exceeded',
    ];
    expect(problems(['fine', ...bad, 'optimisation was not finished'].join('\n'))).toEqual([2, 3, 4, 5]);
  });

  it('leaves settings and good news alone', () => {
    const good = [
      'convergence reached in 7 cycles',
      'stop if not converged',
      'unconverged orbitals: none',
      'converged: yes',
    ];
    expect(problems(good.join('\n'))).toEqual([]);
  });
});
