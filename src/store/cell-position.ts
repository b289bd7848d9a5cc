import type { Vec3 } from '#src/base/matrix3.ts';
import { apply } from '#src/base/matrix3.ts';
import type { Lattice } from '#src/crystal/lattice.ts';

/** A Cartesian position (Å) as fractions of the cell; as it is without a cell. */
export function inCell(lattice: Lattice | null, cartesian: Vec3): Vec3 {
  return lattice ? apply(lattice.toFractional, cartesian) : cartesian;
}

/** Back again. */
export function toCell(lattice: Lattice | null, position: Vec3): Vec3 {
  return lattice ? apply(lattice.toCartesian, position) : position;
}
