import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import type { Vec3 } from '#src/base/matrix3.ts';
import { apply } from '#src/base/matrix3.ts';
import { add, distance } from '#src/base/vector3.ts';
import { buildScene } from '#src/scene/build-scene.ts';
import type { PickEntry, Scene } from '#src/scene/scene.ts';
import type { SceneOptions } from '#src/scene/scene-options.ts';
import { madeDossier } from '#tests/support/made-dossier.ts';
import { madeQuartz } from '#tests/support/made-quartz.ts';
import { madeUrea } from '#tests/support/made-urea.ts';

type AtomPick = Extract<PickEntry, { kind: 'atom' }>;

/** Own atoms of a picture with where they stand, Å. */
function ownAtoms(scene: Scene): { readonly pick: AtomPick; readonly at: Vec3 }[] {
  return scene.picks.flatMap((pick, i) =>
    pick.kind === 'atom' && !pick.context
      ? [{ pick, at: [...scene.quadrics.centres.subarray(3 * i, 3 * i + 3)] as unknown as Vec3 }]
      : [],
  );
}

const alone: Partial<SceneOptions> = { bondedNeighbours: false };

describe('a range of cells', () => {
  const step = fc.integer({ min: -12, max: 12 });
  const corner = fc.tuple(step, step, step);

  it('holds every atom between its corners, and no other', () => {
    const dossier = madeQuartz();
    const { a, b, c } = dossier.lattice!.cell;
    // atoms within 0.02 Å of a border, along the cell edge, lie on it
    const borders = [0.02 / a, 0.02 / b, 0.02 / c] as const;
    fc.assert(
      fc.property(corner, corner, (p, q) => {
        const low = p.map((n) => n / 7 + 0.01234) as unknown as Vec3;
        const high = q.map((n) => n / 7 + 0.01234) as unknown as Vec3;
        const scene = buildScene(dossier, { ...alone, extent: 'range', range: [low, high] });
        let expected = 0;
        for (const atom of dossier.sites.flatMap(({ equivalents }) => equivalents)) {
          let copies = 1;
          for (const k of [0, 1, 2] as const) {
            const [from, to] = [Math.min(low[k], high[k]), Math.max(low[k], high[k])];
            const inside = Array.from({ length: 9 }, (_, n) => atom.fractional![k] + n - 4);
            copies *= inside.filter((x) => x >= from - borders[k] && x <= to + borders[k]).length;
          }
          expected += copies;
        }
        expect(ownAtoms(scene)).toHaveLength(expected);
      }),
      { numRuns: 60 },
    );
  });

  it('takes in atoms on its borders: a corner atom of two cells stands 12 times', () => {
    const dossier = madeDossier({
      rows: [4, 0, 0, 0, 5, 0, 0, 0, 6],
      sites: [{ label: 'Si1', element: 'Si', position: [0, 0, 0] }],
    });
    const scene = buildScene(dossier, {
      extent: 'range',
      range: [
        [0, 0, 0],
        [2, 1, 1],
      ],
    });
    expect(ownAtoms(scene)).toHaveLength(12);
    expect(scene.caption).toContain('Cells a 0 to 2, b 0 to 1, c 0 to 1.');
    // edges of the two cells: 4 along a that span both, 6 along b and 6 along c
    expect(scene.lines.count).toBe(16);
  });

  it('completes molecules that reach into it, and says so', () => {
    const dossier = madeUrea();
    const range = [
      [0, 0, 0],
      [0.9, 0.9, 0.9],
    ] as const;
    const scene = buildScene(dossier, { extent: 'range', range });
    const atoms = ownAtoms(scene);
    const near = (at: Vec3) => atoms.some((other) => distance(other.at, at) < 1e-3);
    const cartesian = new Map(
      dossier.sites.flatMap(({ equivalents }) => equivalents.map((atom) => [atom.id, atom.cartesian])),
    );
    for (const { pick } of atoms) {
      for (const { from, to, shift, kind } of dossier.bonds) {
        if (kind !== 'bond' || from !== pick.atomId) continue;
        const cell = apply(dossier.lattice!.toCartesian, add(pick.cellShift, shift));
        expect(near(add(cartesian.get(to)!, cell))).toBe(true);
      }
    }
    // whole molecules of eight atoms
    expect(atoms.length % 8).toBe(0);
    expect(scene.caption).toContain('molecules that reach into it drawn whole');
    expect(ownAtoms(buildScene(dossier, { ...alone, extent: 'range', range })).length).toBeLessThan(
      atoms.length,
    );
  });

  it('too large for the picture shows its middle', () => {
    const range = [
      [-40, -40, -40],
      [40, 40, 40],
    ] as const;
    const scene = buildScene(madeQuartz(), { ...alone, extent: 'range', range, bonds: false });
    expect(scene.quadrics.count).toBeLessThan(70_000);
    expect(scene.quadrics.count).toBeGreaterThan(50_000);
    expect(scene.caption).toContain('its middle is shown');
    for (const x of scene.bounds.centre) expect(Math.abs(x)).toBeLessThan(3);
  });
});

