import type { Mat3, Vec3, VecCart, VecFrac } from '#src/base/matrix3.ts';
import type { Periodicity } from '#src/base/periodicity.ts';
import type { Place, Problem } from '#src/base/problem.ts';
import type { CrystalSymmetry, Displacement, Species } from '#src/crystal/crystal.ts';
import type { Lattice } from '#src/crystal/lattice.ts';
import type { EfgDescription } from '#src/tensor/efg.ts';
import type { PrincipalAxis } from '#src/tensor/principal-axes.ts';
import type { ShieldingDescription } from '#src/tensor/shielding.ts';
import type { ShiftDescription } from '#src/tensor/shift.ts';

/** δ = intercept + slope·σ (ppm); `simple` has slope −1; `exact` is (σref − σ)/(1 − σref) with σref = intercept. */
export interface Reference {
  readonly kind: 'simple' | 'regression' | 'exact';
  readonly interceptPpm: number;
  readonly slope: number;
  /** Isotope it holds for, such as `13C`. */
  readonly isotope: string;
}

/** Every decision that changes numbers. */
export interface DossierSettings {
  /** Isotope by element, e.g. { Al: '27Al' }; elements not named take the usual one. */
  readonly isotopes: Readonly<Record<string, string>>;
  /** By isotope. */
  readonly references: Readonly<Record<string, Reference>>;
  /** The user's own quadrupole moments, barn, by isotope. */
  readonly quadrupoleMomentsBarn: Readonly<Record<string, number>>;
  /** `auto` = file, or find where the file states none. */
  readonly symmetry: 'auto' | 'file' | 'find' | 'none';
  /** Symmetry search, Å. */
  readonly symmetryToleranceAngstrom: number;
  /** Two images of one row closer than this are one atom, Å. */
  readonly mergeDistanceAngstrom: number;
  /** Named Cartesian setting that overrides the frame found with the tensors; null to keep it. */
  readonly frame: string | null;
}

/** One value that may be undefined, with the reason in words. */
export type Undefinable<T> = T | null;

/** A principal axis: an unsigned direction, or null where its principal value is degenerate. */
export type Axis = PrincipalAxis;

/** Figures of noise: how far the calculation breaks the symmetry it should obey. Units of the tensor. */
export interface NoiseFigures {
  /** Frobenius norm of (T − Tᵀ)/2. */
  readonly antisymmetricNorm: number;
  /** Frobenius norm of T minus its projection on the site symmetry. */
  readonly symmetryResidual: number;
  /** Largest Frobenius norm of R⁻¹ T(equivalent) R minus the mean over the equivalents; null with only one tensor. */
  readonly equivalentSpread: Undefinable<number>;
}

/** What a tensor's description gains by standing on a site. */
export interface OnSite extends NoiseFigures {
  /** The tensor averaged over the site symmetry. */
  readonly projected: Mat3;
  readonly source: Place;
}

/** Shielding of one site, ppm; components σ11 ≤ σ22 ≤ σ33 (Harris et al. 2008). `undefinedBecause` is keyed by field name. */
export interface ShieldingDossier extends ShieldingDescription, OnSite {}

/** Shift of one site, ppm; components δ11 ≥ δ22 ≥ δ33. */
export type ShiftDossier = ShiftDescription;

/** EFG of one site, atomic units; |Vzz| ≥ |Vyy| ≥ |Vxx| listed as [Vxx, Vyy, Vzz]. */
export interface EfgDossier extends EfgDescription, OnSite {
  /** Unit of the file, such as `V/A2`; `tensor` was converted from it to atomic units. */
  readonly unitGiven?: string;
}

