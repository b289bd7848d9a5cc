import type { VecFrac } from '#src/base/matrix3.ts';
import { add, subtract } from '#src/base/vector3.ts';
import { atomFinder } from './atom-finder.ts';
import type { Lattice } from './lattice.ts';

/**
 * How many times the cell repeats a smaller one: the number of translations (the identity included) that take every atom onto
 * one of its kind within the tolerance (Å). Counting stops behind `enough`. 1 for a primitive cell and for no atoms.
 * Linear in the atoms for each atom of the rarest kind.
 */
export function countPureTranslations(
  lattice: Lattice,
  positions: readonly VecFrac[],
  species: readonly number[],
  toleranceAngstrom: number,
  enough: number,
): number {
  const [first, ...others] = rarestKind(species);
  if (first === undefined || others.length < 1) return 1;
  const find = atomFinder(lattice, positions, species, toleranceAngstrom);
  let count = 1;
  for (const other of others) {
    const shift = subtract(positions[other]!, positions[first]!);
    const holds = positions.every((position, atom) => {
      const moved = add(position, shift) as VecFrac;
      return find(moved, species[atom]!) >= 0;
    });
    if (holds) count += 1;
    if (count > enough) break;
  }
  return count;
}

/** Indices of the atoms of the kind that has fewest. */
function rarestKind(species: readonly number[]): readonly number[] {
  const byKind = new Map<number, number[]>();
  for (const [atom, kind] of species.entries()) {
    const listed = byKind.get(kind);
    if (listed) listed.push(atom);
    else byKind.set(kind, [atom]);
  }
  return [...byKind.values()].reduce<readonly number[]>(
    (best, one) => (best.length === 0 || one.length < best.length ? one : best),
    [],
  );
}
