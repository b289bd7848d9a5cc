import { describe, expect, it } from 'vitest';
import { deriveDossier } from '#src/dossier/derive-dossier.ts';
import { defaultSettings } from '#src/dossier/default-settings.ts';
import { sourceFromText } from '#src/bytes/source-from-text.ts';
import { readText } from '#src/readers/read.ts';
import { readySymmetryTables } from '#tests/support/symmetry-library.ts';

/** A made-up box with translations by n-ths of a for operations, and as many rows as asked. */
function box(operations: number, rows: number): string {
  const listed = Array.from({ length: operations }, (_none, i) => `x+${i}/${operations},y,z`);
  const atoms = Array.from({ length: rows }, (_none, i) => `C${i} 0.1 0.2 ${(i / rows).toFixed(6)}`);
  return `data_box
_cell_length_a 900\n_cell_length_b 50\n_cell_length_c 900\n_cell_angle_alpha 90\n_cell_angle_beta 90\n_cell_angle_gamma 90
loop_\n_space_group_symop_operation_xyz\n${listed.join('\n')}
loop_\n_atom_site_label\n_atom_site_fract_x\n_atom_site_fract_y\n_atom_site_fract_z\n${atoms.join('\n')}\n`;
}

function read(text: string) {
  const reading = readText(sourceFromText('box.cif', text));
  return {
    crystal: reading.structures[0]!,
    problems: reading.problems,
    codes: reading.problems.map(({ code }) => code),
  };
}

describe('limits against hostile symmetry', () => {
  it('rows times operations beyond a million: the listed atoms, with an error that states the limit', () => {
    const { crystal, problems } = read(box(1200, 900));
    expect(crystal.symmetry.operations.length).toBe(1);
    expect(crystal.sites.length).toBe(900);
    const problem = problems.find(({ code }) => code === 'cif-too-many-images')!;
    expect(problem).toMatchObject({ severity: 'error', got: '1080000 images', allowed: 'at most 1000000' });
  });

  it('more operations than eight full cubic cells have: read up to the limit, which is stated', () => {
    const { codes, problems } = read(box(2000, 1));
    expect(codes).toContain('cif-too-many-operations');
    expect(problems.find(({ code }) => code === 'cif-too-many-operations')!.allowed).toBe('at most 1536');
  });

  it('letters are not looked for where the operations repeat a cell more than 128 times', () => {
    const { crystal } = read(box(500, 1));
    const dossier = deriveDossier({
      crystal,
      tensorSets: [],
      tables: readySymmetryTables(),
      settings: defaultSettings,
      problems: [],
    });
    expect(dossier.sites[0]).toMatchObject({ multiplicity: 500, wyckoff: null });
    expect(dossier.problems.find(({ code }) => code === 'wyckoff-unknown')!.allowed).toBe('at most 128');
  });
});