/** One atom of the cell: an image of a site under an operation, with the tensors turned along (R T Rᵀ). */
export interface EquivalentAtom {
  /** Unique in the crystal: site index and position in the orbit. */
  readonly id: string;
  readonly siteIndex: number;
  /** Index into symmetry.operations of the first operation that makes this image. */
  readonly operationIndex: number;
  /** As `x,y,z` with the lattice translation that brings it to `fractional`. */
  readonly operation: string;
  /** Brought into [0, 1) along axes that repeat; null without a cell. */
  readonly fractional: VecFrac | null;
  readonly cartesian: VecCart;
  /** Cartesian orthogonal matrix of the operation, row-major. */
  readonly rotation: Mat3;
  /** Which of the site's distinct tensor orientations this atom has, from 0. */
  readonly orientation: number;
}

export interface SiteDossier {
  readonly index: number;
  readonly label: string;
  readonly element: string;
  readonly species: readonly Species[];
  /** Nuclide such as `27Al`, or null where the element has none in the table. */
  readonly isotope: string | null;
  readonly occupancy: number;
  readonly fractional: VecFrac | null;
  readonly cartesian: VecCart;
  readonly multiplicity: number;
  readonly siteSymmetryOrder: number;
  readonly wyckoff: string | null;
  readonly siteSymmetry: string | null;
  readonly distinctOrientations: number;
  /** In words, what the site symmetry forces on a symmetric second-rank tensor. */
  readonly forced: string;
  /** First is the site itself (identity). */
  readonly equivalents: readonly EquivalentAtom[];
  readonly displacement: Displacement | null;
  readonly disorder: { readonly assembly: string | null; readonly group: string | null } | null;
  readonly charge: number | null;
  readonly attachedHydrogens: number;
  readonly shielding: ShieldingDossier | null;
  readonly shift: ShiftDossier | null;
  readonly efg: EfgDossier | null;
  /** The same from a second set of a quantity, such as another calculation; absent without one. */
  readonly other?: OtherTensors;
  readonly source: Place;
}

/** Tensors of one site from a second set; null where that set holds none of the quantity. */
export interface OtherTensors {
  readonly shielding: ShieldingDossier | null;
  readonly shift: ShiftDossier | null;
  readonly efg: EfgDossier | null;
}

/** A bond between two atoms of the cell; `shift` is the cell of the second atom relative to the first. */
export interface BondRecord {
  readonly from: string;
  readonly to: string;
  readonly shift: Vec3;
  readonly lengthAngstrom: number;
  readonly kind: 'bond' | 'hydrogen';
}

/**
 * The Cartesian frame of some tensors is not settled: no lattice came with them, and symmetry does not decide among the named
 * settings. Every figure of orientation carries the mark until the user names a frame; principal values do not depend on it.
 */
export interface UndecidedOrientation {
  /** One sentence for captions and cards. */
  readonly sentence: string;
  /** Names of the sets it holds for. */
  readonly sets: readonly string[];
  /** The setting that orientations are shown in. */
  readonly inUse: string;
  /** Settings that symmetry leaves open. */
  readonly open: readonly string[];
}

/** Everything the views may show of one crystal. Plain data. */
export interface CrystalDossier {
  readonly name: string;
  readonly lattice: Lattice | null;
  /** Along a, b, c, where the cell does not repeat along all three; absent for crystals and molecules without a cell. */
  readonly periodic?: Periodicity;
  readonly symmetry: CrystalSymmetry;
  /** Space-group symbol and number in one line, for headings. */
  readonly spaceGroup: string;
  readonly atomsInCell: number;
  /** Occupancy-weighted count of each element in the cell. */
  readonly composition: Readonly<Record<string, number>>;
  readonly sites: readonly SiteDossier[];
  readonly bonds: readonly BondRecord[];
  /** Cell translation of each atom id that makes molecules whole; only atoms that move are listed. */
  readonly wholeMolecules: Readonly<Record<string, Vec3>>;
  readonly temperatureK: number | null;
  readonly settings: DossierSettings;
  /** Absent where the frames of all tensors are settled. */
  readonly orientation?: UndecidedOrientation;
  readonly problems: readonly Problem[];
}
