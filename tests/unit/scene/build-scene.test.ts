import { describe, expect, it } from 'vitest';
import type { Mat3, Vec3 } from '#src/base/matrix3.ts';
import { asMat3, multiply, transpose } from '#src/base/matrix3.ts';
import { buildScene } from '#src/scene/build-scene.ts';
import { mostAtoms } from '#src/scene/drawn-atoms.ts';
import { defaultSceneOptions } from '#src/scene/scene-options.ts';
import { chooseTensors, ellipsoidColour } from '#src/scene/tensor-choice.ts';
import type { PickEntry, Scene } from '#src/scene/scene.ts';
import { madeDossier } from '#tests/support/made-dossier.ts';
import { madeQuartz } from '#tests/support/made-quartz.ts';
import { madeUrea } from '#tests/support/made-urea.ts';

type AtomPick = Extract<PickEntry, { kind: 'atom' }>;

function atomsOf(scene: Scene): { pick: AtomPick; centre: Vec3; shape: Mat3; circles: number }[] {
  return scene.picks.flatMap((pick, i) =>
    pick.kind === 'atom'
      ? [
          {
            pick,
            centre: [...scene.quadrics.centres.subarray(3 * i, 3 * i + 3)] as unknown as Vec3,
            shape: asMat3(scene.quadrics.shapes.subarray(9 * i, 9 * i + 9)),
            circles: scene.quadrics.circles[i]!,
          },
        ]
      : [],
  );
}

const cube: Mat3 = [4, 0, 0, 0, 5, 0, 0, 0, 6];

describe('atoms of the unit cell', () => {
  it.each([
    ['inside', [0.5, 0.5, 0.5], 1],
    ['on a face', [0, 0.5, 0.5], 2],
    ['on an edge', [0, 0, 0.5], 4],
    ['on a corner', [0, 0, 0], 8],
    ['just under a far face', [0.4, 0.999, 0.5], 2],
  ] as const)('%s', (_name, position, copies) => {
    const dossier = madeDossier({ rows: cube, sites: [{ label: 'Si1', element: 'Si', position }] });
    const atoms = atomsOf(buildScene(dossier));
    expect(atoms).toHaveLength(copies);
    const places = new Set(atoms.map(({ centre }) => centre.join()));
    expect(places.size).toBe(copies);
    for (const { centre } of atoms) {
      expect(Math.min(...centre)).toBeGreaterThan(-0.01);
      [4, 5, 6].forEach((edge, k) => expect(centre[k]).toBeLessThan(edge + 0.01));
    }
  });

  it('draws twelve cell edges whose summed length is four times a + b + c', () => {
    const { lines, axes } = buildScene(madeDossier({ rows: cube, sites: [] }));
    let sum = 0;
    for (let i = 0; i < lines.count; i++) {
      sum += Math.hypot(...[0, 1, 2].map((k) => lines.ends[3 * i + k]! - lines.starts[3 * i + k]!));
    }
    expect(lines.count).toBe(12);
    expect(sum).toBeCloseTo(4 * (4 + 5 + 6), 5);
    expect(axes.map(({ letter }) => letter)).toEqual(['a', 'b', 'c']);
  });

  it('completes every coordination: each silicon of the cell ends up with four bonds', () => {
    const scene = buildScene(madeQuartz());
    const own = atomsOf(scene).filter(({ pick }) => !pick.context && pick.siteIndex === 0);
    expect(own.length).toBeGreaterThanOrEqual(3);
    for (const { centre } of own) {
      const touching = [scene.cylinders.starts, scene.cylinders.ends].flatMap((points) =>
        Array.from({ length: scene.cylinders.count }, (_, i) =>
          Math.hypot(...centre.map((x, k) => x - points[3 * i + k]!)),
        ).filter((distance) => distance < 1e-3),
      );
      expect(touching).toHaveLength(4);
    }
  });
});

describe('whole molecules', () => {
  it('keeps every bond between two drawn atoms and repeats none', () => {
    const dossier = madeUrea();
    const scene = buildScene(dossier);
    expect(scene.extent).toBe('molecules');
    expect(atomsOf(scene)).toHaveLength(16);
    const bonds = dossier.bonds.filter(({ kind }) => kind === 'bond');
    // 7 covalent bonds a molecule of urea, two molecules a cell
    expect(bonds).toHaveLength(14);
    expect(scene.picks.filter((pick) => pick.kind === 'bond' && pick.bond === 'bond')).toHaveLength(14);
  });

  it('draws hydrogen bonds as dashes that leave gaps', () => {
    const scene = buildScene(madeUrea(), { bonds: false });
    expect(scene.cylinders.count).toBeGreaterThan(3);
    let dashes = 0;
    for (let i = 0; i < scene.cylinders.count; i++) {
      dashes += Math.hypot(
        ...[0, 1, 2].map((k) => scene.cylinders.ends[3 * i + k]! - scene.cylinders.starts[3 * i + k]!),
      );
    }
    const lengths = scene.picks.reduce(
      (sum, pick) => sum + (pick.kind === 'bond' ? pick.lengthAngstrom : 0),
      0,
    );
    expect(dashes).toBeGreaterThan(0.35 * lengths);
    expect(dashes).toBeLessThan(0.6 * lengths);
  });
});

