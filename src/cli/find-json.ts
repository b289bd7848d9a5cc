import { nested } from '#src/base/matrix3.ts';
import type { Mat3 } from '#src/base/matrix3.ts';
import type { FoundGroup, FoundText } from '#src/readers/text/found-text.ts';

const printed = (value: number | null): number | null =>
  value === null || !Number.isFinite(value) ? null : value;

function groupJson({
  entries,
  line,
  shape,
  quantity,
  unit,
  reason,
  proposed,
  role,
  roleWord,
  evidence,
}: FoundGroup) {
  return {
    line,
    shape,
    quantity,
    unit,
    reason,
    proposed,
    role,
    roleWord,
    evidence,
    entries: entries.map((entry) => ({
      line: entry.line,
      label: entry.label,
      element: entry.element,
      index: entry.index,
      tensor: nested(entry.tensor as Mat3).map((row) => row.map(printed)),
      complete: entry.isComplete,
      matched: entry.matched.map(({ kind, printed: values, line: at }) => ({ kind, values, line: at })),
    })),
  };
}

/** Tensors of shielding, shift or field gradient as the text gives them last and whole, or that the user must name. */
export function isAnswer({ role, shape }: FoundGroup): boolean {
  // Principal values of tensors that stand in full elsewhere give them back with fewer digits.
  if (role === 'repeated' && shape === 'principal') return false;
  return role !== 'decoy' && role !== 'contribution' && role !== 'earlier';
}

/**
 * The document of `find`. `groups` holds the answer; contributions, earlier cycles and things of the same shape that are no such
 * tensors stand in `others`, so that nothing in `groups` has to be sorted out by whoever reads it.
 */
export function findJson({ groups, structures, problems }: FoundText) {
  return {
    schema: 'ellipsite/find/1',
    structures: structures.map(({ line, lattice, atoms, evidence }) => ({
      line,
      lattice: lattice && nested(lattice.rows),
      atoms: atoms.map(({ label, element, index, fractional, cartesian }) => ({
        label,
        element,
        index,
        fractional,
        cartesian,
      })),
      evidence,
    })),
    groups: groups.filter(isAnswer).map(groupJson),
    others: groups.filter((group) => !isAnswer(group)).map(groupJson),
    problems,
  };
}
