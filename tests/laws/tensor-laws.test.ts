import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import type { Mat3, Vec3 } from '#src/base/matrix3.ts';
import {
  apply,
  frobeniusNorm,
  multiply,
  scaleMatrix,
  subtractMatrices,
  trace,
  transpose,
} from '#src/base/matrix3.ts';
import { dot } from '#src/base/vector3.ts';
import { nuclide } from '#src/data/nuclides.ts';
import { tensorDistance } from '#src/tensor/distance.ts';
import { describeEfg, productFromInvariantMHz } from '#src/tensor/efg.ts';
import { symmetricPart } from '#src/tensor/parts.ts';
import {
  equivalentSpread,
  meanTensor,
  projectOnSiteSymmetry,
  rotateTensor,
  turnBack,
} from '#src/tensor/projection.ts';
import { describeShielding } from '#src/tensor/shielding.ts';
import { describeReferencedShift, describeShift, shiftFromShielding } from '#src/tensor/shift.ts';
import {
  anyOrthogonal,
  anyTensor,
  clearValues,
  handedness,
  largestDifference,
  tensorFrom,
  anyRotation,
} from '#tests/support/arbitrary-tensors.ts';
import { pointGroup, pointGroupNames } from '#tests/support/point-groups.ts';

const close = (a: readonly number[], b: readonly number[], limit: number): void => {
  expect(largestDifference(a, b)).toBeLessThan(limit);
};

/** Scalars that must not depend on the frame. */
function scalars(described: ReturnType<typeof describeShielding>): number[] {
  const { isotropic, components, span, skew, reducedAnisotropy, anisotropy, asymmetry } = described;
  return [isotropic, ...components, span, skew!, reducedAnisotropy!, anisotropy!, asymmetry!];
}

/** A tensor clear of degeneracies, with an antisymmetric part. */
const clearTensor = fc.tuple(clearValues, anyRotation, anyTensor).map(([values, rotation, other]): Mat3 => {
  const skewed = subtractMatrices(other, transpose(other));
  return subtractMatrices(tensorFrom(values, rotation), scaleMatrix(0.05, skewed));
});

const anyGroup = fc.constantFrom(...pointGroupNames).map(pointGroup);

