import type { Mat3, Vec3 } from '#src/base/matrix3.ts';
import { apply, combine, diagonalMatrix, matrixFromColumns, multiply, transpose } from '#src/base/matrix3.ts';
import { cross, normalize, scale } from '#src/base/vector3.ts';
import type { Axis, SiteDossier } from '#src/dossier/dossier.ts';
import { anyPerpendicular } from './camera.ts';
import type { EllipsoidKind, SceneQuantity, TensorScale } from './scene.ts';

/** Principal values (ppm or a.u.) of the symmetric part with their axes; an undefined axis is null. */
export interface PrincipalForm {
  readonly values: Vec3;
  readonly axes: readonly [Axis, Axis, Axis];
  /** Mean of the values; 0 for an EFG. */
  readonly isotropic: number;
  /** The symmetric part itself, row-major. */
  readonly matrix: Mat3;
}

/** The tensor of a site in its own frame, or null where the site has none of that quantity. */
export function principalForm(site: SiteDossier, quantity: SceneQuantity): PrincipalForm | null {
  const found = site[quantity];
  if (!found) return null;
  const { components: values, axes, tensor } = found;
  const isotropic = 'isotropic' in found ? found.isotropic : 0;
  const symmetric = 'symmetric' in found ? found.symmetric : tensor && halfSum(tensor);
  return { values, axes, isotropic, matrix: symmetric ?? matrixOf(values, axes) };
}

function halfSum(tensor: Mat3): Mat3 {
  return combine(0.5, tensor, 0.5, transpose(tensor));
}

/** Σ valueₖ axisₖ axisₖᵀ */
function matrixOf(values: Vec3, axes: readonly [Axis, Axis, Axis]): Mat3 {
  const frame = matrixFromColumns(...completeFrame(axes));
  return multiply(multiply(frame, diagonalMatrix(values)), transpose(frame));
}

/**
 * Largest length that stands for a tensor before scaling, ppm or a.u.: its largest principal value or, of a deviation, the
 * largest distance of one from the isotropic value.
 */
export function largestReach({ values, isotropic }: PrincipalForm, kind: EllipsoidKind): number {
  const zero = kind === 'total' ? 0 : isotropic;
  return Math.max(...values.map((value) => Math.abs(value - zero)));
}

/** An ellipsoid with the great circles that are defined. */
export interface TensorShape {
  /** Columns = semi-axis vectors, Å, in the order of the principal values. */
  readonly shape: Mat3;
  /** Bit k: circle perpendicular to axis k. */
  readonly circles: number;
}

/**
 * Ellipsoid of a tensor turned by an operation (R T Rᵀ: the axes turn, the values stay). Semi-axes in Å:
 * `total`: value / unitsPerAngstrom, all values positive;
 * `deviation`: base radius + (value − isotropic) / unitsPerAngstrom.
 * Where axes are undefined (degenerate values) any perpendicular ones serve the shape, and only the circle perpendicular
 * to a defined axis is drawn.
 */
export function tensorShape(form: PrincipalForm, rotation: Mat3, scaling: TensorScale): TensorShape {
  const [first, second, third] = completeFrame(form.axes);
  const column = (axis: Vec3, value: number) =>
    scale(semiAxis(value, form.isotropic, scaling), apply(rotation, axis));
  const [v1, v2, v3] = form.values;
  return {
    shape: matrixFromColumns(column(first, v1), column(second, v2), column(third, v3)),
    circles: form.axes.reduce((bits, axis, k) => (axis ? bits | (1 << k) : bits), 0),
  };
}

/** Å; a semi-axis never falls below a thousandth of one, so that a shape is never singular. */
export function semiAxis(value: number, isotropic: number, scaling: TensorScale): number {
  const length =
    scaling.kind === 'total'
      ? value / scaling.unitsPerAngstrom
      : scaling.baseRadiusAngstrom + (value - isotropic) / scaling.unitsPerAngstrom;
  return Math.max(length, 1e-3);
}

/** Fills undefined axes with unit vectors perpendicular to the defined ones. */
export function completeFrame(axes: readonly [Axis, Axis, Axis]): readonly [Vec3, Vec3, Vec3] {
  const defined = [0, 1, 2].filter((k) => axes[k]);
  if (defined.length === 3) return axes as readonly [Vec3, Vec3, Vec3];
  const frame: Vec3[] = [
    [1, 0, 0],
    [0, 1, 0],
    [0, 0, 1],
  ];
  if (defined.length === 0) return [frame[0]!, frame[1]!, frame[2]!];
  const k = defined[0]!;
  const next = (k + 1) % 3;
  const last = (k + 2) % 3;
  const known = normalize(axes[k]!);
  const second = axes[next] ?? (axes[last] ? cross(axes[last], known) : anyPerpendicular(known));
  frame[k] = known;
  frame[next] = second;
  frame[last] = axes[last] ?? cross(known, second);
  return [frame[0]!, frame[1]!, frame[2]!];
}
