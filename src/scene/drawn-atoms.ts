import type { Vec3 } from '#src/base/matrix3.ts';
import { apply } from '#src/base/matrix3.ts';
import { repeatsThroughout } from '#src/base/periodicity.ts';
import { add } from '#src/base/vector3.ts';
import type { CrystalDossier, EquivalentAtom, SiteDossier } from '#src/dossier/dossier.ts';

/** One copy of an atom that is in the picture. */
export interface DrawnAtom {
  readonly atom: EquivalentAtom;
  readonly site: SiteDossier;
  /** Å */
  readonly position: Vec3;
  /** Cells by which this copy is away from the atom's own position. */
  readonly cellShift: Vec3;
  /** A neighbour outside the picture's own atoms, there to complete their bonds: drawn as a small sphere. */
  readonly context: boolean;
}

/** An atom this close to a border, in Å along the cell edge, lies on it and is in. */
const borderToleranceAngstrom = 0.02;

/** Atoms drawn at most: what both renderers stay usable with. */
export const mostAtoms = 60_000;

/** Lower and upper corner, in cells. */
export type CellRange = readonly [Vec3, Vec3];

const oneCell: CellRange = [
  [0, 0, 0],
  [1, 1, 1],
];

/** What all the extents need: the crystal and the sites that stay out. */
export interface ExtentInput {
  readonly dossier: CrystalDossier;
  readonly hidden: ReadonlySet<number>;
}

/** Atoms of one unit cell, those on faces it repeats across, edges and corners repeated; without a cell the atoms as given. */
export function atomsOfCell(input: ExtentInput): DrawnAtom[] {
  return atomsInRange(input, oneCell);
}

/** Atoms between the corners of a range of cells, those on its borders in; without a cell the atoms as given. */
export function atomsInRange({ dossier, hidden }: ExtentInput, range: CellRange): DrawnAtom[] {
  const drawn: DrawnAtom[] = [];
  for (const site of dossier.sites) {
    if (hidden.has(site.index)) continue;
    for (const atom of site.equivalents) {
      for (const cellShift of shiftsInto(dossier, atom, range)) {
        if (drawn.length >= mostAtoms) return drawn;
        drawn.push(copyOf(dossier, atom, site, cellShift, false));
      }
    }
  }
  return drawn;
}

/** Atoms of one cell moved together into whole molecules (`wholeMolecules` of the dossier). */
export function atomsOfMolecules({ dossier, hidden }: ExtentInput): DrawnAtom[] {
  const drawn: DrawnAtom[] = [];
  for (const site of dossier.sites) {
    if (hidden.has(site.index)) continue;
    for (const atom of site.equivalents) {
      if (drawn.length >= mostAtoms) return drawn;
      const cellShift = dossier.lattice ? (dossier.wholeMolecules[atom.id] ?? nowhere) : nowhere;
      drawn.push(copyOf(dossier, atom, site, cellShift, false));
    }
  }
  return drawn;
}

/** No shift. */
export const nowhere: Vec3 = [0, 0, 0];

/** The part of a range in which there can be copies: along axes that do not repeat there is one cell only. */
export function repeatedRange(
  { periodic = repeatsThroughout }: CrystalDossier,
  [low, high]: CellRange,
): CellRange {
  const corner = (ends: Vec3, cell: Vec3): Vec3 =>
    ends.map((end, axis) => (periodic[axis] ? end : cell[axis]!)) as unknown as Vec3;
  return [corner(low, oneCell[0]), corner(high, oneCell[1])];
}

/** A range that holds about as many atoms as can be drawn, about the same middle; the same range where it holds fewer. */
export function drawableRange(dossier: CrystalDossier, asked: CellRange): CellRange {
  const low = asked[0].map((x, k) => Math.min(x, asked[1][k]!)) as unknown as Vec3;
  const high = asked[0].map((x, k) => Math.max(x, asked[1][k]!)) as unknown as Vec3;
  if (![...low, ...high].every(Number.isFinite)) return oneCell;
  const cells = [0, 1, 2].reduce((product, k) => product * Math.max(1, high[k]! - low[k]!), 1);
  const share = Math.cbrt(mostAtoms / Math.max(1, cells * dossier.atomsInCell));
  if (share >= 1 || cells <= 1) return [low, high];
  const about = (k: 0 | 1 | 2, side: -1 | 1) => {
    const [middle, half] = [(low[k] + high[k]) / 2, (high[k] - low[k]) / 2];
    return middle + side * half * (half > 0.5 ? share : 1);
  };
  return [
    [about(0, -1), about(1, -1), about(2, -1)],
    [about(0, 1), about(1, 1), about(2, 1)],
  ];
}

