import { describe, expect, it } from 'vitest';
import type { Mat3, Vec3 } from '#src/base/matrix3.ts';
import { distance } from '#src/base/vector3.ts';
import { elementColour } from '#src/data/element-colour.ts';
import { siteColourBytes } from '#src/data/site-colour.ts';
import type { CrystalDossier, SiteDossier } from '#src/dossier/dossier.ts';
import { buildScene } from '#src/scene/build-scene.ts';
import { usualValue } from '#src/scene/colour-meaning.ts';
import { legendColour, legendFor, mapColour } from '#src/scene/colour-scale.ts';
import { vacancyColour } from '#src/scene/occupancy.ts';
import type { Scene } from '#src/scene/scene.ts';
import type { ColourMeaning } from '#src/scene/scene-options.ts';
import { madeDossier } from '#tests/support/made-dossier.ts';
import { madeQuartz } from '#tests/support/made-quartz.ts';

const rows: Mat3 = [9, 0, 0, 0, 9, 0, 0, 0, 9];
const diagonal = (a: number, b: number, c: number): Mat3 => [a, 0, 0, 0, b, 0, 0, 0, c];
const colourAt = (scene: Scene, i: number): number[] => [
  ...scene.quadrics.colours.subarray(3 * i, 3 * i + 3),
];

/** Three atoms far apart with shielding and field gradient, all invented; changes by site index. */
function three(changes: readonly Partial<SiteDossier>[] = []): CrystalDossier {
  const made = madeDossier({
    rows,
    sites: [
      {
        label: 'Al1',
        element: 'Al',
        position: [0.2, 0.2, 0.2],
        shieldingPpm: diagonal(500, 520, 560),
        efg: diagonal(0.1, 0.2, -0.3),
      },
      {
        label: 'Al2',
        element: 'Al',
        position: [0.5, 0.5, 0.5],
        shieldingPpm: diagonal(510, 515, 530),
        efg: diagonal(-0.1, -0.1, 0.2),
      },
      { label: 'Na1', element: 'Na', position: [0.8, 0.8, 0.8] },
    ],
  });
  return { ...made, sites: made.sites.map((site, k) => ({ ...site, ...changes[k] })) };
}

/** The numbers of one tensor changed. */
function withNumbers(site: SiteDossier, numbers: object): Partial<SiteDossier> {
  return { shielding: { ...site.shielding!, ...numbers } };
}

