import { describe, expect, it } from 'vitest';
import { dossierOfText } from '#tests/support/derive.ts';

/** A P 21 crystal made up for the test, with the group's symbol as given. */
function cif(symbol: string): string {
  return (
    'data_x\n_cell_length_a 5\n_cell_length_b 6\n_cell_length_c 7\n_cell_angle_alpha 90\n_cell_angle_beta 100\n' +
    `_cell_angle_gamma 90\n_space_group_name_H-M_alt '${symbol}'\nloop_\n_space_group_symop_operation_xyz\n'x,y,z'\n` +
    "'-x,y+1/2,-z'\nloop_\n_atom_site_label\n_atom_site_fract_x\n_atom_site_fract_y\n_atom_site_fract_z\nO1 .1 .2 .3\n"
  );
}

describe('naming the group', () => {
  it('prints symbol and number where they agree', () => {
    expect(dossierOfText('x.cif', cif('P 1 21 1')).spaceGroup).toBe('P 1 21 1 (No. 4)');
  });

  it('goes by the operations where the symbol names another group, and says both', () => {
    const dossier = dossierOfText('x.cif', cif('P 1 2 1'));
    expect(dossier.spaceGroup).toBe('P 21 (No. 4) by its operations, named P 1 2 1 in the file');
    expect(dossier.symmetry).toMatchObject({ number: 4, source: 'file' });
    expect(dossier.problems.some(({ code }) => code === 'cif-group-disagrees')).toBe(true);
  });

  // C 1 m 1 (No. 8) on the primitive axes (a − b)/2, (a + b)/2, c: the mirror plane exchanges the first two.
  const primitive = (name: string): string =>
    'data_x\n_cell_length_a 5\n_cell_length_b 5\n_cell_length_c 7\n_cell_angle_alpha 95\n_cell_angle_beta 95\n' +
    `_cell_angle_gamma 100\n${name}loop_\n_space_group_symop_operation_xyz\n'x,y,z'\n'y,x,z'\n` +
    'loop_\n_atom_site_label\n_atom_site_fract_x\n_atom_site_fract_y\n_atom_site_fract_z\nO1 .1 .2 .3\n';

  it('says which group has axes of no tabulated setting, and what follows', () => {
    const { symmetry, sites, problems } = dossierOfText('x.cif', primitive(''));
    expect(symmetry).toMatchObject({ number: 8, hall: null });
    expect(sites[0]?.wyckoff).toBe('b');
    const told = problems.filter(({ code }) => code === 'setting-not-tabulated');
    expect(told).toMatchObject([{ severity: 'note' }]);
    expect(told[0]?.message).toMatch(/C m \(No\. 8\).*no Hall symbol.*Wyckoff letters.*standard setting/);
  });

  it('says so once where the file names the group', () => {
    const { problems } = dossierOfText('x.cif', primitive("_space_group_name_H-M_alt 'C 1 m 1'\n"));
    const told = problems.filter(({ code }) => /setting/.test(code));
    expect(told).toMatchObject([{ code: 'cif-other-setting', severity: 'note' }]);
    expect(told[0]?.message).toMatch(
      /no tabulated setting.*no Hall symbol.*Wyckoff letters.*standard setting/,
    );
  });
});
