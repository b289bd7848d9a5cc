/** One of the three cell vectors, by its letter. */
export type CellVectorName = 'a' | 'b' | 'c';
/** One of the three Cartesian axes. */
export type CartesianAxisName = 'x' | 'y' | 'z';

/**
 * Our names of Cartesian settings: what lies along which axis, then what fixes the turn about it. `a-x-b-xy` has a
 * along x and b in the xy plane on the side of positive y.
 */
export type LatticeSettingName =
  'a-x-b-xy' | 'a-x-c-xz' | 'b-y-a-xy' | 'b-y-c-yz' | 'c-z-a-xz' | 'c-z-b-yz' | 'ab-x-b-xy' | 'b-x-c-xy';

/** How a right-handed Cartesian frame is tied to the cell. */
export interface LatticeSetting {
  readonly name: LatticeSettingName;
  /** The rule as a sentence for people; also the `frame` of lattices built with it. */
  readonly sentence: string;
  /** The lattice direction along the first axis: one cell vector, or the sum a + b. */
  readonly along: CellVectorName | 'a+b';
  readonly alongAxis: CartesianAxisName;
  /** The cell vector in the half-plane of the first axis and the positive second axis. */
  readonly inPlane: CellVectorName;
  readonly planeAxis: CartesianAxisName;
}

/**
 * Eight Cartesian settings met in published work and in calculations, all right-handed. For orthogonal cells the first
 * six coincide; on hexagonal axes those with a in the xz or xy half-plane differ from those with b ∥ y by 30° about c.
 */
export const latticeSettings: readonly LatticeSetting[] = [
  setting('a-x-b-xy', 'a along x, b in the xy plane with y > 0 (so c* along z)', 'a', 'x', 'b', 'y'),
  setting('a-x-c-xz', 'a along x, c in the xz plane with z > 0 (so b* along y)', 'a', 'x', 'c', 'z'),
  setting('b-y-a-xy', 'b along y, a in the xy plane with x > 0 (so c* along z)', 'b', 'y', 'a', 'x'),
  setting('b-y-c-yz', 'b along y, c in the yz plane with z > 0 (so a* along x)', 'b', 'y', 'c', 'z'),
  setting('c-z-a-xz', 'c along z, a in the xz plane with x > 0 (so b* along y)', 'c', 'z', 'a', 'x'),
  setting('c-z-b-yz', 'c along z, b in the yz plane with y > 0 (so a* along x)', 'c', 'z', 'b', 'y'),
  setting('ab-x-b-xy', 'a + b along x, a and b in the xy plane (so c* along z)', 'a+b', 'x', 'b', 'y'),
  setting('b-x-c-xy', 'b along x, c in the xy plane with y > 0 (so a* along z)', 'b', 'x', 'c', 'y'),
];

/**
 * The setting used where nothing says otherwise: c along z, b in the yz plane, as the CIF core dictionary assigns the
 * axes in its definition of `_cell.orthogonal_matrix` (after Rollett, Computing Methods in Crystallography, 1965).
 */
export const defaultLatticeSetting: LatticeSettingName = 'c-z-b-yz';

/** The setting of a name; an unknown name is a programmer's mistake and throws. */
export function latticeSetting(name: LatticeSettingName): LatticeSetting {
  const found = latticeSettings.find((candidate) => candidate.name === name);
  if (!found) throw new RangeError(`no lattice setting is called ${String(name)}`);
  return found;
}

function setting(
  name: LatticeSettingName,
  sentence: string,
  along: LatticeSetting['along'],
  alongAxis: CartesianAxisName,
  inPlane: CellVectorName,
  planeAxis: CartesianAxisName,
): LatticeSetting {
  return { name, sentence, along, alongAxis, inPlane, planeAxis };
}
