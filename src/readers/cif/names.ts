import { cifLimits } from './limits.ts';
import type { CifReport } from './report.ts';

/** Names compare without case; beyond ASCII also without regard to how accents are composed (CIF 2.0). */
export function foldCase(name: string): string {
  const folded = name.toLowerCase();
  return /[\u0080-\uffff]/.test(folded) ? folded.normalize('NFC') : folded;
}

export function noteNameLength(name: string, offset: number, report: CifReport): void {
  if (name.length <= cifLimits.nameLength) return;
  report.add(
    'note',
    'cif-long-name',
    offset,
    `A name is longer than ${cifLimits.nameLength} characters; it was read whole.`,
    { got: `${name.length} characters`, allowed: `${cifLimits.nameLength} characters` },
  );
}
