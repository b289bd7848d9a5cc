import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import type { Mat3, Vec3 } from '#src/base/matrix3.ts';
import { apply, asMat3, determinant, multiply, transpose } from '#src/base/matrix3.ts';
import { add, cross, distance, dot, length, normalize, scale, subtract } from '#src/base/vector3.ts';
import type { CrystalDossier } from '#src/dossier/dossier.ts';
import { buildScene } from '#src/scene/build-scene.ts';
import { mapColour } from '#src/scene/colour-scale.ts';
import type { PickEntry, Scene } from '#src/scene/scene.ts';
import { madeDossier } from '#tests/support/made-dossier.ts';
import { madeQuartz } from '#tests/support/made-quartz.ts';

type AtomPick = Extract<PickEntry, { kind: 'atom' }>;

function atomOf(scene: Scene, pickId: number): AtomPick {
  const pick = scene.picks[pickId - 1]!;
  if (pick.kind !== 'atom') throw new Error('not an atom');
  return pick;
}

/** Cartesian tensor of a drawn atom by R T Rᵀ. */
function tensorAt(dossier: CrystalDossier, pick: AtomPick, tensor: Mat3): Mat3 {
  const { rotation } = dossier.sites[pick.siteIndex]!.equivalents.find(({ id }) => id === pick.atomId)!;
  return multiply(multiply(rotation, tensor), transpose(rotation));
}

const three = (points: Float32Array, i: number): Vec3 =>
  [...points.subarray(3 * i, 3 * i + 3)] as unknown as Vec3;
const directions = fc
  .tuple(
    ...([0, 1, 2].map(() => fc.integer({ min: -9, max: 9 })) as [
      fc.Arbitrary<number>,
      fc.Arbitrary<number>,
      fc.Arbitrary<number>,
    ]),
  )
  .filter((v) => v.some((x) => x !== 0))
  .map((v) => normalize(v));

