import { describe, expect, it } from 'vitest';
import { symmetricEigen } from '#src/base/symmetric-eigen.ts';
import { length, subtract } from '#src/base/vector3.ts';
import type { Vec3 } from '#src/base/matrix3.ts';
import { buildScene } from '#src/scene/build-scene.ts';
import type { PolarBatch, Scene } from '#src/scene/scene.ts';
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
    expect(subject({ quantity: 'efg' })).toBe('electric field gradients V/a.u.');
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

  it('are none where all is drawn as asked', () => {
    expect(unfollowed({})).toBe('');
    expect(unfollowed({ quantity: 'efg', colourBy: 'element' })).toBe('');
    expect(unfollowed({ glyph: 'axes', ellipsoid: 'total', colourBy: 'span' })).toBe('');
    expect(unfollowed({ showTensors: false, colourBy: 'difference' })).toBe('');
  });
});
