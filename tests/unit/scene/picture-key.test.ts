import { describe, expect, it } from 'vitest';
import { symmetricEigen } from '#src/base/symmetric-eigen.ts';
import { length, subtract } from '#src/base/vector3.ts';
import type { Vec3 } from '#src/base/matrix3.ts';
import type { CrystalDossier } from '#src/dossier/dossier.ts';
import { buildScene } from '#src/scene/build-scene.ts';
import type { PolarBatch, Scene } from '#src/scene/scene.ts';
import { madeDossier } from '#tests/support/made-dossier.ts';
import { madeQuartz } from '#tests/support/made-quartz.ts';

const three = (points: Float32Array, i: number): Vec3 =>
  [...points.subarray(3 * i, 3 * i + 3)] as unknown as Vec3;

/** Longest half length of the rods of a scene, Å. */
function longestDrawn({ cylinders }: Scene): number {
  const halves = [...cylinders.radii.keys()].map(
    (i) => length(subtract(three(cylinders.ends, i), three(cylinders.starts, i))) / 2,
  );
  return Math.max(...halves);
}

/** Largest size of a trace among the polar surfaces, Å. */
function largestTrace({ tensors }: PolarBatch): number {
  const traces: number[] = [];
  for (let i = 0; i < tensors.length; i += 6)
    traces.push(Math.abs(tensors[i]! + tensors[i + 1]! + tensors[i + 2]!));
  return Math.max(...traces);
}

const combinations = (['shielding', 'efg'] as const).flatMap((quantity) =>
  (['ellipsoid', 'polar', 'axes'] as const).flatMap((glyph) =>
    (['total', 'deviation'] as const).flatMap((ellipsoid) =>
      (['symmetric', 'antisymmetric'] as const).map((part) => [quantity, glyph, ellipsoid, part] as const),
    ),
  ),
);

describe('words about sizes', () => {
  it.each(combinations)('of %s %s, %s, %s are those of what is drawn, in key and caption', (...wished) => {
    const [quantity, glyph, ellipsoid, part] = wished;
    const scene = buildScene(madeQuartz(), {
      quantity,
      glyph,
      ellipsoid,
      part,
      tensorElements: null,
      bonds: false,
    });
    const words = scene.key!.lengths!;
    expect(scene.caption).toContain(`${words}, ${scene.scaleStatement}`);
    const drawn = scene.scale!;
    expect(words.includes('axial vector')).toBe(drawn.part === 'antisymmetric');
    if (drawn.part === 'antisymmetric') return;
    // only shielding and shift have an isotropic value to take off
    const isDeviation = quantity !== 'efg' && drawn.kind === 'deviation';
    expect(/iso/.test(words)).toBe(isDeviation);
    expect(words.includes('radius = |')).toBe(glyph === 'polar');
    if (glyph === 'polar') expect(words).toContain(quantity === 'efg' ? 'n·V·n' : 'n·σ·n');
    if (glyph === 'axes' && quantity === 'shielding' && !isDeviation) {
      const largest = Math.max(
        ...madeQuartz().sites.flatMap(({ shielding }) => {
          const t = shielding!.tensor;
          const half = (i: number, j: number) => (t[i]! + t[j]!) / 2;
          return symmetricEigen([
            ...([t[0], half(1, 3), half(2, 6), half(1, 3), t[4]] as const),
            ...([half(5, 7), half(2, 6), half(5, 7), t[8]] as const),
          ]).values;
        }),
      );
      expect(longestDrawn(scene)).toBeCloseTo(largest / drawn.unitsPerAngstrom, 4);
    }
    if (glyph === 'polar') {
      // the trace of what is drawn is gone exactly where the words take the isotropic value off
      const isTraceless = largestTrace(scene.polars!) < 1e-4;
      expect(isTraceless).toBe(isDeviation || quantity === 'efg');
    }
  });
});

