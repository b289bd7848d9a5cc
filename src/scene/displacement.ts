import type { Mat3, Vec3 } from '#src/base/matrix3.ts';
import { diagonalMatrix, matrixFromColumns, multiply, rowsOf, transpose } from '#src/base/matrix3.ts';
import { symmetricEigen } from '#src/base/symmetric-eigen.ts';
import { length, scale } from '#src/base/vector3.ts';
import type { CrystalDossier, SiteDossier } from '#src/dossier/dossier.ts';

/**
 * Semi-axes of the surface inside which an atom is with a given probability, in units of its root-mean-square displacement along
 * them: k with P(χ² ≤ k²) = p for three degrees of freedom, P = erf(k/√2) − √(2/π) k exp(−k²/2). Between 0 and 1; values outside
 * give 0 or the k of 1 − 10⁻⁹.
 *
 * `probabilityFactor(0.5)` → 1.5382
 */
export function probabilityFactor(probability: number): number {
  if (!(probability > 0)) return 0;
  const wanted = Math.min(probability, 1 - 1e-9);
  let [low, high] = [0, 8];
  while (high - low > 1e-12) {
    const middle = (low + high) / 2;
    if (chiSquaredShare(middle) < wanted) low = middle;
    else high = middle;
  }
  return (low + high) / 2;
}

/** P(χ² ≤ k²) for three degrees of freedom by the series of the incomplete gamma function of 3/2 (Abramowitz & Stegun 6.5.29). */
function chiSquaredShare(k: number): number {
  const x = (k * k) / 2;
  let term = 1 / 1.5;
  let sum = term;
  for (let n = 1; term > 1e-17 * sum; n++) sum += term *= x / (1.5 + n);
  // Γ(3/2) = √π/2
  return (x ** 1.5 * Math.exp(-x) * sum * 2) / Math.sqrt(Math.PI);
}

/**
 * Mean-square displacements in Cartesian axes, Å², row-major, in the crystal's frame, of a site at its own position: U of the file
 * refers to axes a·a* and so on, hence A N U N Aᵀ with A = (a b c) and N = diag(a*, b*, c*) (Trueblood et al., Acta Cryst. A52
 * (1996) 770). An isotropic one is Uiso on the diagonal. Copies have R U Rᵀ. Null where the file gives none, or an anisotropic one
 * without a cell.
 */
export function cartesianDisplacement(site: SiteDossier, lattice: CrystalDossier['lattice']): Mat3 | null {
  const { displacement } = site;
  if (!displacement) return null;
  const { uAniso, uEquivalent } = displacement;
  if (!uAniso) return uEquivalent === null ? null : diagonalMatrix([uEquivalent, uEquivalent, uEquivalent]);
  if (!lattice) return null;
  const [u11, u22, u33, u12, u13, u23] = uAniso;
  const reciprocal = rowsOf(lattice.toFractional).map(length) as unknown as Vec3;
  const m = multiply(lattice.toCartesian, diagonalMatrix(reciprocal));
  return multiply(multiply(m, [u11, u12, u13, u12, u22, u23, u13, u23, u33]), transpose(m));
}

/** Displacement ellipsoids of a crystal's sites. */
export interface DisplacementShapes {
  /** By site index: columns = semi-axis vectors at the site's own position, Å. */
  readonly shapes: ReadonlyMap<number, Mat3>;
  /** Labels of sites whose U has a principal value that is not positive: no ellipsoid. */
  readonly impossible: readonly string[];
}

/** Å; thinner ellipsoids are drawn this thin, so that no shape is singular. */
const thinnestAngstrom = 0.005;

/** The ellipsoid of each site that has one, at a probability between 0 and 1. */
export function displacementShapes(dossier: CrystalDossier, probability: number): DisplacementShapes {
  const factor = probabilityFactor(probability);
  const shapes = new Map<number, Mat3>();
  const impossible: string[] = [];
  for (const site of dossier.sites) {
    const u = cartesianDisplacement(site, dossier.lattice);
    if (!u || !u.every(Number.isFinite)) continue;
    const { values, vectors } = symmetricEigen(u);
    if (!(values[0] > 0)) {
      impossible.push(site.label);
      continue;
    }
    const column = (k: 0 | 1 | 2) =>
      scale(Math.max(thinnestAngstrom, factor * Math.sqrt(values[k])), vectors[k]);
    shapes.set(site.index, matrixFromColumns(column(0), column(1), column(2)));
  }
  return { shapes, impossible };
}