/** A Aᵀ of a quadric against a matrix given row by row, to single precision. */
function expectSquared(shape: Mat3, expected: Mat3): void {
  const square = multiply(shape, transpose(shape));
  const size = Math.max(...expected.map(Math.abs));
  square.forEach((value, k) => expect(Math.abs(value - expected[k]!)).toBeLessThan(2e-6 * size));
}

describe('tensor ellipsoids', () => {
  it('total: A Aᵀ = (R S Rᵀ / units)² on every equivalent atom', () => {
    const dossier = madeQuartz();
    const scene = buildScene(dossier, { ellipsoid: 'total', unitsPerAngstrom: 500 });
    let seen = 0;
    for (const { pick, shape } of atomsOf(scene).filter((atom) => !atom.pick.context)) {
      const site = dossier.sites[pick.siteIndex]!;
      const r = site.equivalents.find(({ id }) => id === pick.atomId)!.rotation;
      const turned = multiply(multiply(r, site.shielding!.symmetric), transpose(r));
      const semi = asMat3(turned.map((value) => value / 500));
      expectSquared(shape, multiply(semi, semi));
      seen += 1;
    }
    expect(seen).toBeGreaterThanOrEqual(9);
  });

  it('deviation: A Aᵀ = (r₀ + (R S Rᵀ − iso)/units)², of one base radius', () => {
    const dossier = madeUrea();
    const scene = buildScene(dossier);
    expect(scene.scale?.kind).toBe('deviation');
    const { baseRadiusAngstrom: r0, unitsPerAngstrom: units } = scene.scale!;
    for (const { pick, shape } of atomsOf(scene)) {
      const site = dossier.sites[pick.siteIndex]!;
      const r = site.equivalents.find(({ id }) => id === pick.atomId)!.rotation;
      const turned = multiply(multiply(r, site.shielding!.symmetric), transpose(r));
      const semi = asMat3(
        turned.map((value, k) =>
          k % 4 === 0 ? r0 + (value - site.shielding!.isotropic) / units : value / units,
        ),
      );
      expectSquared(shape, multiply(semi, semi));
    }
  });

  it('offers no total where a principal value is negative, and says why', () => {
    const scene = buildScene(madeUrea(), { ellipsoid: 'total' });
    expect(scene.scale?.kind).toBe('deviation');
    expect(scene.caption).toContain('not positive');
  });

  it('marks only circles perpendicular to defined axes', () => {
    const axial: Mat3 = [100, 0, 0, 0, 100, 0, 0, 0, 160];
    const of = (undefinedAxes: number[]) => {
      const site = {
        label: 'O1',
        element: 'O',
        position: [0.5, 0.5, 0.5] as Vec3,
        shieldingPpm: axial,
        undefinedAxes,
      };
      return atomsOf(buildScene(madeDossier({ rows: cube, sites: [site] })))[0]!;
    };
    expect(of([]).circles).toBe(0b111);
    expect(of([0, 1]).circles).toBe(0b100);
    expect(of([0, 1, 2]).circles).toBe(0);
    // the shape with two undefined axes is still the ellipsoid of revolution about z
    const { shape } = of([0, 1]);
    const square = multiply(shape, transpose(shape));
    expect(square[0]).toBeCloseTo(square[4], 5);
    expect(square[8] / square[0]).toBeCloseTo(1.6 ** 2, 4);
  });

  it('leaves neighbours apart: half axes of a bonded pair stay below their distance', () => {
    for (const made of [madeQuartz(), madeUrea()]) {
      const scene = buildScene(made);
      const longest = new Map(
        atomsOf(scene).map(({ pick, shape }) => [
          pick.atomId + pick.context,
          Math.max(...[0, 1, 2].map((k) => Math.hypot(shape[k]!, shape[k + 3]!, shape[k + 6]!))),
        ]),
      );
      for (const bond of made.bonds) {
        const sum = longest.get(`${bond.from}false`)! + longest.get(`${bond.to}false`)!;
        expect(sum).toBeLessThan(bond.lengthAngstrom);
      }
    }
  });
});