describe('the key', () => {
  it('tells negative lobes of any colouring by their stripes', () => {
    const lobes = (options: Parameters<typeof buildScene>[1]) => buildScene(madeQuartz(), options).key!.lobes;
    expect(lobes({ quantity: 'efg', glyph: 'polar' })!.positive).not.toBeNull();
    for (const colourBy of ['asymmetry', 'element', 'site'] as const)
      expect(lobes({ quantity: 'efg', glyph: 'polar', colourBy })!.positive).toBeNull();
    expect(lobes({ quantity: 'shielding', glyph: 'polar' })).not.toBeNull();
    expect(lobes({ quantity: 'shielding', glyph: 'ellipsoid' })).toBeNull();
    // every principal value of the made shieldings is positive
    expect(lobes({ quantity: 'shielding', glyph: 'polar', ellipsoid: 'total' })).toBeNull();
  });

  it('names the glyphs where no colour bar of the same quantity does', () => {
    const subject = (options: Parameters<typeof buildScene>[1]) =>
      buildScene(madeQuartz(), options).key!.subject;
    expect(subject({ quantity: 'efg' })).toBe('electric field gradients (atomic units)');
    expect(subject({ quantity: 'efg', colourBy: 'vzz' })).toBeNull();
    expect(subject({ quantity: 'shielding', colourBy: 'element' })).toBe('shielding tensors σ/ppm');
    expect(subject({ quantity: 'shielding', colourBy: 'vzz' })).toBe('shielding tensors σ/ppm');
    expect(subject({ quantity: 'shielding' })).toBeNull();
    expect(subject({ showTensors: false })).toBeNull();
  });

  it('lists the sites in their own colours', () => {
    const { key } = buildScene(madeQuartz(), { colourBy: 'site' });
    expect(key!.sites.map(({ label }) => label)).toEqual(madeQuartz().sites.map(({ label }) => label));
    expect(key!.moreSites).toBe(0);
    expect(buildScene(madeQuartz()).key!.sites).toEqual([]);
  });
});

/** Isotropic 100 ppm and the given largest deviation, on one atom of each element, side by side. */
function unequal(deviations: Readonly<Record<string, number>>): CrystalDossier {
  return madeDossier({
    rows: [12, 0, 0, 0, 12, 0, 0, 0, 12],
    sites: Object.entries(deviations).map(([element, d], k) => ({
      label: `${element}1`,
      element,
      position: [0.2 + 0.3 * k, 0.5, 0.5] as const,
      shieldingPpm: [100 - d / 2, 0, 0, 0, 100 - d / 2, 0, 0, 0, 100 + d] as const,
    })),
  });
}

describe('what one scale hides', () => {
  it('is named with its size, beside the largest', () => {
    const scene = buildScene(unequal({ O: 350, N: 9.64 }));
    expect(scene.tensorElements).toEqual(['O']);
    const [sentence, ...more] = scene.sizeNotes!;
    expect(more).toEqual([]);
    expect(sentence).toContain('N (up to 9.6 ppm)');
    expect(sentence).toContain('O (up to 350 ppm)');
    expect(scene.caption).toContain(sentence);
    // a picture to take away has no panel
    expect(scene.caption).not.toContain('under Show');
    expect(scene.key!.elementsWords).toBe('tensors too small to be seen at this scale');
    expect(scene.elements.map(({ element }) => element)).toEqual(['N']);
  });

  it('is said too where the small ones are drawn because someone asked for them', () => {
    const scene = buildScene(unequal({ O: 350, N: 9.64 }), { tensorElements: null });
    expect(scene.sizeNotes!.join()).toMatch(/N \(up to 9.6 ppm\) are hardly seen/);
    expect(scene.key!.marks).toContain('N: too small to be seen at this scale');
  });

  it('is nothing where all are seen, or drawn alone', () => {
    for (const [deviations, options] of [
      [{ O: 350, N: 90 }, {}],
      [{ O: 350, N: 9.64 }, { tensorElements: ['N'] }],
    ] as const) {
      const scene = buildScene(unequal(deviations), options);
      expect(scene.sizeNotes).toEqual([]);
      expect(scene.caption).not.toContain('under Show');
    }
  });

  it('tells elements without any tensor from those whose tensors are not drawn', () => {
    const words = (options: Parameters<typeof buildScene>[1]) =>
      buildScene(madeQuartz(), options).key!.elementsWords;
    expect(words({ tensorElements: ['O'] })).toBe('tensors not drawn');
    expect(words({ showTensors: false })).toBeNull();
    const bare = madeDossier({
      rows: [8, 0, 0, 0, 8, 0, 0, 0, 8],
      sites: [
        { label: 'O1', element: 'O', position: [0.2, 0.5, 0.5], shieldingPpm: [1, 0, 0, 0, 2, 0, 0, 0, 3] },
        { label: 'H1', element: 'H', position: [0.7, 0.5, 0.5] },
      ],
    });
    expect(buildScene(bare).key!.elementsWords).toBe('without a tensor');
  });
});