describe('laws of the shielding tensor', () => {
  it('its numbers do not depend on the frame; its axes turn with it', () => {
    fc.assert(
      fc.property(clearTensor, anyOrthogonal, (tensor, rotation) => {
        const here = describeShielding(tensor);
        const there = describeShielding(rotateTensor(rotation, tensor));
        close(scalars(there), scalars(here), 1e-9);
        expect(there.antisymmetricNorm).toBeCloseTo(here.antisymmetricNorm, 9);
        here.axes.forEach((axis, i) => {
          expect(Math.abs(dot(apply(rotation, axis!), there.axes[i]!))).toBeCloseTo(1, 9);
        });
      }),
    );
  });

  it('transposing it turns the axial vector round and changes nothing else', () => {
    fc.assert(
      fc.property(clearTensor, (tensor) => {
        const given = describeShielding(tensor);
        const turned = describeShielding(transpose(tensor));
        expect({ ...turned, tensor, axialVector: given.axialVector }).toEqual(given);
        close(
          turned.axialVector,
          given.axialVector.map((component) => -component),
          1e-12,
        );
      }),
    );
  });

  it('scaling it scales ppm quantities and leaves κ, η and the axes', () => {
    fc.assert(
      fc.property(clearTensor, fc.double({ min: 0.1, max: 50, noNaN: true }), (tensor, factor) => {
        const here = describeShielding(tensor);
        const there = describeShielding(scaleMatrix(factor, tensor));
        close(
          there.components,
          here.components.map((value) => value * factor),
          1e-9 * factor,
        );
        expect(there.reducedAnisotropy).toBeCloseTo(here.reducedAnisotropy! * factor, 7);
        close([there.skew!, there.asymmetry!], [here.skew!, here.asymmetry!], 1e-9);
        here.axes.forEach((axis, i) => {
          expect(Math.abs(dot(axis!, there.axes[i]!))).toBeCloseTo(1, 9);
        });
      }),
    );
  });

  it('components are the values n·σ·n along the axes, which form a right-handed triplet', () => {
    fc.assert(
      fc.property(clearTensor, (tensor) => {
        const { axes, components } = describeShielding(tensor);
        const [x, y, z] = axes as [Vec3, Vec3, Vec3];
        close(
          [x, y, z].map((axis) => dot(axis, apply(tensor, axis))),
          components,
          1e-9,
        );
        expect(handedness([x, y, z])).toBeCloseTo(1, 13);
        expect(components[0]).toBeLessThanOrEqual(components[1]);
        expect(components[1]).toBeLessThanOrEqual(components[2]);
      }),
    );
  });

  it('any tensor at all gives κ in [−1, 1], η in [0, 1], Ω ≥ 0, and a reason for every null', () => {
    fc.assert(
      fc.property(anyTensor, fc.double({ min: 0, max: 400, noNaN: true }), (tensor, noise) => {
        const described = describeShielding(tensor, noise);
        expect(described.span).toBeGreaterThanOrEqual(0);
        if (described.skew !== null) expect(Math.abs(described.skew)).toBeLessThanOrEqual(1);
        if (described.asymmetry !== null) expect(described.asymmetry).toBeLessThanOrEqual(1);
        if (described.asymmetry !== null) expect(described.asymmetry).toBeGreaterThanOrEqual(0);
        const missing = (['skew', 'reducedAnisotropy', 'anisotropy', 'asymmetry'] as const).filter(
          (f) => described[f] === null,
        );
        if (described.axes.includes(null)) expect(described.undefinedBecause).toHaveProperty('axes');
        expect(
          Object.keys(described.undefinedBecause)
            .filter((key) => key !== 'axes')
            .sort(),
        ).toEqual([...missing].sort());
      }),
    );
  });
});

describe('laws of the shift', () => {
  const reference = fc.record({
    kind: fc.constantFrom('simple' as const, 'exact' as const, 'regression' as const),
    interceptPpm: fc.double({ min: -500, max: 500, noNaN: true }),
    slope: fc.double({ min: -1.3, max: -0.7, noNaN: true }),
  });

  it('converting components equals describing the converted tensor', () => {
    fc.assert(
      fc.property(clearTensor, reference, (tensor, how) => {
        const byComponents = describeReferencedShift(tensor, how);
        const byTensor = describeShift(shiftFromShielding(tensor, how));
        close(byComponents.components, byTensor.components, 1e-9);
        expect(byComponents.isotropic).toBeCloseTo(byTensor.isotropic, 9);
        byComponents.axes.forEach((axis, i) => {
          expect(Math.abs(dot(axis!, byTensor.axes[i]!))).toBeCloseTo(1, 9);
        });
        expect(byComponents.components[0]).toBeGreaterThanOrEqual(byComponents.components[1]);
        expect(byComponents.components[1]).toBeGreaterThanOrEqual(byComponents.components[2]);
      }),
    );
  });

  it('ζ turns its sign, κ and η stay', () => {
    fc.assert(
      fc.property(clearTensor, reference, (tensor, how) => {
        const shielding = describeShielding(tensor);
        const shift = describeReferencedShift(tensor, how);
        expect(Math.sign(shift.reducedAnisotropy!)).toBe(-Math.sign(shielding.reducedAnisotropy!));
        close([shift.skew!, shift.asymmetry!], [shielding.skew!, shielding.asymmetry!], 1e-9);
      }),
    );
  });

  it('a rising regression keeps δ11 ≥ δ22 ≥ δ33 with axes of their own values', () => {
    fc.assert(
      fc.property(clearTensor, (tensor) => {
        const shift = describeReferencedShift(tensor, { kind: 'regression', interceptPpm: 5, slope: 0.5 });
        shift.axes.forEach((axis, i) => {
          expect(dot(axis!, apply(shift.tensor!, axis!))).toBeCloseTo(shift.components[i]!, 8);
        });
        expect(shift.components[0]).toBeGreaterThanOrEqual(shift.components[2]);
      }),
    );
  });
});

