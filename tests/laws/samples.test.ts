import { readdirSync, readFileSync } from 'node:fs';
import { describe, expect, it } from 'vitest';
import type { Mat3, VecFrac } from '#src/base/matrix3.ts';
import { apply, inverse, multiply, trace, transpose } from '#src/base/matrix3.ts';
import { sourceFromText } from '#src/bytes/source-from-text.ts';
import type { Crystal } from '#src/crystal/crystal.ts';
import { orbitOf } from '#src/crystal/orbit.ts';
import { applyOperation, cartesianRotation } from '#src/crystal/symmetry-operation.ts';
import { readText } from '#src/readers/read.ts';
import type { Reading } from '#src/readers/reading.ts';
import { projectOnSiteSymmetry, rotateTensor } from '#src/tensor/projection.ts';
import { dossierOfText } from '#tests/support/derive.ts';
import { makeSamples } from '#tests/support/make-samples.ts';

const folder = new URL('../../samples/', import.meta.url);
const textOf = (name: string): string => readFileSync(new URL(name, folder), 'utf8');
const readSample = (name: string): Reading => readText(sourceFromText(name, textOf(name)));

interface SampleIndex {
  readonly cases: readonly { id: string; title: string; sentence: string; files: string[] }[];
}
const index = JSON.parse(textOf('index.json')) as SampleIndex;
const names = ['drum-1-quartz', 'drum-2-diopside', 'drum-3-malate'];

function crystalOf(name: string): Crystal {
  const [crystal] = readSample(name).structures;
  if (!crystal?.lattice) throw new Error(`${name} holds no crystal`);
  return crystal;
}

describe('the files', () => {
  it('are what their script makes', () => {
    for (const [name, text] of makeSamples()) expect(textOf(name), name).toBe(text);
  });

  it('are all offered or explained', () => {
    expect(index.cases.map(({ id }) => id)).toEqual(names);
    const readme = textOf('README.md');
    for (const { title, sentence, files } of index.cases) {
      expect(title.length).toBeGreaterThan(5);
      expect(sentence).toContain('invented');
      for (const file of files) expect(readme).toContain(file);
    }
    for (const file of readdirSync(new URL('formats/', folder))) expect(readme).toContain(file);
  });

  it('say in their text that the tensors are invented, and where the structure is published', () => {
    for (const name of names) {
      expect(textOf(`${name}.cif`)).toMatch(/THE TENSORS ARE INVENTED/);
      expect(textOf(`${name}.cif`)).toMatch(/\((19|20)\d\d\)/);
      expect(textOf(`${name}.xyz`)).toMatch(/tensors are invented/);
    }
  });
});

