import { describe, expect, it } from 'vitest';
import { sourceFromText } from '#src/bytes/source-from-text.ts';
import { readXyz } from '#src/readers/xyz/read-xyz.ts';
import type { XyzOptions } from '#src/readers/xyz/read-xyz.ts';

const read = (text: string, options?: XyzOptions) => readXyz(sourceFromText('f.xyz', text), options);
const codes = (text: string, options?: XyzOptions) => read(text, options).problems.map(({ code }) => code);

const cell = 'Lattice="4 0 0 0 5 0 0 0 6"';
const nine = '1 2 3 4 5 6 7 8 9';

describe('molecules and crystals', () => {
  it('reads a molecule without a cell', () => {
    const { structures, problems, format } = read('3\nwater\nO 0 0 0.1\nH 0.8 0 -0.5\nH -0.8 0 -0.5\n');
    expect(format).toBe('xyz');
    expect(problems).toEqual([]);
    expect(structures).toHaveLength(1);
    expect(structures[0]).toMatchObject({ name: 'water', lattice: null, periodic: [false, false, false] });
    expect(structures[0]?.sites.map((site) => [site.label, site.element, site.fractional])).toEqual([
      ['O1', 'O', null],
      ['H1', 'H', null],
      ['H2', 'H', null],
    ]);
    expect(structures[0]?.sites[1]?.cartesian).toEqual([0.8, 0, -0.5]);
    expect(structures[0]?.sites[1]?.place).toEqual({ file: 'f.xyz', line: 4, column: 1 });
  });

  it('keeps the rows of Lattice bit by bit and names no symmetry', () => {
    const rows = [2.45619613, -4.25427416, 0, 2.45619613, 4.25427416, 0, 0, 0, 5.40363149];
    const [crystal] = read(`1\nLattice="${rows.join(' ')}"\nSi 2.45619613 0.0 2.701815745\n`).structures;
    expect(crystal?.lattice?.rows).toEqual(rows);
    expect(crystal?.periodic).toEqual([true, true, true]);
    expect(crystal?.symmetry).toMatchObject({ source: 'none', stated: false, number: null });
    expect(crystal?.symmetry.operations).toHaveLength(1);
    const [x, y, z] = crystal?.sites[0]?.fractional ?? [];
    expect(x).toBeCloseTo(0.5, 12);
    expect(y).toBeCloseTo(0.5, 12);
    expect(z).toBeCloseTo(0.5, 12);
  });

  it('reads atomic numbers, mixed line endings and tabs', () => {
    const { structures, problems } = read('2\r\n\r\n14\t0\t0\t0\r8 −1.5D0 0 1\n');
    expect(problems).toEqual([]);
    expect(structures[0]?.sites.map(({ element }) => element)).toEqual(['Si', 'O']);
    expect(structures[0]?.sites[1]?.cartesian).toEqual([-1.5, 0, 1]);
    expect(structures[0]?.name).toBe('f');
  });

  it('takes labels from the site column, from telling species, else counts', () => {
    const labels = (text: string): (string | undefined)[] =>
      read(text).structures[0]?.sites.map(({ label }) => label) ?? [];
    const columns = 'Properties=species:S:1:site:S:1:pos:R:3';
    expect(labels(`2\n${cell} ${columns}\nO O1 0 0 0\nO O1 1 1 1\n`)).toEqual(['O1', 'O1']);
    expect(labels('2\n\nC3 0 0 0\nC7 1 1 1\n')).toEqual(['C3', 'C7']);
    expect(labels('2\n\nFe1 0 0 0\nFe1 1 1 1\n')).toEqual(['Fe1', 'Fe2']);
  });

  it('reads all frames; the first is the crystal', () => {
    const frame = `1\n${cell} Properties=species:S:1:pos:R:3:shift:R:9\nC 0 0 0 ${nine}\n`;
    const reading = read(`${frame}\n${frame}${frame}`);
    expect(reading.structures.map(({ name }) => name)).toEqual(['f, frame 1', 'f, frame 2', 'f, frame 3']);
    expect(reading.tensorSets.map(({ structureIndex }) => structureIndex)).toEqual([0, 1, 2]);
    expect(reading.problems).toMatchObject([{ code: 'xyz-several-frames', severity: 'note' }]);
  });
});

