import { readFileSync } from 'node:fs';
import { describe, expect, it } from 'vitest';
import { runCommand } from '#tests/support/command-io.ts';

async function documentOf(name: string, text: string) {
  const { out } = await runCommand(['sites', name, '--json'], { [name]: text });
  return JSON.parse(out);
}

/** The contract: an undefined number is null, with a problem that says why. */
function notesOf(document: { problems: { code: string; severity: string; message: string }[] }): string[] {
  return document.problems
    .filter(({ code, severity }) => code === 'undefined-value' && severity === 'note')
    .map(({ message }) => message);
}

describe('nulls of ellipsite sites --json', () => {
  it('gives a spread that one tensor cannot have its reason, at the tensor and once for the file', async () => {
    const document = await documentOf('q.cif', readFileSync('samples/drum-1-quartz.cif', 'utf8'));
    const reason = 'only one of the equivalent atoms has a tensor';
    for (const { shielding } of document.sites) {
      expect(shielding).toMatchObject({
        equivalentSpread: null,
        undefinedBecause: { equivalentSpread: reason },
      });
    }
    expect(document.sites[1].efg.undefinedBecause).toEqual({ equivalentSpread: reason });
    expect(notesOf(document)).toEqual([
      `shielding, equivalentSpread of 2 sites (Si1, O1): undefined, for ${reason}.`,
      `efg, equivalentSpread of 1 site (O1): undefined, for ${reason}.`,
    ]);
  });

  it('says of a molecule why it has neither cell nor symmetry, in one note', async () => {
    const molecule =
      '2\nProperties=species:S:1:pos:R:3:shielding:R:9\nN 0 0 0 1 0 0 0 2 0 0 0 4\nN 0 0 1.1 1 0 0 0 2 0 0 0 4\n';
    const document = await documentOf('n2.xyz', molecule);
    const nulls = ['cell', 'lattice', 'frame'].map((key) => document.crystal[key]);
    expect(nulls).toEqual([null, null, null]);
    expect(document.sites[0]).toMatchObject({ fractional: null, wyckoff: null, siteSymmetry: null });
    expect(document.sites[0].shielding.undefinedBecause.equivalentSpread).toBe('the atom has no equivalents');
    expect(notesOf(document)).toEqual([
      'cell, lattice, frame, symmetry, fractional, wyckoff, siteSymmetry: undefined, for the atoms are a molecule without a cell.',
      'shielding, equivalentSpread of 2 sites (N1, N2): undefined, for the atom has no equivalents.',
    ]);
  });

  it('says of operations that are no group, and of an element without a magnetic nuclide, what is missing', async () => {
    const document = await documentOf(
      'x.cif',
      `data_x
_cell_length_a 5
_cell_length_b 6
_cell_length_c 7
_cell_angle_alpha 90
_cell_angle_beta 90
_cell_angle_gamma 90
loop_
_space_group_symop_operation_xyz
x,y,z
x+1/2,y+1/3,z
loop_
_atom_site_label
_atom_site_type_symbol
_atom_site_fract_x
_atom_site_fract_y
_atom_site_fract_z
Ar1 Ar 0.1 0.2 0.3
`,
    );
    expect(document.crystal.symmetry).toMatchObject({ number: null, hermannMauguin: null, hall: null });
    expect(notesOf(document)).toEqual([
      'symmetry, number, hermannMauguin, hall: undefined, for the operations are those of no tabulated setting.',
      expect.stringMatching(/^isotope of 1 site \(Ar1\): undefined, for the table has no magnetic nuclide/),
      'wyckoff, siteSymmetry of 1 site (Ar1): undefined, for the operations are no space group of the tables.',
    ]);
  });
});
