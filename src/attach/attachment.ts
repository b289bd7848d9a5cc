import type { Mat3, Vec3, VecCart } from '#src/base/matrix3.ts';
import type { Quantity, TensorEntry } from '#src/tensor/tensor-set.ts';
import type { FrameRanking } from './frame-ranking.ts';

/** How a tensor set was bound to the crystal, strongest evidence first. */
export type AttachMethod = 'same-file' | 'geometry' | 'labels' | 'order';

/** An atom by its label, with a distance, Å. */
export interface MovedAtom {
  readonly label: string;
  readonly value: number;
}

/** How the atoms of a source were laid on those of the crystal. Plain data. */
export interface Mapping {
  readonly method: AttachMethod;
  /** Atoms of the source that were to be found, and how many were. */
  readonly atoms: number;
  readonly matched: number;
  /** Labels of the source's atoms that belong to none of the crystal. */
  readonly unmatched: readonly string[];
  /** Atoms that moved by more than 0.5 Å, or far more than the others: the link may be wrong. */
  readonly doubtful: readonly MovedAtom[];
  /** Å; null where positions were not compared. */
  readonly rmsDisplacementAngstrom: number | null;
  readonly maxDisplacement: MovedAtom | null;
  /** Source lattice rows = basis × crystal lattice rows; null without lattices. */
  readonly basis: Mat3 | null;
  /** Fractions of the crystal's cell (Å for molecules), added to the source's positions on the crystal's axes. */
  readonly originShift: Vec3 | null;
  /** Frobenius norm of the Lagrangian strain that takes the source's lattice to the crystal's; null without lattices. */
  readonly strain: number | null;
  readonly handedness: 'same' | 'mirrored';
}

/** One tensor on one image of a site, in the crystal's Cartesian frame. */
export interface SiteTensor {
  /** Full tensor, row-major, canonical unit of its quantity, turned into the crystal's frame. */
  readonly tensor: Mat3;
  /** Cartesian orthogonal matrix R with T(image) = R T(site) Rᵀ; the identity for the site itself. */
  readonly rotation: Mat3;
  readonly entry: TensorEntry;
}

/** A tensor set bound to the sites of a crystal. Plain data. */
export interface Attachment {
  readonly name: string;
  readonly file: string;
  readonly quantity: Quantity;
  /** Unit as printed in the file. */
  readonly unitGiven: string;
  readonly method: AttachMethod;
  /** Orthogonal matrix, set frame → crystal frame. */
  readonly rotation: Mat3;
  /** By site index; the site's own atom first where the set holds it. */
  readonly bySite: readonly (readonly SiteTensor[])[];
  /** Å, over the matched atoms; null where positions were not compared. */
  readonly rmsDisplacementAngstrom: number | null;
  readonly mapping: Mapping;
  /** How its Cartesian frame was settled; null for molecules and where site symmetries were not given. */
  readonly frame: FrameRanking | null;
}

/** One atom of the cell a tensor may belong to. */
export interface AtomImage {
  readonly siteIndex: number;
  readonly element: string;
  readonly label: string;
  /** In [0, 1); null without a cell. */
  readonly fractional: readonly [number, number, number] | null;
  /** Å, in the crystal's frame; needed for molecules only. */
  readonly cartesian?: VecCart;
  /** Cartesian matrix of the operation that makes this image. */
  readonly rotation: Mat3;
  /** True for the site as listed. */
  readonly own: boolean;
}