describe('tensors', () => {
  const header = `${cell} Properties=species:S:1:pos:R:3`;

  it('reads our columns row by row, in the frame of Lattice', () => {
    const { tensorSets, problems } = read(`1\n${header}:shielding:R:9:efg:R:9\nO 0 0 0 ${nine} ${nine}\n`);
    expect(problems).toEqual([]);
    expect(tensorSets).toMatchObject([
      { quantity: 'shielding', unitGiven: 'ppm', structureIndex: 0, name: 'shielding' },
      { quantity: 'efg', unitGiven: 'a.u.', structureIndex: 0 },
    ]);
    expect(tensorSets[0]?.lattice?.rows).toEqual([4, 0, 0, 0, 5, 0, 0, 0, 6]);
    expect(tensorSets[0]?.entries).toEqual([
      {
        label: null,
        element: 'O',
        atomIndex: 0,
        cartesian: [0, 0, 0],
        tensor: [1, 2, 3, 4, 5, 6, 7, 8, 9],
        place: { file: 'f.xyz', line: 3, column: 9 },
      },
    ]);
  });

  // 1 a.u. = 9.717362442e21 V m⁻² (CODATA 2022, Eh e⁻¹ a0⁻²); 1 V Å⁻² = 1e20 V m⁻².
  it.each([
    ['V/A2', 97.17362442],
    ['"V/Å²"', 97.17362442],
    ['1e21V/m2', 9.717362442],
    ['"1e21 V m^-2"', 9.717362442],
    ['V/m2', 9.717362442e21],
    ['au', 1],
    ['a.u.', 1],
  ])('turns an EFG in %s into atomic units', (unit, oneAtomicUnit) => {
    const row = Array(9).fill(oneAtomicUnit).join(' ');
    const { tensorSets } = read(`1\n${header}:efg:R:9 efg_unit=${unit}\nO 0 0 0 ${row}\n`);
    tensorSets[0]?.entries[0]?.tensor.forEach((value) => expect(value).toBeCloseTo(1, 8));
    expect(tensorSets).toHaveLength(1);
  });

  it('takes no set in an unknown unit', () => {
    const reading = read(
      `1\n${header}:efg:R:9:shift:R:9 efg_unit=Hz shift_unit=kHz\nO 0 0 0 ${nine} ${nine}\n`,
    );
    expect(reading.tensorSets).toEqual([]);
    expect(reading.structures).toHaveLength(1);
    expect(reading.problems).toMatchObject([
      { code: 'xyz-unknown-unit', severity: 'error', got: 'Hz', line: 2 },
      { code: 'xyz-unknown-unit', severity: 'error', got: 'kHz', allowed: 'ppm' },
    ]);
  });

  it('leaves out an atom whose tensor is missing or unreadable, and says where', () => {
    const rows = `O 0 0 0 1 2 3 nan 5 6 7 8 9\nO 1 0 0 ***** 2 3 4 5 6 7 8 9\nO 2 0 0 ${nine}\nO 3 0 0 1,5 2 3 4 5 6 7 8 9\n`;
    const { tensorSets, problems, structures } = read(`4\n${header}:shielding:R:9\n${rows}`);
    expect(structures[0]?.sites).toHaveLength(4);
    expect(tensorSets[0]?.entries.map(({ atomIndex }) => atomIndex)).toEqual([2]);
    expect(problems).toMatchObject([
      { code: 'xyz-missing-tensor', severity: 'warning', line: 3, column: 15, got: 'nan' },
      { code: 'xyz-bad-tensor', severity: 'error', line: 6, column: 9, got: '1,5' },
    ]);
    expect(problems).toHaveLength(2);
    expect(problems[0]?.message).toMatch(
      /^2 of 4 atoms have no shielding.*\(lines 3, 4\); the others keep theirs/,
    );
    expect(problems[1]?.message).toMatch(/^1 of 4 atoms has no shielding.*\(line 6\)/);
  });

  it('counts atoms whose tensor is left out as a whole in one note', () => {
    const absent = Array(9).fill('nan').join(' ');
    const { tensorSets, problems } = read(
      `3\n${header}:efg:R:9\nSi 0 0 0 ${absent}\nO 1 0 0 ${nine}\nSi 2 0 0 ${absent}\n`,
    );
    expect(tensorSets[0]?.entries.map(({ atomIndex }) => atomIndex)).toEqual([1]);
    expect(problems).toMatchObject([{ code: 'xyz-tensor-absent', severity: 'note', line: 3 }]);
    expect(problems[0]?.message).toMatch(/^2 of 3 atoms have no efg.*\(lines 3, 5\); the others keep theirs/);
  });

  it('keeps tensors without positions, but makes no structure', () => {
    const reading = read(`2\n${cell} Properties=site:S:1:shielding:R:9\nSi1 ${nine}\nO1 ${nine}\n`);
    expect(reading.structures).toEqual([]);
    expect(reading.tensorSets).toMatchObject([
      {
        structureIndex: null,
        entries: [
          { label: 'Si1', element: 'Si', atomIndex: null, cartesian: null },
          { label: 'O1', element: 'O', atomIndex: null, cartesian: null },
        ],
      },
    ]);
    expect(reading.tensorSets[0]?.lattice?.rows).toEqual([4, 0, 0, 0, 5, 0, 0, 0, 6]);
    expect(reading.problems.map(({ code }) => code)).toEqual(['xyz-no-positions', 'xyz-no-species']);
  });

  it('does not take a column of ours in another shape', () => {
    const reading = read(`1\n${header}:shielding:R:1:efg:R:6\nO 0 0 0 1 1 2 3 4 5 6\n`);
    expect(reading.tensorSets).toEqual([]);
    expect(reading.problems.map(({ code }) => code)).toEqual(['xyz-tensor-shape', 'xyz-tensor-shape']);
  });
});

