import type { Severity } from '#src/store/dossier-types.ts';

/** Heaviest first. */
export const severityOrder: readonly Severity[] = ['error', 'warning', 'note'];

/** `2 errors, 1 note`, or `no problems`. */
export function problemSummary(counts: Readonly<Record<Severity, number>>): string {
  const parts = severityOrder
    .filter((severity) => counts[severity] > 0)
    .map((severity) => `${counts[severity]} ${severity}${counts[severity] === 1 ? '' : 's'}`);
  return parts.length === 0 ? 'no problems' : parts.join(', ');
}
