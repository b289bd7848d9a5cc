import type { CellRange } from './drawn-atoms.ts';
import { mostAtoms } from './drawn-atoms.ts';
import type { ChosenAtoms } from './extent.ts';
import { lengthWords } from './picture-key.ts';
import { printed } from './printed.ts';
import type { GlyphKind, Legend, SceneQuantity, TensorScale } from './scene.ts';
import type { SceneOptions } from './scene-options.ts';
import type { TensorSizes } from './tensor-sizes.ts';
import { sizeSentences } from './tensor-sizes.ts';

const quantityWords: Readonly<Record<SceneQuantity, string>> = {
  shielding: 'Shielding',
  shift: 'Shift',
  efg: 'EFG',
};

/** The tensors of a picture, as far as the caption speaks of them. */
export interface TensorCaption {
  readonly scale: TensorScale;
  readonly glyph: GlyphKind;
  readonly legend: Legend | null;
  readonly colourBy: SceneOptions['colourBy'] | 'sign';
  /** Elements and labels of sites whose tensors are drawn, where only some are. */
  readonly elements: readonly string[] | null;
  readonly sites: readonly string[] | null;
  /** How unequal they are: what one scale hides. */
  readonly sizes: TensorSizes;
  readonly copies: SceneOptions['tensorCopies'];
  /** Some principal axis drawn from is undefined. */
  readonly hasUndefinedAxes: boolean;
  /** Dots mean a negative value. */
  readonly isDotted: boolean;
}

/** What the caption is made from. */
export interface CaptionParts {
  readonly tensors: TensorCaption | null;
  /** Quantity asked for, where another one is drawn. */
  readonly askedFor: SceneQuantity | null;
  readonly isSiteColoured: boolean;
  readonly displacement: DisplacementCaption | null;
  readonly chosen: ChosenAtoms;
  readonly hasCell: boolean;
  readonly atomsInCell: number;
  /** Sites not drawn because another one with a larger occupancy stands on their position. */
  readonly isShared: boolean;
  readonly polyhedra: readonly string[];
  readonly occupancy: { readonly hasPartial: boolean; readonly hasMixed: boolean };
  readonly hasDisorderPatterns: boolean;
  /** What labels print, where it is a number. */
  readonly labels: string | null;
  /** Sentences of the parts themselves. */
  readonly notes: readonly string[];
}

export interface DisplacementCaption {
  readonly mode: 'beside' | 'instead';
  /** 0 to 1. */
  readonly probability: number;
  /** Labels of drawn sites without a possible ellipsoid. */
  readonly impossible: readonly string[];
}

/** 30000 → 30,000 */
export function grouped(count: number): string {
  return String(count).replace(/\B(?=(\d{3})+$)/g, ',');
}

/** The scale of the tensors in words, such as "1 Å = 250 ppm". */
export function scaleStatement({ unitsPerAngstrom, quantity, part }: TensorScale): string {
  const of = part === 'antisymmetric' ? ' of the axial vector' : '';
  // six digits: a scale that was typed is stated as typed
  const units = printed(unitsPerAngstrom, 6);
  return `1 Å = ${units} ${quantity === 'efg' ? 'a.u.' : 'ppm'}${of}`;
}

/** A few sentences that say in words what is drawn and in which convention. */
export function caption(parts: CaptionParts): string {
  const { tensors, askedFor } = parts;
  const sentences = [tensors ? tensorSentence(tensors) : plainSentence(parts)];
  if (askedFor && tensors) {
    const asked = quantityWords[askedFor];
    sentences.push(
      `There are no ${asked === 'EFG' ? asked : asked.toLowerCase()} tensors here, so this is shown instead.`,
    );
  }
  if (tensors) {
    const { sizes, scale } = tensors;
    sentences.push(...sizeSentences(sizes, scale.quantity), ...tensorAsides(tensors));
  }
  sentences.push(
    ...parts.notes,
    ...displacementSentences(parts),
    ...extentSentences(parts),
    ...markSentences(parts),
  );
  return sentences.join(' ');
}

function plainSentence({ isSiteColoured, displacement }: CaptionParts): string {
  const what = displacement?.mode === 'instead' ? displacementWords(displacement) : 'Atoms';
  return `${what} coloured by ${isSiteColoured ? 'site' : 'element'}.`;
}

function displacementWords({ probability }: DisplacementCaption): string {
  return `Displacement ellipsoids at ${printed(100 * probability)} % probability`;
}

function tensorSentence(tensors: TensorCaption): string {
  const { scale, elements, sites } = tensors;
  const of = sites ? ` of ${listed(sites)}` : elements ? ` of ${elements.join(', ')}` : '';
  return `${quantityWords[scale.quantity]} ${glyphWords(tensors, of)}; ${colourWords(tensors)}.`;
}

function glyphWords({ scale, glyph }: TensorCaption, of: string): string {
  const letter = { shielding: 'σ', shift: 'δ', efg: 'V' }[scale.quantity];
  const lengths = `${lengthWords(scale)}, ${scaleStatement(scale)}`;
  if (scale.part === 'antisymmetric') {
    return `tensors${of}, antisymmetric part: arrows along the axial vector, ${lengths}; it turns the field right-handed about the arrow`;
  }
  if (glyph === 'polar') return `polar surfaces${of} of the symmetric part, ${lengths}`;
  if (glyph === 'axes') {
    const names = scale.quantity === 'efg' ? ['Vxx', 'Vzz'] : [`${letter}11`, `${letter}33`];
    return `principal axes${of} of the symmetric part: ${lengths}; thin and pale ${names[0]} to thick and dark ${names[1]}, dashed where negative`;
  }
  return `ellipsoids${of}: ${lengths}; great circles lie perpendicular to the principal axes that are defined`;
}