describe('proposals', () => {
  const file = (name: string, numbers: string): string =>
    `1\n${cell} Properties=species:S:1:pos:R:3:${name}:R:9\nO 0 0 0 ${numbers}\n`;
  const traceless = '1 0 0 0 2 0 0 0 -3';

  it.each([
    ['my_shielding', nine, 'shielding'],
    ['sigma', nine, 'shielding'],
    ['cs_shift', nine, 'shift'],
    ['EFG_tensor', traceless, 'efg'],
    ['EFG_tensor', nine, 'unknown'],
    ['t', traceless, 'efg'],
    ['t', nine, 'unknown'],
    ['born_charges', nine, 'unknown'],
    ['virial', traceless, 'unknown'],
  ])('%s with %s is proposed as the third', (name, numbers, quantity) => {
    const { proposals, tensorSets, problems } = read(file(name, numbers));
    expect(tensorSets).toEqual([]);
    expect(proposals).toMatchObject([{ name, quantity, line: 2, structureIndex: 0 }]);
    expect(problems.map(({ code }) => code)).toEqual(['xyz-column-proposed']);
    expect(problems[0]?.hint).toMatch(
      quantity === 'unknown' ? /efg:R:9/ : new RegExp(`rename.*${quantity}:R:9`),
    );
  });

  it('is taken by name, quantity and unit on request', () => {
    const accept = { t: { quantity: 'efg', unit: 'V/A2' } } as const;
    const { proposals, tensorSets, problems } = read(file('t', '97.17362442 0 0 0 0 0 0 0 -97.17362442'), {
      accept,
    });
    expect(proposals).toEqual([]);
    expect(problems).toEqual([]);
    expect(tensorSets).toMatchObject([{ name: 't', quantity: 'efg', unitGiven: 'V/A2' }]);
    expect(tensorSets[0]?.entries[0]?.tensor[0]).toBeCloseTo(1, 8);
  });

  it('says that a requested column is not there', () => {
    expect(codes(file('t', nine), { accept: { u: { quantity: 'efg', unit: 'au' } } })).toContain(
      'xyz-column-not-found',
    );
  });

  it('leaves integers, shorter and longer columns alone', () => {
    const text = `1\n${cell} Properties=species:S:1:pos:R:3:n:I:9:f:R:3\nO 0 0 0 ${nine} 1 2 3\n`;
    expect(read(text).proposals).toEqual([]);
  });
});
