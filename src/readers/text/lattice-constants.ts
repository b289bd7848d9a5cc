import type { CellConstants } from '#src/crystal/lattice.ts';

/** The length or angle of a cell that a word names: `a`, `cell_length_b`, `alpha`, `γ`; null for any other word. */
export function constantName(text: string): keyof CellConstants | null {
  const name = text.toLowerCase().replace(/^\w*_/, '');
  if (name === 'α') return 'alpha';
  if (name === 'β') return 'beta';
  if (name === 'γ') return 'gamma';
  return /^(?:a|b|c|alpha|beta|gamma)$/.test(name) ? (name as keyof CellConstants) : null;
}
