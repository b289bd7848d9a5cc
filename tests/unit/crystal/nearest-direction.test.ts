import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import type { Vec3 } from '#src/base/matrix3.ts';
import { apply } from '#src/base/matrix3.ts';
import { scale } from '#src/base/vector3.ts';
import { latticeFromCell } from '#src/crystal/lattice.ts';
import { nearestDirection } from '#src/crystal/nearest-direction.ts';

const cubic = latticeFromCell({ a: 4, b: 4, c: 4, alpha: 90, beta: 90, gamma: 90 });
const monoclinic = latticeFromCell({ a: 9.7, b: 8.9, c: 5.3, alpha: 90, beta: 105.9, gamma: 90 });

describe('the lattice direction nearest to a vector', () => {
  it('is the vector’s own where it has small indices, in any sense and length', () => {
    const index = fc.integer({ min: -3, max: 3 });
    fc.assert(
      fc.property(index, index, index, fc.double({ min: 0.1, max: 50, noNaN: true }), (u, v, w, factor) => {
        const along = apply(monoclinic.toCartesian, [u, v, w]);
        const found = nearestDirection(scale(-factor, along), monoclinic);
        if (u === 0 && v === 0 && w === 0) {
          expect(found).toBeNull();
          return;
        }
        expect(found!.degrees).toBeLessThan(1e-9);
        const [a, b, c] = found!.uvw;
        expect([a * v - b * u, b * w - c * v, c * u - a * w].map(Math.abs)).toEqual([0, 0, 0]);
        expect(a || b || c).toBeGreaterThan(0);
      }),
    );
  });

  it('says how far off it is', () => {
    // 5° off c in a cube
    const tilted: Vec3 = [Math.sin(Math.PI / 36), 0, Math.cos(Math.PI / 36)];
    expect(nearestDirection(tilted, cubic)).toMatchObject({ uvw: [0, 0, 1] });
    expect(nearestDirection(tilted, cubic)!.degrees).toBeCloseTo(5, 9);
  });

  it('is measured in space, not in indices: [101] of a monoclinic cell is no bisector', () => {
    const bisector: Vec3 = scale(1, apply(monoclinic.toCartesian, [1 / 9.7, 0, 1 / 5.3]));
    // u a ∥ w c with u·9.7 = w·5.3: nearest whole numbers to 1 : 1.83
    expect(nearestDirection(bisector, monoclinic)!.uvw).toEqual([1, 0, 2]);
  });
});
