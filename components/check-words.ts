import type { CheckedSet, CheckView } from '#src/store/check-desk.ts';
import { counted, formatNumber, formatTriple } from '#src/table/number-format.ts';

type Frame = NonNullable<CheckedSet['frame']>;

const methods: Readonly<Record<CheckedSet['mapping']['method'], string>> = {
  'same-file': 'They stand in the crystal’s own file.',
  geometry: 'Bound by position.',
  labels: 'Bound by site labels only: weaker evidence.',
  order: 'Bound by the order within each element only: weaker evidence.',
};

/** How a set was laid on the crystal, sentence by sentence. */
export function mappingSentences({ mapping }: CheckedSet): string[] {
  const { method, matched, atoms, rmsDisplacementAngstrom: rms, maxDisplacement: largest } = mapping;
  const { basis, strain, originShift, handedness } = mapping;
  const sentences = [methods[method], `${matched} of ${counted(atoms, 'atom')} found in the crystal.`];
  if (method !== 'geometry') return sentences;
  if (rms !== null) {
    const most = largest ? `, at most ${formatNumber(largest.value, 3)} Å (${largest.label})` : '';
    sentences.push(`Positions differ by ${formatNumber(rms, 3)} Å rms${most}.`);
  }
  if (basis) {
    const rows = [0, 3, 6].map((row) =>
      basis
        .slice(row, row + 3)
        .map((x) => formatNumber(x, Number.isInteger(x) ? 0 : 3))
        .join(' '),
    );
    const isSame = basis.every((x, at) => x === (at % 4 === 0 ? 1 : 0));
    const cell = isSame ? 'the crystal’s' : `(${rows.join(' / ')}) times the crystal’s`;
    sentences.push(`Its cell is ${cell}, strained by ${formatNumber((strain ?? 0) * 100, 2)} %.`);
  }
  if (originShift?.some((x) => Math.abs(x) >= 0.5e-4))
    sentences.push(`Origin shifted by ${formatTriple(originShift, 4)}.`);
  if (handedness === 'mirrored') sentences.push('It is the mirror image of the crystal.');
  return sentences;
}

/** How the Cartesian frame was settled. */
export function frameSentence({ inUse, by, decided }: Frame): string {
  if (!decided)
    return `${inUse} is in use, but symmetry does not decide: orientations are not to be trusted until a frame is chosen under Settings.`;
  const grounds = {
    lattice: 'the lattice that came with the tensors',
    positions: 'the positions that came with the tensors',
    user: 'your choice',
    symmetry: 'symmetry: no other named setting obeys it',
    nothing: 'default',
  } as const;
  return `${inUse}, by ${grounds[by]}.`;
}

/** Residual of a frame with its unit. */
export function residualText({ quantity }: CheckedSet, residual: number): string {
  return quantity === 'efg' ? `${formatNumber(residual, 4)} a.u.` : `${formatNumber(residual, 2)} ppm`;
}

/** A figure of noise of a shielding or field gradient. */
export function noiseText(quantity: 'shielding' | 'efg', value: number | null): string {
  return value === null ? '–' : formatNumber(value, quantity === 'efg' ? 4 : 2);
}

/** One sentence where nothing was found amiss with the structure and the sizes of values; else none. */
export function soundSentence({ contacts, hydrogens, implausible, unfinished }: CheckView): string | null {
  const count = contacts.length + hydrogens.length + implausible.length + unfinished.length;
  return count === 0 ? 'Nothing suspicious in distances, sizes of values, and the ends of runs.' : null;
}
