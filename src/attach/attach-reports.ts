import { countOf, wordFor } from '#src/base/count-of.ts';
import { determinant } from '#src/base/matrix3.ts';
import type { Periodicity } from '#src/base/periodicity.ts';
import { openAxes } from '#src/base/periodicity.ts';
import type { Place, ProblemLog } from '#src/base/problem.ts';
import type { Lattice } from '#src/crystal/lattice.ts';
import { cellFromRows } from '#src/crystal/lattice.ts';
import type { TensorEntry, TensorSet } from '#src/tensor/tensor-set.ts';
import type { Binding } from './binding.ts';
import type { FrameRanking } from './frame-ranking.ts';
import { matchDistanceAngstrom } from './match-positions.ts';
import { latticeTolerances, leastFitShare } from './match-structure.ts';
import type { PositionBinding } from './bind-by-position.ts';
import type { ReducedLattice } from './structure-atoms.ts';

export function placeOfSet(set: TensorSet): Place {
  return { file: set.file, line: set.entries[0]?.place.line ?? 1 };
}

function describeCell({ cell }: Pick<Lattice, 'cell'>): string {
  const lengths = [cell.a, cell.b, cell.c].map((x) => x.toFixed(3)).join(', ');
  const angles = [cell.alpha, cell.beta, cell.gamma].map((x) => x.toFixed(2)).join(', ');
  return `${lengths} Å; ${angles}°`;
}

function describeReduced({ rows }: ReducedLattice): string {
  return `${describeCell({ cell: cellFromRows(rows) })} (${Math.abs(determinant(rows)).toFixed(1)} Å³)`;
}

/** Why no way of laying the source on the crystal was believed, with the test it failed and by how much. */
export function reportRefusal(
  set: TensorSet,
  lattice: Lattice,
  refusal: NonNullable<PositionBinding['refusal']>,
  log: ProblemLog,
): void {
  const place = placeOfSet(set);
  const { lengthShare, angleDegrees } = latticeTolerances.at(-1)!;
  const hint = 'Give the tensors together with the structure that was calculated, or open their file alone.';
  if (refusal.kind === 'other-lattice') {
    const got = set.lattice ? describeCell(set.lattice) : '';
    log.add(
      'error',
      'attach-other-cell',
      `The cell of ${set.name} is not the crystal's, nor one made from it: its tensors were left out.`,
      {
        place,
        got: `${got}; reduced ${describeReduced(refusal.source)}`,
        allowed: `${describeCell(lattice)}; reduced ${describeReduced(refusal.target)}, or a multiple; lengths within ${lengthShare * 100} %, angles within ${angleDegrees}°`,
        hint,
      },
    );
    return;
  }
  if (refusal.kind === 'too-many') {
    log.add(
      'error',
      'attach-too-large',
      `${set.name} and the crystal have too many common cells to try: its tensors were left out.`,
      {
        place,
        hint,
      },
    );
    return;
  }
  const { best, largestAngstrom } = refusal;
  const got = best
    ? `${best.sought - best.missing.length} of ${countOf(best.sought, 'atom')} found, ${best.rmsAngstrom.toFixed(3)} Å rms off`
    : 'no origin at which more than a few atoms agree';
  log.add(
    'error',
    'attach-refused',
    `The lattices of ${set.name} and the crystal agree, their atoms do not: its tensors were left out.`,
    {
      place,
      got,
      allowed: `at least ${leastFitShare * 100} % found, at most ${largestAngstrom.toFixed(2)} Å rms off, atoms that are not found counting as 0.7 Å`,
      hint: 'Another compound or polymorph in a like cell: open the file alone to see it.',
    },
  );
}

/** Share of a set's atoms that must be found in the crystal; below it the agreement of the others is chance. */
const leastMatchedShare = 0.5;

/** True, with one problem, where too few tensors of another file's set belong to atoms of the crystal. */
export function refused(set: TensorSet, binding: Binding, log: ProblemLog): boolean {
  const found = binding.images.filter((images) => images.length > 0).length;
  if (binding.mapping.method === 'same-file' || found >= leastMatchedShare * set.entries.length) return false;
  log.add(
    'error',
    'attach-refused',
    `Only ${found} of the ${countOf(set.entries.length, 'atom')} of ${set.name} ${wordFor(found, 'is', 'are')} found in the crystal: its tensors were left out.`,
    {
      place: placeOfSet(set),
      allowed: `at least ${leastMatchedShare * 100} % of them within ${matchDistanceAngstrom} Å of an atom of the same element`,
      hint: 'Another compound, another origin or setting, or the other hand: open the file alone to see it.',
    },
  );
  return true;
}

