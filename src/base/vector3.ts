import type { Vec3 } from './matrix3.ts';

export function add(a: Vec3, b: Vec3): Vec3 {
  return [a[0] + b[0], a[1] + b[1], a[2] + b[2]];
}

export function subtract(a: Vec3, b: Vec3): Vec3 {
  return [a[0] - b[0], a[1] - b[1], a[2] - b[2]];
}

export function scale(factor: number, v: Vec3): Vec3 {
  return [factor * v[0], factor * v[1], factor * v[2]];
}

export function dot(a: Vec3, b: Vec3): number {
  return a[0] * b[0] + a[1] * b[1] + a[2] * b[2];
}

export function cross(a: Vec3, b: Vec3): Vec3 {
  return [a[1] * b[2] - a[2] * b[1], a[2] * b[0] - a[0] * b[2], a[0] * b[1] - a[1] * b[0]];
}

export function length(v: Vec3): number {
  return Math.hypot(v[0], v[1], v[2]);
}

/** v / |v|; the zero vector stays zero. */
export function normalize(v: Vec3): Vec3 {
  const size = length(v);
  return size === 0 ? [0, 0, 0] : scale(1 / size, v);
}

export function distance(a: Vec3, b: Vec3): number {
  return length(subtract(a, b));
}

/**
 * An axis with the sign that reads best: its largest component is positive. The sign of a principal axis means
 * nothing, a fixed choice keeps equal axes looking equal.
 */
export function withReadableSign(axis: Vec3): Vec3 {
  const largest = [0, 1, 2].reduce((best, i) =>
    Math.abs(axis[i]!) > Math.abs(axis[best]!) + 1e-9 ? i : best,
  );
  return axis[largest]! < 0 ? [-axis[0], -axis[1], -axis[2]] : axis;
}
