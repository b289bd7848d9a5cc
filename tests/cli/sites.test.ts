import { describe, expect, it } from 'vitest';
import { runCommand } from '#tests/support/command-io.ts';

/** Cell and positions of α-quartz: Levien, Prewitt & Weidner, Am. Mineral. 65, 920 (1980), origin as in International Tables. */
const quartzCif = `data_quartz
_cell_length_a 4.916
_cell_length_b 4.916
_cell_length_c 5.4054
_cell_angle_alpha 90
_cell_angle_beta 90
_cell_angle_gamma 120
_space_group_name_H-M_alt 'P 32 2 1'
_chemical_formula_sum 'O2 Si'
_cell_formula_units_Z 3
loop_
_atom_site_label
_atom_site_type_symbol
_atom_site_fract_x
_atom_site_fract_y
_atom_site_fract_z
Si1 Si 0.4697 0 0.6666667
O1 O 0.4135 0.2669 0.7857667
`;

const water = `3
a molecule without a cell
O 0 0 0
H 0.9572 0 0
H -0.2400 0.9266 0
`;

/** Cubic perovskite-like cell, tensors made up for the test: isotropic on the corner, axial about z on the face centre. */
const cubeWithTensors = `2
Lattice="4 0 0 0 4 0 0 0 4" Properties=species:S:1:pos:R:3:shielding:R:9:efg:R:9
Al 0 0 0 500 0 0 0 500 0 0 0 500 0 0 0 0 0 0 0 0 0
O 2 2 2 200 0 0 0 200 0 0 0 260 -0.1 0 0 0 -0.1 0 0 0 0.2
`;

