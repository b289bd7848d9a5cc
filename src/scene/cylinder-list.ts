import type { Vec3 } from '#src/base/matrix3.ts';
import { add, distance, scale, subtract } from '#src/base/vector3.ts';
import type { CylinderBatch } from './scene.ts';

type Rgb = readonly [number, number, number];

/** One cylinder before it is packed. */
export interface Cylinder {
  readonly start: Vec3;
  readonly end: Vec3;
  readonly radius: number;
  readonly startColour: Rgb;
  readonly endColour: Rgb;
  readonly pickId: number;
}

/** Typed arrays of many cylinders. */
export function packedCylinders(cylinders: readonly Cylinder[]): CylinderBatch {
  const count = cylinders.length;
  const batch = {
    count,
    starts: new Float32Array(3 * count),
    ends: new Float32Array(3 * count),
    radii: new Float32Array(count),
    startColours: new Uint8Array(3 * count),
    endColours: new Uint8Array(3 * count),
    pickIds: new Uint32Array(count),
  };
  cylinders.forEach((cylinder, i) => {
    batch.starts.set(cylinder.start, 3 * i);
    batch.ends.set(cylinder.end, 3 * i);
    batch.radii[i] = cylinder.radius;
    batch.startColours.set(cylinder.startColour, 3 * i);
    batch.endColours.set(cylinder.endColour, 3 * i);
    batch.pickIds[i] = cylinder.pickId;
  });
  return batch;
}

/**
 * Dashes of one period (dash and gap, half each) along a line, symmetric about its middle, which is always a dash; of at most
 * `mostDashes` the period is longer.
 */
export function dashesBetween(
  start: Vec3,
  end: Vec3,
  usualPeriodAngstrom: number,
  look: Pick<Cylinder, 'radius' | 'startColour' | 'endColour' | 'pickId'>,
  mostDashes = Infinity,
): Cylinder[] {
  const size = distance(start, end);
  if (!(size > 0)) return [];
  const periodAngstrom = Math.max(usualPeriodAngstrom, size / (mostDashes + 0.01));
  const along = scale(1 / size, subtract(end, start));
  const middle = scale(0.5, add(start, end));
  const steps = Math.max(0, Math.floor((size - periodAngstrom) / 2 / periodAngstrom));
  const half = Math.min(periodAngstrom / 4, size / 2);
  const made: Cylinder[] = [];
  for (let k = -steps; k <= steps; k++) {
    const at = (offset: number) => add(middle, scale(k * periodAngstrom + offset, along));
    made.push({ ...look, start: at(-half), end: at(half) });
  }
  return made;
}
