import { expect, it } from 'vitest';
import { dossierOfText } from '#tests/support/derive.ts';

/** A simple cubic crystal of edge 4 Å, repeated along x. */
function cubicXyz(times: number): string {
  const atoms = Array.from({ length: times }, (_none, cell) => `Cu ${4 * cell} 0 0`);
  return `${times}\nLattice="${4 * times} 0 0 0 4 0 0 0 4" Properties=species:S:1:pos:R:3\n${atoms.join('\n')}\n`;
}

it('warns where the shape of a supercell hides symmetry, and keeps the cell', () => {
  const dossier = dossierOfText('doubled.xyz', cubicXyz(2));
  const warning = dossier.problems.find(({ code }) => code === 'supercell-breaks-symmetry')!;
  expect(warning.severity).toBe('warning');
  expect(warning.message).toContain(
    'The cell is 2 × the primitive cell of P m -3 m (No. 221); its shape keeps only 32 of 96 operations.',
  );
  expect(dossier.atomsInCell).toBe(2);
  expect(dossier.symmetry.number).toBe(123);
  expect(dossier.lattice!.rows[0]).toBe(8);
});

it('is silent where nothing is lost', () => {
  const { problems, symmetry } = dossierOfText('single.xyz', cubicXyz(1));
  expect(symmetry.number).toBe(221);
  expect(problems.map(({ code }) => code)).not.toContain('supercell-breaks-symmetry');
});
