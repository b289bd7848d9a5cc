import type { Vec3 } from '#src/base/matrix3.ts';
import { add, distance, normalize, scale, subtract } from '#src/base/vector3.ts';
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

/** What the dashes of one line have in common. */
type DashLook = Pick<Cylinder, 'radius' | 'startColour' | 'endColour' | 'pickId'>;

/** Dashes of one period (dash and gap, half each) along a line, symmetric about its middle, which is always a dash. */
export function dashesBetween(start: Vec3, end: Vec3, periodAngstrom: number, look: DashLook): Cylinder[] {
  const size = distance(start, end);
  const steps = Math.max(0, Math.floor((size - periodAngstrom) / 2 / periodAngstrom));
  const [dash, count] = [Math.min(periodAngstrom / 2, size), 2 * steps + 1];
  return dashesAbout(start, end, { count, dash, step: periodAngstrom }, look);
}

/** An odd number of dashes with gaps as long as they are, from one end of a line exactly to the other: at least 3. */
export function dashesToTheEnds(
  start: Vec3,
  end: Vec3,
  wanted: { readonly periodAngstrom: number; readonly mostDashes: number },
  look: DashLook,
): Cylinder[] {
  const size = distance(start, end);
  const fitting = 2 * Math.round(size / wanted.periodAngstrom / 2) + 1;
  const count = Math.min(Math.max(3, fitting), wanted.mostDashes);
  const dash = size / (2 * count - 1);
  return dashesAbout(start, end, { count, dash, step: 2 * dash }, look);
}

function dashesAbout(
  start: Vec3,
  end: Vec3,
  { count, dash, step }: { readonly count: number; readonly dash: number; readonly step: number },
  look: DashLook,
): Cylinder[] {
  const along = normalize(subtract(end, start));
  const middle = scale(0.5, add(start, end));
  return Array.from({ length: count }, (_, k) => {
    const at = (offset: number) => add(middle, scale((k - (count - 1) / 2) * step + offset, along));
    return { ...look, start: at(-dash / 2), end: at(dash / 2) };
  });
}
