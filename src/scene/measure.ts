import type { Vec3 } from '#src/base/matrix3.ts';
import { apply, transpose } from '#src/base/matrix3.ts';
import { repeatsThroughout } from '#src/base/periodicity.ts';
import type { Periodicity } from '#src/base/periodicity.ts';
import { add, cross, dot, length, normalize, subtract } from '#src/base/vector3.ts';
import type { CrystalDossier, EquivalentAtom, SiteDossier } from '#src/dossier/dossier.ts';
import type { MeasuredAtom, MeasuredAxis, Measurement } from './measurement.ts';

/** What measuring needs to know of a crystal. */
export interface MeasuredCrystal {
  readonly lattice: CrystalDossier['lattice'];
  /** As in the dossier: absent where the lattice repeats along all three. */
  readonly periodic?: Periodicity | undefined;
  readonly symmetry: Pick<CrystalDossier['symmetry'], 'operations'>;
  /** Site of an index; null where the crystal has none, or it isn't known yet. */
  readonly site: (index: number) => SiteDossier | null;
}

/** What was measured. */
export interface MeasuredValue {
  /** Å or degrees; null where it is undefined. */
  readonly value: number | null;
  readonly unit: 'Å' | '°';
  /** Fraction digits it is printed with: 0.001 Å, 0.1°. */
  readonly digits: number;
  /** Where `value` is null. */
  readonly undefinedBecause: string | null;
  /** Positions of the measurement's atoms, Å, Cartesian. */
  readonly points: readonly Vec3[];
  /** With kind `axes`: both directions, unit length, null where undefined. */
  readonly directions: readonly (Vec3 | null)[];
}

const degrees = 180 / Math.PI;
/** Å: atoms nearer than this stand on one place, and a line through them has no direction. */
const samePlaceAngstrom = 1e-6;

/**
 * Distance (Å), angle with its apex at the second atom (0 to 180°), dihedral (−180 to 180°) or angle between two lines without
 * sense (0 to 90°). The dihedral of A–B–C–D is positive where, seen along B→C, the front bond A–B is turned clockwise to
 * cover C–D (IUPAC, Klyne & Prelog, Experientia 16 (1960) 521). Null where the crystal lacks one of the atoms; an angle at
 * atoms on one place, a dihedral of atoms in a line and the angle of an undefined axis are undefined, with the reason.
 */
export function measure(measurement: Measurement, crystal: MeasuredCrystal): MeasuredValue | null {
  const atoms = measurement.atoms.map((atom) => placeOf(atom, crystal));
  if (atoms.some((atom) => atom === null)) return null;
  const points = atoms.map((atom) => atom!.position);
  const unit = measurement.kind === 'distance' ? 'Å' : '°';
  const common = { unit, digits: unit === 'Å' ? 3 : 1, points, directions: [] } as const;
  const defined = (value: number): MeasuredValue => ({ ...common, value, undefinedBecause: null });
  const not = (undefinedBecause: string): MeasuredValue => ({ ...common, value: null, undefinedBecause });
  const [a, b, c, d] = points;
  switch (measurement.kind) {
    case 'distance':
      return a && b ? defined(length(subtract(b, a))) : null;
    case 'angle': {
      if (!a || !b || !c) return null;
      const value = angleDegrees(subtract(a, b), subtract(c, b));
      return value === null ? not('two of the atoms stand on one place') : defined(value);
    }
    case 'dihedral': {
      if (!a || !b || !c || !d) return null;
      const value = dihedralDegrees(a, b, c, d);
      return value === null ? not('three of the atoms stand in one line') : defined(value);
    }
    case 'axes': {
      const both = measurement.axes?.map((axis) => directionOf(axis, measurement, crystal, points));
      if (!both || both.includes(undefined)) return null;
      const directions = both as (Vec3 | null)[];
      const [one, other] = directions;
      if (one && other) return { ...defined(foldedDegrees(one, other)), directions };
      return { ...not('a principal axis is undefined: its principal value is degenerate'), directions };
    }
  }
}

/** An atom of a measurement where it stands; null where the crystal has none such, as beside a cell that does not repeat. */
export function placeOf(
  { atomId, cellShift }: MeasuredAtom,
  { lattice, periodic = repeatsThroughout, site }: MeasuredCrystal,
): { readonly site: SiteDossier; readonly atom: EquivalentAtom; readonly position: Vec3 } | null {
  const found = site(siteIndexOf(atomId));
  const atom = found?.equivalents.find(({ id }) => id === atomId);
  if (!found || !atom) return null;
  if (lattice && cellShift.some((cells, axis) => cells !== 0 && !periodic[axis])) return null;
  const shift = lattice ? apply(lattice.toCartesian, cellShift) : ([0, 0, 0] as const);
  return { site: found, atom, position: add(atom.cartesian, shift) };
}

/** Index of the site an atom id belongs to: `EquivalentAtom.id` starts with it. */
export function siteIndexOf(atomId: string): number {
  return Number.parseInt(atomId, 10);
}

/** 0 to 180°, by the arc tangent, which keeps its digits near both ends; null for a vector without direction. */
export function angleDegrees(u: Vec3, v: Vec3): number | null {
  if (length(u) < samePlaceAngstrom || length(v) < samePlaceAngstrom) return null;
  return Math.atan2(length(cross(u, v)), dot(u, v)) * degrees;
}

/** −180 to 180° by IUPAC's sign (see `measure`); null where three atoms in a row stand in one line. */
export function dihedralDegrees(a: Vec3, b: Vec3, c: Vec3, d: Vec3): number | null {
  const [first, middle, last] = [subtract(b, a), subtract(c, b), subtract(d, c)];
  const [n1, n2] = [cross(first, middle), cross(middle, last)];
  const least = 1e-6 * length(middle);
  if (length(n1) <= least * length(first) || length(n2) <= least * length(last)) return null;
  const value = Math.atan2(length(middle) * dot(first, n2), dot(n1, n2)) * degrees;
  return value <= -180 + 1e-9 ? 180 : value;
}

/** 0 to 90°: lines without sense. */
export function foldedDegrees(u: Vec3, v: Vec3): number {
  return Math.atan2(length(cross(u, v)), Math.abs(dot(u, v))) * degrees;
}

/** Unit vector along a line to measure from; null where it is undefined, nothing where the crystal lacks it. */
function directionOf(
  axis: MeasuredAxis,
  { atoms }: Measurement,
  crystal: MeasuredCrystal,
  points: readonly Vec3[],
): Vec3 | null | undefined {
  const { lattice } = crystal;
  switch (axis.of) {
    case 'tensor': {
      const atom = atoms[axis.atom];
      const place = atom && placeOf(atom, crystal);
      const axes = place?.site[axis.quantity]?.axes;
      if (!place || !axes) return undefined;
      const own = axes[axis.axis];
      return own && normalize(apply(place.atom.rotation, own));
    }
    case 'line': {
      const [from, to] = [points[axis.from], points[axis.to]];
      if (!from || !to) return undefined;
      const line = subtract(to, from);
      return length(line) < samePlaceAngstrom ? null : normalize(line);
    }
    case 'direction':
      return lattice ? normalize(apply(lattice.toCartesian, axis.uvw)) : undefined;
    case 'normal':
      return lattice ? normalize(apply(transpose(lattice.toFractional), axis.hkl)) : undefined;
  }
}
