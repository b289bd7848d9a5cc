import { describe, expect, it } from 'vitest';
import {
  atoms,
  bohr,
  cartesian,
  expectCrystal,
  expectFrame,
  find,
  fractional,
  inAngstrom,
  latticeRows,
  n,
  perElement,
  rows,
  vector,
} from '#tests/support/text-crystal.ts';

const [a, b, c] = [0, 3, 6].map((i) => Math.hypot(...rows.slice(i, i + 3))) as [number, number, number];
const between = (p: number[], q: number[]): number =>
  (Math.acos(p.reduce((sum, v, i) => sum + v * q[i]!, 0) / (Math.hypot(...p) * Math.hypot(...q))) * 180) /
  Math.PI;
const [va, vb, vc] = [rows.slice(0, 3), rows.slice(3, 6), rows.slice(6, 9)] as [number[], number[], number[]];
const angles = [between(vb, vc), between(va, vc), between(va, vb)];
const constants = [
  `a = ${n(a)} b = ${n(b)} c = ${n(c)} Å`,
  `alpha = ${n(angles[0]!)} beta = ${n(angles[1]!)} gamma = ${n(angles[2]!)}`,
];
const listed = atoms.map(([symbol], i) => `${symbol} ${vector(fractional[i]!)}`);
const masses = [47.867, 87.62, 15.999, 15.999, 15.999];

/** Layouts of our own invention; each holds one trap. */
const layouts: Record<string, string[]> = {
  'vectors printed as columns, beside lengths and angles': [
    ...constants,
    'cell matrix (Å), lattice vectors',
    ...[0, 1, 2].map((i) => vector([rows[i]!, rows[3 + i]!, rows[6 + i]!])),
    'fractional coordinates',
    ...listed,
  ],
  'keyword on the first row only, charges and types of atoms elsewhere': [
    `lengthsofcell ${vector([4.1, 4.1, 4.1], 1 / bohr)} bohr`,
    'kinds 1 2 3 3 3',
    'charges 22. 38. 8.'.replace(/\./g, ''),
    `vectors ${latticeRows(1 / 4.1)[0]}`,
    ...latticeRows(1 / 4.1).slice(1),
    `place_reduced ${vector(fractional[0]!)}`,
    ...fractional.slice(1).map((f) => `   ${vector(f)}`),
  ],
  'no word about the coordinates, species with counts': [
    ...inAngstrom,
    'species    atoms',
    'Ti  1',
    'Sr  1',
    'O   3',
    'list',
    ...fractional.map((f) => vector(f)),
  ],
  'a mass before the coordinates': [
    ...inAngstrom,
    'Cartesian coordinates with masses',
    ...atoms.map(([symbol], i) => `${symbol} ${masses[i]!.toFixed(4)} ${vector(cartesian[i]!)}`),
  ],
  'a charge of an atom after the coordinates': [
    ...inAngstrom,
    'Cartesian coordinates, Å',
    ...atoms.map(([symbol], i) => `${symbol} ${vector(cartesian[i]!)} ${(0.4 - 0.1 * i).toFixed(3)}`),
  ],
  'a list broken by the head of a page': [
    ...inAngstrom,
    'fractional coordinates',
    ...listed.slice(0, 3).map((row, i) => `${i + 1} ${row}`),
    '',
    'page 2, continued',
    '  No  El   u    v    w',
    ...listed.slice(3).map((row, i) => `${i + 4} ${row}`),
  ],
  'numbers glued before the symbol': [
    ...inAngstrom,
    'fractional coordinates',
    ...atoms.map(([symbol], i) => `${i + 1}${symbol} ${vector(fractional[i]!)}`),
  ],
  'attributes of marked-up text': [
    '<cell unit="Å">',
    ...latticeRows().map((row) => `  <vector>${row}</vector>`),
    '</cell>',
    ...atoms.map(([symbol], i) => {
      const [x, y, z] = fractional[i]!.map((v) => v!.toFixed(7));
      return `<atom symbol="${symbol}" number="${i + 1}" x="${x}" y="${y}" z="${z}"/>`;
    }),
  ],
  'lists in brackets': [
    '"lattice_vectors": [',
    ...latticeRows().map((row) => `  [${row.trim().replace(/\s+/g, ', ')}],`),
    '],',
    `"symbols": [${atoms.map(([symbol]) => `"${symbol}"`).join(', ')}],`,
    '"fractional_coordinates": [',
    ...fractional.map((f) => `  [${vector(f).trim().replace(/\s+/g, ', ')}],`),
    ']',
  ],
  'names of data items': [
    ...inAngstrom,
    'loop_',
    ...['label', 'type_symbol', 'fract_x', 'fract_y', 'fract_z', 'occupancy'].map(
      (name) => `_atom_site_${name}`,
    ),
    ...atoms.map(
      ([symbol], i) =>
        `${symbol}${perElement[i]} ${symbol} ${fractional[i]!.map((v) => `${v!.toFixed(4)}(2)`).join(' ')} 1.0`,
    ),
  ],
  'answers whether an atom may move': [
    ...inAngstrom,
    'Ti Sr O',
    '1 1 3',
    'fractional coordinates, free to move',
    ...fractional.map((f, i) => `${vector(f)} T ${i % 2 ? 'F' : 'T'} T`),
  ],
  'answers before the symbol': [
    ...inAngstrom,
    'atom  unique  charge  symbol   x/a   y/b   z/c',
    ...atoms.map(
      ([symbol, z], i) =>
        `${i + 1} ${i < 4 ? 'T' : 'F'} ${z} ${symbol.toUpperCase()} ${vector(fractional[i]!)}`,
    ),
  ],
  'a box of letters around the list': [
    ...inAngstrom,
    'x  Element   Atom     Fractional coordinates   x',
    'x            Number     u        v        w    x',
    'x'.repeat(50),
    ...atoms.map(([symbol], i) => `x  ${symbol}  ${perElement[i]}  ${vector(fractional[i]!)}  x`),
  ],
  'nuclides in place of symbols': [
    ...inAngstrom,
    'fractional coordinates',
    ...atoms.map((_, i) => `${['47Ti', '87Sr', '17O', '17O', '17O'][i]} ${vector(fractional[i]!)}`),
  ],
  'real and reciprocal vectors named on the line': [
    'Primitive vectors R (bohr) and reciprocal G (1/bohr)',
    ...reciprocalBeside(1 / bohr).map((row, i) =>
      row.replace('#', `R(${i + 1})=`).replace('#', `G(${i + 1})=`),
    ),
    'reduced coordinates',
    ...listed,
  ],
  'a matrix that is no cell in the same words': [
    'Cell, direct vectors (Å)',
    ...latticeRows(),
    'Cell, metric tensor',
    ...latticeRows(4),
    'fractional coordinates',
    ...listed,
  ],
};

