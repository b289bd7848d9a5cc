import { describe, expect, it } from 'vitest';
import type { Vec3 } from '#src/base/matrix3.ts';
import { seededRandom } from '#src/base/seeded-random.ts';
import { latticeFromRows } from '#src/crystal/lattice.ts';
import { framedStructures } from '#tests/support/crystal-frames.ts';
import { dossierOfText } from '#tests/support/derive.ts';
import { asXyz, modelOfGroup, repeated } from '#tests/support/supercell-models.ts';

/** A simple cubic crystal of edge 4 Å, repeated along x. */
function cubicXyz(times: number): string {
  const atoms = Array.from({ length: times }, (_none, cell) => `Cu ${4 * cell} 0 0`);
  return `${times}\nLattice="${4 * times} 0 0 0 4 0 0 0 4" Properties=species:S:1:pos:R:3\n${atoms.join('\n')}\n`;
}

it('groups the sites by all operations where the shape of a supercell holds some only, and says so', () => {
  const dossier = dossierOfText('doubled.xyz', cubicXyz(2));
  const note = dossier.problems.find(({ code }) => code === 'supercell-breaks-symmetry')!;
  expect(note.severity).toBe('note');
  expect(note.message).toBe(
    'The cell is 2 × the primitive cell of P m -3 m (No. 221); its shape holds only 32 of 96 operations itself; the sites are grouped by all of them.',
  );
  expect(dossier.atomsInCell).toBe(2);
  expect(dossier.symmetry).toMatchObject({ number: 221, hermannMauguin: 'P m -3 m', hall: null });
  expect(dossier.symmetry.operations).toHaveLength(96);
  expect(dossier.spaceGroup).toBe('P m -3 m (No. 221)');
  expect(dossier.lattice!.rows[0]).toBe(8);
  expect(dossier.sites).toHaveLength(1);
  expect(dossier.sites[0]).toMatchObject({ multiplicity: 2, siteSymmetryOrder: 48, siteSymmetry: 'm-3m' });
});

it('is silent where nothing is lost', () => {
  const { problems, symmetry } = dossierOfText('single.xyz', cubicXyz(1));
  expect(symmetry.number).toBe(221);
  expect(problems.map(({ code }) => code)).not.toContain('supercell-breaks-symmetry');
});

it('names directions that symmetry forces by whole numbers, in the given axes', () => {
  const cell = { a: 5.4, b: 5.4, c: 5.4, alpha: 90, beta: 90, gamma: 90 };
  const small = modelOfGroup(cell, 'P 2 2 3', [['Zn', [0.11, 0.11, 0.11]]]);
  const { sites } = dossierOfText('long.xyz', asXyz(repeated(small, [5, 0, 0, 0, 6, 0, 0, 0, 1])));
  expect(sites[0]!.forced).toContain('three-fold axis [6 5 30]');
});

describe('quartz given twice along a, row by row', () => {
  const single = framedStructures().find(({ name }) => name === 'quartz')!;
  const { rows, atoms } = repeated({ rows: single.rowsS1, atoms: single.atoms }, [2, 0, 0, 0, 1, 0, 0, 0, 1]);
  const { a, b, c } = latticeFromRows(rows, 'S1').cell;
  const cif = [
    'data_quartz',
    `_cell_length_a ${a}\n_cell_length_b ${b}\n_cell_length_c ${c}`,
    '_cell_angle_alpha 90\n_cell_angle_beta 90\n_cell_angle_gamma 120',
    "_space_group_name_H-M_alt 'P 1'\nloop_\n_space_group_symop_operation_xyz\nx,y,z",
    'loop_\n_atom_site_label\n_atom_site_type_symbol',
    '_atom_site_fract_x\n_atom_site_fract_y\n_atom_site_fract_z',
    ...atoms.map(({ element, fractional }, row) => `${element}${row + 1} ${element} ${fractional.join(' ')}`),
  ].join('\n');

  it('has two sites when its symmetry is searched', () => {
    const { sites, symmetry, atomsInCell } = dossierOfText('quartz.cif', cif, { symmetry: 'find' });
    expect(symmetry.number).toBe(154);
    expect(atomsInCell).toBe(18);
    expect(sites.map(({ element, multiplicity }) => `${element} ${multiplicity}`).sort()).toEqual([
      'O 12',
      'Si 6',
    ]);
    const ids = sites.flatMap(({ equivalents }) => equivalents.map(({ id }) => id));
    expect(new Set(ids).size).toBe(18);
    const operations = sites.flatMap(({ equivalents }) => equivalents.map(({ operation }) => operation));
    expect(operations.some((text) => text.includes('x/2') || text.includes('2x'))).toBe(true);
  });

  it('has the symmetry the file states where that is asked for', () => {
    const { sites, symmetry, problems } = dossierOfText('quartz.cif', cif);
    expect(symmetry).toMatchObject({ number: 1, source: 'file' });
    expect(sites).toHaveLength(18);
    expect(problems.map(({ code }) => code)).not.toContain('supercell-breaks-symmetry');
  });

  it('has every silicon bonded to four oxygens', () => {
    const { bonds, sites } = dossierOfText('quartz.cif', cif, { symmetry: 'find' });
    const silicons = sites.filter(({ element }) => element === 'Si').flatMap((site) => site.equivalents);
    for (const { id } of silicons) {
      expect(bonds.filter(({ from, to }) => from === id || to === id)).toHaveLength(4);
    }
  });
});

it('finds the group of a supercell through noise smaller than the tolerance', () => {
  const single = framedStructures().find(({ name }) => name === 'corundum')!;
  const model = repeated({ rows: single.rowsS1, atoms: single.atoms }, [2, 0, 0, 0, 1, 0, 0, 0, 1]);
  const random = seededRandom(5);
  const atoms = model.atoms.map((atom) => ({
    ...atom,
    fractional: atom.fractional.map((x) => x + 4e-4 * (random() - 0.5)) as unknown as Vec3,
  }));
  const { sites, symmetry } = dossierOfText('noisy.xyz', asXyz({ ...model, atoms }), {
    symmetryToleranceAngstrom: 0.02,
  });
  expect(symmetry.number).toBe(167);
  expect(sites.map(({ multiplicity }) => multiplicity).sort()).toEqual([24, 36]);
  for (const { shielding } of sites) expect(shielding!.equivalentSpread).toBeLessThan(1e-6);
});