function colourWords({ colourBy, legend, glyph, scale }: TensorCaption): string {
  const isLobes = glyph === 'polar' && scale.part !== 'antisymmetric';
  if (colourBy === 'sign') return 'positive lobes orange, negative lobes blue and striped';
  const colour = legend ? `colour = ${legend.title}` : `coloured by ${colourBy}`;
  return isLobes ? `${colour}; negative lobes darker and striped` : colour;
}

function tensorAsides({ copies, glyph, scale, hasUndefinedAxes, isDotted }: TensorCaption): string[] {
  const sentences: string[] = [];
  if (isDotted) sentences.push('Dots on an ellipsoid mark a negative value.');
  if (copies === 'first') sentences.push('Tensors stand on one atom of each site.');
  if (copies === 'orientations')
    sentences.push('Of each site one tensor is drawn for every orientation it has in the crystal.');
  if (glyph === 'axes' && scale.part !== 'antisymmetric' && hasUndefinedAxes)
    sentences.push('Axes of equal principal values are undefined and not drawn.');
  return sentences;
}

function displacementSentences({ displacement, tensors }: CaptionParts): string[] {
  if (!displacement) return [];
  const { mode, impossible } = displacement;
  const sentences: string[] = [];
  if (mode === 'instead')
    sentences.push('Great circles lie perpendicular to their principal axes; isotropic ones are spheres.');
  else
    sentences.push(`${displacementWords(displacement)} on atoms without a ${tensors ? '' : 'drawn '}tensor.`);
  if (impossible.length > 0)
    sentences.push(`None for ${listed(impossible)}: the displacement is not positive in every direction.`);
  return sentences;
}

function extentSentences(parts: CaptionParts): string[] {
  const { chosen, atomsInCell, isShared } = parts;
  const sentences = [extentSentence(parts)];
  if (chosen.openAxes.length > 0)
    sentences.push(
      `The cell does not repeat along ${chosen.openAxes.join(', ')}: atoms stand there as the file has them.`,
    );
  if (chosen.isNarrowed)
    sentences.push(
      `The range asked for holds more than the ${grouped(mostAtoms)} atoms that can be drawn: its middle is shown.`,
    );
  if (chosen.isCut) {
    const all = chosen.range ? '' : `; there are ${grouped(atomsInCell)}, all of them in the table`;
    sentences.push(
      `Only the first ${grouped(chosen.ownCount)} atoms are drawn, the limit of the picture${all}.`,
    );
  }
  if (isShared) sentences.push('Where sites share a position, the one with the largest occupancy is drawn.');
  return sentences;
}

function extentSentence({ chosen, hasCell, polyhedra, displacement }: CaptionParts): string {
  const { extent, range, middle } = chosen;
  const hasOutside = chosen.atoms.length > chosen.ownCount;
  const outside = hasOutside
    ? `; ${displacement?.mode === 'instead' ? 'paler atoms without circles' : 'small plain spheres'} outside complete the ${polyhedra.length > 0 ? 'polyhedra' : 'coordination'}`
    : '';
  if (extent === 'shell') return `The surroundings of ${listed(middle)}${outside}.`;
  if (!hasCell) return 'Molecule without a cell.';
  if (extent === 'asymmetric') return `The first atom of each site${outside}.`;
  if (extent === 'molecules') return `One unit cell, its molecules drawn whole${outside}.`;
  if (range) {
    const whole = chosen.isCompleted ? ', molecules that reach into it drawn whole' : '';
    return `Cells ${rangeWords(range)}${whole}${outside}.`;
  }
  if (chosen.openAxes.length === 3) return `All atoms${outside}.`;
  const faces = chosen.openAxes.length > 0 ? 'the faces it repeats across' : 'its faces';
  return `One unit cell; atoms on ${faces} are repeated${outside}.`;
}

/** Such as "a 0 to 2, b 0 to 1, c −0.5 to 1". */
export function rangeWords([low, high]: CellRange): string {
  const along = ['a', 'b', 'c'].map((axis, k) => `${axis} ${printed(low[k]!)} to ${printed(high[k]!)}`);
  return along.join(', ');
}

function markSentences({ polyhedra, occupancy, hasDisorderPatterns, labels }: CaptionParts): string[] {
  const sentences: string[] = [];
  if (polyhedra.length > 0) sentences.push(`Polyhedra join the atoms bonded to ${listed(polyhedra)}.`);
  if (occupancy.hasMixed)
    sentences.push('Two colours on one sphere: its two most abundant elements, by their shares.');
  if (occupancy.hasPartial)
    sentences.push('Pale parts of spheres: the share of cells in which no atom is there.');
  if (hasDisorderPatterns) sentences.push('Stripes and dots mark further alternatives of disorder.');
  // "a.u." brings its own full stop
  if (labels) sentences.push(`Labels: ${labels}`.replace(/\.?$/, '.'));
  return sentences;
}

/** At most six names, then how many more. */
function listed(names: readonly string[]): string {
  const more = names.length - 6;
  return names.slice(0, 6).join(', ') + (more > 0 ? ` and ${more} more` : '');
}
