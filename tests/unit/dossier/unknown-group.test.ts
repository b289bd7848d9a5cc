import { describe, expect, it } from 'vitest';
import { dossierOfText } from '#tests/support/derive.ts';

/** A made-up cubic cell with two rows; the group, if any, as the file names it. */
const cube = (group: string) => `data_x
_cell_length_a 4\n_cell_length_b 4\n_cell_length_c 4
_cell_angle_alpha 90\n_cell_angle_beta 90\n_cell_angle_gamma 90
${group}
loop_\n_atom_site_label\n_atom_site_fract_x\n_atom_site_fract_y\n_atom_site_fract_z
Cs1 0 0 0\nO1 .5 .5 0\nO2 .5 0 .5\n`;
const named = "_space_group_name_H-M_alt 'Q 17'";

describe('a file that names a group which is not known', () => {
  it('keeps its rows as sites of P 1, since a search over part of a cell finds a wrong crystal', () => {
    const { spaceGroup, symmetry, sites, atomsInCell, problems } = dossierOfText('t.cif', cube(named));
    const codes = problems.map(({ code }) => code);
    expect([spaceGroup, symmetry.operations.length, sites.length, atomsInCell]).toEqual([
      'P 1 (No. 1)',
      1,
      3,
      3,
    ]);
    expect(symmetry.reason).toContain('Q 17');
    expect(codes).not.toContain('symmetry-found');
    const error = problems.find(({ code }) => code === 'cif-symmetry-not-understood');
    expect(error).toMatchObject({ severity: 'error', message: expect.stringContaining('P 1') as string });
  });

  it('is searched where that is asked for', () => {
    const { problems } = dossierOfText('t.cif', cube(named), { symmetry: 'find' });
    const found = problems.find(({ code }) => code === 'symmetry-found');
    expect(found?.message).toMatch(
      /as asked, in place of “Q 17” of the file.*only if all atoms of the cell are listed/,
    );
    const error = problems.find(({ code }) => code === 'cif-symmetry-not-understood');
    expect(error?.message).toContain('unless a search is asked for');
  });
});

it('a file that names no group is searched, and is not told to let it be searched', () => {
  const { problems } = dossierOfText('t.cif', cube(''));
  expect(problems.map(({ code }) => code)).toContain('symmetry-found');
  expect(problems.find(({ code }) => code === 'cif-no-symmetry')?.hint).not.toContain('searched');
});