describe('what colours say', () => {
  const base = three();
  const [first, second] = base.sites;
  const other = (isotropic: number): Partial<SiteDossier> => ({
    other: { shielding: { ...first!.shielding!, isotropic }, shift: null, efg: null },
  });
  const efgWith = (site: SiteDossier, couplingMHz: number): Partial<SiteDossier> => ({
    efg: { ...site.efg!, couplingMHz },
  });

  it.each([
    ['isotropic', [1580 / 3, 1555 / 3], three(), 'ppm', false],
    [
      'span',
      [60, 20],
      three([withNumbers(first!, { span: 60 }), withNumbers(second!, { span: 20 })]),
      'ppm',
      false,
    ],
    [
      'anisotropy',
      [50, -8],
      three([withNumbers(first!, { anisotropy: 50 }), withNumbers(second!, { anisotropy: -8 })]),
      'ppm',
      true,
    ],
    [
      'asymmetry',
      [0.6, 0.1],
      three([withNumbers(first!, { asymmetry: 0.6 }), withNumbers(second!, { asymmetry: 0.1 })]),
      '',
      false,
    ],
    ['vzz', [-0.3, 0.2], three(), 'a.u.', true],
    ['coupling', [-10.3, 6.9], three([efgWith(first!, -10.3), efgWith(second!, 6.9)]), 'MHz', true],
    [
      'residual',
      [0.4, 0.05],
      three([
        withNumbers(first!, { symmetryResidual: 0.4 }),
        withNumbers(second!, { symmetryResidual: 0.05 }),
      ]),
      'ppm',
      false,
    ],
    ['difference', [530 - 1580 / 3, 510 - 1555 / 3], three([other(530), other(510)]), 'ppm', true],
  ] as const)('%s', (colourBy, values, dossier, unit, isSigned) => {
    const scene = buildScene(dossier, {
      quantity: 'shielding',
      colourBy: colourBy as ColourMeaning,
      ellipsoid: 'deviation',
    });
    const legend = scene.legend!;
    expect(legend.unit).toBe(unit);
    expect(legend.map).toBe(isSigned ? 'vik' : 'batlow');
    expect(legend.diverging).toBe(isSigned);
    if (isSigned) expect(legend.low).toBe(-legend.high);
    values.forEach((value, k) => {
      expect(value).toBeGreaterThanOrEqual(legend.low);
      expect(value).toBeLessThanOrEqual(legend.high);
      expect(colourAt(scene, k)).toEqual([...legendColour(legend, value)]);
      // signs have dots as their second cue
      expect(scene.quadrics.patterns?.[k] ?? 0).toBe(isSigned && value < 0 ? 2 : 0);
    });
    expect(scene.caption.includes('Dots on an ellipsoid mark a negative value.')).toBe(isSigned);
    expect([...scene.siteColours!]).toEqual([
      ...colourAt(scene, 0),
      255,
      ...colourAt(scene, 1),
      255,
      0,
      0,
      0,
      0,
    ]);
    expect(legend.title.length).toBeGreaterThan(3);
  });

  it.each([
    ['residual', [4e-13, 0]],
    ['residual', [0.004, 0.0049]],
    ['difference', [2.3e-13, -2.3e-13]],
  ] as const)('%s of %j ppm is nothing but rounding: grey, without a bar, and said', (colourBy, sizes) => {
    const made = ([a, b]: readonly [number, number]) =>
      colourBy === 'residual'
        ? three([withNumbers(first!, { symmetryResidual: a }), withNumbers(second!, { symmetryResidual: b })])
        : three([other(1580 / 3 + a), other(1555 / 3 + b)]);
    const scene = buildScene(made(sizes), { quantity: 'shielding', colourBy });
    const [r, g, b] = colourAt(scene, 0);
    expect(Math.max(r!, g!, b!) - Math.min(r!, g!, b!)).toBeLessThan(16);
    expect(colourAt(scene, 1)).toEqual([r, g, b]);
    expect(scene.quadrics.patterns).toBeUndefined();
    expect(scene.legend).toBeNull();
    expect(scene.colourNotes).toHaveLength(1);
    expect(scene.caption).toContain('zero within rounding, below 0.005 ppm');
  });

  it('values beyond typed limits are told, those within are not', () => {
    const dossier = three([
      withNumbers(first!, { anisotropy: 50 }),
      withNumbers(second!, { anisotropy: 20 }),
    ]);
    const notes = (colourLimits: readonly [number, number]) =>
      buildScene(dossier, { colourBy: 'anisotropy', colourLimits }).colourNotes;
    expect(notes([0, 60])).toEqual([]);
    expect(notes([30, 60])).toEqual([
      'Values reach from 20 to 50 ppm: those beyond the colour bar have the colours of its ends.',
    ]);
  });

  it('an undefined number leaves a grey tensor and no colour for the site', () => {
    const dossier = three([
      withNumbers(first!, { anisotropy: 50 }),
      withNumbers(second!, { anisotropy: null }),
    ]);
    const scene = buildScene(dossier, { colourBy: 'anisotropy' });
    expect([...scene.siteColours!.subarray(4, 8)]).toEqual([0, 0, 0, 0]);
    expect(scene.caption).toContain('Grey tensors have no such number.');
  });

  it('falls back to the usual number where there is none, in words', () => {
    const noSecond = buildScene(three(), { colourBy: 'difference' });
    expect(noSecond.legend!.title).toBe('isotropic shielding σ(iso)');
    expect(noSecond.caption).toContain('There is no second set of this quantity here');
    const noSpan = buildScene(three(), { quantity: 'efg', glyph: 'ellipsoid', colourBy: 'span' });
    expect(noSpan.legend!.title).toBe('largest EFG component V(zz)');
  });

  it('element and site have no colour bar', () => {
    const byElement = buildScene(three(), { colourBy: 'element' });
    expect(byElement.legend).toBeNull();
    expect(colourAt(byElement, 0)).toEqual([...elementColour('Al')]);
    expect(byElement.elements.map(({ element }) => element)).toEqual(['Al', 'Na']);
    const bySite = buildScene(three(), { colourBy: 'site' });
    [0, 1, 2].forEach((k) => expect(colourAt(bySite, k)).toEqual([...siteColourBytes(k)]));
    expect(bySite.elements).toEqual([]);
    expect(new Set([0, 1, 2].map((k) => String(colourAt(bySite, k)))).size).toBe(3);
    expect(buildScene(three(), { colourBy: 'site', showTensors: false }).caption).toMatch(
      /^Atoms coloured by site\./,
    );
  });

  it('typed limits are kept and zero stays palest on a diverging bar', () => {
    const signed = { ...usualValue('efg') };
    const legend = legendFor(signed, [-0.1, 0.4], [-0.2, 0.8]);
    expect([legend.low, legend.high, legend.diverging]).toEqual([-0.2, 0.8, false]);
    expect(legendColour(legend, 0.8)).toEqual(mapColour('vik', 1));
    const [zero, middle] = [legendColour(legend, 0), mapColour('vik', 0.5)];
    zero.forEach((channel, k) => expect(Math.abs(channel - middle[k]!)).toBeLessThan(6));
    // −0.2 is a quarter of the way from zero to the other end of the map
    const low = mapColour('vik', 0.375);
    legendColour(legend, -0.2).forEach((channel, k) => expect(channel).toBe(low[k]));
  });

  it('a map can be asked for', () => {
    expect(buildScene(three(), { colourMap: 'vik' }).legend!.map).toBe('vik');
    const sequential = buildScene(three(), { colourBy: 'vzz', colourMap: 'batlow' });
    expect(sequential.legend!.map).toBe('batlow');
    expect(sequential.quadrics.patterns).toBeUndefined();
  });
});

