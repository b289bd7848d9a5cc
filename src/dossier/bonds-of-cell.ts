import type { Vec3 } from '#src/base/matrix3.ts';
import type { ProblemLog } from '#src/base/problem.ts';
import { findBonds } from '#src/crystal/bonds.ts';
import { wholeMolecules } from '#src/crystal/molecules.ts';
import type { ChosenCrystal } from './choose-symmetry.ts';
import type { BondRecord } from './dossier.ts';

/** Bonds among all atoms of the cell by atom id, and the cell shifts that make finite molecules whole. */
export function bondsOf(
  { crystal, sites }: ChosenCrystal,
  log: ProblemLog,
): {
  bonds: BondRecord[];
  wholeMolecules: Record<string, Vec3>;
} {
  const atoms = sites.flatMap(({ site, atoms: images, cellShifts }) =>
    images.map((atom, image) => ({ site, atom, cellShift: cellShifts[image] ?? ([0, 0, 0] as const) })),
  );
  const found = findBonds(
    atoms.map(({ site, atom, cellShift }) => ({
      element: site.element,
      cartesian: atom.cartesian,
      occupancy: site.occupancy,
      disorder: site.disorder,
      siteIndex: site.index,
      operationIndex: atom.operationIndex,
      cellShift,
    })),
    crystal.lattice,
    { periodic: crystal.periodic, report: (found) => log.push(found) },
  );
  const bonds = found.map((bond): BondRecord => ({
    from: atoms[bond.from]!.atom.id,
    to: atoms[bond.to]!.atom.id,
    shift: bond.shift,
    lengthAngstrom: bond.lengthAngstrom,
    kind: bond.kind,
  }));
  const positions = atoms.flatMap(({ atom }) => (atom.fractional ? [atom.fractional] : []));
  const inCell = positions.length === atoms.length ? positions : undefined;
  const shifts = wholeMolecules(atoms.length, found, inCell);
  const moved = shifts.flatMap((shift, index): [string, Vec3][] =>
    shift.some((x) => x !== 0) ? [[atoms[index]!.atom.id, shift]] : [],
  );
  return { bonds, wholeMolecules: Object.fromEntries(moved) };
}
