import { describe, expect, it } from 'vitest';
import type { FramedSite } from '#src/attach/frame-ranking.ts';
import { frameResidual, namedFrames, rankFrames } from '#src/attach/frame-ranking.ts';
import type { Mat3, Vec3 } from '#src/base/matrix3.ts';
import { apply, inverse, multiply, transpose } from '#src/base/matrix3.ts';
import { latticeFromRows } from '#src/crystal/lattice.ts';
import facts from './facts/crystal-frames.json' with { type: 'json' };

type Structure = (typeof facts.structures)[number];
const flat = (rows: readonly (readonly number[])[]): Mat3 => rows.flat() as unknown as Mat3;
const settingNames = ['S1', 'S2', 'S3', 'S4', 'S5', 'S6', 'S7', 'S8'] as const;

function isSame(a: readonly number[], b: readonly number[]): boolean {
  return a.every((value, i) => Math.abs(value - b[i]! - Math.round(value - b[i]!)) < 1e-5);
}

/** Sites with the tensors of all their atoms, given in setting S1, and Cartesian rotations in S1. */
function framedSites(structure: Structure, elements: readonly string[]): FramedSite[] {
  const columns = flat(structure.lattice_columns.S1);
  const operations = structure.operations.map(({ W, w }) => ({
    rotation: multiply(multiply(columns, flat(W)), inverse(columns)),
    image: (position: readonly number[]) =>
      apply(flat(W), position as unknown as Vec3).map((x, i) => x + w[i]!),
  }));
  return structure.sites
    .filter(({ element }) => elements.includes(element))
    .map((site) => ({
      stabiliser: operations
        .filter((one) => isSame(one.image(site.frac), site.frac))
        .map((one) => one.rotation),
      tensors: structure.field
        .filter(({ label }) => label === site.label)
        .map(({ frac, tensor_S1: tensor }) => ({
          tensor: flat(tensor),
          rotation: operations.find((one) => isSame(one.image(site.frac), frac))!.rotation,
        })),
    }));
}

function latticeOf(structure: Structure) {
  return latticeFromRows(transpose(flat(structure.lattice_columns.S1)), 'as given');
}

function elementsOf(structure: Structure): string[] {
  return [...new Set(structure.sites.map(({ element }) => element))];
}

/** Structures: the papers named in `reference` of each; fields invented, residuals by an independent program, tolerance 1e-8. */
describe.each(facts.structures.map((one) => [one.name, one] as const))('frames of %s', (_name, structure) => {
  const frames = namedFrames(latticeOf(structure));

  it.each(settingNames)('leave the residual of %s that was computed elsewhere', (setting) => {
    const { frame } = frames[settingNames.indexOf(setting)]!;
    const all = frameResidual(framedSites(structure, elementsOf(structure)), frame);
    const wanted = structure.wrong_setting[setting].residual.symmetric.rms_rel;
    expect(all.relative).toBeCloseTo(wanted, 7);
  });
});

const ranked = (name: string, elements?: readonly string[]) => {
  const structure = facts.structures.find((one) => one.name === name)!;
  const sites = framedSites(structure, elements ?? elementsOf(structure));
  return rankFrames({ sites, lattice: latticeOf(structure), known: null }).ranking;
};
const verdicts = ({ frames }: ReturnType<typeof ranked>): Record<string, string> =>
  Object.fromEntries(frames.map(({ name, verdict }) => [name, verdict]));

/** The theorem: undetectable just where R⁻¹QRQ⁻¹ commutes with every tensor, for all operations and sites. */
describe('what symmetry decides', () => {
  it('finds the frame of quartz, corundum, calcite', () => {
    for (const name of ['quartz', 'corundum', 'calcite']) {
      const ranking = ranked(name);
      expect(ranking).toMatchObject({ decided: true, by: 'symmetry' });
      expect(verdicts(ranking)[ranking.inUse]).toMatch(/best|same frame/);
      expect(verdicts(ranking)['c-z-b-yz']).toBe('excluded');
    }
  });

  it('says that a rotation about the unique axis is undetectable in diopside', () => {
    const ranking = ranked('diopside');
    expect(ranking.decided).toBe(false);
    const told = verdicts(ranking);
    const about = ['b-y-c-yz', 'c-z-a-xz', 'c-z-b-yz'].map((name) => told[name]);
    expect(about.filter((verdict) => verdict === 'excluded')).toEqual([]);
    expect(Object.values(told)).toContain('undetectable by symmetry');
  });

  it('says that nothing is detectable without symmetry and at axial sites (Al of corundum)', () => {
    const structure = facts.structures.find(({ name }) => name === 'quartz')!;
    const alone = framedSites(structure, ['O']).map(({ tensors, stabiliser }) => ({
      tensors: tensors.slice(0, 1),
      stabiliser,
    }));
    const { ranking: single } = rankFrames({ sites: alone, lattice: latticeOf(structure), known: null });
    for (const ranking of [single, ranked('corundum', ['Al'])]) {
      expect(ranking.decided).toBe(false);
      expect(verdicts(ranking)['b-y-a-xy']).not.toBe('excluded');
      expect(Object.values(verdicts(ranking))).toContain('undetectable by symmetry');
    }
  });
});