export function reportUnmatched(entry: TensorEntry, method: string, log: ProblemLog): void {
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
      got: entry.cartesian ? `${entry.cartesian.map((x) => x.toFixed(4)).join(', ')} Å` : name,
      allowed,
      hint: 'Check that structure and tensors are of the same compound, cell and origin.',
    },
  );
}

/** What a fit by geometry found beyond the identity: another cell, origin, hand, and moved atoms. */
export function reportMapping(
  set: TensorSet,
  { mapping, cellsAway }: Binding,
  periodic: Periodicity,
  log: ProblemLog,
): void {
  const place = placeOfSet(set);
  const { maxDisplacement: largest, rmsDisplacementAngstrom: rms, doubtful } = mapping;
  if (mapping.handedness === 'mirrored') {
    log.add(
      'warning',
      'attach-mirrored',
      `${set.name} is the mirror image of the crystal: its tensors were mirrored with it.`,
      {
        place,
        hint: 'Check which hand was calculated; isotropic values and couplings are the same for both.',
      },
    );
  }
  if (rms !== null && largest && largest.value >= 0.02) {
    log.add(
      'note',
      'attach-moved',
      `Atoms of ${set.name} lie off the crystal's by ${rms.toFixed(3)} Å rms, ${largest.value.toFixed(3)} Å at most.`,
      { place, got: `${largest.label} moved most` },
    );
  }
  if (doubtful.length > 0 && mapping.method === 'geometry' && mapping.matched > 3) {
    log.add(
      'warning',
      'attach-doubtful',
      `Some atoms of ${set.name} moved so far that they may be taken for others.`,
      {
        place,
        got: doubtful
          .slice(0, 10)
          .map(({ label, value }) => `${label} ${value.toFixed(2)} Å`)
          .join(', '),
      },
    );
  }
  if (cellsAway > 0) {
    log.add(
      'note',
      'attach-cells-away',
      `Atoms of ${set.name} lie whole cells away from the crystal's, which does not repeat along ${openAxes(periodic).join(', ')}: they were taken for the same ones.`,
      { place, got: `${cellsAway} of ${mapping.matched} so far away` },
    );
  }
}

const percent = (share: number | null): string => `${((share ?? 0) * 100).toFixed(1)} %`;

/** What is uncertain about a frame: not decidable, no setting fits, or the chosen one is worse than another. */
export function reportFrame(
  set: TensorSet,
  { frames, decided, by, inUse }: FrameRanking,
  log: ProblemLog,
): void {
  const place = placeOfSet(set);
  const [best] = frames;
  const used = frames.find(({ name }) => name === inUse);
  const ranking = frames
    .map(({ name, relative, verdict }) => `${name} ${percent(relative)} (${verdict})`)
    .join(', ');
  if (!best || !used) return;
  if (decided && used.verdict === 'excluded') {
    log.add(
      'warning',
      'frame-misfit',
      `Read in the frame ${inUse}, the tensors of ${set.name} break the crystal's symmetry by ${percent(used.relative)} of their anisotropy; in ${best.name} by ${percent(best.relative)}.`,
      { place, got: ranking, hint: `Choose it with --frame ${best.name}, if the tensors stand in it.` },
    );
    return;
  }
  if (decided && by === 'symmetry') {
    log.add(
      'note',
      'frame-found',
      `No lattice came with ${set.name}: symmetry leaves the frame ${inUse} only.`,
      {
        place,
        got: ranking,
      },
    );
    return;
  }
  if (decided) return;
  const invisible = frames
    .filter(({ verdict }) => verdict === 'undetectable by symmetry')
    .map(({ name }) => name);
  const why =
    invisible.length > 0
      ? `undetectable by symmetry: ${[best.name, ...invisible].join(', ')} obey it alike`
      : 'several settings obey symmetry alike within the noise, or none does';
  log.add(
    'warning',
    'frame-undecided',
    `No lattice came with ${set.name}, and its Cartesian frame is ${why}. Orientations are shown as if it were ${inUse} and are not to be trusted.`,
    {
      place,
      got: ranking,
      hint: 'Say which frame was used with --frame NAME. Isotropic values and principal values do not depend on it.',
    },
  );
}
