import type { Mat3, Vec3 } from '#src/base/matrix3.ts';
import { apply, identity3 } from '#src/base/matrix3.ts';
import { add, scale, subtract } from '#src/base/vector3.ts';

/**
 * The proper rotation R and shift t with least Σ|R x + t − y|² (Horn, J. Opt. Soc. Am. A 4, 629 (1987): the eigenvector of the
 * largest eigenvalue of a symmetric 4×4 matrix, found by Jacobi rotations). Planar and linear arrangements are no exception;
 * for a single point R is the identity. Frames and unit (Å) are those of the points.
 */
export function rigidRotation(
  from: readonly Vec3[],
  onto: readonly Vec3[],
): { readonly rotation: Mat3; readonly shift: Vec3 } {
  const mean = (points: readonly Vec3[]): Vec3 =>
    scale(1 / Math.max(1, points.length), points.reduce(add, [0, 0, 0]));
  const [fromMean, ontoMean] = [mean(from), mean(onto)];
  const s = new Float64Array(9);
  from.forEach((point, at) => {
    const x = subtract(point, fromMean);
    const y = subtract(onto[at]!, ontoMean);
    for (let i = 0; i < 3; i += 1) for (let j = 0; j < 3; j += 1) s[3 * i + j]! += x[i]! * y[j]!;
  });
  const rotation = from.length < 2 ? identity3 : fromQuaternion(largestEigenvector(quaternionMatrix(s)));
  return { rotation, shift: subtract(ontoMean, apply(rotation, fromMean)) };
}

function quaternionMatrix(s: Float64Array): number[][] {
  const [xx, xy, xz, yx, yy, yz, zx, zy, zz] = s as unknown as Mat3;
  return [
    [xx + yy + zz, yz - zy, zx - xz, xy - yx],
    [yz - zy, xx - yy - zz, xy + yx, zx + xz],
    [zx - xz, xy + yx, yy - xx - zz, yz + zy],
    [xy - yx, zx + xz, yz + zy, zz - xx - yy],
  ];
}

function largestEigenvector(a: number[][]): number[] {
  const v = [0, 1, 2, 3].map((i) => [0, 1, 2, 3].map((j) => (i === j ? 1 : 0)));
  for (let sweep = 0; sweep < 40; sweep += 1) {
    let off = 0;
    for (let p = 0; p < 3; p += 1) {
      for (let q = p + 1; q < 4; q += 1) {
        off += a[p]![q]! ** 2;
        rotate(a, v, p, q);
      }
    }
    if (off < 1e-28) break;
  }
  const best = [0, 1, 2, 3].reduce((top, i) => (a[i]![i]! > a[top]![top]! ? i : top), 0);
  return v.map((row) => row[best]!);
}

function rotate(a: number[][], v: number[][], p: number, q: number): void {
  const apq = a[p]![q]!;
  if (apq === 0) return;
  const theta = (a[q]![q]! - a[p]![p]!) / (2 * apq);
  const t = (theta < 0 ? -1 : 1) / (Math.abs(theta) + Math.sqrt(theta * theta + 1));
  const c = 1 / Math.sqrt(t * t + 1);
  const s = t * c;
  for (let k = 0; k < 4; k += 1) {
    const [kp, kq] = [a[k]![p]!, a[k]![q]!];
    a[k]![p] = c * kp - s * kq;
    a[k]![q] = s * kp + c * kq;
  }
  for (let k = 0; k < 4; k += 1) {
    const [pk, qk] = [a[p]![k]!, a[q]![k]!];
    a[p]![k] = c * pk - s * qk;
    a[q]![k] = s * pk + c * qk;
    const [vp, vq] = [v[k]![p]!, v[k]![q]!];
    v[k]![p] = c * vp - s * vq;
    v[k]![q] = s * vp + c * vq;
  }
}

function fromQuaternion(q: number[]): Mat3 {
  const [w, x, y, z] = q as [number, number, number, number];
  return [
    ...[1 - 2 * (y * y + z * z), 2 * (x * y - w * z), 2 * (x * z + w * y)],
    ...[2 * (x * y + w * z), 1 - 2 * (x * x + z * z), 2 * (y * z - w * x)],
    ...[2 * (x * z - w * y), 2 * (y * z + w * x), 1 - 2 * (x * x + y * y)],
  ] as unknown as Mat3;
}
