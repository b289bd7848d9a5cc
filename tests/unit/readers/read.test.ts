import { describe, expect, it } from 'vitest';
import { sourceFromText } from '#src/bytes/source-from-text.ts';
import { readText } from '#src/readers/read.ts';

const atoms = '1\nLattice="4 0 0 0 5 0 0 0 6"\nSi 1 1 1\n';
const cif =
  'data_a\n_cell_length_a 4\n_cell_length_b 5\n_cell_length_c 6\n_cell_angle_alpha 90\n_cell_angle_beta 90\n' +
  "_cell_angle_gamma 90\n_space_group_name_H-M_alt 'P 1'\nloop_\n_space_group_symop_operation_xyz\nx,y,z\n" +
  'loop_\n_atom_site_label\n_atom_site_fract_x\n_atom_site_fract_y\n_atom_site_fract_z\nSi1 0.25 0.2 0.5\n';

describe('readText', () => {
  it('goes by content, whatever the name says', () => {
    const asXyz = readText(sourceFromText('a.cif', atoms));
    expect(asXyz).toMatchObject({ format: 'xyz', file: 'a.cif' });
    expect(asXyz.structures).toHaveLength(1);
    const asCif = readText(sourceFromText('a.xyz', cif));
    expect(asCif).toMatchObject({ format: 'cif', file: 'a.xyz' });
    expect(asCif.structures[0]?.sites[0]?.element).toBe('Si');
  });

  it('says what an unknown text is, what is accepted and what to do', () => {
    const reading = readText(sourceFromText('a.cif', '\n<html><body>Not found</body></html>'));
    expect(reading).toMatchObject({ format: 'unknown', structures: [], tensorSets: [], proposals: [] });
    expect(reading.problems).toHaveLength(1);
    expect(reading.problems[0]).toMatchObject({
      code: 'format-unknown',
      severity: 'error',
      file: 'a.cif',
      line: 2,
    });
    expect(reading.problems[0]?.message).toContain('HTML');
    expect(reading.problems[0]?.got).toBe('<html><body>Not found</body></html>');
    expect(reading.problems[0]?.allowed).toMatch(/CIF.*XYZ/);
    expect(reading.problems[0]?.hint).toMatch(/save/);
  });

  it('passes progress and accepted columns on', () => {
    const shares: number[] = [];
    const text = `1\nProperties=species:S:1:pos:R:3:t:R:9\nSi 0 0 0 1 2 3 4 5 6 7 8 9\n`;
    const reading = readText(sourceFromText('a', text), {
      progress: (share) => shares.push(share),
      accept: { t: { quantity: 'shielding', unit: 'ppm' } },
    });
    expect(reading.tensorSets).toMatchObject([{ quantity: 'shielding', name: 't' }]);
    expect(shares.length).toBeGreaterThan(0);
    expect(Math.max(...shares)).toBeLessThanOrEqual(1);
  });
});
