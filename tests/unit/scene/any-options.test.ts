import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import type { CrystalDossier } from '#src/dossier/dossier.ts';
import { buildScene } from '#src/scene/build-scene.ts';
import type { Scene } from '#src/scene/scene.ts';
import type { SceneOptions } from '#src/scene/scene-options.ts';
import { madeDossier } from '#tests/support/made-dossier.ts';
import { madeQuartz } from '#tests/support/made-quartz.ts';
import { madeUrea } from '#tests/support/made-urea.ts';

/** With displacements, occupancies, alternatives and a second set, all invented. */
function furnished(dossier: CrystalDossier): CrystalDossier {
  const sites = dossier.sites.map((site, k) => ({
    ...site,
    occupancy: k % 3 === 0 ? 0.6 : 1,
    disorder: k % 2 === 0 ? { assembly: 'A', group: String(1 + (k % 4)) } : null,
    displacement: {
      uAniso: k % 2 === 0 ? ([0.01, 0.02, 0.03, 0.001, 0.002, k === 2 ? 0.9 : 0.003] as const) : null,
      uEquivalent: 0.02,
      given: 'U' as const,
    },
    other: {
      shielding: site.shielding && { ...site.shielding, isotropic: site.shielding.isotropic + k },
      shift: null,
      efg: site.efg,
    },
  }));
  return { ...dossier, sites };
}

const molecule = madeDossier({
  rows: null,
  sites: [
    { label: 'C1', element: 'C', position: [0, 0, 0], shieldingPpm: [10, 3, 0, -2, 50, 0, 0, 1, 90] },
    { label: 'O1', element: 'O', position: [0, 0, 1.2], shieldingPpm: [-90, 0, 0, 0, 20, 0, 0, 0, 300] },
  ],
  bondLimits: { 'C-O': 1.4 },
});
const empty = madeDossier({ rows: [4, 0, 0, 0, 5, 0, 0, 0, 6], sites: [] });
const crystals = [
  madeQuartz(),
  furnished(madeQuartz()),
  madeUrea(),
  furnished(madeUrea()),
  molecule,
  furnished(molecule),
  empty,
];

const corner = fc.tuple(...([0, 1, 2] as const).map(() => fc.double({ min: -2, max: 2 }))) as fc.Arbitrary<
  [number, number, number]
>;
const anyOptions = fc.record(
  {
    quantity: fc.constantFrom('auto', 'shielding', 'shift', 'efg'),
    showTensors: fc.boolean(),
    tensorElements: fc.constantFrom<SceneOptions['tensorElements'][]>('auto', null, ['O'], [], ['Xx']),
    extent: fc.constantFrom('auto', 'cell', 'molecules', 'asymmetric', 'range', 'shell'),
    range: fc.tuple(corner, corner),
    shell: fc.constantFrom(
      null,
      { siteIndices: [0], radiusAngstrom: 3 },
      { siteIndices: [1, 7], radiusAngstrom: 0 },
      { siteIndices: [], radiusAngstrom: Number.NaN },
    ),
    glyph: fc.constantFrom('auto', 'ellipsoid', 'polar', 'axes'),
    part: fc.constantFrom('symmetric', 'antisymmetric'),
    tensorSites: fc.constantFrom(null, [0], [], [99]),
    tensorCopies: fc.constantFrom('all', 'first', 'orientations'),
    colourBy: fc.constantFrom(
      ...(['isotropic', 'span', 'anisotropy', 'asymmetry', 'vzz', 'coupling'] as const),
      ...(['residual', 'difference', 'element', 'site'] as const),
    ),
    colourMap: fc.constantFrom(null, 'batlow', 'vik'),
    ellipsoid: fc.constantFrom('auto', 'total', 'deviation'),
    unitsPerAngstrom: fc.constantFrom(null, 1e-3, 100, 1e6),
    colourLimits: fc.constantFrom(null, [0, 0] as const, [5, -3] as const, [100, 500] as const),
    bonds: fc.boolean(),
    bondedNeighbours: fc.boolean(),
    hydrogenBonds: fc.boolean(),
    cellEdges: fc.boolean(),
    labels: fc.boolean(),
    labelContent: fc.constantFrom('site', 'element', 'value'),
    polyhedra: fc.constantFrom([], ['Si'], ['C', 'O'], ['Xx']),
    displacement: fc.constantFrom('none', 'beside', 'instead'),
    displacementProbability: fc.constantFrom(0, 0.5, 0.99, 1),
    occupancy: fc.boolean(),
    disorder: fc.constantFrom<SceneOptions['disorder'][]>('patterns', 'alike', { only: '1' }, { only: 'B' }),
  },
  { requiredKeys: [] },
);

function expectSound(scene: Scene): void {
  const { quadrics, cylinders, lines, polars, facets, picks, bounds } = scene;
  const arrays = [
    quadrics.centres,
    quadrics.shapes,
    cylinders.starts,
    cylinders.ends,
    cylinders.radii,
    lines.starts,
    lines.ends,
  ];
  for (const array of [
    ...arrays,
    ...(polars ? [polars.centres, polars.tensors] : []),
    ...(facets ? [facets.corners] : []),
  ]) {
    expect(array.every(Number.isFinite)).toBe(true);
  }
  expect(quadrics.centres).toHaveLength(3 * quadrics.count);
  expect(cylinders.starts).toHaveLength(3 * cylinders.count);
  for (const ids of [quadrics.pickIds, cylinders.pickIds, polars?.pickIds ?? []]) {
    for (const id of ids) expect(picks[id - 1]).toBeDefined();
  }
  for (let i = 0; i < quadrics.count; i++) {
    const [a, b, c, d, e, f, g, h, k] = quadrics.shapes.subarray(9 * i, 9 * i + 9);
    expect(a! * (e! * k! - f! * h!) - b! * (d! * k! - f! * g!) + c! * (d! * h! - e! * g!)).not.toBe(0);
  }
  expect(Number.isFinite(bounds.radiusAngstrom) && bounds.radiusAngstrom > 0).toBe(true);
  expect(scene.caption).toMatch(/^[A-Z].*\.$/);
  expect(scene.caption).not.toMatch(/undefined|null|NaN|\.\.|\s{2}/);
  for (const { pickId, quadric } of scene.labels) expect(quadrics.pickIds[quadric]).toBe(pickId);
  expect(scene.scaleStatement === null).toBe(scene.scale === null);
  expect(structuredClone(scene)).toEqual(scene);
}

describe('any choice of options', () => {
  it('gives a sound picture with a caption', () => {
    fc.assert(
      fc.property(fc.nat(crystals.length - 1), anyOptions, (which, options) => {
        const dossier = crystals[which]!;
        const scene = buildScene(dossier, options as Partial<SceneOptions>);
        expectSound(scene);
        expect(scene.siteColours).toHaveLength(4 * dossier.sites.length);
      }),
      { numRuns: 400 },
    );
  });
});
