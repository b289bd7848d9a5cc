import { countOf, wordFor } from '#src/base/count-of.ts';
import { apply, identity3, multiply, transpose } from '#src/base/matrix3.ts';
import type { Mat3, Vec3 } from '#src/base/matrix3.ts';
import type { Periodicity } from '#src/base/periodicity.ts';
import { openAxes, repeatsThroughout } from '#src/base/periodicity.ts';
import type { ProblemLog } from '#src/base/problem.ts';
import type { Lattice } from '#src/crystal/lattice.ts';
import type { TensorEntry, TensorSet } from '#src/tensor/tensor-set.ts';
import type { AtomImage, Attachment, AttachMethod, SiteTensor } from './attachment.ts';
import { frameRotation, latticeAgreement, sameCell } from './frame-rotation.ts';
import type { PositionMatch } from './match-positions.ts';
import { matchDistanceAngstrom, positionFinder, rootMeanSquare } from './match-positions.ts';

/** What a set is bound to: the crystal's lattice, its atoms in the cell, and how many sites they belong to. */
export interface AttachTarget {
  readonly lattice: Lattice | null;
  /** Along a, b, c; absent: all three. */
  readonly periodic?: Periodicity;
  readonly images: readonly AtomImage[];
  readonly siteCount: number;
  /** Rows of the crystal's own file → image index of that row's atom; null where the set comes from another file. */
  readonly rows: readonly number[] | null;
}

/** Q T Qᵀ: a tensor turned from one Cartesian frame into another. */
function turned(rotation: Mat3, tensor: Mat3): Mat3 {
  return rotation === identity3 ? tensor : multiply(multiply(rotation, tensor), transpose(rotation));
}

interface Binding {
  readonly method: AttachMethod;
  readonly rotation: Mat3;
  /** Image index of an entry, or null where it has none. */
  readonly imageOf: (entry: TensorEntry) => number | null;
  /** Of the atoms found by position. */
  readonly matches: PositionMatch[];
}

function bindByRows(rows: readonly number[]): Binding {
  const imageOf = (entry: TensorEntry) => (entry.atomIndex === null ? null : (rows[entry.atomIndex] ?? null));
  return { method: 'same-file', rotation: identity3, imageOf, matches: [] };
}

function bindByGeometry(setLattice: Lattice, lattice: Lattice, target: AttachTarget): Binding {
  const find = positionFinder(lattice, target.images, target.periodic);
  const matches: PositionMatch[] = [];
  const imageOf = (entry: TensorEntry) => {
    if (!entry.cartesian) return null;
    const fractional = apply(setLattice.toFractional, entry.cartesian);
    const match = find(fractional, entry.element);
    if (!match) return null;
    matches.push(match);
    return match.imageIndex;
  };
  return { method: 'geometry', rotation: frameRotation(setLattice, lattice), imageOf, matches };
}

/** By label, only where a label names one site; an element in the set must agree with the site's. */
function bindByLabels(set: TensorSet, target: AttachTarget): Binding {
  const byLabel = new Map<string, number | null>();
  target.images.forEach((image, index) => {
    if (image.own) byLabel.set(image.label, byLabel.has(image.label) ? null : index);
  });
  const rotation =
    set.lattice && target.lattice && sameCell(set.lattice.cell, target.lattice.cell)
      ? frameRotation(set.lattice, target.lattice)
      : identity3;
  const imageOf = (entry: TensorEntry) => {
    const index = entry.label === null ? null : (byLabel.get(entry.label) ?? null);
    return index !== null && target.images[index]?.element === entry.element ? index : null;
  };
  return { method: 'labels', rotation, imageOf, matches: [] };
}

/** Chooses the strongest binding the evidence allows; null with a problem when there is none. */
function chooseBinding(set: TensorSet, target: AttachTarget, log: ProblemLog): Binding | null {
  if (target.rows) return bindByRows(target.rows);
  const place = { file: set.file, line: set.entries[0]?.place.line ?? 1 };
  const hasPositions = set.lattice !== null && set.entries.some(({ cartesian }) => cartesian !== null);
  if (hasPositions && set.lattice && target.lattice) {
    if (sameCell(set.lattice.cell, target.lattice.cell)) {
      return bindByGeometry(set.lattice, target.lattice, target);
    }
    log.add(
      'error',
      'attach-other-cell',
      `The cell of ${set.name} is not the crystal's: its tensors were left out.`,
      {
        place,
        got: describeCell(set.lattice),
        allowed: `${describeCell(target.lattice)}, lengths within ${latticeAgreement.lengthShare * 100} %, angles within ${latticeAgreement.angleDegrees}°`,
        hint: 'Give the tensors together with the structure in the cell that was calculated, or open their file alone.',
      },
    );
    return null;
  }
  if (set.entries.some(({ label }) => label !== null)) {
    log.add(
      'warning',
      'attach-by-label',
      `${set.name} came without positions: bound by site labels, weaker evidence.`,
      {
        place,
        hint: 'Check a few values, or give the structure with the tensors.',
      },
    );
    return bindByLabels(set, target);
  }
  log.add(
    'error',
    'attach-no-evidence',
    `${set.name} has neither positions nor labels: its tensors were left out.`,
    {
      place,
      hint: 'Give the tensors in extended XYZ with a Lattice and positions.',
    },
  );
  return null;
}

function describeCell({ cell }: Lattice): string {
  const lengths = [cell.a, cell.b, cell.c].map((x) => x.toFixed(3)).join(', ');
  const angles = [cell.alpha, cell.beta, cell.gamma].map((x) => x.toFixed(2)).join(', ');
  return `${lengths} Å; ${angles}°`;
}

