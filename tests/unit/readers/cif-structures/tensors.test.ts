import { describe, expect, it } from 'vitest';
import { efgTensorToAtomicUnits } from '#src/tensor/units.ts';
import {
  atomText,
  block,
  cellText,
  codes,
  inversion,
  only,
  plainColumns,
  problemOf,
} from '#tests/support/cif-structure.ts';

const components = [11, 12, 13, 21, 22, 23, 31, 32, 33];
const nine = '1 2 3 4 5 6 7 8 9';
const cell = cellText(8, 8, 8);
const atoms = atomText(plainColumns, 'Na1 .1 .2 .3', 'Cl1 .2 .3 .4', 'O1 .3 .3 .4', 'O1 .3 .3 .1');
const frame = components
  .map((index) => `_atom_sites_Cartn_tran_matrix_${index} ${index % 11 === 0 ? 8 : 0}\n`)
  .join('');

function tensors(...rows: readonly string[]): string {
  const names = ['site_label', 'quantity', 'unit', ...components.map(String)].map(
    (name) => `_ellipsite_tensor_${name}`,
  );
  return `loop_\n${names.join('\n')}\n${rows.join('\n')}\n`;
}

describe('tensors in a CIF', () => {
  it('make one set a quantity, row-major, bound to site and frame', () => {
    const reading = block(
      cell,
      frame,
      inversion,
      atoms,
      tensors(`Na1 shielding ppm ${nine}`, `Na1 shift ppm ${nine}`, `Cl1 shielding ppm ${nine}`),
    );
    expect(codes(reading)).toEqual([]);
    expect(reading.tensorSets.map(({ quantity, entries }) => [quantity, entries.length])).toEqual([
      ['shielding', 2],
      ['shift', 1],
    ]);
    const [set] = reading.tensorSets;
    expect(set!.lattice).toEqual(only(reading).lattice);
    expect(set!.structureIndex).toBe(0);
    expect(set!.entries[1]).toMatchObject({
      label: 'Cl1',
      element: 'Cl',
      atomIndex: 1,
      tensor: [1, 2, 3, 4, 5, 6, 7, 8, 9],
    });
    expect(set!.entries[1]!.place.line).toBe(45);
  });

  it.each([
    ['a.u.', 'au'],
    ['au', 'au'],
    ['?', 'au'],
    ['1e21V/m2', '1e21V/m2'],
    ['V/A2', 'V/A2'],
  ] as const)('EFG in %s becomes atomic units', (unit, known) => {
    const reading = block(cell, frame, inversion, atoms, tensors(`Na1 efg ${unit} ${nine}`));
    const [entry] = reading.tensorSets[0]!.entries;
    const expected = efgTensorToAtomicUnits([1, 2, 3, 4, 5, 6, 7, 8, 9], known);
    entry!.tensor.forEach((x, i) => expect(x).toBeCloseTo(expected[i]!, 12));
    expect(reading.tensorSets[0]!.unitGiven).toBe(unit === '?' ? 'a.u.' : unit);
  });

  it('under dotted names and in a block with several structures know their structure', () => {
    const dotted = tensors(`Na1 shielding ppm ${nine}`).replaceAll('_tensor_', '_tensor.');
    const second = block(
      cell,
      frame,
      inversion,
      atoms,
      `data_u\n${cell}${frame}${inversion}${atoms}${dotted}`,
    );
    expect(second.tensorSets.map(({ structureIndex }) => structureIndex)).toEqual([1]);
  });

  it('without a stated frame assume the default one and warn', () => {
    const reading = block(cell, inversion, atoms, tensors(`Na1 shielding ppm ${nine}`));
    expect(codes(reading)).toEqual(['cif-tensor-frame-assumed']);
    expect(problemOf(reading, 'cif-tensor-frame-assumed').message).toContain('c along z');
  });

  it.each([
    ['an unknown quantity', `Na1 magic ppm ${nine}`, 'cif-bad-tensor', 'magic'],
    ['a unit that is none of it', `Na1 shielding Hz ${nine}`, 'cif-bad-tensor', 'Hz'],
    ['an EFG unit nobody knows', `Na1 efg furlong ${nine}`, 'cif-bad-tensor', 'furlong'],
    ['a component in words', `Na1 shielding ppm 1 2 3 4 five 6 7 8 9`, 'cif-bad-tensor', 'five'],
  ])('%s leaves the row out', (_, row, code, got) => {
    const reading = block(cell, frame, inversion, atoms, tensors(row));
    expect(reading.tensorSets).toEqual([]);
    expect(problemOf(reading, code)).toMatchObject({ severity: 'error', got, line: 43 });
  });

  it('rows with components that were not computed are left out alone, and told in one warning', () => {
    const rows = [
      'Na1 shielding ppm 1 2 3 4 ? 6 7 8 9',
      `Cl1 shielding ppm ${nine}`,
      'Na1 efg a.u. nan nan nan 4 5 6 7 8 9',
    ];
    const reading = block(cell, frame, inversion, atoms, tensors(...rows));
    expect(reading.tensorSets).toMatchObject([{ quantity: 'shielding', entries: [{ label: 'Cl1' }] }]);
    const told = reading.problems.filter(({ code }) => code === 'cif-bad-tensor');
    expect(told).toMatchObject([{ severity: 'warning', line: 43, got: '?' }]);
    expect(told[0]?.message).toMatch(/^2 of 3 tensor rows have .*Na1 in line 43, Na1 in line 45/);
  });

  it('labels of no site, of several sites, and repeated ones are told', () => {
    const rows = [
      `Xe9 shift ppm ${nine}`,
      `O1 shift ppm ${nine}`,
      `Na1 shift ppm ${nine}`,
      `Na1 shift ppm ${nine}`,
    ];
    const reading = block(cell, frame, inversion, atoms, tensors(...rows));
    expect(codes(reading)).toEqual(['cif-tensor-label', 'cif-tensor-label', 'cif-tensor-label']);
    expect(reading.tensorSets[0]!.entries.map(({ label, atomIndex }) => [label, atomIndex])).toEqual([
      ['Xe9', null],
      ['O1', null],
      ['Na1', 0],
    ]);
  });
});
