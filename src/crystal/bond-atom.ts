import type { Vec3, VecCart } from '#src/base/matrix3.ts';
import type { Site } from './crystal.ts';

/** What the search for bonds needs to know of one atom of the cell. */
export interface BondAtom {
  readonly element: string;
  /** Å, in the frame of the lattice; need not lie in the cell. */
  readonly cartesian: VecCart;
  /** Share of the position that is filled; 1 unless given. */
  readonly occupancy?: number;
  readonly disorder?: Site['disorder'];
  readonly siteIndex?: number;
  /** Which operation made this atom from its site, and the lattice translation applied after it (multiples of a, b, c). */
  readonly operationIndex?: number;
  readonly cellShift?: Vec3;
}

/** A bond or hydrogen bond; the atom `to`, moved by `shift` (multiples of a, b, c), is the partner of `from`. */
export interface Bond {
  /** For a hydrogen bond the hydrogen, otherwise the smaller index. */
  readonly from: number;
  /** For a hydrogen bond the acceptor. */
  readonly to: number;
  readonly shift: Vec3;
  /** Å; for a hydrogen bond the distance H…A. */
  readonly lengthAngstrom: number;
  readonly kind: 'bond' | 'hydrogen';
}

/**
 * Whether two atoms can be present at once. Different groups of one disorder assembly exclude each other; atoms of a
 * group with a minus sign, disordered about a special position, meet only within one symmetry copy (CIF core
 * dictionary, `_atom_site_disorder_group`).
 */
export function canMeet(a: BondAtom, b: BondAtom, shift: Vec3): boolean {
  const groupA = named(a.disorder?.group);
  const groupB = named(b.disorder?.group);
  if (groupA === null || groupB === null) return true;
  if (named(a.disorder?.assembly) !== named(b.disorder?.assembly)) return true;
  if (groupA !== groupB) return false;
  return !groupA.startsWith('-') || sameCopy(a, b, shift);
}

/** Without translations on record every atom made by one operation counts as of one copy. */
function sameCopy(a: BondAtom, b: BondAtom, shift: Vec3): boolean {
  if ((a.operationIndex ?? 0) !== (b.operationIndex ?? 0)) return false;
  const { cellShift: from } = a;
  const { cellShift: to } = b;
  if (!from || !to) return true;
  return shift.every((turns, axis) => from[axis] === to[axis]! + turns);
}

function named(text: string | null | undefined): string | null {
  return text === undefined || text === null || /^[.?0]?$/.test(text.trim()) ? null : text.trim();
}
