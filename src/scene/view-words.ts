import type { Vec3 } from '#src/base/matrix3.ts';
import { apply, transpose } from '#src/base/matrix3.ts';
import { dot } from '#src/base/vector3.ts';
import type { Camera } from './camera.ts';
import { viewRotation } from './camera.ts';
import { parseLookAlong } from './look-along.ts';
import type { CellAxis } from './scene.ts';

/** Cosine of the largest angle, 0.01°, by which a view may miss the direction it is named after. */
const nearlyOne = Math.cos((0.01 * Math.PI) / 180);
/** Indices of named directions and normals, at most. */
const largestIndex = 3;

/**
 * From where a camera sees the crystal, as one would type it: `c`, `−a*`, `[1 1 0]`, `(1 0 1)`; `z` without a cell. Letters go
 * before indices, lower indices before higher ones, directions before normals. Null where the view has no such name.
 */
export function viewWords(
  { orientation }: Pick<Camera, 'orientation'>,
  axes: readonly CellAxis[],
): string | null {
  const towards = apply(transpose(viewRotation(orientation)), [0, 0, 1]);
  for (const text of axes.length === 3 ? namesInCell : ['x', 'y', 'z']) {
    const found = parseLookAlong(text, axes);
    if ('fault' in found) continue;
    const cosine = dot(towards, found.towards);
    if (cosine >= nearlyOne) return found.words;
    if (-cosine >= nearlyOne) return opposite(text, axes, found.words);
  }
  return null;
}

/** `−c`; of indices each with the other sign: `[−1 −1 0]`. */
function opposite(text: string, axes: readonly CellAxis[], words: string): string {
  const numbers = text.match(/-?\d+/g);
  if (!numbers) return `−${words}`;
  const turned = numbers.map((index) => -Number(index) || 0).join(' ');
  const found = parseLookAlong(text.startsWith('[') ? `[${turned}]` : `(${turned})`, axes);
  return 'fault' in found ? `−${words}` : found.words;
}

const namesInCell: readonly string[] = ['a', 'b', 'c', 'a*', 'b*', 'c*', ...namesByIndices()];

/** Every line of the lattice once: the first index that is not 0 is positive, and the three have no common factor. */
function namesByIndices(): string[] {
  const all: Vec3[] = [];
  const range = Array.from({ length: 2 * largestIndex + 1 }, (_, i) => i - largestIndex);
  for (const h of range)
    for (const k of range) for (const l of range) if (isFirst([h, k, l])) all.push([h, k, l]);
  const size = (indices: Vec3): number => indices.reduce((sum, n) => sum + n * n, 0);
  all.sort((one, other) => size(one) - size(other));
  return [...all.map((n) => `[${n.join(' ')}]`), ...all.map((n) => `(${n.join(' ')})`)];
}

function isFirst(indices: Vec3): boolean {
  const leading = indices.find((index) => index !== 0) ?? 0;
  const isReduced = [2, 3].every((factor) => indices.some((index) => index % factor !== 0));
  return leading > 0 && isReduced;
}