/** Shared by all sites without a tensor; a list of their own comes with the first. */
const noTensors: SiteTensor[] = [];

/** The tensor of a site's own atom goes before those of its images. */
function addTensor(bySite: SiteTensor[][], { siteIndex, own }: AtomImage, found: SiteTensor): void {
  const list = bySite[siteIndex];
  if (list === undefined) return;
  if (list.length === 0) bySite[siteIndex] = [found];
  else if (own) list.unshift(found);
  else list.push(found);
}

/**
 * Binds a tensor set to the atoms of a crystal and turns its tensors into the crystal's frame.
 * Raises `attach-other-cell`, `attach-no-evidence`, `attach-refused`, `attach-by-label`, `attach-unmatched`, `attach-twice`, `attach-moved`,
 * `attach-cells-away`.
 */
export function attachTensors(set: TensorSet, target: AttachTarget, log: ProblemLog): Attachment | null {
  const binding = chooseBinding(set, target, log);
  if (!binding) return null;
  const bySite: SiteTensor[][] = Array.from({ length: target.siteCount }, () => noTensors);
  const indices = set.entries.map(binding.imageOf);
  if (refused(set, binding.method, indices, log)) return null;
  const taken = new Set<number>();
  for (const [row, entry] of set.entries.entries()) {
    const index = indices[row] ?? null;
    const image = index === null ? undefined : target.images[index];
    if (index === null || !image) {
      reportUnmatched(entry, binding.method, log);
      continue;
    }
    if (taken.has(index)) {
      log.add(
        'warning',
        'attach-twice',
        `Atom ${image.label} has two ${set.quantity} tensors: the first was kept.`,
        {
          place: entry.place,
        },
      );
      continue;
    }
    taken.add(index);
    const tensor = turned(binding.rotation, entry.tensor);
    addTensor(bySite, image, { tensor, rotation: image.rotation, entry });
  }
  const distances = binding.matches.map(({ distanceAngstrom }) => distanceAngstrom);
  const rmsDisplacementAngstrom = rootMeanSquare(distances);
  reportDisplacement(set, distances, rmsDisplacementAngstrom, log);
  reportCellsAway(set, binding.matches, target, log);
  return {
    name: set.name,
    file: set.file,
    quantity: set.quantity,
    unitGiven: set.unitGiven,
    method: binding.method,
    rotation: binding.rotation,
    bySite,
    rmsDisplacementAngstrom,
  };
}

/** Share of a set's atoms that must be found in the crystal; below it the agreement of the others is chance. */
const leastMatchedShare = 0.5;

/** True, with one problem, where too few atoms of another file's set lie on atoms of the crystal. */
function refused(
  set: TensorSet,
  method: AttachMethod,
  indices: readonly (number | null)[],
  log: ProblemLog,
): boolean {
  const found = indices.filter((index) => index !== null).length;
  if (method === 'same-file' || found >= leastMatchedShare * indices.length) return false;
  log.add(
    'error',
    'attach-refused',
    `Only ${found} of the ${countOf(indices.length, 'atom')} of ${set.name} ${wordFor(found, 'is', 'are')} found in the crystal: its tensors were left out.`,
    {
      place: { file: set.file, line: set.entries[0]?.place.line ?? 1 },
      allowed: `at least ${leastMatchedShare * 100} % of them within ${matchDistanceAngstrom} Å of an atom of the same element`,
      hint: 'Another compound, another origin or setting, or the other hand: open the file alone to see it.',
    },
  );
  return true;
}

function reportUnmatched(entry: TensorEntry, method: AttachMethod, log: ProblemLog): void {
  const name = entry.label ?? entry.element;
  const allowed =
    method === 'geometry'
      ? `an atom of the same element within ${matchDistanceAngstrom} Å`
      : 'a site of that label and element, named once';
  log.add(
    'error',
    'attach-unmatched',
    `The tensor of ${name} belongs to no atom of the crystal and was left out.`,
    {
      place: entry.place,
      got: entry.cartesian ? formatPosition(entry.cartesian) : name,
      allowed,
      hint: 'Check that structure and tensors are of the same compound, cell and origin.',
    },
  );
}

function formatPosition(v: Vec3): string {
  return `${v.map((x) => x.toFixed(4)).join(', ')} Å`;
}

function reportDisplacement(
  set: TensorSet,
  distances: readonly number[],
  rms: number | null,
  log: ProblemLog,
): void {
  const largest = distances.reduce((a, b) => Math.max(a, b), 0);
  if (rms === null || largest < 0.02) return;
  log.add(
    'note',
    'attach-moved',
    `Atoms of ${set.name} lie off the crystal's by ${rms.toFixed(3)} Å rms, ${largest.toFixed(3)} Å at most.`,
    { place: { file: set.file, line: set.entries[0]?.place.line ?? 1 } },
  );
}

function reportCellsAway(
  set: TensorSet,
  matches: readonly PositionMatch[],
  { periodic = repeatsThroughout }: AttachTarget,
  log: ProblemLog,
): void {
  const count = matches.filter(({ isCellsAway }) => isCellsAway).length;
  if (count === 0) return;
  const open = openAxes(periodic).join(', ');
  log.add(
    'note',
    'attach-cells-away',
    `Atoms of ${set.name} lie whole cells away from the crystal's, which does not repeat along ${open}: they were taken for the same ones.`,
    {
      place: { file: set.file, line: set.entries[0]?.place.line ?? 1 },
      got: `${count} of ${matches.length} so far away`,
    },
  );
}