/** Largest difference of two channels: 0 for a pure grey. */
const chroma = (colour: ArrayLike<number>): number => {
  const [r, g, b] = [colour[0]!, colour[1]!, colour[2]!];
  return Math.max(r, g, b) - Math.min(r, g, b);
};

describe('colours that are not values', () => {
  it('are greys wherever tensors are coloured by value', () => {
    const scene = buildScene(madeQuartz());
    const { quadrics, cylinders, picks } = scene;
    let contexts = 0;
    for (let i = 0; i < quadrics.count; i++) {
      const pick = picks[quadrics.pickIds[i]! - 1]!;
      if (pick.kind !== 'atom' || !pick.context) continue;
      contexts += 1;
      expect(chroma(quadrics.colours.subarray(3 * i, 3 * i + 3))).toBeLessThan(20);
    }
    expect(contexts).toBeGreaterThan(0);
    for (let i = 0; i < cylinders.count; i++) {
      expect(chroma(cylinders.startColours.subarray(3 * i, 3 * i + 3))).toBeLessThan(20);
    }
    expect(scene.elements).toEqual([]);
  });

  it('have a key of just the elements that are drawn in their own colour', () => {
    const scene = buildScene(madeQuartz(), { tensorElements: ['O'] });
    expect(scene.elements.map(({ element }) => element)).toEqual(['Si']);
    const silicon = atomsOf(scene).findIndex(({ pick }) => pick.siteIndex === 0 && !pick.context);
    expect([...scene.quadrics.colours.subarray(3 * silicon, 3 * silicon + 3)]).toEqual([
      ...scene.elements[0]!.colour,
    ]);
  });

  it('give the swatch of a site the colour of its ellipsoids', () => {
    const dossier = madeQuartz();
    const scene = buildScene(dossier);
    const chosen = chooseTensors(dossier, defaultSceneOptions);
    for (let i = 0; i < scene.quadrics.count; i++) {
      const pick = scene.picks[scene.quadrics.pickIds[i]! - 1]!;
      if (pick.kind !== 'atom' || pick.context) continue;
      const drawn = [...scene.quadrics.colours.subarray(3 * i, 3 * i + 3)];
      expect(ellipsoidColour(chosen, pick.siteIndex)).toEqual(drawn);
    }
  });
});

