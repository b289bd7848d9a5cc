import type { Vec3 } from '#src/base/matrix3.ts';
import { add, cross, dot, length, normalize, scale, subtract } from '#src/base/vector3.ts';
import type { MeasuredValue } from './measure.ts';
import type { MeasurementKind } from './measurement.ts';

/** An annotation as lines in space, Å: straight ones between atoms, an arc, and where its text stands. */
export interface MeasureDrawing {
  readonly lines: readonly (readonly Vec3[])[];
  readonly arc: readonly Vec3[] | null;
  readonly textAt: Vec3 | null;
}

/** Points of an arc for each 180°. */
const arcPoints = 32;
/** Share of the shorter leg at which an angle's arc stands, and its largest radius, Å. */
const arcShare = 0.35;
const largestArcAngstrom = 0.9;
/** Half length of the line that stands for an axis, Å. */
const axisAngstrom = 1.6;

/** How a measured value is drawn; null without enough points. */
export function measureDrawing(kind: MeasurementKind, measured: MeasuredValue): MeasureDrawing | null {
  const [a, b, c, d] = measured.points;
  if (kind === 'axes') return axesDrawing(measured);
  if (!a || !b) return null;
  if (kind === 'distance') return { lines: [[a, b]], arc: null, textAt: scale(0.5, add(a, b)) };
  if (!c) return null;
  if (kind === 'angle') {
    const [u, v] = [subtract(a, b), subtract(c, b)];
    const arc = arcBetween(b, u, v, Math.min(length(u), length(v)));
    return { lines: [[a, b, c]], arc, textAt: middleOf(arc) ?? b };
  }
  if (!d) return null;
  const axis = normalize(subtract(c, b));
  const aside = (v: Vec3): Vec3 => subtract(v, scale(dot(v, axis), axis));
  const [u, v] = [aside(subtract(a, b)), aside(subtract(d, c))];
  const middle = scale(0.5, add(b, c));
  const arc = arcBetween(middle, u, v, Math.min(length(u), length(v)) * 1.4);
  return { lines: [[a, b, c, d]], arc, textAt: middleOf(arc) ?? middle };
}

/** Two axes through their atoms; the arc between them where both pass through one point. */
function axesDrawing({ points, directions }: MeasuredValue): MeasureDrawing | null {
  const [first, second = first] = points;
  const [u, v] = directions;
  if (!first || !second) return null;
  const line = (at: Vec3, along: Vec3): readonly Vec3[] => [
    subtract(at, scale(axisAngstrom, along)),
    add(at, scale(axisAngstrom, along)),
  ];
  const lines = [...(u ? [line(first, u)] : []), ...(v ? [line(second, v)] : [])];
  const isApart = length(subtract(second, first)) > 1e-6;
  if (!u || !v || isApart) return { lines, arc: null, textAt: scale(0.5, add(first, second)) };
  const arc = arcBetween(first, u, dot(u, v) < 0 ? scale(-1, v) : v, axisAngstrom);
  return { lines, arc, textAt: middleOf(arc) ?? first };
}

/** The arc about a point from one direction to another, in their plane; null where that is none. */
function arcBetween(centre: Vec3, from: Vec3, to: Vec3, leg: number): readonly Vec3[] | null {
  const u = normalize(from);
  const normal = cross(u, to);
  if (length(normal) < 1e-6 * length(to)) return null;
  const v = cross(normalize(normal), u);
  const angle = Math.atan2(dot(to, v), dot(to, u));
  const radius = Math.min(largestArcAngstrom, arcShare * leg);
  const count = Math.max(2, Math.ceil((arcPoints * angle) / Math.PI));
  return Array.from({ length: count + 1 }, (_, k) => {
    const at = (angle * k) / count;
    return add(centre, add(scale(radius * Math.cos(at), u), scale(radius * Math.sin(at), v)));
  });
}

function middleOf(arc: readonly Vec3[] | null): Vec3 | null {
  return arc?.[Math.floor(arc.length / 2)] ?? null;
}
