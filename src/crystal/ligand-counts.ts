import type { BondAtom } from './bond-atom.ts';
import type { BondingElement } from './bonding-rules.ts';
import { drawsElectrons } from './bonding-rules.ts';

/** Non-metal neighbours of each atom, to the nearest whole number. */
export interface LigandCounts {
  readonly neighbours: Uint16Array;
  /** Those of them that draw electrons from the atom. */
  readonly drawing: Uint16Array;
}

/**
 * Counts the non-metals bonded to each atom. A neighbour that is there only part of the time counts for its share, taken
 * relative to the atom's own: two halves of a disordered hydrogen make one.
 */
export function ligandCounts(
  atoms: readonly BondAtom[],
  elements: readonly BondingElement[],
  bonds: readonly { readonly from: number; readonly to: number }[],
): LigandCounts {
  const neighbours = new Float64Array(atoms.length);
  const drawing = new Float64Array(atoms.length);
  const count = (atom: number, other: number): void => {
    const partner = elements[other]!;
    if (partner.class === 'metal') return;
    const share = Math.min(1, (atoms[other]!.occupancy ?? 1) / (atoms[atom]!.occupancy ?? 1)) || 0;
    neighbours[atom]! += share;
    if (drawsElectrons(partner, elements[atom]!)) drawing[atom]! += share;
  };
  for (const { from, to } of bonds) {
    count(from, to);
    count(to, from);
  }
  return {
    neighbours: Uint16Array.from(neighbours, Math.round),
    drawing: Uint16Array.from(drawing, Math.round),
  };
}
