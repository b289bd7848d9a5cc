import type { Vec3 } from '#src/base/matrix3.ts';
import type { SceneQuantity } from './scene.ts';

/** One atom of the picture: an atom of the dossier's cell, and the cell its copy stands in. */
export interface MeasuredAtom {
  /** EquivalentAtom.id */
  readonly atomId: string;
  /** Cell translation against the atom's own position in the dossier; [0, 0, 0] without a cell. */
  readonly cellShift: Vec3;
}

/** A line without a sense: what an angle between axes is measured from. `atom` counts from 0 in the measurement's `atoms`. */
export type MeasuredAxis =
  /** Principal axis 0 to 2 of a tensor of that atom, in the order of the quantity's components. */
  | {
      readonly of: 'tensor';
      readonly atom: number;
      readonly quantity: SceneQuantity;
      readonly axis: 0 | 1 | 2;
    }
  /** The line through two atoms. */
  | { readonly of: 'line'; readonly from: number; readonly to: number }
  /** Lattice direction [uvw]. */
  | { readonly of: 'direction'; readonly uvw: Vec3 }
  /** Normal of the lattice plane (hkl). */
  | { readonly of: 'normal'; readonly hkl: Vec3 };

export type MeasurementKind = 'distance' | 'angle' | 'dihedral' | 'axes';

/**
 * Something measured in the picture and kept as an annotation. Holds what is measured, never the number, which the scene
 * derives. A measurement whose atoms the present crystal lacks (another symmetry, another structure) is kept, not drawn.
 */
export interface Measurement {
  /** Unique in the case. */
  readonly id: string;
  readonly kind: MeasurementKind;
  /** Two for a distance, three for an angle (apex in the middle), four for a dihedral; for axes those that `axes` name. */
  readonly atoms: readonly MeasuredAtom[];
  /** With kind `axes`: the two lines between which the angle, folded to 0…90°, is meant. */
  readonly axes?: readonly [MeasuredAxis, MeasuredAxis];
}