describe('ellipsite sites', () => {
  it('prints the contract’s JSON for a CIF whose operations come from its symbol', async () => {
    const { status, out, error } = await runCommand(['sites', 'q.cif', '--json'], { 'q.cif': quartzCif });
    expect(error).toBe('');
    expect(status).toBe(0);
    const document = JSON.parse(out);
    expect(document.schema).toBe('ellipsite/sites/1');
    expect(document.crystal.symmetry).toMatchObject({ number: 154, operations: 6, source: 'symbol' });
    expect(document.crystal.atoms).toBe(9);
    expect(document.crystal.composition).toEqual({ O: 6, Si: 3 });
    expect(document.sites.map((site: { multiplicity: number }) => site.multiplicity)).toEqual([3, 6]);
    expect(document.sites[0]).toMatchObject({
      label: 'Si1',
      isotope: '29Si',
      siteSymmetryOrder: 2,
      distinctOrientations: 3,
      shielding: null,
      shift: null,
      efg: null,
    });
    expect(document.sites[0].equivalents).toHaveLength(3);
    expect(document.sites[0].equivalents[0].operation).toBe('x,y,z');
  });

  it('prints every key of a tensor and null where it is undefined', async () => {
    const { status, out } = await runCommand(['sites', 't.xyz', '--json', '--reference', '17O=290'], {
      't.xyz': cubeWithTensors,
    });
    expect(status).toBe(0);
    const { sites, crystal } = JSON.parse(out);
    expect(crystal.lattice).toEqual([
      [4, 0, 0],
      [0, 4, 0],
      [0, 0, 4],
    ]);
    const [corner, face] = sites;
    expect(corner.shielding).toMatchObject({ isotropic: 500, span: 0, skew: null, axes: [null, null, null] });
    expect(corner.shift).toBeNull();
    expect(face.shielding.components).toEqual([200, 200, 260]);
    expect(face.shielding.axes[2].map(Math.abs)).toEqual([0, 0, 1]);
    expect(face.shielding.axes.slice(0, 2)).toEqual([null, null]);
    expect(face.shielding).toMatchObject({ reducedAnisotropy: 40, anisotropy: 60, asymmetry: 0 });
    expect(face.shift.isotropic).toBeCloseTo(70, 9);
    expect(face.shift.components[0]).toBeCloseTo(90, 9);
    expect(face.efg.isotope).toBe('17O');
    // C_Q = 234.96478 MHz/(a.u. barn) × (−0.02558 barn) × 0.2 a.u.; Q of the year-2017 set, Mol. Phys. 116, 1328 (2018)
    expect(face.efg.couplingMHz).toBeCloseTo(234.9647785 * -0.02558 * 0.2, 6);
    expect(face.efg.source).toEqual({ file: 't.xyz', line: 4 });
  });

  it('reads a molecule from standard input and states positions in Å', async () => {
    const { status, out } = await runCommand(['sites', '-', '--json'], { '-': water });
    expect(status).toBe(0);
    const { crystal, sites } = JSON.parse(out);
    expect(crystal).toMatchObject({ cell: null, lattice: null, atoms: 3, composition: { H: 2, O: 1 } });
    expect(sites[1]).toMatchObject({ fractional: null, cartesian: [0.9572, 0, 0], multiplicity: 1 });
  });

  it('sets symmetry aside when asked', async () => {
    const { out } = await runCommand(['sites', 'q.cif', '--json', '--symmetry', 'none'], {
      'q.cif': quartzCif,
    });
    const { crystal, sites } = JSON.parse(out);
    expect(crystal.symmetry).toMatchObject({ operations: 1, source: 'none' });
    expect(sites).toHaveLength(9);
  });

  it('finds the symmetry when asked', async () => {
    const { out } = await runCommand(['sites', 'q.cif', '--json', '--symmetry', 'find'], {
      'q.cif': quartzCif,
    });
    const { crystal, sites } = JSON.parse(out);
    expect(crystal.symmetry).toMatchObject({ operations: 6, number: 154, source: 'found' });
    expect(sites).toHaveLength(2);
    expect(sites[0]).toMatchObject({ label: 'Si1', multiplicity: 3 });
  });

  it('gives a readable table with units in its header', async () => {
    const { out } = await runCommand(['sites', 't.xyz'], { 't.xyz': cubeWithTensors });
    expect(out).toContain('σiso/ppm');
    expect(out).toContain('CQ/MHz');
    expect(out).not.toContain('\u001b');
  });

  it('keeps problems off standard output and sets the exit status', async () => {
    const broken = await runCommand(['sites', 'nothing.cif'], {
      'nothing.cif': 'data_x\n_cell_length_a 3\n',
    });
    expect(broken.status).toBe(1);
    expect(broken.out).toBe('');
    expect(broken.error).toMatch(/^nothing\.cif:\d+:\d+: error cif-\S+ /m);
    const json = await runCommand(['sites', 'nothing.cif', '--json'], {
      'nothing.cif': 'data_x\n_cell_length_a 3\n',
    });
    expect(json.error).toBe('');
    expect(JSON.parse(json.out)).toMatchObject({ crystal: null, sites: [] });
    expect(JSON.parse(json.out).problems[0]).toHaveProperty('allowed');
  });

  it.each([
    [['sites']],
    [['nonsense', 'x.cif']],
    [[]],
    [['sites', 'q.cif', '--tolerance', 'wide']],
    [['sites', 'q.cif', '--symmetry', 'perhaps']],
    [['sites', 'q.cif', '--isotope', '99Zz']],
    [['sites', 'q.cif', '--reference', '29Si']],
    [['sites', 'q.cif', '--frame', 'sideways']],
    [['sites', 'q.cif', '--block', 'other']],
    [['sites', 'q.cif', '--colour']],
    [['sites', 'q.cif', '--moment', '17O=1e9']],
    [['sites', 'q.cif', '--moment', '17O=-10.1']],
    [['sites', '/no/such/file.cif']],
  ])('answers wrong usage %j with status 2 and a sentence', async (argv) => {
    const { status, out, error } = await runCommand(argv, { 'q.cif': quartzCif });
    expect(status).toBe(2);
    expect(out).toBe('');
    expect(error).toMatch(/^ellipsite: \S/);
  });

  it('warns where a file without symmetry holds fewer atoms than its formula and Z ask for', async () => {
    const bare = quartzCif.replace("_space_group_name_H-M_alt 'P 32 2 1'\n", '');
    const { error } = await runCommand(['sites', 'b.cif'], { 'b.cif': bare });
    expect(error).toContain('warning cif-no-symmetry');
    expect(error).toContain('cif-');
    expect(error).not.toContain('whole cell');
  });

  it('counts one atom and one operation as one', async () => {
    const bare = await runCommand(['sites', 'o.xyz'], { 'o.xyz': '1\nan atom\nO 0 0 0\n' });
    expect(bare.out).toContain('1 operation,');
    expect(bare.out).toContain('\n1 atom in the molecule: O1\n');
    const listed = quartzCif.replace("'P 32 2 1'", "'P 1'");
    const { out } = await runCommand(['sites', 'p.cif'], { 'p.cif': listed });
    expect(out).toMatch(/; 1 operation derived from/);
  });

  it('prints the nuclide of a coupling that is not the row’s', async () => {
    const text =
      '1\nProperties=species:S:1:pos:R:3:shielding:R:9:efg:R:9\nN 0 0 0 1 0 0 0 2 0 0 0 6 -.1 0 0 0 -.2 0 0 0 .3\n';
    const { out } = await runCommand(['sites', 'n.xyz'], { 'n.xyz': text });
    expect(out).toMatch(/15N .* \(14N\)/);
  });

  it('prints help and version with status 0', async () => {
    expect((await runCommand(['--help'])).out).toContain('--reference');
    expect(await runCommand(['--version'])).toMatchObject({ status: 0, out: '0.0.0-test\n', error: '' });
  });

  it('attaches the tensors of a second file by position, turned into the crystal’s frame', async () => {
    // The same cell with its Cartesian axes turned by 90° about z: x′ = y, y′ = −x. Tensors made up for the test.
    const first = `1\nLattice="4 0 0 0 5 0 0 0 6"\nAl 0.1 0 0\n`;
    const second = `1\nLattice="0 -4 0 5 0 0 0 0 6" Properties=species:S:1:pos:R:3:shielding:R:9\nAl 0 -0.1 0 10 0 0 0 20 0 0 0 30\n`;
    const { out, status } = await runCommand(['sites', 'a.xyz', 'b.xyz', '--json'], {
      'a.xyz': first,
      'b.xyz': second,
    });
    expect(status).toBe(0);
    const [site] = JSON.parse(out).sites;
    const expected = [
      [20, 0, 0],
      [0, 10, 0],
      [0, 0, 30],
    ];
    expected
      .flat()
      .forEach((value, index) => expect(site.shielding.tensor.flat()[index]).toBeCloseTo(value, 9));
  });
});
