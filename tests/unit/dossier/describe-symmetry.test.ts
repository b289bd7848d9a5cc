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
    expect(dossier.symmetry).toMatchObject({
      ...{ number: 4, hermannMauguin: 'P 21', hall: 'P 2yb', named: 'P 1 2 1', source: 'file' },
    });
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

  it('gives the Hall symbol of the operations where the file has that of another group', () => {
    const withHall = cif('P 1 21 1').replace('loop_', "_space_group_name_Hall '-P 2yn'\nloop_");
    const { symmetry } = dossierOfText('x.cif', withHall);
    expect(symmetry).toMatchObject({ number: 4, hermannMauguin: 'P 1 21 1', hall: 'P 2yb' });
    expect(symmetry).not.toHaveProperty('named');
  });

  it.each(['P 21', 'P1211', 'P 1 21 1', 'P 2yb'])('keeps the spelling of the file, %s', (symbol) => {
    const { symmetry } = dossierOfText('x.cif', cif(symbol));
    expect(symmetry).toMatchObject({ number: 4, hermannMauguin: symbol, hall: 'P 2yb' });
    expect(symmetry).not.toHaveProperty('named');
  });
});

/**
 * α-quartz, space group 154, P 32 2 1: Levien, Prewitt & Weidner, Am. Mineral. 65, 920 (1980); a along x, b in the xy plane. With
 * `sign` −1 the very same atoms are told on −a, −b, −c: positions and translations change their sign.
 */
function quartz(sign: 1 | -1, names = ''): string {
  const s = sign > 0 ? '-' : '+';
  const matrix = [4.916, -2.458, 0, 0, 4.25738089, 0, 0, 0, 5.4054].map((entry) => sign * entry);
  const frame = [11, 12, 13, 21, 22, 23, 31, 32, 33].map(
    (index, k) => `_atom_sites_Cartn_tran_matrix_${index} ${matrix[k]}\n`,
  );
  return `data_q
_cell_length_a 4.916
_cell_length_b 4.916
_cell_length_c 5.4054
_cell_angle_alpha 90
_cell_angle_beta 90
_cell_angle_gamma 120
${frame.join('')}${names}loop_
_space_group_symop_operation_xyz
x,y,z
-y,x-y,z${s}1/3
-x+y,-x,z${s}2/3
y,x,-z
x-y,-y,-z${s}2/3
-x,-x+y,-z${s}1/3
loop_
_atom_site_label
_atom_site_fract_x
_atom_site_fract_y
_atom_site_fract_z
Si1 ${sign * 0.4697} 0 ${(sign * 2) / 3}
O1 ${sign * 0.4135} ${sign * 0.2669} ${sign * 0.785767}
`;
}

describe('naming the group of left-handed axes', () => {
  it('names the group of the crystal, not of its mirror image', () => {
    const right = dossierOfText('q.cif', quartz(1));
    const left = dossierOfText('q.cif', quartz(-1));
    expect(right.symmetry).toMatchObject({ number: 154, hermannMauguin: 'P 32 2 1', hall: 'P 32 2"' });
    expect(left.symmetry).toMatchObject({ number: 154, hermannMauguin: 'P 32 2 1', hall: null });
    expect([left.spaceGroup, left.atomsInCell]).toEqual([right.spaceGroup, 9]);
    expect(left.sites.map(({ wyckoff }) => wyckoff)).toEqual(['a', 'c']);
    const told = (code: string) => left.problems.filter((found) => found.code === code);
    expect(told('cif-left-handed')).toMatchObject([{ severity: 'note', file: 'q.cif' }]);
    expect(told('setting-not-tabulated')).toHaveLength(1);
    expect(right.problems.map(({ code }) => code)).not.toContain('cif-left-handed');
  });

  it.each([
    ['P 32 2 1', false],
    ['P 31 2 1', true],
  ])('compares the name %s of the file with the crystal', (symbol, disagrees) => {
    const { symmetry, problems } = dossierOfText(
      'q.cif',
      quartz(-1, `_space_group_name_H-M_alt '${symbol}'\n`),
    );
    expect(symmetry).toMatchObject({ number: 154, hermannMauguin: 'P 32 2 1' });
    expect(symmetry.named).toBe(disagrees ? symbol : undefined);
    expect(problems.some(({ code }) => code === 'cif-group-disagrees')).toBe(disagrees);
  });
});