describe('polar surfaces', () => {
  it.each([
    ['efg', 'auto', 'auto', 0],
    ['shielding', 'polar', 'auto', 1],
    ['shielding', 'polar', 'total', 0],
  ] as const)('of %s (%s, %s): r(n) = |n·T·n| on every copy', (quantity, glyph, ellipsoid, isDeviation) => {
    const dossier = madeQuartz();
    const scene = buildScene(dossier, { quantity, glyph, ellipsoid, tensorElements: null });
    const { polars, scale: drawn } = scene;
    expect(polars!.count).toBeGreaterThanOrEqual(6);
    fc.assert(
      fc.property(directions, fc.integer({ min: 0, max: polars!.count - 1 }), (n, i) => {
        const pick = atomOf(scene, polars!.pickIds[i]!);
        const found = dossier.sites[pick.siteIndex]![quantity]!;
        const along = dot(n, apply(tensorAt(dossier, pick, found.tensor), n));
        const isotropic = (found.tensor[0] + found.tensor[4] + found.tensor[8]) / 3;
        const expected = (along - isDeviation * isotropic) / drawn!.unitsPerAngstrom;
        const [xx, yy, zz, xy, xz, yz] = polars!.tensors.subarray(6 * i, 6 * i + 6);
        const t: Mat3 = [xx!, xy!, xz!, xy!, yy!, yz!, xz!, yz!, zz!];
        expect(dot(n, apply(t, n))).toBeCloseTo(expected, 5);
      }),
    );
  });

  it('of field gradients say the sign by two colours of the diverging map, without a colour bar', () => {
    const scene = buildScene(madeQuartz(), { quantity: 'efg' });
    expect(scene.legend).toBeNull();
    expect(scene.lobeColours).toEqual({ positive: mapColour('vik', 0.8), negative: mapColour('vik', 0.2) });
    expect(three(scene.polars!.positiveColours as unknown as Float32Array, 0)).toEqual(
      scene.lobeColours!.positive,
    );
    expect(scene.caption).toContain('positive lobes orange, negative lobes blue and striped');
  });

  /** An axial tensor (−v/2, −v/2, v) of the EFG, a.u., on each of two sites with the given v. */
  const twoGradients = (v: readonly [number, number]): CrystalDossier =>
    madeDossier({
      rows: [9, 0, 0, 0, 9, 0, 0, 0, 9],
      sites: v.map((vzz, k) => ({
        label: `Al${k + 1}`,
        element: 'Al',
        position: [0.25 + 0.5 * k, 0.5, 0.5] as const,
        efg: [-vzz / 2, 0, 0, 0, -vzz / 2, 0, 0, 0, vzz] as const,
      })),
    });

  it.each(['vzz', 'asymmetry', 'site'] as const)(
    'coloured by %s have just the colour of their value, the negative lobe darker in every channel',
    (colourBy) => {
      const dossier = twoGradients([0.4, -0.4]);
      const lobes = buildScene(dossier, { quantity: 'efg', colourBy });
      // ellipsoids of the same tensors say what colour the value has
      const solid = buildScene(dossier, { quantity: 'efg', colourBy, glyph: 'ellipsoid' });
      expect(lobes.polars!.count).toBe(2);
      for (const i of [0, 1]) {
        const place = lobes.polars!.pickIds[i]! - 1;
        const own = [...solid.quadrics.colours.subarray(3 * place, 3 * place + 3)];
        const positive = [...lobes.polars!.positiveColours.subarray(3 * i, 3 * i + 3)];
        const negative = [...lobes.polars!.negativeColours.subarray(3 * i, 3 * i + 3)];
        expect(positive).toEqual(own);
        negative.forEach((value, k) => expect(value).toBeLessThan(own[k]! * 0.75 + 1));
      }
      expect(lobes.caption).toContain('negative lobes darker and striped');
    },
  );

  it('coloured by V(zz) tell its sign by warm and cool, whichever lobe', () => {
    const { polars } = buildScene(twoGradients([0.4, -0.4]), { quantity: 'efg', colourBy: 'vzz' });
    const isWarm = (colours: Uint8Array, i: number) => colours[3 * i]! > colours[3 * i + 2]!;
    expect([0, 1].map((i) => isWarm(polars!.positiveColours, i))).toEqual([true, false]);
    expect([0, 1].map((i) => isWarm(polars!.negativeColours, i))).toEqual([true, false]);
  });

  it('are pickable as their atoms and stay within the bounds of the scene', () => {
    const scene = buildScene(madeQuartz(), { quantity: 'efg' });
    const { polars, bounds } = scene;
    for (let i = 0; i < polars!.count; i++) {
      const place = polars!.pickIds[i]! - 1;
      expect(three(polars!.centres, i)).toEqual(three(scene.quadrics.centres, place));
      const [xx, yy, zz] = polars!.tensors.subarray(6 * i, 6 * i + 3);
      const tip = Math.max(Math.abs(xx!), Math.abs(yy!), Math.abs(zz!));
      expect(distance(three(polars!.centres, i), bounds.centre) + tip).toBeLessThanOrEqual(
        bounds.radiusAngstrom + 1e-5,
      );
    }
  });
});

/** One atom in the middle of a cubic cell with a tensor, and nothing else. */
function single(shieldingPpm: Mat3, undefinedAxes: readonly number[] = []): CrystalDossier {
  return madeDossier({
    rows: [8, 0, 0, 0, 8, 0, 0, 0, 8],
    sites: [{ label: 'P1', element: 'P', position: [0.5, 0.5, 0.5], shieldingPpm, undefinedAxes }],
  });
}