describe('laws of the field gradient', () => {
  it('is ordered, traceless, bounded in η and frame-free', () => {
    fc.assert(
      fc.property(anyTensor, anyOrthogonal, (big, rotation) => {
        const tensor = scaleMatrix(0.002, big);
        const here = describeEfg(tensor, nuclide('27Al'));
        const there = describeEfg(rotateTensor(rotation, tensor), nuclide('27Al'));
        const [x, y, z] = here.components.map(Math.abs) as [number, number, number];
        expect(z).toBeGreaterThanOrEqual(y);
        expect(y).toBeGreaterThanOrEqual(x);
        expect(here.components[0] + here.components[1] + here.components[2]).toBeCloseTo(0, 12);
        expect(here.trace).toBeCloseTo(trace(tensor), 14);
        if (here.signDetermined) close(there.components, here.components, 1e-12);
        expect(Math.abs(there.productMHz!)).toBeCloseTo(Math.abs(here.productMHz!), 9);
        expect(Math.abs(here.productMHz!)).toBeCloseTo(productFromInvariantMHz(0.1466, here.symmetric), 9);
      }),
    );
  });

  it('reversing it reverses C_Q and keeps η', () => {
    fc.assert(
      fc.property(anyTensor, (tensor) => {
        const here = describeEfg(tensor, nuclide('17O'));
        const there = describeEfg(scaleMatrix(-1, tensor), nuclide('17O'));
        if (!here.signDetermined) return;
        expect(there.couplingMHz).toBeCloseTo(-here.couplingMHz!, 7);
        expect(there.asymmetry).toBeCloseTo(here.asymmetry!, 10);
      }),
    );
  });
});