function reciprocalBeside(factor: number): string[] {
  const cross = (p: number[], q: number[]): number[] => [
    p[1]! * q[2]! - p[2]! * q[1]!,
    p[2]! * q[0]! - p[0]! * q[2]!,
    p[0]! * q[1]! - p[1]! * q[0]!,
  ];
  const volume = cross(vb, vc).reduce((sum, v, i) => sum + v * va[i]!, 0);
  const stars = [cross(vb, vc), cross(vc, va), cross(va, vb)];
  return [va, vb, vc].map((v, i) => `# ${vector(v, factor)}  # ${vector(stars[i]!, 1 / volume / factor)}`);
}

describe('rarer structures in a text', () => {
  it.each(Object.entries(layouts))('%s', (_, lines) => {
    expectFrame(expectCrystal(lines.join('\n')));
  });

  it('gives each step of a relaxation its own cell, whether printed above or below the atoms', () => {
    const cell = (size: number): string[] => ['Cell vectors / Å', ...latticeRows(size)];
    const list = (size: number): string[] => [
      'fractional coordinates',
      ...atoms.map(
        ([symbol], i) =>
          `${symbol} ${vector([fractional[i]![0]! + 0.01 * size, fractional[i]![1]!, fractional[i]![2]!])}`,
      ),
    ];
    const pause = Array.from({ length: 20 }, (_, i) => `talk in line ${i}`);
    const above = [1, 1.01, 1.02].flatMap((size) => [...cell(size), ...list(size), ...pause]);
    const below = [1, 1.01, 1.02].flatMap((size) => [...list(size), ...cell(size), ...pause]);
    for (const text of [above, below]) {
      const found = find(text.join('\n'));
      expect(found.map(({ lattice }) => lattice!.cell.a / a)).toEqual([
        expect.closeTo(1, 5),
        expect.closeTo(1.01, 5),
        expect.closeTo(1.02, 5),
      ]);
    }
  });

  it('does not take a scaled lattice without its length for one in Å', () => {
    const text = [
      'lattice vectors in units of alat',
      ...latticeRows(1 / 4.1),
      'fractional coordinates',
      ...listed,
    ];
    const [structure] = find(text.join('\n'));
    expect(structure!.lattice).toBeNull();
    expect(structure!.atoms[1]!.cartesian).toBeNull();
    expect(structure!.atoms[1]!.fractional![0]).toBeCloseTo(0.52, 6);
  });
});
