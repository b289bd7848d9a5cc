import { blockLayouts } from './block-layouts.ts';
import { rareLayouts } from './rare-layouts.ts';
import { rowLayouts } from './row-layouts.ts';
import { tableLayouts } from './table-layouts.ts';
import type { LogLayout } from './log-writer.ts';

/** Layouts of logs and tables of our own invention; each writes the same tensors with noise and decoys around them. */
export const logLayouts: readonly (readonly [string, LogLayout])[] = Object.entries({
  ...blockLayouts,
  ...rowLayouts,
  ...tableLayouts,
  ...rareLayouts,
});
