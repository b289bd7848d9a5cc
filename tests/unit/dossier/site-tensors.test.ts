import { describe, expect, it } from 'vitest';
import { dossierOfText } from '#tests/support/derive.ts';

/** Tensors made up for these tests; rock salt's cubic arrangement (Bragg 1913) in a cell of 4 Å. */
function rockSalt(noise: number): string {
  const tensor = `${500 + noise} 0 0 0 500 0 0 0 ${500 - noise}`;
  const metal = ['0 0 0', '0 2 2', '2 0 2', '2 2 0'].map((at) => `Na ${at} ${tensor}`);
  const other = ['2 2 2', '2 0 0', '0 2 0', '0 0 2'].map((at) => `Cl ${at} 800 0 0 0 800 0 0 0 800`);
  const head = '8\nLattice="4 0 0 0 4 0 0 0 4" Properties=species:S:1:pos:R:3:shielding:R:9\n';
  return `${head}${[...metal, ...other].join('\n')}\n`;
}

describe('tensors of a site', () => {
  it('takes all anisotropy on a cubic site for noise', () => {
    const dossier = dossierOfText('salt.xyz', rockSalt(0.05));
    const { shielding, siteSymmetryOrder } = dossier.sites[0]!;
    expect(siteSymmetryOrder).toBe(48);
    expect(shielding).toMatchObject({ axes: [null, null, null], skew: null, reducedAnisotropy: null });
    expect(shielding!.symmetryResidual).toBeCloseTo(0.05 * Math.SQRT2, 9);
    expect(shielding!.projected.map((x) => Math.round(x * 1e9) / 1e9)).toEqual([
      500, 0, 0, 0, 500, 0, 0, 0, 500,
    ]);
    expect(dossier.problems.some(({ code }) => code === 'symmetry-broken')).toBe(false);
  });

  it('says so when a tensor breaks its site symmetry grossly', () => {
    const dossier = dossierOfText('salt.xyz', rockSalt(20));
    expect(dossier.problems.filter(({ code }) => code === 'symmetry-broken')).toMatchObject([
      { severity: 'warning', line: 3, message: expect.stringContaining("breaks the site's symmetry") },
    ]);
  });

  it('names the equivalents where they disagree and each tensor obeys its site', () => {
    const isotropic = (size: number): string => `${size} 0 0 0 ${size} 0 0 0 ${size}`;
    const text = rockSalt(0).replace(`Na 0 0 0 ${isotropic(500)}`, `Na 0 0 0 ${isotropic(560)}`);
    const { sites, problems } = dossierOfText('salt.xyz', text);
    expect(sites[0]!.shielding!.symmetryResidual).toBeCloseTo(0, 9);
    const [found, ...more] = problems.filter(({ code }) => code === 'symmetry-broken');
    expect(more).toEqual([]);
    expect(found!.message).toMatch(
      /^The shielding tensors of the atoms equivalent to \S+, turned onto it, differ from their mean by/,
    );
    expect(found!.hint).toContain('wrong Cartesian frame');
  });

  it('gives one note a reason, naming the fields', () => {
    const dossier = dossierOfText('salt.xyz', rockSalt(0));
    const notes = dossier.problems.filter(({ code }) => code === 'undefined-value');
    expect(notes.map(({ message }) => message.split(':')[0])).toEqual([
      'Na1 shielding, skew',
      'Na1 shielding, axes',
      'Cl1 shielding, skew',
      'Cl1 shielding, axes',
    ]);
  });

  it('uses the user’s isotope, reference and moment', () => {
    const text =
      '1\nProperties=species:S:1:pos:R:3:shielding:R:9:efg:R:9\nN 0 0 0 100 0 0 0 110 0 0 0 150 -.3 0 0 0 -.2 0 0 0 .5\n';
    const usual = dossierOfText('n.xyz', text).sites[0]!;
    expect([usual.isotope, usual.efg!.isotope]).toEqual(['15N', '14N']);
    const own = dossierOfText('n.xyz', text, {
      isotopes: { N: '14N' },
      references: { '14N': { kind: 'regression', interceptPpm: 200, slope: -0.9, isotope: '14N' } },
      quadrupoleMomentsBarn: { '14N': 0.02 },
    }).sites[0]!;
    expect(own.shift!.isotropic).toBeCloseTo(200 - 0.9 * 120, 9);
    expect(own.shift!.components[0]).toBeCloseTo(200 - 0.9 * 100, 9);
    expect(own.efg).toMatchObject({ isotope: '14N', quadrupoleMomentSource: 'entered by the user' });
    expect(own.efg!.couplingMHz).toBeCloseTo(234.9647785 * 0.02 * 0.5, 6);
  });

  it('warns of an EFG with a trace: it may be another quantity', () => {
    const head = '1\nProperties=species:S:1:pos:R:3:efg:R:9\n';
    const traced = dossierOfText('tr.xyz', `${head}Al 0 0 0 430 0 0 0 431 0 0 0 440\n`);
    expect(traced.problems.filter(({ code }) => code === 'efg-trace')).toMatchObject([
      { severity: 'warning', line: 3 },
    ]);
    const clean = dossierOfText('tr.xyz', `${head}Al 0 0 0 -.1 0 0 0 -.2 0 0 0 .3001\n`);
    expect(clean.problems.some(({ code }) => code === 'efg-trace')).toBe(false);
  });

  it.each([
    ['as large as a shielding', '430 0 0 0 431 0 0 0 440', true],
    ['a little above Vzz', '-.1 0 0 0 .2 0 0 0 .7', true],
    ['a fifth of Vzz', '-.1 0 0 0 -.2 0 0 0 .36', false],
  ])('withholds couplings for a trace larger than Vzz only: %s', (_, nine, withheld) => {
    const head = '1\nProperties=species:S:1:pos:R:3:efg:R:9\n';
    const { sites, problems } = dossierOfText('tr.xyz', `${head}Al 0 0 0 ${nine}\n`);
    const { couplingMHz, productMHz, asymmetry, undefinedBecause } = sites[0]!.efg!;
    expect([couplingMHz, productMHz, asymmetry].map((value) => value === null)).toEqual(
      Array(3).fill(withheld),
    );
    expect(undefinedBecause['couplingMHz'] ?? '').toMatch(withheld ? /trace .* larger than Vzz/ : /^$/);
    expect(problems.filter(({ code }) => code === 'efg-trace')).toHaveLength(1);
  });

  it('keeps the unit of the file beside the converted tensor', () => {
    const head = '1\nProperties=species:S:1:pos:R:3:efg:R:9 efg_unit=V/A2\n';
    const { sites } = dossierOfText('u.xyz', `${head}Al 0 0 0 -1 0 0 0 -2 0 0 0 3\n`);
    expect(sites[0]!.efg?.unitGiven).toBe('V/A2');
  });

  it('leaves no dust of an isotropic tensor', () => {
    const head = '1\nProperties=species:S:1:pos:R:3:efg:R:9\n';
    const { efg } = dossierOfText('iso.xyz', `${head}Al 0 0 0 0.1 0 0 0 0.1 0 0 0 0.1\n`).sites[0]!;
    expect(efg).toMatchObject({ components: [0, 0, 0], couplingMHz: null });
  });

  it('says that the sign of C_Q is an accident at η = 1', () => {
    const head = '1\nProperties=species:S:1:pos:R:3:efg:R:9\n';
    const dossier = dossierOfText('eta.xyz', `${head}O 0 0 0 0.2 0 0 0 -0.2 0 0 0 0\n`);
    expect(dossier.sites[0]!.efg).toMatchObject({ signDetermined: false });
    expect(dossier.sites[0]!.efg!.undefinedBecause.sign).toContain('η ≈ 1');
    expect(dossier.problems.some(({ message }) => message.startsWith('O1 EFG, sign: undefined'))).toBe(true);
  });

  it('names the sites a set leaves bare, and settings without effect', () => {
    const text =
      'data_x\n_cell_length_a 5\n_cell_length_b 6\n_cell_length_c 7\n_cell_angle_alpha 90\n_cell_angle_beta 90\n' +
      "_cell_angle_gamma 90\n_space_group_name_H-M_alt 'P -1'\nloop_\n_atom_site_label\n_atom_site_fract_x\n" +
      '_atom_site_fract_y\n_atom_site_fract_z\nO1 .1 .2 .3\nO2 .4 .3 .8\nloop_\n_ellipsite_tensor_site_label\n' +
      '_ellipsite_tensor_quantity\n_ellipsite_tensor_unit\n' +
      [11, 12, 13, 21, 22, 23, 31, 32, 33].map((ij) => `_ellipsite_tensor_${ij}\n`).join('') +
      'O1 shielding ppm 10 0 0 0 20 0 0 0 40\n';
    const { problems } = dossierOfText('x.cif', text, { isotopes: { Al: '27Al' } });
    expect(problems.find(({ code }) => code === 'sites-without-tensor')!.message).toContain('O2');
    expect(problems.find(({ code }) => code === 'isotope-absent')!.message).toContain('27Al');
  });
});
