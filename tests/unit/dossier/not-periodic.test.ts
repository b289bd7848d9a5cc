import { expect, it } from 'vitest';
import { dossierOfText } from '#tests/support/derive.ts';

/** A square net of carbon, 1.5 Å in all three directions, made up for this test. */
function net(pbc: string): string {
  return `1\nLattice="1.5 0 0 0 1.5 0 0 0 1.5" pbc="${pbc}" Properties=species:S:1:pos:R:3\nC 0 0 0\n`;
}

it('searches no space group where the cell does not repeat along c, and says so', () => {
  const { symmetry, bonds, problems } = dossierOfText('slab.xyz', net('T T F'));
  expect(symmetry.operations).toHaveLength(1);
  expect(bonds.map(({ shift }) => shift[2])).toEqual([0, 0]);
  const found = problems.find(({ code }) => code === 'cell-not-periodic');
  expect(found).toMatchObject({ severity: 'warning', got: 'not periodic along c' });
});

it('searches it where the cell repeats along all three', () => {
  const { symmetry, bonds, problems } = dossierOfText('cube.xyz', net('T T T'));
  expect([symmetry.number, bonds.length]).toEqual([221, 3]);
  expect(problems.map(({ code }) => code)).not.toContain('cell-not-periodic');
});
