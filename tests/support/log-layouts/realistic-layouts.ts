import { crystalRunLayouts } from './crystal-run-layouts.ts';
import type { LogLayout } from './log-writer.ts';
import { moleculeRunLayouts } from './molecule-run-layouts.ts';
import { nameLayouts } from './name-layouts.ts';
import { paperLayouts } from './paper-layouts.ts';

/** Whole logs of invented calculations, and tables as papers, scripts and spreadsheets hold them. */
export const realisticLayouts: readonly (readonly [string, LogLayout])[] = Object.entries({
  ...crystalRunLayouts,
  ...moleculeRunLayouts,
  ...paperLayouts,
  ...nameLayouts,
});
