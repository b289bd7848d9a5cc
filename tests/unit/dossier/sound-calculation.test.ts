import { readFileSync, readdirSync } from 'node:fs';
import { describe, expect, it } from 'vitest';
import { sourceFromText } from '#src/bytes/source-from-text.ts';
import { defaultSettings } from '#src/dossier/default-settings.ts';
import { deriveDossier } from '#src/dossier/derive-dossier.ts';
import type { CrystalDossier } from '#src/dossier/dossier.ts';
import { hydrogenLengths, implausibleValues, shortContacts } from '#src/dossier/sound-calculation.ts';
import { readText } from '#src/readers/read.ts';
import { checkView } from '#src/store/check-desk.ts';

function dossierOf(name: string, text: string): CrystalDossier {
  const { structures, tensorSets, problems } = readText(sourceFromText(name, text));
  return deriveDossier({
    crystal: structures[0]!,
    tensorSets,
    ...{ tables: null, settings: defaultSettings, problems },
  });
}

/** Invented: atoms in P 1 of a cell of 8 Å, each with a row of a tensor column where asked for. */
function xyz(rows: readonly string[], column = ''): string {
  return `${rows.length}\nLattice="8 0 0 0 8 0 0 0 8" Properties=species:S:1:pos:R:3${column}\n${rows.join('\n')}\n`;
}

const tensor = (iso: number): string => `${iso - 10} 0 0 0 ${iso} 0 0 0 ${iso + 10}`;
/** Methanol-like: C–O 1.42 Å, C–H 1.09 Å, O–H 0.98 Å. */
const clean = (hydrogen: number): string[] => [
  'C 1 1 1',
  'O 2.42 1 1',
  'H 2.42 1.98 1',
  `H 1 ${1 + hydrogen} 1`,
];

const cif = (rows: readonly string[], columns = ''): string =>
  `data_x\n_cell_length_a 8\n_cell_length_b 8\n_cell_length_c 8\n_cell_angle_alpha 90\n_cell_angle_beta 90\n_cell_angle_gamma 90\n_space_group_name_H-M_alt 'P 1'\nloop_\n_atom_site_label\n_atom_site_type_symbol\n_atom_site_fract_x\n_atom_site_fract_y\n_atom_site_fract_z\n${columns}${rows.join('\n')}\n`;

describe('contacts too short', () => {
  it('names two atoms nearer than atoms come, with their distance', () => {
    const [contact, ...more] = shortContacts(dossierOf('c.xyz', xyz(['C 1 1 1', 'O 1.8 1 1', 'Si 5 5 5'])));
    expect(more).toEqual([]);
    expect(contact!.atoms.map((label) => label.replace(/\d+$/, ''))).toEqual(['C', 'O']);
    expect(contact!.distanceAngstrom).toBeCloseTo(0.8, 9);
    expect(contact!.areAlternatives).toBe(false);
  });

  it('finds them across a cell face', () => {
    const [contact] = shortContacts(dossierOf('f.xyz', xyz(['C 0.2 1 1', 'O 7.6 1 1'])));
    expect(contact!.distanceAngstrom).toBeCloseTo(0.6, 9);
  });

  it('tells alternatives of a disorder from atoms on top of each other', () => {
    const columns = '_atom_site_occupancy\n_atom_site_disorder_group\n';
    const dossier = dossierOf('d.cif', cif(['C1A C 0.1 0.1 0.1 0.6 1', 'C1B C 0.16 0.1 0.1 0.4 2'], columns));
    const [contact] = shortContacts(dossier);
    expect(contact).toMatchObject({ atoms: ['C1A', 'C1B'], areAlternatives: true });
    expect(contact!.distanceAngstrom).toBeCloseTo(0.48, 9);
  });
});

describe('bonds of hydrogen', () => {
  // Allen & Bruno, Acta Cryst. B66, 380 (2010): mean neutron C–H near 1.09 Å; value from memory
  it('says a C–H bond as X-rays see it, 0.95 Å, is shorter than the neutron norm', () => {
    const found = hydrogenLengths(dossierOf('x.xyz', xyz(clean(0.95))));
    expect(found).toHaveLength(1);
    expect(found[0]!.lengthAngstrom).toBeCloseTo(0.95, 9);
    expect(found[0]!.normAngstrom).toBeCloseTo(1.09, 1);
  });
});

describe('values no atom of an element has', () => {
  it('catches a shielding of 30,000 ppm on carbon, and a gradient a thousand times too large', () => {
    const shielding = dossierOf(
      's.xyz',
      xyz([`C 1 1 1 ${tensor(30_000)}`, `O 4 4 4 ${tensor(200)}`], ':shielding:R:9'),
    );
    expect(implausibleValues(shielding.sites)).toMatchObject([{ quantity: 'shielding', value: 30_000 }]);
    const gradient = 'Al 1 1 1 -300 0 0 0 -100 0 0 0 400';
    const efg = dossierOf('e.xyz', xyz([gradient], ':efg:R:9 efg_unit=au'));
    expect(implausibleValues(efg.sites)).toMatchObject([{ quantity: 'efg' }]);
  });
});

describe('a sound calculation', () => {
  it('raises nothing', () => {
    const rows = clean(1.09).map((row) => `${row} ${tensor(row.startsWith('H') ? 28 : 130)}`);
    const view = checkView(dossierOf('ok.xyz', xyz(rows, ':shielding:R:9')), []);
    expect(view).toMatchObject({ contacts: [], hydrogens: [], implausible: [], unfinished: [] });
  });

  it('tells of a run that did not finish', () => {
    const dossier = dossierOf('ok.xyz', xyz(clean(1.09)));
    const said = {
      ...{ code: 'text-unfinished', severity: 'warning', message: 'The run did not converge.' },
      ...{ file: 'run.log', line: 7, column: null, got: '', allowed: '', hint: '' },
    } as unknown as CrystalDossier['problems'][number];
    const { unfinished } = checkView({ ...dossier, problems: [said] }, []);
    expect(unfinished).toEqual([{ message: said.message, file: 'run.log', line: 7 }]);
  });
});

/** Fixtures whose atoms overlap because the publication lists alternatives, or hydrogens that X-rays drew in. */
describe('published structures', () => {
  const folder = new URL('../../outside/fixtures/', import.meta.url);
  const files = readdirSync(folder).filter((name) => name.endsWith('.cif'));

  it.each(files)('%s has no contact that is too short, but between alternatives', (name) => {
    const dossier = dossierOf(name, readFileSync(new URL(name, folder), 'utf8'));
    const wrong = shortContacts(dossier).filter(({ areAlternatives }) => !areAlternatives);
    expect(wrong).toEqual([]);
  });
});
