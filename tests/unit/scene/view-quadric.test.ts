import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import type { Mat3, Vec3 } from '#src/base/matrix3.ts';
import { apply, determinant, inverse, multiply, transpose } from '#src/base/matrix3.ts';
import {
  bodyRotation,
  circleDistance,
  outlineDistance,
  surfaceDepth,
  surfaceNormal,
  unitPoint,
  viewQuadric,
} from '#src/scene/view-quadric.ts';

const number = fc.double({ min: -3, max: 3, noNaN: true });
const shape = fc
  .tuple(number, number, number, number, number, number, number, number, number)
  .filter((m) => Math.abs(determinant(m)) > 0.2);
/** A point well inside the unit disc. */
const disc = fc
  .tuple(fc.double({ min: 0, max: 0.95, noNaN: true }), fc.double({ min: 0, max: 7, noNaN: true }))
  .map(([r, a]) => [r * Math.cos(a), r * Math.sin(a)] as const);

/** Implicit form of the ellipsoid with axes in the columns of m: xᵀ(M Mᵀ)⁻¹x. */
function implicit(m: Mat3, x: Vec3): number {
  const y = apply(inverse(m), x);
  return y[0] * y[0] + y[1] * y[1] + y[2] * y[2];
}

function offset(q: ReturnType<typeof viewQuadric>, e: readonly [number, number]): [number, number] {
  return [q.l11 * e[0], q.l21 * e[0] + q.l22 * e[1]];
}

describe('view quadric', () => {
  it('every visible point lies on the ellipsoid, on the side of the viewer', () => {
    fc.assert(
      fc.property(shape, disc, (m, e) => {
        const q = viewQuadric(m);
        const [dx, dy] = offset(q, e);
        const unit = unitPoint(q, dx, dy)!;
        const z = surfaceDepth(q, unit);
        expect(implicit(m, [dx, dy, z])).toBeCloseTo(1, 6);
        expect(implicit(m, [dx, dy, z + 1e-3])).toBeGreaterThan(1);
      }),
    );
  });

  it('agrees with Σ = M Mᵀ: outline K = Σxy⁻¹, g = K Σxy,z, w² = Σzz − g·Σxy,z', () => {
    fc.assert(
      fc.property(shape, disc, (m, e) => {
        const q = viewQuadric(m);
        const s = multiply(m, transpose(m));
        const d = s[0] * s[4] - s[1] * s[1];
        const k = [s[4] / d, -s[1] / d, s[0] / d] as const;
        const g = [k[0] * s[2] + k[1] * s[5], k[1] * s[2] + k[2] * s[5]] as const;
        const w = Math.sqrt(s[8] - g[0] * s[2] - g[1] * s[5]);
        const [x, y] = offset(q, e);
        const height = 1 - (k[0] * x * x + 2 * k[1] * x * y + k[2] * y * y);
        const expected = g[0] * x + g[1] * y + w * Math.sqrt(height);
        expect(surfaceDepth(q, unitPoint(q, x, y)!)).toBeCloseTo(expected, 5);
        expect(Math.hypot(q.l21, q.l22)).toBeCloseTo(Math.sqrt(s[4]), 9);
      }),
    );
  });

  it('its normal is the gradient of the implicit form', () => {
    fc.assert(
      fc.property(shape, disc, (m, e) => {
        const q = viewQuadric(m);
        const [x, y] = offset(q, e);
        const unit = unitPoint(q, x, y)!;
        const point: Vec3 = [x, y, surfaceDepth(q, unit)];
        const n = surfaceNormal(q, unit);
        const gradient = apply(inverse(multiply(m, transpose(m))), point);
        const scale = Math.hypot(...gradient);
        n.forEach((value, k) =>
          expect(Math.abs(value - gradient[k]!)).toBeLessThan(1e-6 * Math.max(1, scale)),
        );
      }),
    );
  });

  it('body coordinates are M⁻¹ of the point, and the body matrix is orthogonal', () => {
    fc.assert(
      fc.property(shape, disc, (m, e) => {
        const q = viewQuadric(m);
        const body = bodyRotation(m, q);
        multiply(body, transpose(body)).forEach((v, k) => expect(v).toBeCloseTo(k % 4 === 0 ? 1 : 0, 6));
        const [x, y] = offset(q, e);
        const unit = unitPoint(q, x, y)!;
        const expected = apply(inverse(m), [x, y, surfaceDepth(q, unit)]);
        apply(body, unit).forEach((v, k) => expect(v).toBeCloseTo(expected[k]!, 6));
      }),
    );
  });
});

describe('distances on screen', () => {
  it('to the outline of a circle are exact', () => {
    const q = viewQuadric([5, 0, 0, 0, 5, 0, 0, 0, 2]);
    expect(outlineDistance(q, 1.4, 0)).toBeCloseTo(2, 12);
    expect(outlineDistance(q, 0, -0.5)).toBeCloseTo(-2.5, 12);
  });

  it('to the outline of an ellipse are right to first order', () => {
    const q = viewQuadric([40, 0, 0, 0, 10, 0, 0, 0, 20]);
    // on the long axis the gradient points along it
    expect(outlineDistance(q, 1.025, 0)).toBeCloseTo(1, 12);
    expect(outlineDistance(q, 0, 1.1)).toBeCloseTo(1, 12);
  });

  it('to a great circle through the middle of a sphere is the distance across it', () => {
    const m: Mat3 = [10, 0, 0, 0, 10, 0, 0, 0, 10];
    const q = viewQuadric(m);
    const body = bodyRotation(m, q);
    const unit = unitPoint(q, 0.4, 3)!;
    expect(circleDistance(body, q, unit, 0)).toBeCloseTo(0.4, 9);
    expect(circleDistance(body, q, unit, 1)).toBeCloseTo(3, 9);
    // the circle perpendicular to the line of sight is the outline itself
    const nearRim = unitPoint(q, 9.9, 0)!;
    expect(circleDistance(body, q, nearRim, 2)).toBeLessThan(0.25);
  });
});
