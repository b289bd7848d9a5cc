import type { Mat3 } from '#src/base/matrix3.ts';
import type { Quantity, TensorEntry } from '#src/tensor/tensor-set.ts';

/** How a tensor set was bound to the crystal, strongest evidence first. */
export type AttachMethod = 'same-file' | 'geometry' | 'labels';

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
}

/** One atom of the cell a tensor may belong to. */
export interface AtomImage {
  readonly siteIndex: number;
  readonly element: string;
  readonly label: string;
  /** In [0, 1); null without a cell. */
  readonly fractional: readonly [number, number, number] | null;
  /** Cartesian matrix of the operation that makes this image. */
  readonly rotation: Mat3;
  /** True for the site as listed. */
  readonly own: boolean;
}
