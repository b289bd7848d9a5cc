import type { Mat3, VecCart, VecFrac } from '#src/base/matrix3.ts';
import type { Periodicity } from '#src/base/periodicity.ts';
import type { Place } from '#src/base/problem.ts';
import type { Lattice } from './lattice.ts';
import type { SymmetryOperation } from './symmetry-operation.ts';

/** One element (symbol; deuterium is `D`, tritium `T`) on a site, with the share of the position it fills. */
export interface Species {
  readonly element: string;
  readonly occupancy: number;
}

/** Mean-square displacement as the file gives it, converted to U. */
export interface Displacement {
  /** Å² along cell-scaled axes: U¹¹, U²², U³³, U¹², U¹³, U²³ of exp(−2π² Σ hᵢhⱼ aᵢ*aⱼ* Uⁱʲ) (Trueblood et al. 1996); null when isotropic. */
  readonly uAniso: readonly [number, number, number, number, number, number] | null;
  /** Å², as given or ⅓ of the trace in Cartesian axes. */
  readonly uEquivalent: number | null;
  /** What stood in the file: U, B = 8π²U or dimensionless β. */
  readonly given: 'U' | 'B' | 'beta';
}

/** One row of the atom list: a crystallographic site. Labels may repeat; `index` is the key. */
export interface Site {
  readonly index: number;
  readonly label: string;
  /** True where the file gives no label and `label` is the element with a running number. */
  readonly isNumbered?: true;
  /** Main element's symbol: the species with the largest share; `D` for deuterium; `X` where unknown. */
  readonly element: string;
  /** All elements on the site with their occupancies, which sum to `occupancy`. */
  readonly species: readonly Species[];
  readonly occupancy: number;
  /** Formal charge, e; null where not given. */
  readonly charge: number | null;
  /** null for a molecule without a cell. */
  readonly fractional: VecFrac | null;
  /** Å, in the frame of the crystal's lattice (or of the file, without a cell). */
  readonly cartesian: VecCart;
  readonly displacement: Displacement | null;
  /** Disorder assembly and group as in the file; a group that starts with − is disordered about a special position. */
  readonly disorder: { readonly assembly: string | null; readonly group: string | null } | null;
  /** `d`, `calc`, `c`, `dum` … as in the file. */
  readonly calcFlag: string | null;
  /** Refinement flags on the position, such as `R` for riding. */
  readonly refinementFlags: string | null;
  /** Hydrogens the file counts on this atom without giving them sites. */
  readonly attachedHydrogens: number;
  readonly place: Place;
}

/** Where the operations came from. */
export type SymmetrySource = 'file' | 'symbol' | 'found' | 'none';

export interface CrystalSymmetry {
  /** All of them, centring included, identity first, no two alike modulo lattice translations. */
  readonly operations: readonly SymmetryOperation[];
  /** International Tables number; null when it could not be told. */
  readonly number: number | null;
  /** Symbol as the file names it, else as found; in a dossier always one of the operations. */
  readonly hermannMauguin: string | null;
  /** The file's symbol where it names another group or setting than the operations are. */
  readonly named?: string;
  readonly hall: string | null;
  readonly source: SymmetrySource;
  /** In words: which item of which line led to the operations. */
  readonly reason: string;
  /** False where the file names no symmetry at all: `source: none` is then a gap, not P 1. */
  readonly stated: boolean;
}

/** A periodic crystal or, with `lattice` null, a molecule. Plain data: it crosses worker borders. */
export interface Crystal {
  readonly name: string;
  readonly lattice: Lattice | null;
  /** Along a, b, c; without a lattice none. */
  readonly periodic: Periodicity;
  readonly symmetry: CrystalSymmetry;
  readonly sites: readonly Site[];
  /** Formula as given and the number of formula units in the cell. */
  readonly formula: { readonly sum: string | null; readonly units: number | null };
  /** Measurement temperature, K, where given. */
  readonly temperatureK: number | null;
  readonly place: Place;
}

/** Matrix of numbers U in the order of the file turned into a full symmetric matrix. */
export function displacementMatrix(u: NonNullable<Displacement['uAniso']>): Mat3 {
  const [u11, u22, u33, u12, u13, u23] = u;
  return [u11, u12, u13, u12, u22, u23, u13, u23, u33];
}
