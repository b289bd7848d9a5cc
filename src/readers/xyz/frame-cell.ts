import { rowsOf } from '#src/base/matrix3.ts';
import type { Mat3 } from '#src/base/matrix3.ts';
import type { Periodicity } from '#src/base/periodicity.ts';
import type { Place, ProblemLog } from '#src/base/problem.ts';
import type { Lattice } from '#src/crystal/lattice.ts';
import { latticeFromRows, rowsProblem } from '#src/crystal/lattice.ts';
import type { CommentEntry, CommentLine } from './comment-line.ts';
import { parseLattice, parsePeriodicity } from './lattice-value.ts';

export interface FrameCell {
  readonly lattice: Lattice | null;
  readonly periodic: Periodicity;
}

/**
 * The cell of a frame from `Lattice` (rows kept bit by bit) and `pbc` (all three true where `Lattice` stands alone).
 * Reports `xyz-bad-lattice`, `xyz-lattice-edges`, `xyz-lattice-zero`, `xyz-left-handed`, `xyz-bad-pbc`,
 * `xyz-pbc-without-lattice`, `xyz-other-cell-key`.
 */
export function readFrameCell(comment: CommentLine, line: Place, log: ProblemLog): FrameCell {
  const latticeEntry = comment.byKey.get('lattice');
  const lattice =
    latticeEntry === undefined
      ? reportOtherKey(comment, line, log)
      : readLattice(latticeEntry, at(latticeEntry, line), log);
  const pbc = comment.byKey.get('pbc');
  const given = pbc === undefined ? null : parsePeriodicity(pbc.value);
  if (pbc !== undefined && given === null) {
    log.add(
      'warning',
      'xyz-bad-pbc',
      'pbc cannot be read; the crystal is taken as periodic along a, b and c.',
      {
        place: at(pbc, line),
        got: pbc.value.slice(0, 60),
        allowed: 'three of T and F, such as "T T T"',
      },
    );
  }
  if (lattice === null) {
    if (pbc !== undefined && given?.includes(true)) {
      const message =
        'pbc names periodic directions, but there is no cell; the atoms are taken as a molecule.';
      log.add('warning', 'xyz-pbc-without-lattice', message, {
        place: at(pbc, line),
        hint: 'Add Lattice="…".',
      });
    }
    return { lattice: null, periodic: [false, false, false] };
  }
  return { lattice, periodic: given ?? [true, true, true] };
}

function at(entry: CommentEntry, line: Place): Place {
  return { ...line, column: entry.valueStart + 1 };
}

function readLattice(entry: CommentEntry, place: Place, log: ProblemLog): Lattice | null {
  const value = parseLattice(entry.value);
  const got = entry.value.slice(0, 120);
  const allowed = 'nine numbers in Å: a, b, c one after the other';
  if (value.kind === 'fault') {
    log.add('error', 'xyz-bad-lattice', `${value.message} The atoms are taken as a molecule.`, {
      place,
      got,
      allowed,
    });
    return null;
  }
  if (value.kind === 'zero') {
    log.add('note', 'xyz-lattice-zero', 'Lattice holds only zeros; the atoms are taken as a molecule.', {
      place,
      got,
    });
    return null;
  }
  const fault = rowsProblem(value.rows);
  if (fault !== null) {
    log.add('error', 'xyz-bad-lattice', `${fault} The atoms are taken as a molecule.`, {
      place,
      got,
      allowed: 'three vectors of 0.01 to 1000000 Å that do not lie in one plane: a, b, c one after the other',
      hint: 'Compare the nine numbers with the source: one vector may stand twice or be cut off. A layer or chain still needs three vectors: give it one across the empty space, and pbc="T T F". A molecule needs no Lattice.',
    });
    return null;
  }
  if (value.kind === 'edges') {
    const message =
      'Lattice holds three numbers; they were read as the edges of a right-angled cell along x, y, z.';
    log.add('warning', 'xyz-lattice-edges', message, { place, got, allowed });
  }
  if (isLeftHanded(value.rows)) {
    log.add('note', 'xyz-left-handed', 'The cell vectors are left-handed; they were kept as they are.', {
      place,
    });
  }
  return latticeFromRows(value.rows, 'as given by Lattice');
}

function isLeftHanded(rows: Mat3): boolean {
  const [a, b, c] = rowsOf(rows);
  const [x, y, z] = [a[1] * b[2] - a[2] * b[1], a[2] * b[0] - a[0] * b[2], a[0] * b[1] - a[1] * b[0]];
  return x * c[0] + y * c[1] + z * c[2] < 0;
}

/** A cell under another key is not read, but not passed over in silence either. */
function reportOtherKey(comment: CommentLine, line: Place, log: ProblemLog): null {
  const other = ['cell', 'unitcell', 'unit_cell', 'lattice_vectors', 'box'].find((key) =>
    comment.byKey.has(key),
  );
  const entry = other === undefined ? undefined : comment.byKey.get(other);
  if (entry !== undefined) {
    const message = `The key ${entry.key} may hold a cell, but only Lattice is read; the atoms are taken as a molecule.`;
    log.add('warning', 'xyz-other-cell-key', message, {
      place: at(entry, line),
      got: entry.value.slice(0, 120),
      allowed: 'Lattice="ax ay az bx by bz cx cy cz"',
    });
  }
  return null;
}
