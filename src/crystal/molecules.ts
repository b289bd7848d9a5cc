import type { Vec3, VecFrac } from '#src/base/matrix3.ts';
import type { Periodicity } from '#src/base/periodicity.ts';
import { repeatsThroughout } from '#src/base/periodicity.ts';
import type { Bond } from './bond-atom.ts';

/** Which atoms hang together by bonds, and how to move them so that each molecule is in one piece. */
export interface Molecules {
  /** For each atom the number of its molecule, counted from 0 in the order of their first atoms. */
  readonly molecule: Int32Array;
  /** For each molecule whether it goes on for ever: a chain, layer or framework. */
  readonly endless: readonly boolean[];
  /** For each atom the multiples of a, b, c that make its molecule whole; zero in endless ones. */
  readonly shifts: readonly Vec3[];
}

/**
 * Multiples of a, b, c to add to each atom so that every finite molecule is whole across the faces of the cell, its
 * first atom unmoved, or, where fractional positions are given, its centre in the cell along axes that repeat. Chains, layers and frameworks
 * (a closed walk along bonds ends in another cell) stay where they are. Hydrogen bonds do not count. Linear in atoms and bonds.
 *
 * `wholeMolecules(2, [{from: 0, to: 1, shift: [1, 0, 0], …}])` → [[0, 0, 0], [1, 0, 0]]
 */
export function wholeMolecules(
  atomCount: number,
  bonds: readonly Bond[],
  positions?: readonly VecFrac[],
  periodic: Periodicity = repeatsThroughout,
): Vec3[] {
  return [...findMolecules(atomCount, bonds, positions, periodic).shifts];
}

/** Molecules with their members and shifts; see `wholeMolecules`. */
export function findMolecules(
  atomCount: number,
  bonds: readonly Bond[],
  positions?: readonly VecFrac[],
  periodic: Periodicity = repeatsThroughout,
): Molecules {
  const links = linksOf(
    atomCount,
    bonds.filter(({ kind }) => kind === 'bond'),
  );
  const molecule = new Int32Array(atomCount).fill(-1);
  const moved = new Int32Array(3 * atomCount);
  const endless: boolean[] = [];
  for (let root = 0; root < atomCount; root++) {
    if (molecule[root] !== -1) continue;
    const members = walkFrom(root, endless.length, links, molecule, moved);
    const isEndless = !closes(members, links, moved);
    endless.push(isEndless);
    if (isEndless) members.forEach((atom) => moved.fill(0, 3 * atom, 3 * atom + 3));
    else if (positions) centre(members, positions, moved, periodic);
  }
  const shifts = Array.from({ length: atomCount }, (_, i): Vec3 => [
    moved[3 * i]!,
    moved[3 * i + 1]!,
    moved[3 * i + 2]!,
  ]);
  return { molecule, endless, shifts };
}

/** Bonds as seen from each atom: partners of atom i are entries `starts[i]` to `starts[i + 1] - 1`. */
interface Links {
  readonly starts: Int32Array;
  readonly partner: Int32Array;
  readonly shift: Int32Array;
}

function linksOf(atomCount: number, bonds: readonly Bond[]): Links {
  const starts = new Int32Array(atomCount + 1);
  for (const { from, to } of bonds) {
    starts[from + 1]!++;
    starts[to + 1]!++;
  }
  for (let i = 0; i < atomCount; i++) starts[i + 1]! += starts[i]!;
  const next = starts.slice(0, atomCount);
  const partner = new Int32Array(2 * bonds.length);
  const shift = new Int32Array(6 * bonds.length);
  const put = (atom: number, other: number, turns: Vec3, sign: 1 | -1): void => {
    const at = next[atom]!++;
    partner[at] = other;
    turns.forEach((n, axis) => (shift[3 * at + axis] = sign * n));
  };
  for (const bond of bonds) {
    put(bond.from, bond.to, bond.shift, 1);
    put(bond.to, bond.from, bond.shift, -1);
  }
  return { starts, partner, shift };
}

/** Marks all atoms that can be reached, moves each beside the atom it was reached from, and returns them. */
function walkFrom(
  root: number,
  number: number,
  { starts, partner, shift }: Links,
  molecule: Int32Array,
  moved: Int32Array,
): number[] {
  const members = [root];
  molecule[root] = number;
  for (const atom of members) {
    for (let at = starts[atom]!; at < starts[atom + 1]!; at++) {
      const other = partner[at]!;
      if (molecule[other] !== -1) continue;
      molecule[other] = number;
      for (let axis = 0; axis < 3; axis++) {
        moved[3 * other + axis] = moved[3 * atom + axis]! + shift[3 * at + axis]!;
      }
      members.push(other);
    }
  }
  return members;
}

/** Whether every bond joins its atoms where they now are. */
function closes(members: readonly number[], { starts, partner, shift }: Links, moved: Int32Array): boolean {
  for (const atom of members) {
    for (let at = starts[atom]!; at < starts[atom + 1]!; at++) {
      for (let axis = 0; axis < 3; axis++) {
        const expected = moved[3 * atom + axis]! + shift[3 * at + axis]!;
        if (moved[3 * partner[at]! + axis] !== expected) return false;
      }
    }
  }
  return true;
}

/** Moves a whole molecule by lattice translations so that the mean of its positions is in [0, 1) where the cell repeats. */
function centre(
  members: readonly number[],
  positions: readonly VecFrac[],
  moved: Int32Array,
  periodic: Periodicity,
): void {
  for (const axis of [0, 1, 2] as const) {
    if (!periodic[axis]) continue;
    const sum = members.reduce((s, atom) => s + positions[atom]![axis] + moved[3 * atom + axis]!, 0);
    const turns = Math.floor(sum / members.length + 1e-9);
    for (const atom of members) moved[3 * atom + axis]! -= turns;
  }
}
