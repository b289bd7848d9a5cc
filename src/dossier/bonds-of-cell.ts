import { apply, determinant } from '#src/base/matrix3.ts';
import type { Vec3, VecCart } from '#src/base/matrix3.ts';
import type { ProblemLog } from '#src/base/problem.ts';
import { findBonds } from '#src/crystal/bonds.ts';
import type { Crystal } from '#src/crystal/crystal.ts';
import { wholeMolecules } from '#src/crystal/molecules.ts';
import { periodicBasis } from '#src/crystal/periodic-basis.ts';
import type { ChosenCrystal } from './choose-symmetry.ts';
import type { BondRecord } from './dossier.ts';

/**
 * Atoms × atoms per Å³ beyond which bonds are not looked for: the search visits some hundred times as many pairs. Crystals have
 * 0.02 to 0.3 atoms per Å³, so that 200,000 atoms of one stay below; a cell in the wrong unit does not.
 */
const crowdingLimit = 60_000;

/** Å; in steps of this atoms are counted along directions that do not repeat: some twenty atoms of a dense solid a cube. */
const countingEdgeAngstrom = 4;

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
  const cartesians = atoms.map(({ atom }) => atom.cartesian);
  if (isTooCrowded(crystal, cartesians, log)) return { bonds: [], wholeMolecules: {} };
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
  const shifts = wholeMolecules(atoms.length, found, inCell, crystal.periodic);
  const moved = shifts.flatMap((shift, index): [string, Vec3][] =>
    shift.some((x) => x !== 0) ? [[atoms[index]!.atom.id, shift]] : [],
  );
  return { bonds, wholeMolecules: Object.fromEntries(moved) };
}

/**
 * Atoms per Å³ that an atom has around it, on average: in a crystal those of the cell by its volume. Across directions that do
 * not repeat they are counted in steps, because a box around them all would be made by a single atom far away.
 */
function densityAround({ lattice, periodic }: Crystal, positions: readonly VecCart[]): number {
  const basis = periodicBasis(lattice, lattice ? periodic : [false, false, false]);
  const counts = new Map<string, number>();
  for (const position of positions) {
    if (!position.every(Number.isFinite)) continue;
    const along = apply(basis.toBasis, position);
    const key = along.map((x, axis) => (basis.periodic[axis] ? 0 : Math.floor(x / countingEdgeAngstrom)));
    counts.set(key.join(), (counts.get(key.join()) ?? 0) + 1);
  }
  let squares = 0;
  for (const count of counts.values()) squares += count * count;
  const steps = basis.periodic.filter((repeats) => !repeats).length;
  const volume = Math.abs(determinant(basis.rows)) * countingEdgeAngstrom ** steps;
  return squares / Math.max(1, positions.length) / volume;
}

function isTooCrowded(crystal: Crystal, positions: readonly VecCart[], log: ProblemLog): boolean {
  const { lattice, place } = crystal;
  const atoms = positions.length;
  const perVolume = densityAround(crystal, positions);
  if (atoms * perVolume <= crowdingLimit) return false;
  const density = Number(perVolume.toPrecision(3));
  log.add(
    'warning',
    'cell-too-crowded',
    `The ${lattice ? 'cell holds' : 'molecule has'} ${atoms} atoms, ${density} per Å³: bonds were not looked for.`,
    {
      place,
      got: `${density} atoms per Å³`,
      allowed: 'about 0.02 to 0.3 atoms per Å³ in crystals and molecules',
      hint: lattice
        ? 'The cell may be in another unit than Å, or operations or coordinates may be wrong.'
        : 'The coordinates may be in another unit than Å, or be fractions of a cell that is missing.',
    },
  );
  return true;
}
