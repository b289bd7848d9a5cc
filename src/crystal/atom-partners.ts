import type { VecFrac } from '#src/base/matrix3.ts';
import { identity3 } from '#src/base/matrix3.ts';
import { subtract } from '#src/base/vector3.ts';
import { atomFinder } from './atom-finder.ts';
import type { Lattice } from './lattice.ts';
import type { SymmetryOperation } from './symmetry-operation.ts';
import { applyOperation, operationKey, rotationKey } from './symmetry-operation.ts';

const identityKey = rotationKey(identity3);

/** An operation as a pure translation after the first operation with its rotation part; null for the identity's. */
interface Factors {
  readonly turned: Int32Array;
  readonly shifted: Int32Array | null;
}

/**
 * Makes a function that tells which atom an operation (by its index) takes an atom to. Only pure translations and one
 * operation of each rotation part are looked up among the atoms, within the reach (Å); the others are their products,
 * so that a cell of many repetitions costs no more than its translations and its point group. Null as soon as one of
 * them takes an atom to where none of its kind is.
 */
export function atomPartners(
  operations: readonly SymmetryOperation[],
  lattice: Lattice,
  positions: readonly VecFrac[],
  species: readonly number[],
  reachAngstrom: number,
): ((operationIndex: number, atom: number) => number) | null {
  const find = atomFinder(lattice, positions, species, reachAngstrom);
  const partnersOf = (operation: SymmetryOperation): Int32Array | null => {
    const partners = new Int32Array(positions.length);
    for (const [atom, position] of positions.entries()) {
      const partner = find(applyOperation(operation, position), species[atom]!);
      if (partner < 0) return null;
      partners[atom] = partner;
    }
    return partners;
  };
  const shifts = new Map<string, Int32Array>();
  for (const operation of operations) {
    if (rotationKey(operation.rotation) !== identityKey) continue;
    const partners = partnersOf(operation);
    if (!partners) return null;
    shifts.set(operationKey(operation), partners);
  }
  const turns = new Map<number, { first: SymmetryOperation; turned: Int32Array }>();
  const factors: Factors[] = [];
  for (const operation of operations) {
    const turn = turns.get(rotationKey(operation.rotation));
    const translation = turn && subtract(operation.translation, turn.first.translation);
    const shifted = translation && shifts.get(operationKey({ rotation: identity3, translation }));
    const turned = shifted ? turn.turned : partnersOf(operation);
    if (!turned) return null;
    if (!turn) turns.set(rotationKey(operation.rotation), { first: operation, turned });
    factors.push({ turned, shifted: shifted ?? null });
  }
  return (operationIndex, atom) => {
    const { turned, shifted } = factors[operationIndex]!;
    return shifted ? shifted[turned[atom]!]! : turned[atom]!;
  };
}