describe('principal axes', () => {
  /** Half the length of the rod along each Cartesian axis, its radius and how many pieces it has. */
  const rodsOf = ({ cylinders }: Scene) =>
    [0, 1, 2].map((axis) => {
      const along = Array.from({ length: cylinders.count }, (_, i) => i).filter((i) => {
        const way = subtract(three(cylinders.ends, i), three(cylinders.starts, i));
        return Math.abs(way[axis]!) > 0.99 * length(way);
      });
      const ends = along.flatMap((i) => [three(cylinders.starts, i)[axis]!, three(cylinders.ends, i)[axis]!]);
      return {
        pieces: along.length,
        half: along.length === 0 ? 0 : (Math.max(...ends) - Math.min(...ends)) / 2,
        radius: along.length === 0 ? 0 : cylinders.radii[along[0]!]!,
      };
    });

  it('are rods as long as the deviations, thicker by order, dashed where negative', () => {
    const scene = buildScene(single([120, 0, 0, 0, 150, 0, 0, 0, 240]), {
      glyph: 'axes',
      unitsPerAngstrom: 100,
    });
    const [x, y, z] = rodsOf(scene);
    // isotropic 170
    expect(z).toMatchObject({ pieces: 1 });
    expect(z!.half).toBeCloseTo(0.7, 5);
    expect(x!.pieces).toBeGreaterThan(1);
    expect(x!.half).toBeCloseTo(0.5, 5);
    expect(y!.half).toBeCloseTo(0.2, 5);
    expect(x!.radius).toBeLessThan(y!.radius);
    expect(y!.radius).toBeLessThan(z!.radius);
    expect(scene.caption).toContain('dashed where negative');
    expect(scene.caption).toContain('deviations from the isotropic value, 1 Å = 100 ppm');
  });

  it('are at least twice as thick as the bonds and hydrogen bonds beside them', () => {
    const scene = buildScene(madeQuartz(), { glyph: 'axes' });
    const radii = (kind: 'atom' | 'bond') =>
      [...scene.cylinders.pickIds.keys()]
        .filter((i) => scene.picks[scene.cylinders.pickIds[i]! - 1]!.kind === kind)
        .map((i) => scene.cylinders.radii[i]!);
    expect(radii('bond').length).toBeGreaterThan(0);
    expect(Math.min(...radii('atom'))).toBeGreaterThanOrEqual(2 * Math.max(...radii('bond')));
  });

  it('of totals are as long as the principal values', () => {
    const options = { glyph: 'axes', ellipsoid: 'total', unitsPerAngstrom: 200 } as const;
    const rods = rodsOf(buildScene(single([120, 0, 0, 0, 150, 0, 0, 0, 240]), options));
    expect(rods.map(({ half }) => half)).toEqual([0.6, 0.75, 1.2].map((half) => expect.closeTo(half, 5)));
    expect(rods.map(({ pieces }) => pieces)).toEqual([1, 1, 1]);
  });

  it('that are undefined are not drawn, and the caption says so', () => {
    const scene = buildScene(single([100, 0, 0, 0, 100, 0, 0, 0, 160], [0, 1]), { glyph: 'axes' });
    expect(rodsOf(scene).map(({ pieces }) => Math.min(1, pieces))).toEqual([0, 0, 1]);
    expect(scene.caption).toContain('Axes of equal principal values are undefined and not drawn.');
  });

  it('draw no more pieces of dashes for many atoms than the renderers take', () => {
    const one = single([120, 0, 0, 0, 130, 0, 0, 0, 240]);
    const [site] = one.sites;
    const sites = Array.from({ length: 3500 }, (_, index) => ({
      ...site!,
      index,
      equivalents: [{ ...site!.equivalents[0]!, siteIndex: index, id: `${index}:0` }],
    }));
    const { cylinders } = buildScene({ ...one, sites, atomsInCell: 3500 }, { glyph: 'axes' });
    // one solid rod, two dashed ones of at most three pieces
    expect(cylinders.count).toBeLessThanOrEqual(3500 * 7);
  });
});