/** Cell shifts of an atom that bring it between the corners of a range, borders included; 0 along axes that do not repeat. */
function* shiftsInto(dossier: CrystalDossier, atom: EquivalentAtom, [low, high]: CellRange): Generator<Vec3> {
  const { lattice, periodic = repeatsThroughout } = dossier;
  const { fractional } = atom;
  if (!lattice || !fractional) {
    yield nowhere;
    return;
  }
  const edges = [lattice.cell.a, lattice.cell.b, lattice.cell.c];
  // + 0 turns −0 into 0
  const first = [0, 1, 2].map((k) =>
    periodic[k] ? Math.ceil(low[k]! - borderToleranceAngstrom / edges[k]! - fractional[k]!) + 0 : 0,
  );
  const last = [0, 1, 2].map((k) =>
    periodic[k] ? Math.floor(high[k]! + borderToleranceAngstrom / edges[k]! - fractional[k]!) : 0,
  );
  if (first.some((from, k) => from > last[k]!)) return;
  for (let i = first[0]!; i <= last[0]!; i++) {
    for (let j = first[1]!; j <= last[1]!; j++) {
      for (let k = first[2]!; k <= last[2]!; k++) yield [i, j, k];
    }
  }
}

/** One copy of an atom, `cellShift` cells away from its own position. */
export function copyOf(
  dossier: CrystalDossier,
  atom: EquivalentAtom,
  site: SiteDossier,
  cellShift: Vec3,
  context: boolean,
): DrawnAtom {
  return { atom, site, cellShift, context, position: shiftedPosition(dossier, atom.cartesian, cellShift) };
}

/** Å; `cellShift` in cells. */
export function shiftedPosition(dossier: CrystalDossier, cartesian: Vec3, cellShift: Vec3): Vec3 {
  return dossier.lattice ? add(cartesian, apply(dossier.lattice.toCartesian, cellShift)) : cartesian;
}

/** Cells this far out still have keys of their own. */
const keyReach = 1 << 16;

/** A cell shift as one number, for maps. */
export function shiftKey([i, j, k]: Vec3): number {
  return ((i + keyReach) * 2 * keyReach + j + keyReach) * 2 * keyReach + k + keyReach;
}

/** The drawn copies of each atom id. */
export interface Copies {
  readonly of: (id: string) => readonly DrawnAtom[];
  /** The copy a number of cells away from the atom's own position. */
  readonly at: (id: string, cellShift: Vec3) => DrawnAtom | undefined;
}

/** Lists longer than this are looked up by key, shorter ones from front to back. */
const shortList = 6;

export function copiesById(drawn: readonly DrawnAtom[]): Copies {
  const lists = new Map<string, DrawnAtom[]>();
  for (const one of drawn) {
    const known = lists.get(one.atom.id);
    if (known) known.push(one);
    else lists.set(one.atom.id, [one]);
  }
  const keyed = new Map<string, Map<number, DrawnAtom>>();
  const keyedList = (id: string, list: readonly DrawnAtom[]): Map<number, DrawnAtom> => {
    const made = new Map(list.map((one) => [shiftKey(one.cellShift), one]));
    keyed.set(id, made);
    return made;
  };
  return {
    of: (id) => lists.get(id) ?? none,
    at: (id, [i, j, k]) => {
      const list = lists.get(id);
      if (!list) return undefined;
      if (list.length > shortList) return (keyed.get(id) ?? keyedList(id, list)).get(shiftKey([i, j, k]));
      return list.find(({ cellShift: [p, q, r] }) => p === i && q === j && r === k);
    },
  };
}

const none: readonly DrawnAtom[] = [];

export interface KnownAtom {
  readonly atom: EquivalentAtom;
  readonly site: SiteDossier;
}

const knownAtoms = new WeakMap<CrystalDossier, ReadonlyMap<string, KnownAtom>>();

/** Every atom of the dossier by its id. */
export function atomsById(dossier: CrystalDossier): ReadonlyMap<string, KnownAtom> {
  const known = knownAtoms.get(dossier);
  if (known) return known;
  const atoms = new Map<string, KnownAtom>();
  for (const site of dossier.sites) for (const atom of site.equivalents) atoms.set(atom.id, { atom, site });
  knownAtoms.set(dossier, atoms);
  return atoms;
}