// Space-group numbers and multiplicities: International Tables A, for the published groups.
describe.each([
  ['drum-1-quartz', 154, { Si1: 3, O1: 6 }],
  ['drum-2-diopside', 15, { Ca1: 4, Mg1: 4, Si1: 8, O1: 8, O2: 8, O3: 8 }],
  ['drum-3-malate', 4, { O1: 2, C18: 2, H18A: 2 }],
])('%s', (name, number, multiplicities) => {
  const reading = readSample(`${name}.cif`);
  const crystal = crystalOf(`${name}.cif`);
  const { operations } = crystal.symmetry;
  const lattice = crystal.lattice!;
  const orbits = crystal.sites.map((site) => orbitOf(site.fractional!, operations, lattice, 0.1));

  it('reads without a problem, with its published group and multiplicities', () => {
    expect(reading.problems).toEqual([]);
    expect(crystal.symmetry).toMatchObject({ number, source: 'file' });
    for (const [label, count] of Object.entries(multiplicities)) {
      const site = crystal.sites.find((one) => one.label === label);
      expect(orbits[site?.index ?? -1]?.images, label).toHaveLength(count);
    }
  });

  it('has tensors that obey their site symmetry to the printed digits', () => {
    const shares = reading.tensorSets.flatMap(({ entries }) =>
      entries.map(({ tensor, atomIndex }) => {
        const { stabiliser } = orbits[atomIndex!]!;
        const rotations = stabiliser.map((g) => cartesianRotation(operations[g]!, lattice));
        return { order: rotations.length, residual: projectOnSiteSymmetry(tensor, rotations).residual };
      }),
    );
    expect(shares.length).toBeGreaterThan(2);
    for (const { residual } of shares) expect(residual).toBeLessThan(1e-6);
    const special = shares.filter(({ order }) => order > 1);
    expect(special.length > 0).toBe(name !== 'drum-3-malate');
  });

  it('has shieldings for all sites, with a small antisymmetric part, and gradients without a trace', () => {
    const shielding = reading.tensorSets.find(({ quantity }) => quantity === 'shielding');
    expect(shielding?.entries.map(({ label }) => label)).toEqual(crystal.sites.map(({ label }) => label));
    const oblique = shielding!.entries.filter(({ tensor }) =>
      tensor.some((v, i) => v !== transpose(tensor)[i]),
    );
    expect(oblique.length).toBe(shielding!.entries.length);
    const efg = reading.tensorSets.find(({ quantity }) => quantity === 'efg');
    const oxygens = crystal.sites.filter(({ element }) => element === 'O').map(({ label }) => label);
    expect(efg?.entries.map(({ label }) => label)).toEqual(expect.arrayContaining(oxygens));
    for (const { tensor } of efg!.entries) {
      expect(Math.abs(trace(tensor))).toBeLessThan(1e-9);
      expect(tensor).toEqual(transpose(tensor));
    }
  });

  it('has a twin in another frame with every atom and every turned tensor', () => {
    const twin = crystalOf(`${name}.xyz`);
    const images = crystal.sites.flatMap((site) =>
      orbits[site.index]!.images.map(({ operationIndex }) => ({
        site,
        operation: operations[operationIndex]!,
      })),
    );
    expect(twin.sites).toHaveLength(images.length);
    const between = multiply(twin.lattice!.toCartesian, inverse(lattice.toCartesian));
    expect(between.some((value, i) => Math.abs(value - (i % 4 === 0 ? 1 : 0)) > 0.1)).toBe(true);
    const twinSets = readSample(`${name}.xyz`).tensorSets;
    for (const { site, operation } of images) {
      const atom = nearestAtom(twin, applyOperation(operation, site.fractional!));
      expect(atom).toMatchObject({ label: site.label, element: site.element });
      for (const { quantity, entries } of reading.tensorSets) {
        const own = entries.find(({ atomIndex }) => atomIndex === site.index);
        const turned = twinSets
          .find((set) => set.quantity === quantity)
          ?.entries.find(({ atomIndex }) => atomIndex === atom.index);
        expect(turned === undefined).toBe(own === undefined);
        if (own === undefined || turned === undefined) continue;
        const rotation: Mat3 = multiply(between, cartesianRotation(operation, lattice));
        const expected = rotateTensor(rotation, own.tensor);
        turned.tensor.forEach((value, i) =>
          expect(value).toBeCloseTo(expected[i]!, quantity === 'efg' ? 5 : 3),
        );
      }
    }
  });

  it('gives the same dossier from CIF and twin, whose symmetry is searched', () => {
    const fromCif = dossierOfText(`${name}.cif`, textOf(`${name}.cif`));
    const fromTwin = dossierOfText(`${name}.xyz`, textOf(`${name}.xyz`));
    expect(fromTwin.symmetry.number).toBe(number);
    expect(fromTwin.atomsInCell).toBe(fromCif.atomsInCell);
    expect(fromTwin.composition).toEqual(fromCif.composition);
    for (const site of fromCif.sites) {
      const other = fromTwin.sites.find(({ label }) => label === site.label);
      expect(other?.multiplicity, site.label).toBe(site.multiplicity);
      expect(other?.distinctOrientations, site.label).toBe(site.distinctOrientations);
      site.shielding!.components.forEach((value, i) =>
        expect(other!.shielding!.components[i]).toBeCloseTo(value, 3),
      );
      expect(other!.shielding!.isotropic).toBeCloseTo(site.shielding!.isotropic, 3);
      expect(other!.efg === null).toBe(site.efg === null);
      if (site.efg !== null) {
        expect(Math.abs(other!.efg!.couplingMHz!)).toBeCloseTo(Math.abs(site.efg.couplingMHz!), 3);
      }
    }
  });
});

function nearestAtom(crystal: Crystal, position: VecFrac): Crystal['sites'][number] {
  const distance = ({ fractional }: Crystal['sites'][number]): number => {
    const step = fractional!.map((value, i) => value - position[i]! - Math.round(value - position[i]!));
    return Math.hypot(...apply(crystal.lattice!.toCartesian, step as unknown as VecFrac));
  };
  const [nearest] = crystal.sites
    .map((site) => ({ site, away: distance(site) }))
    .sort((a, b) => a.away - b.away);
  expect(nearest!.away).toBeLessThan(1e-4);
  return nearest!.site;
}