describe('laws of turning and projecting', () => {
  it('(R2 R1) T (R2 R1)ᵀ is R2 (R1 T R1ᵀ) R2ᵀ, and turning back undoes it', () => {
    fc.assert(
      fc.property(anyTensor, anyOrthogonal, anyOrthogonal, (tensor, first, second) => {
        const twice = rotateTensor(second, rotateTensor(first, tensor));
        close(rotateTensor(multiply(second, first), tensor), twice, 1e-9);
        close(turnBack(first, rotateTensor(first, tensor)), tensor, 1e-9);
        expect(frobeniusNorm(twice)).toBeCloseTo(frobeniusNorm(tensor), 9);
      }),
    );
  });

  it('n′·T′·n′ = n·T·n for n′ = R n', () => {
    fc.assert(
      fc.property(anyTensor, anyOrthogonal, anyRotation, (tensor, rotation, frame) => {
        const n: Vec3 = [frame[0], frame[3], frame[6]];
        const turned = apply(rotation, n);
        expect(dot(turned, apply(rotateTensor(rotation, tensor), turned))).toBeCloseTo(
          dot(n, apply(tensor, n)),
          9,
        );
      }),
    );
  });

  it('projection is idempotent, keeps the trace and is orthogonal to its residual', () => {
    fc.assert(
      fc.property(anyTensor, anyGroup, (tensor, group) => {
        const once = projectOnSiteSymmetry(tensor, group);
        const twice = projectOnSiteSymmetry(once.projected, group);
        close(twice.projected, once.projected, 1e-10);
        expect(twice.residual).toBeLessThan(1e-9);
        expect(trace(once.projected)).toBeCloseTo(trace(tensor), 9);
        const pythagoras = frobeniusNorm(once.projected) ** 2 + once.residual ** 2;
        expect(Math.sqrt(pythagoras)).toBeCloseTo(frobeniusNorm(tensor), 9);
      }),
    );
  });

  it('projection commutes with a turn of the whole crystal and with any operation of the group', () => {
    fc.assert(
      fc.property(anyTensor, anyGroup, anyOrthogonal, (tensor, group, turn) => {
        const { projected } = projectOnSiteSymmetry(tensor, group);
        const turnedGroup = group.map((rotation) => multiply(multiply(turn, rotation), transpose(turn)));
        const there = projectOnSiteSymmetry(rotateTensor(turn, tensor), turnedGroup);
        close(there.projected, rotateTensor(turn, projected), 1e-9);
        for (const rotation of group) close(rotateTensor(rotation, projected), projected, 1e-9);
      }),
    );
  });

  it('does not depend on the order of the group', () => {
    fc.assert(
      fc.property(anyTensor, anyGroup, (tensor, group) => {
        const forwards = projectOnSiteSymmetry(tensor, group).projected;
        close(projectOnSiteSymmetry(tensor, [...group].reverse()).projected, forwards, 1e-10);
      }),
    );
  });

  it('copies made by R T Rᵀ have no spread; a disturbed one has its own share', () => {
    fc.assert(
      fc.property(
        anyTensor,
        anyTensor,
        fc.array(anyOrthogonal, { minLength: 2, maxLength: 6 }),
        (tensor, error, turns) => {
          const copies = turns.map((rotation) => rotateTensor(rotation, tensor));
          expect(equivalentSpread(copies, turns)).toBeLessThan(1e-9);
          const disturbed = copies.map((copy, i) =>
            i === 0 ? rotateTensor(turns[0]!, meanTensor([tensor, error])) : copy,
          );
          const expected = (frobeniusNorm(subtractMatrices(error, tensor)) / 2) * (1 - 1 / turns.length);
          expect(equivalentSpread(disturbed, turns)).toBeCloseTo(expected, 8);
        },
      ),
    );
  });

  it('says nothing about a single copy', () => {
    expect(equivalentSpread([[1, 0, 0, 0, 1, 0, 0, 0, 1]], [[1, 0, 0, 0, 1, 0, 0, 0, 1]])).toBeNull();
  });
});

describe('laws of the distance', () => {
  /** The twelve corners of an icosahedron average every polynomial up to degree 5 exactly. */
  const corners: Vec3[] = [-1, 1].flatMap((s) =>
    [-1, 1].flatMap((t): Vec3[] => {
      const golden = (1 + Math.sqrt(5)) / 2;
      const size = Math.hypot(1, golden);
      const [a, b] = [s / size, (t * golden) / size];
      return [
        [0, a, b],
        [a, b, 0],
        [b, 0, a],
      ];
    }),
  );

  it('is the rms difference of line positions over all field directions', () => {
    fc.assert(
      fc.property(anyTensor, anyTensor, (a, b) => {
        const difference = subtractMatrices(a, b);
        const squares = corners.map((n) => dot(n, apply(difference, n)) ** 2);
        const rms = Math.sqrt(squares.reduce((sum, square) => sum + square, 0) / corners.length);
        expect(tensorDistance(a, b)).toBeCloseTo(rms, 9);
      }),
    );
  });

  it('is symmetric, frame-free, blind to antisymmetric parts and obeys the triangle inequality', () => {
    fc.assert(
      fc.property(anyTensor, anyTensor, anyTensor, anyOrthogonal, (a, b, c, turn) => {
        const d = tensorDistance(a, b);
        expect(tensorDistance(b, a)).toBeCloseTo(d, 10);
        expect(tensorDistance(rotateTensor(turn, a), rotateTensor(turn, b))).toBeCloseTo(d, 9);
        expect(tensorDistance(a, symmetricPart(a))).toBeLessThan(1e-10);
        expect(d).toBeLessThanOrEqual(tensorDistance(a, c) + tensorDistance(c, b) + 1e-9);
      }),
    );
  });
});
