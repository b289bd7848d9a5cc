import { countOf, wordFor } from '#src/base/count-of.ts';
import type { Place, ProblemLog } from '#src/base/problem.ts';
import { componentLimitText } from '#src/tensor/component-limit.ts';
import type { TensorColumn } from './column-plan.ts';

/** Why an atom got no tensor from a column: not given at all, a component not computed, one that is no number or beyond the limit. */
export type GapKind = 'absent' | 'missing' | 'unreadable' | 'beyond';

interface Gap {
  count: number;
  /** Lines of the first few atoms, from 1. */
  readonly lines: number[];
  readonly place: Place;
  readonly got: string;
}

/** Atoms of one tensor column without a tensor, by the reason; each reason is said once a frame. */
export type TensorGaps = Map<GapKind, Gap>;

const namedLines = 5;

/** Notes that the atom in this line has no tensor; `got` is the text in the way. */
export function addGap(gaps: TensorGaps, kind: GapKind, place: Place, got: string): void {
  const gap = gaps.get(kind) ?? { count: 0, lines: [], place, got };
  gaps.set(kind, gap);
  gap.count++;
  if (gap.lines.length < namedLines) gap.lines.push(place.line);
}

/**
 * One problem a reason: how many of the atoms have no tensor of this column, and in which lines they stand. The others keep
 * theirs. Raises `xyz-tensor-absent` (all nine components marked as missing), `xyz-missing-tensor` (some marked so),
 * `xyz-bad-tensor` (text that is no number), `xyz-tensor-too-large` (a component beyond `largestComponent`).
 */
export function reportGaps(
  { column: { name }, quantity }: TensorColumn,
  gaps: TensorGaps,
  atoms: number,
  log: ProblemLog,
): void {
  for (const [kind, gap] of gaps) {
    const { severity, code, why } = kinds[kind];
    const lines = `${wordFor(gap.count, 'line')} ${gap.lines.join(', ')}${gap.count > gap.lines.length ? ', …' : ''}`;
    const rest = gap.count < atoms ? '; the others keep theirs' : '';
    const message = `${gap.count} of ${countOf(atoms, 'atom')} ${wordFor(gap.count, 'has', 'have')} no ${name}, because ${why} (${lines})${rest}.`;
    log.add(severity, code, message, {
      place: gap.place,
      got: gap.got.slice(0, 60),
      ...(kind !== 'absent' && {
        allowed: kind === 'beyond' ? componentLimitText(quantity) : 'nine numbers, row by row',
      }),
    });
  }
}

const kinds = {
  absent: {
    severity: 'note',
    code: 'xyz-tensor-absent',
    why: 'all nine components are marked as missing',
  },
  missing: { severity: 'warning', code: 'xyz-missing-tensor', why: 'a component is missing' },
  unreadable: { severity: 'error', code: 'xyz-bad-tensor', why: 'a component is not a number' },
  beyond: {
    severity: 'error',
    code: 'xyz-tensor-too-large',
    why: 'a component is larger than any tensor of this quantity has',
  },
} as const;
