import { describe, expect, it } from 'vitest';
import { sourceFromText } from '#src/bytes/source-from-text.ts';
import { defaultSettings } from '#src/dossier/default-settings.ts';
import { deriveDossier } from '#src/dossier/derive-dossier.ts';
import type { CrystalDossier } from '#src/dossier/dossier.ts';
import { readText } from '#src/readers/read.ts';

/** A molecule of two atoms, all numbers invented, with the isotropic shielding of the first as asked for. */
function text(isotropic: number): string {
  const tensor = [isotropic - 30, 0, 0, 0, isotropic, 0, 0, 0, isotropic + 30].join(' ');
  return `2\nLattice="6 0 0 0 6 0 0 0 6" Properties=species:S:1:pos:R:3:shielding:R:9\nC 0 0 0 ${tensor}\nC 0 0 1.2 ${tensor}\n`;
}

function dossierOf(values: readonly number[], references = {}): CrystalDossier {
  const readings = values.map((value, k) => readText(sourceFromText(`set-${k + 1}.xyz`, text(value))));
  return deriveDossier({
    crystal: readings[0]!.structures[0]!,
    tensorSets: readings.flatMap(({ tensorSets }) => tensorSets),
    tables: null,
    settings: { ...defaultSettings, references },
    problems: [],
  });
}

describe('a second set of one quantity', () => {
  it('stands beside the main one, which is the first', () => {
    const { sites, problems } = dossierOf([100, 107.5]);
    expect(sites.map(({ shielding }) => shielding?.isotropic)).toEqual([100, 100]);
    expect(sites.map(({ other }) => other?.shielding?.isotropic)).toEqual([107.5, 107.5]);
    expect(sites[0]!.other?.efg).toBeNull();
    const [said] = problems.filter(({ code }) => code === 'second-set');
    expect(said?.message).toMatch(/set-1\.xyz.* is the main one.*set-2\.xyz.* is the other one/);
  });

  it('gets shifts by the same reference', () => {
    const reference = { kind: 'simple' as const, interceptPpm: 170, slope: -1, isotope: '13C' };
    const [site] = dossierOf([100, 107.5], { '13C': reference }).sites;
    expect(site!.shift?.isotropic).toBeCloseTo(70, 9);
    expect(site!.other?.shift?.isotropic).toBeCloseTo(62.5, 9);
  });

  it('is absent where there is one set only, and a third one is left out with a warning', () => {
    expect(dossierOf([100]).sites[0]).not.toHaveProperty('other');
    const { sites, problems } = dossierOf([100, 101, 102]);
    expect(sites[0]!.other?.shielding?.isotropic).toBe(101);
    const warned = problems.filter(({ code }) => code === 'third-set-left-out');
    expect(warned).toHaveLength(1);
    expect(warned[0]!.file).toBe('set-3.xyz');
  });
});
