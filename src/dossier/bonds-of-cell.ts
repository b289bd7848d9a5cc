import { countOf } from '#src/base/count-of.ts';
import type { Vec3, VecCart } from '#src/base/matrix3.ts';
import { apply, determinant } from '#src/base/matrix3.ts';
import type { ProblemLog } from '#src/base/problem.ts';
import type { ReportProgress } from '#src/base/progress.ts';
import { partOf, unwatched } from '#src/base/progress.ts';
import type { BondAtom } from '#src/crystal/bond-atom.ts';
import { findBonds, mayStopShort } from '#src/crystal/bonds.ts';
import type { Crystal } from '#src/crystal/crystal.ts';
import { wholeMolecules } from '#src/crystal/molecules.ts';
import { periodicBasis } from '#src/crystal/periodic-basis.ts';
import type { SiteAtoms } from './cell-atoms.ts';
import type { ChosenCrystal } from './choose-symmetry.ts';
import type { BondRecord } from './dossier.ts';

/**
 * Atoms × atoms per Å³ beyond which bonds are not looked for: the search visits some hundred times as many pairs. Crystals have
 * 0.02 to 0.3 atoms per Å³, so that 200,000 atoms of one stay below; a cell in the wrong unit does not.
 */
const crowdingLimit = 60_000;

/** Å; in steps of this atoms are counted along directions that do not repeat: some twenty atoms of a dense solid a cube. */
const countingEdgeAngstrom = 4;

/** Every atom of the cell as bonds are made from, site after site. */
function bondAtoms(sites: readonly SiteAtoms[]): BondAtom[] {
  const atoms: BondAtom[] = [];
  for (const { site, atoms: images, cellShifts } of sites) {
    for (const [image, { cartesian, operationIndex }] of images.entries()) {
      atoms.push({
        element: site.element,
        cartesian,
        occupancy: site.occupancy,
        disorder: site.disorder,
        siteIndex: site.index,
        operationIndex,
        cellShift: cellShifts[image] ?? [0, 0, 0],
      });
    }
  }
  return atoms;
}

/**
 * Bonds among all atoms of the cell by atom id, and the cell shifts that make finite molecules whole. None, with
 * `cell-too-crowded`, where atoms are packed far denser than in any crystal.
 */
export function bondsOf(
  { crystal, sites }: ChosenCrystal,
  log: ProblemLog,
  progress: ReportProgress = unwatched,
): {
  bonds: BondRecord[];
  wholeMolecules: Record<string, Vec3>;
} {
  progress(0, 'bonds');
  const atoms = bondAtoms(sites);
  const cartesians = atoms.map(({ cartesian }) => cartesian);
  if (isTooCrowded(crystal, cartesians, log)) return { bonds: [], wholeMolecules: {} };
  const found = findBonds(atoms, crystal.lattice, {
    periodic: crystal.periodic,
    report: (found) => log.push(found),
    progress: partOf(progress, 0.1, 0.8),
  });
  progress(0.8, 'molecules');
  const images = sites.flatMap(({ atoms: ofSite }) => ofSite);
  const bonds = found.map((bond): BondRecord => ({
    from: images[bond.from]!.id,
    to: images[bond.to]!.id,
    shift: bond.shift,
    lengthAngstrom: bond.lengthAngstrom,
    kind: bond.kind,
  }));
  const positions = images.flatMap(({ fractional }) => (fractional ? [fractional] : []));
  const inCell = positions.length === atoms.length ? positions : undefined;
  progress(0.9, 'molecules');
  const shifts = wholeMolecules(atoms.length, found, inCell, crystal.periodic);
  const moved = shifts.flatMap((shift, index): [string, Vec3][] =>
    shift.some((x) => x !== 0) ? [[images[index]!.id, shift]] : [],
  );
  return { bonds, wholeMolecules: Object.fromEntries(moved) };
}

/** The problems that `bondsOf` raises, without the bonds: they are looked for only where the search may have to stop. */
export function reportBonds(chosen: ChosenCrystal, log: ProblemLog): void {
  const { crystal, sites } = chosen;
  const atoms = bondAtoms(sites);
  const cartesians = atoms.map(({ cartesian }) => cartesian);
  if (isTooCrowded(crystal, cartesians, log)) return;
  if (!mayStopShort(atoms, crystal.lattice, crystal.periodic)) return;
  findBonds(atoms, crystal.lattice, { periodic: crystal.periodic, report: (found) => log.push(found) });
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
    `The ${lattice ? 'cell holds' : 'molecule has'} ${countOf(atoms, 'atom')}, ${density} per Å³: bonds were not looked for.`,
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
