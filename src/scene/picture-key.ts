import { siteColourBytes } from '#src/data/site-colour.ts';
import type { SiteDossier } from '#src/dossier/dossier.ts';
import { printed } from './printed.ts';
import type { PictureKey, SceneQuantity, SiteKey, TensorScale } from './scene.ts';
import type { ChosenTensors } from './tensor-choice.ts';
import { lobeColours } from './tensor-choice.ts';
import type { TensorDrawing } from './tensor-drawing.ts';

export const quantityLetters: Readonly<Record<SceneQuantity, string>> = {
  shielding: 'σ',
  shift: 'δ',
  efg: 'V',
};

/** What of the glyphs is how long, such as "radius = |n·σ·n − σ(iso)|": the same words on the page, in captions and in pictures. */
export function lengthWords(scale: TensorScale): string {
  const letter = quantityLetters[scale.quantity];
  const isDeviation = scale.kind === 'deviation' && scale.quantity !== 'efg';
  if (scale.part === 'antisymmetric') return 'half length = size of the axial vector';
  if (scale.glyph === 'polar') return `radius = |n·${letter}·n${isDeviation ? ` − ${letter}(iso)` : ''}|`;
  if (scale.glyph === 'axes')
    return `half lengths = sizes of the ${isDeviation ? 'deviations from the isotropic value' : 'principal values'}`;
  if (scale.kind === 'total') return 'semi-axes = principal values of the symmetric part';
  const value = isDeviation ? 'deviation from the isotropic value' : 'principal value';
  return `semi-axes = ${printed(scale.baseRadiusAngstrom)} Å + ${value}`;
}

const subjects: Readonly<Record<SceneQuantity, string>> = {
  shielding: 'shielding tensors σ/ppm',
  shift: 'shift tensors δ/ppm',
  efg: 'electric field gradients (atomic units)',
};

/** What the glyphs are, where no colour bar of the same quantity says it. */
function subjectOf({ quantity, legend, colourBy, coloured }: ChosenTensors): string | null {
  const isSaid = legend !== null && coloured.convention.quantity === quantity && colourBy !== 'coupling';
  return isSaid ? null : subjects[quantity];
}

/** Share of the largest value below which a lobe is rounding. */
const dustShare = 1e-6;

/** Signs of lobes: both colours where colour says nothing else; else that darker, striped ones are negative, so far as some are. */
function lobeKeyOf({ choice, forms, scale }: TensorDrawing): PictureKey['lobes'] {
  if (scale.glyph !== 'polar' || scale.part === 'antisymmetric') return null;
  if (choice.colourBy === 'sign') return { ...lobeColours, negativeWords: 'negative (striped)' };
  let [lowest, size] = [0, 0];
  for (const { values, isotropic } of forms.values()) {
    for (const value of values) {
      const drawn = value - (scale.kind === 'total' ? 0 : isotropic);
      lowest = Math.min(lowest, drawn);
      size = Math.max(size, Math.abs(drawn));
    }
  }
  return lowest < -dustShare * size ? darkerLobes : null;
}

const darkerLobes: PictureKey['lobes'] = {
  positive: null,
  negative: [112, 108, 101],
  negativeWords: 'darker, striped = negative',
};

/** Sites named in a key, at most. */
const mostSites = 12;

export interface KeyParts {
  readonly drawing: TensorDrawing | null;
  /** Sites drawn, where their colours are their own. */
  readonly colouredSites: readonly SiteDossier[];
  /** Displacement ellipsoids: 0 to 1; null where none is drawn. */
  readonly probability: number | null;
  readonly hasPartial: boolean;
  readonly hasMixed: boolean;
  readonly hasDisorderPatterns: boolean;
  readonly isDotted: boolean;
  /** Elements whose tensors are drawn, but too small beside others to be seen. */
  readonly tiny: readonly string[];
  /** What the elements of the key have in common beside the tensors drawn; null where all that is drawn has its element's colour. */
  readonly elementsWords: string | null;
}

/** What a key beside the picture has to say, apart from colour bar, scale and elements. */
export function pictureKey(parts: KeyParts): PictureKey {
  const { drawing, colouredSites } = parts;
  const sites = colouredSites
    .slice(0, mostSites)
    .map(({ index, label }): SiteKey => ({ label, colour: siteColourBytes(index) }));
  return {
    subject: drawing && subjectOf(drawing.choice),
    lengths: drawing && lengthWords(drawing.scale),
    lobes: drawing && lobeKeyOf(drawing),
    sites,
    moreSites: colouredSites.length - sites.length,
    elementsWords: parts.elementsWords,
    marks: markWords(parts),
  };
}

function markWords(parts: KeyParts): string[] {
  const words: string[] = [];
  if (parts.probability !== null)
    words.push(`displacement ellipsoids at ${printed(100 * parts.probability)} %`);
  if (parts.hasMixed) words.push('two colours: shares of two elements');
  if (parts.hasPartial) words.push('pale part: unoccupied share');
  if (parts.hasDisorderPatterns) words.push('stripes, dots: further alternatives of disorder');
  if (parts.isDotted) words.push('dots: negative value');
  if (parts.tiny.length > 0) words.push(`${parts.tiny.join(', ')}: too small to be seen at this scale`);
  return words;
}