describe('the asymmetric unit', () => {
  it('is one atom a site, moved together where bonded', () => {
    const dossier = madeUrea();
    const scene = buildScene(dossier, { extent: 'asymmetric' });
    const atoms = ownAtoms(scene);
    expect(atoms.map(({ pick }) => pick.siteIndex)).toEqual(dossier.sites.map(({ index }) => index));
    const place = new Map(atoms.map(({ pick, at }) => [pick.atomId, at]));
    let bonded = 0;
    for (const { from, to, lengthAngstrom, kind } of dossier.bonds) {
      const [one, other] = [place.get(from), place.get(to)];
      if (kind !== 'bond' || !one || !other) continue;
      bonded += 1;
      expect(distance(one, other)).toBeCloseTo(lengthAngstrom, 4);
    }
    expect(bonded).toBeGreaterThan(0);
    expect(scene.caption).toContain('The first atom of each site.');
  });

  it('of a pair cut by a face stands together', () => {
    const dossier = madeDossier({
      rows: [6, 0, 0, 0, 6, 0, 0, 0, 6],
      sites: [
        { label: 'C1', element: 'C', position: [0.95, 0.5, 0.5] },
        { label: 'O1', element: 'O', position: [0.15, 0.5, 0.5] },
      ],
      bondLimits: { 'C-O': 1.3 },
    });
    const [carbon, oxygen] = ownAtoms(buildScene(dossier, { extent: 'asymmetric' }));
    expect(distance(carbon!.at, oxygen!.at)).toBeCloseTo(1.2, 5);
  });
});

describe('a shell', () => {
  const dossier = madeQuartz();
  const centre = dossier.sites[0]!.equivalents[0]!.cartesian;

  it.each([1.7, 3.2, 5.5])('holds all atoms within %f Å, by counting over many cells', (radiusAngstrom) => {
    const shell = { siteIndices: [0], radiusAngstrom };
    const atoms = ownAtoms(buildScene(dossier, { extent: 'shell', shell }));
    let expected = 0;
    const cells = Array.from({ length: 9 }, (_, n) => n - 4);
    for (const { cartesian } of dossier.sites.flatMap(({ equivalents }) => equivalents)) {
      for (const i of cells)
        for (const j of cells)
          for (const k of cells) {
            const at = add(cartesian, apply(dossier.lattice!.toCartesian, [i, j, k]));
            if (distance(at, centre) <= radiusAngstrom) expected += 1;
          }
    }
    expect(atoms).toHaveLength(expected);
    expect(atoms[0]!.pick.siteIndex).toBe(0);
  });

  it('of radius 0 is the bonded coordination: SiO₄', () => {
    const shell = { siteIndices: [0], radiusAngstrom: 0 };
    const scene = buildScene(dossier, { extent: 'shell', shell });
    expect(ownAtoms(scene).map(({ pick }) => pick.siteIndex)).toEqual([0, 1, 1, 1, 1]);
    expect(scene.cylinders.count).toBe(4);
    expect(scene.caption).toContain('The surroundings of Si1.');
  });

  it('of no site at all falls back to the usual picture', () => {
    expect(buildScene(dossier, { extent: 'shell' }).extent).toBe('cell');
    expect(
      buildScene(dossier, { extent: 'shell', shell: { siteIndices: [99], radiusAngstrom: 3 } }).extent,
    ).toBe('cell');
  });
});