describe('antisymmetric part', () => {
  /** σ = S + A with the axial vector (3, −4, 12): A·x = −a × x. */
  const a: Vec3 = [3, -4, 12];
  const skew: Mat3 = [100, a[2], -a[1], -a[2], 110, a[0], a[1], -a[0], 150];

  function crystal(): CrystalDossier {
    const made = madeDossier({
      rows: [8, 0, 0, 0, 8, 0, 0, 0, 8],
      sites: [
        {
          label: 'P1',
          element: 'P',
          position: [0.1, 0.2, 0.3],
          operations: [
            { w: [1, 0, 0, 0, 1, 0, 0, 0, 1], t: [0, 0, 0] },
            { w: [-1, 0, 0, 0, -1, 0, 0, 0, -1], t: [0, 0, 0] },
            { w: [-1, 0, 0, 0, -1, 0, 0, 0, 1], t: [0, 0, 0] },
            { w: [1, 0, 0, 0, 1, 0, 0, 0, -1], t: [0, 0, 0] },
          ],
          shieldingPpm: skew,
        },
      ],
    });
    return made;
  }

  it('is one arrow of half length |a| along A’s own axial vector, which narrows to its end', () => {
    const dossier = crystal();
    const scene = buildScene(dossier, { part: 'antisymmetric', unitsPerAngstrom: 20, bonds: false });
    const { cylinders } = scene;
    expect(scene.polars).toBeUndefined();
    expect(scene.quadrics.count).toBe(4);
    for (const pickId of [1, 2, 3, 4]) {
      // the axial vector of the turned tensor itself, not of a formula for axial vectors
      const t = tensorAt(dossier, atomOf(scene, pickId), skew);
      const own = normalize([(t[5] - t[7]) / 2, (t[6] - t[2]) / 2, (t[1] - t[3]) / 2]);
      const pieces = [...cylinders.pickIds.keys()].filter((i) => cylinders.pickIds[i] === pickId);
      const centre = three(scene.quadrics.centres, pickId - 1);
      const ends = pieces.map((i) => subtract(three(cylinders.ends, i), centre));
      const starts = pieces.map((i) => subtract(three(cylinders.starts, i), centre));
      for (const p of [...starts, ...ends]) expect(length(cross(p, own))).toBeLessThan(1e-5);
      const places = (list: readonly Vec3[]) => list.map((p) => dot(p, own));
      expect(Math.min(...places(starts))).toBeCloseTo(-13 / 20, 5);
      expect(Math.max(...places(ends))).toBeCloseTo(13 / 20, 5);
      // pieces follow one another without gaps; the widest is where the head begins, the narrowest at its end
      const order = pieces.map((_, k) => k).sort((p, q) => places(ends)[p]! - places(ends)[q]!);
      order.slice(1).forEach((k, n) => expect(places(starts)[k]).toBeCloseTo(places(ends)[order[n]!]!, 5));
      const radii = order.map((k) => cylinders.radii[pieces[k]!]!);
      expect(radii[1]).toBeGreaterThan(2 * radii[0]!);
      radii.slice(2).forEach((radius, k) => expect(radius).toBeLessThan(radii[k + 1]!));
    }
    scene.quadrics.ringRadii!.forEach((radius) => expect(radius).toBeCloseTo(13 / 20, 6));
    expect(scene.scaleStatement).toBe('1 Å = 20 ppm of the axial vector');
    expect(scene.caption).toContain('antisymmetric part');
    expect(scene.caption).toContain('right-handed about the arrow');
  });

  it('turns the field in the drawn sense: −A·B is a × B', () => {
    const field: Vec3 = [0.3, -1, 0.4];
    const antisymmetric = asMat3(skew.map((value, k) => (value - transpose(skew)[k]!) / 2));
    const change = scale(-1, apply(antisymmetric, field));
    cross(a, field).forEach((value, k) => expect(change[k]).toBeCloseTo(value, 9));
    expect(determinant(skew)).not.toBe(0);
  });

  it('of symmetric tensors is none: they are drawn as they are, and that is said', () => {
    const scene = buildScene(madeQuartz(), { part: 'antisymmetric' });
    expect(scene.caption).toContain('no antisymmetric part');
    expect(scene.caption).toContain('Shielding ellipsoids');
  });
});

describe('which atoms carry tensors', () => {
  const withTensor = (scene: Scene) =>
    [...scene.quadrics.circles.keys()]
      .filter((i) => scene.quadrics.circles[i] !== 0)
      .map((i) => atomOf(scene, i + 1));

  it('one of each site', () => {
    const atoms = withTensor(buildScene(madeQuartz(), { tensorCopies: 'first' }));
    expect(atoms.map(({ siteIndex }) => siteIndex)).toEqual([0, 1]);
  });

  it('one of each orientation: three of Si on its axis, six of O', () => {
    const scene = buildScene(madeQuartz(), { tensorCopies: 'orientations' });
    const counts = [0, 1].map(
      (site) => withTensor(scene).filter(({ siteIndex }) => siteIndex === site).length,
    );
    expect(counts).toEqual([3, 6]);
    expect(scene.caption).toContain('one tensor is drawn for every orientation');
  });

  it('of chosen sites only, and the others keep the colour of their element', () => {
    const scene = buildScene(madeQuartz(), { tensorSites: [1] });
    expect(new Set(withTensor(scene).map(({ siteIndex }) => siteIndex))).toEqual(new Set([1]));
    expect(scene.elements.map(({ element }) => element)).toEqual(['Si']);
    expect(scene.caption).toContain('ellipsoids of O1:');
  });

  it('no total ellipsoid where a principal value is negative, but a total polar surface', () => {
    const dossier = single([-50, 0, 0, 0, 20, 0, 0, 0, 120]);
    const refused = buildScene(dossier, { ellipsoid: 'total', glyph: 'ellipsoid' });
    expect(refused.scale!.kind).toBe('deviation');
    expect(refused.caption).toContain('not positive');
    const polar = buildScene(dossier, { ellipsoid: 'total', glyph: 'polar' });
    expect(polar.scale).toMatchObject({ kind: 'total', glyph: 'polar' });
    expect(add([0, 0, 0], three(polar.polars!.tensors, 0))[0]).toBeLessThan(0);
  });
});