describe('occupancy', () => {
  const species = (...list: [string, number][]) => ({
    species: list.map(([element, occupancy]) => ({ element, occupancy })),
    occupancy: list.reduce((sum, [, occupancy]) => sum + occupancy, 0),
  });

  it('shows vacancies pale and mixed sites by the ratio of their two most abundant elements', () => {
    const dossier = three([
      species(['Al', 0.4]),
      species(['Al', 0.5], ['Fe', 0.3], ['Mg', 0.2]),
      species(['Na', 1]),
    ]);
    const { quadrics, caption, elements } = buildScene(dossier, { showTensors: false });
    // the second element of the mixed site has its place in the key
    expect(elements.map(({ element }) => element)).toEqual(['Al', 'Na', 'Fe']);
    const rest = (i: number) => [...quadrics.restColours!.subarray(3 * i, 3 * i + 3)];
    expect([...quadrics.shares!]).toEqual([Math.round(0.4 * 255), Math.round((0.5 / 0.8) * 255), 255]);
    expect(rest(0)).toEqual([...vacancyColour]);
    expect(rest(1)).toEqual([...elementColour('Fe')]);
    expect(caption).toContain('its two most abundant elements');
    expect(caption).toContain('Pale parts of spheres');
    const plain = buildScene(dossier, { showTensors: false, occupancy: false });
    expect(plain.quadrics.shares).toBeUndefined();
    expect(plain.caption).not.toContain('Pale parts');
  });

  it('counts another row on the same position as a second element', () => {
    const made = madeDossier({
      rows,
      sites: [
        { label: 'Nb1', element: 'Nb', position: [0.1, 0.2, 0.3] },
        { label: 'Al1', element: 'Al', position: [0.1, 0.2, 0.3] },
      ],
    });
    const sites = made.sites.map((site, k) => ({ ...site, occupancy: [0.25, 0.75][k]! }));
    const { quadrics } = buildScene({ ...made, sites });
    expect(quadrics.count).toBe(1);
    expect(quadrics.shares![0]).toBe(Math.round(0.75 * 255));
    expect([...quadrics.restColours!]).toEqual([...elementColour('Nb')]);
  });
});

describe('disorder', () => {
  const group = (name: string | null) => ({
    disorder: name === null ? null : { assembly: 'A', group: name },
  });
  const dossier = three([group('1'), group('2'), group(null)]);

  it('gives each alternative of an assembly a pattern of its own', () => {
    const { quadrics, caption } = buildScene(dossier, { showTensors: false });
    expect([...quadrics.patterns!]).toEqual([0, 1, 0]);
    expect(caption).toContain('alternatives of disorder');
    const alike = buildScene(dossier, { showTensors: false, disorder: 'alike' });
    expect(alike.quadrics.patterns).toBeUndefined();
  });

  it('draws one group only with the ordered atoms; −1 belongs to group 1', () => {
    const sitesOf = (scene: Scene) =>
      scene.picks.flatMap((pick) => (pick.kind === 'atom' ? [pick.siteIndex] : []));
    const only = buildScene(dossier, { disorder: { only: '2' } });
    expect(sitesOf(only)).toEqual([1, 2]);
    expect(only.caption).toContain('only group 2 is drawn');
    const special = three([group('-1'), group('2'), group(null)]);
    expect(sitesOf(buildScene(special, { disorder: { only: '1' } }))).toEqual([0, 2]);
    const unknown = buildScene(dossier, { disorder: { only: '7' } });
    expect(sitesOf(unknown)).toEqual([0, 1, 2]);
    expect(unknown.caption).toContain('No atom belongs to disorder group 7');
  });

  it('draws the smaller alternative of a shared position once the larger is left out', () => {
    const made = madeDossier({
      rows,
      sites: [
        { label: 'O1A', element: 'O', position: [0.1, 0.2, 0.3] },
        { label: 'N1B', element: 'N', position: [0.1, 0.2, 0.3] },
      ],
    });
    const sites = made.sites.map((site, k) => ({
      ...site,
      occupancy: [0.7, 0.3][k]!,
      ...group(String(k + 1)),
    }));
    const { picks } = buildScene({ ...made, sites }, { disorder: { only: '2' } });
    expect(picks.map((pick) => pick.kind === 'atom' && pick.siteIndex)).toEqual([1]);
  });
});