describe('wishes that cannot be followed', () => {
  const unfollowed = (options: Parameters<typeof buildScene>[1]) =>
    buildScene(madeQuartz(), options).unfollowed!.join(' ');

  it('are said with what is drawn instead', () => {
    expect(unfollowed({ colourBy: 'difference' })).toMatch(/no difference .* colours say the isotropic/);
    expect(unfollowed({ displacement: 'instead' })).toMatch(/no displacements.*tensors are drawn/);
    expect(unfollowed({ quantity: 'efg', glyph: 'ellipsoid', ellipsoid: 'total' })).toMatch(/no ellipsoid/);
    expect(unfollowed({ quantity: 'efg', ellipsoid: 'deviation' })).toMatch(/no isotropic value/);
    expect(unfollowed({ quantity: 'shift' })).toMatch(/no shift tensors here: shielding/);
  });

  it('include a range cut down to what can be drawn, with the limit and the range that is left', () => {
    // 9 atoms a cell: 40³ cells hold 576,000
    const range = [
      [0, 0, 0],
      [40, 40, 40],
    ] as const;
    const scene = buildScene(madeQuartz(), { extent: 'range', range, bonds: false, showTensors: false });
    const [sentence] = scene.unfollowed!;
    const [, low, high] = /more than the 60,000 atoms .* a ([\d.]+) to ([\d.]+), b/.exec(sentence!)!;
    expect(Number(low) + Number(high)).toBeCloseTo(40, 1);
    const cells = (Number(high) - Number(low)) ** 3;
    expect(9 * cells).toBeLessThan(60_100);
    expect(9 * cells).toBeGreaterThan(50_000);
    expect(scene.caption).toContain('more than the 60,000 atoms');
    // and what was drawn is what is said, but for atoms on the borders and the limit itself
    expect(scene.quadrics.count).toBeLessThanOrEqual(60_000);
    expect(scene.quadrics.count).toBeGreaterThan(50_000);
  });

  it('include a shell round nothing and a range of cells without a cell', () => {
    expect(unfollowed({ extent: 'shell' })).toMatch(/No site is chosen/);
    const molecule = madeDossier({
      rows: null,
      sites: [{ label: 'C1', element: 'C', position: [0, 0, 0] }],
    });
    expect(buildScene(molecule, { extent: 'range' }).unfollowed).toEqual([
      expect.stringContaining('gives no cell'),
    ]);
    expect(buildScene(molecule).unfollowed).toEqual([]);
  });

  it('are none where all is drawn as asked', () => {
    expect(unfollowed({})).toBe('');
    expect(unfollowed({ extent: 'range' })).toBe('');
    expect(unfollowed({ quantity: 'efg', colourBy: 'element' })).toBe('');
    expect(unfollowed({ glyph: 'axes', ellipsoid: 'total', colourBy: 'span' })).toBe('');
    expect(unfollowed({ showTensors: false, colourBy: 'difference' })).toBe('');
  });
});
