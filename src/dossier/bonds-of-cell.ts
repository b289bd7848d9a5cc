import type { Vec3 } from '#src/base/matrix3.ts';
import { findBonds } from '#src/crystal/bonds.ts';
import { wholeMolecules } from '#src/crystal/molecules.ts';
import type { ChosenCrystal } from './choose-symmetry.ts';
import type { BondRecord } from './dossier.ts';

/** Bonds among all atoms of the cell by atom id, and the cell shifts that make finite molecules whole. */
export function bondsOf({ crystal, sites }: ChosenCrystal): {
  bonds: BondRecord[];
  wholeMolecules: Record<string, Vec3>;
} {
  const atoms = sites.flatMap(({ site, atoms: images }) => images.map((atom) => ({ site, atom })));
  const found = findBonds(
    atoms.map(({ site, atom }) => ({
      element: site.element,
      cartesian: atom.cartesian,
      occupancy: site.occupancy,
      disorder: site.disorder,
      siteIndex: site.index,
      operationIndex: atom.operationIndex,
    })),
    crystal.lattice,
  );
  const bonds = found.map((bond): BondRecord => ({
    from: atoms[bond.from]!.atom.id,
    to: atoms[bond.to]!.atom.id,
    shift: bond.shift,
    lengthAngstrom: bond.lengthAngstrom,
    kind: bond.kind,
  }));
  const shifts = wholeMolecules(atoms.length, found);
  const moved = shifts.flatMap((shift, index): [string, Vec3][] =>
    shift.some((x) => x !== 0) ? [[atoms[index]!.atom.id, shift]] : [],
  );
  return { bonds, wholeMolecules: Object.fromEntries(moved) };
}