describe('coordination polyhedra', () => {
  it('round every silicon of quartz: tetrahedra whose corners are its oxygens', () => {
    const dossier = madeQuartz();
    const scene = buildScene(dossier, { polyhedra: ['Si'], bondedNeighbours: false });
    const own = scene.picks.filter((pick) => pick.kind === 'atom' && pick.siteIndex === 0 && !pick.context);
    expect(scene.facets!.count).toBe(4 * own.length);
    const bonds = scene.picks.filter(({ kind }) => kind === 'bond').length;
    expect(bonds).toBeGreaterThan(0);
    // each facet's corners are oxygens at the bond length from one silicon
    const { corners } = scene.facets!;
    const centres = own.map(
      (_, k) => [...scene.quadrics.centres.subarray(3 * k, 3 * k + 3)] as unknown as Vec3,
    );
    for (let i = 0; i < scene.facets!.count; i++) {
      const facet = [0, 3, 6].map((o) => [...corners.subarray(9 * i + o, 9 * i + o + 3)] as unknown as Vec3);
      const near = centres.filter((centre) =>
        facet.every((corner) => Math.abs(distance(centre, corner) - 1.61) < 0.03),
      );
      expect(near).toHaveLength(1);
    }
    // six edges each, besides bonds of one cylinder
    expect(
      scene.cylinders.count - buildScene(dossier, { bondedNeighbours: false }).cylinders.count,
    ).toBeGreaterThanOrEqual(6 * own.length);
    expect(scene.caption).toContain('Polyhedra join the atoms bonded to Si.');
  });

  it('of a square coordination is one flat face with four edges', () => {
    const dossier = madeDossier({
      rows,
      sites: [
        { label: 'Cu1', element: 'Cu', position: [0.5, 0.5, 0.5] },
        ...[
          [2, 0],
          [-2, 0],
          [0, 2],
          [0, -2],
        ].map(([x, y], k) => ({
          label: `O${k + 1}`,
          element: 'O',
          position: [0.5 + x! / 9, 0.5 + y! / 9, 0.5] as Vec3,
        })),
      ],
      bondLimits: { 'Cu-O': 2.1 },
    });
    const scene = buildScene(dossier, { polyhedra: ['Cu'], bonds: false });
    expect(scene.facets!.count).toBe(2);
    expect(scene.cylinders.count).toBe(4);
    expect(buildScene(dossier, { polyhedra: ['O'] }).facets).toBeUndefined();
    expect(buildScene(dossier, { polyhedra: ['O'] }).caption).not.toContain('Polyhedra');
  });
});

describe('labels', () => {
  it('print site, element, or the number of the colour with the digits of the table', () => {
    const texts = (options: object) =>
      buildScene(three(), { labels: true, ...options }).labels.map(({ text }) => text);
    expect(texts({})).toEqual(['Al1', 'Al2', 'Na1']);
    expect(texts({ labelContent: 'element' })).toEqual(['Al', 'Al', 'Na']);
    expect(texts({ labelContent: 'value' })).toEqual(['526.67', '518.33', 'Na1']);
    expect(texts({ labelContent: 'value', colourBy: 'vzz' })).toEqual(['−0.3000', '0.2000', 'Na1']);
    const scene = buildScene(three(), { labels: true, labelContent: 'value' });
    expect(scene.caption).toContain('Labels: isotropic shielding σ(iso) in ppm.');
  });

  it('show a sign that the tensor leaves open as ±', () => {
    const [first] = three().sites;
    const open = three([{ efg: { ...first!.efg!, signDetermined: false } }]);
    const scene = buildScene(open, { labels: true, labelContent: 'value', quantity: 'efg' });
    expect(scene.labels[0]!.text).toBe('±0.3000');
  });
});