describe('what was chosen is said', () => {
  it('falls back to a quantity that exists', () => {
    const scene = buildScene(madeUrea(), { quantity: 'efg' });
    expect(scene.scale?.quantity).toBe('shielding');
    expect(scene.caption).toContain('There are no EFG tensors here');
  });

  it('without tensors shows atoms coloured by element', () => {
    const scene = buildScene(madeQuartz(), { showTensors: false });
    expect(scene.legend).toBeNull();
    expect(scene.scaleStatement).toBeNull();
    expect(scene.caption).toMatch(/^Atoms coloured by element\./);
    expect(scene.elements.map(({ element }) => element)).toEqual(['Si', 'O']);
  });

  it('states the scale in caption and statement, and the asked one exactly', () => {
    const scene = buildScene(madeQuartz(), { unitsPerAngstrom: 725 });
    expect(scene.scaleStatement).toBe('1 Å = 725 ppm');
    expect(scene.caption).toContain('semi-axes = principal values of the symmetric part, 1 Å = 725 ppm');
  });

  it('does not turn an ellipsoid inside out for a scale asked for, and says so', () => {
    const scene = buildScene(madeUrea(), { unitsPerAngstrom: 10 });
    const { baseRadiusAngstrom, unitsPerAngstrom } = scene.scale!;
    // largest deviation from the isotropic value: O1, −10 against 87.33 ppm
    expect(unitsPerAngstrom * baseRadiusAngstrom).toBeGreaterThan(262 / 3 + 10);
    expect(scene.caption).toContain('inside out');
  });

  it('keeps tensors to the elements asked for', () => {
    const scene = buildScene(madeQuartz(), { tensorElements: ['O'] });
    const withCircles = atomsOf(scene).filter(({ circles }) => circles !== 0);
    expect(new Set(withCircles.map(({ pick }) => pick.siteIndex))).toEqual(new Set([1]));
    expect(scene.caption).toContain('ellipsoids of O:');
  });

  it('leaves out of deviations what would be spheres beside one giant, unless asked for, and lets the rest be seen', () => {
    const at = (x: number): [number, number, number] => [x, 0.5, 0.5];
    const dossier = madeDossier({
      rows: [10, 0, 0, 0, 8, 0, 0, 0, 8],
      sites: [
        { label: 'O1', element: 'O', position: at(0.1), shieldingPpm: [-280, 0, 0, 0, -215, 0, 0, 0, 277] },
        { label: 'C1', element: 'C', position: at(0.225), shieldingPpm: [-70, 0, 0, 0, -25, 0, 0, 0, 83] },
        { label: 'C2', element: 'C', position: at(0.375), shieldingPpm: [-40, 0, 0, 0, 10, 0, 0, 0, 140] },
        { label: 'H1', element: 'H', position: at(0.485), shieldingPpm: [22, 0, 0, 0, 25, 0, 0, 0, 33] },
      ],
      bondLimits: { 'C-O': 1.3, 'C-C': 1.6, 'C-H': 1.2 },
    });
    const scene = buildScene(dossier);
    expect(scene.tensorElements).toEqual(['O', 'C']);
    expect(scene.caption).toMatch(/Those of H \(up to [\d.]+ ppm\) would look like plain spheres .*beside O/);
    expect(scene.elements.map(({ element }) => element)).toEqual(['H']);
    const axes = (i: number) => {
      const shape = asMat3(scene.quadrics.shapes.subarray(9 * i, 9 * i + 9));
      return [0, 1, 2].map((k) => Math.hypot(shape[k]!, shape[3 + k]!, shape[6 + k]!)).sort((p, q) => p - q);
    };
    const siteAt = (i: number) => (scene.picks[i] as { siteIndex: number }).siteIndex;
    for (let i = 0; i < scene.quadrics.count; i++) {
      const [short, , long] = axes(i) as [number, number, number];
      if (siteAt(i) !== 3) expect(long / short, `site ${siteAt(i)}`).toBeGreaterThan(1.5);
    }
    const all = buildScene(dossier, { tensorElements: null });
    expect(all.tensorElements).toBeNull();
    expect(all.caption).not.toContain('plain spheres at');
  });

  it('draws of field gradients the heavier quadrupolar nuclei where the others would drown them', () => {
    const gradient = (vzz: number): Mat3 => [-vzz / 2, 0, 0, 0, -vzz / 2, 0, 0, 0, vzz];
    const crystal = (ofHydrogen: number) => {
      const made = madeDossier({
        rows: cube,
        sites: [
          { label: 'Al1', element: 'Al', position: [0.2, 0.2, 0.2], efg: gradient(0.1) },
          { label: 'H1', element: 'H', position: [0.6, 0.6, 0.6], efg: gradient(ofHydrogen) },
        ],
      });
      const sites = made.sites.map((site) => ({
        ...site,
        efg: { ...site.efg!, couplingMHz: site.element === 'Al' ? 3.4 : null },
      }));
      return { ...made, sites };
    };
    const drawn = buildScene(crystal(0.7), { glyph: 'ellipsoid' });
    expect(drawn.caption).toContain('EFG ellipsoids of Al:');
    expect(drawn.sizeNotes!.length).toBeGreaterThan(0);
    expect(drawn.elements.map(({ element }) => element)).toEqual(['H']);
    expect(buildScene(crystal(0.5), { glyph: 'ellipsoid' }).caption).toContain('EFG ellipsoids:');
    expect(buildScene(crystal(0.7), { tensorElements: null, glyph: 'ellipsoid' }).caption).toContain(
      'EFG ellipsoids:',
    );
    expect(buildScene(crystal(0.7)).caption).toContain('EFG polar surfaces of Al of the symmetric part');
  });

  it('draws a limited number of atoms of a very large file and states it', () => {
    const one = madeDossier({
      rows: cube,
      sites: [
        { label: 'O1', element: 'O', position: [0.3, 0.3, 0.3], shieldingPpm: [9, 0, 0, 0, 9, 0, 0, 0, 9] },
      ],
    });
    const [site] = one.sites;
    const many = Array.from({ length: mostAtoms + 10 }, (_, index) => ({
      ...site!,
      index,
      equivalents: [{ ...site!.equivalents[0]!, siteIndex: index, id: `${index}:0` }],
    }));
    const scene = buildScene({ ...one, sites: many, atomsInCell: many.length });
    expect(scene.quadrics.count).toBe(mostAtoms);
    expect(scene.caption).toContain('Only the first 60,000 atoms are drawn');
    expect(scene.caption).toContain('there are 60,010');
  });

  it('crosses worker borders', () => {
    const scene = buildScene(madeUrea(), { labels: true });
    expect(structuredClone(scene)).toEqual(scene);
  });
});
