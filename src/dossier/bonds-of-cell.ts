import type { Vec3 } from '#src/base/matrix3.ts';
import type { ProblemLog } from '#src/base/problem.ts';
import { findBonds } from '#src/crystal/bonds.ts';
import type { Crystal } from '#src/crystal/crystal.ts';
import { wholeMolecules } from '#src/crystal/molecules.ts';
import type { ChosenCrystal } from './choose-symmetry.ts';
import type { BondRecord } from './dossier.ts';

/**
 * Atoms × atoms per Å³ beyond which bonds are not looked for: the search visits some hundred times as many pairs. Crystals have
 * 0.02 to 0.3 atoms per Å³, so that 200,000 atoms of one stay below; a cell in the wrong unit does not.
 */
const crowdingLimit = 60_000;

/**
 * Bonds among all atoms of the cell by atom id, and the cell shifts that make finite molecules whole. None, with
 * `cell-too-crowded`, where atoms are packed far denser than in any crystal.
 */
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
  if (isTooCrowded(crystal, atoms.length, log)) return { bonds: [], wholeMolecules: {} };
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

function isTooCrowded({ lattice, place }: Crystal, atoms: number, log: ProblemLog): boolean {
  if (!lattice || (atoms * atoms) / lattice.volume <= crowdingLimit) return false;
  const density = Number((atoms / lattice.volume).toPrecision(3));
  log.add(
    'warning',
    'cell-too-crowded',
    `The cell holds ${atoms} atoms, ${density} per Å³: bonds were not looked for.`,
    {
      place,
      got: `${density} atoms per Å³`,
      allowed: 'about 0.02 to 0.3 atoms per Å³ in crystals',
      hint: 'The cell may be in another unit than Å, or operations or coordinates may be wrong.',
    },
  );
  return true;
}
