import type { Legend, SceneQuantity, TensorScale } from './scene.ts';

const quantityWords: Readonly<Record<SceneQuantity, string>> = {
  shielding: 'Shielding',
  shift: 'Shift',
  efg: 'EFG',
};

/** What the caption is made from. */
export interface CaptionParts {
  readonly scale: TensorScale | null;
  readonly legend: Legend | null;
  /** Sentences about kind and scale. */
  readonly notes: readonly string[];
  /** Quantity asked for, where another one is drawn. */
  readonly askedFor: SceneQuantity | null;
  readonly extent: 'cell' | 'molecules';
  readonly hasCell: boolean;
  /** Bonded neighbours outside the cell are drawn. */
  readonly neighbours: boolean;
  /** Elements whose tensors are drawn, where only some are. */
  readonly onlyElements: readonly string[] | null;
  /** Nobody asked for these elements: the scale did. */
  readonly elementsUnasked: boolean;
  /** Atoms drawn, where the limit left out the rest. */
  readonly cutAt: number | null;
  readonly atomsInCell: number;
  /** Sites not drawn because another one with a larger occupancy stands on their position. */
  readonly hiddenSites: number;
}

/** A number for people: − as minus sign, no trailing zeros, at most four significant digits. */
export function printed(value: number): string {
  return String(Number(value.toPrecision(4))).replace('-', '−');
}

/** 30000 → 30,000 */
function grouped(count: number): string {
  return String(count).replace(/\B(?=(\d{3})+$)/g, ',');
}

/** The scale of the tensors in words, such as "1 Å = 250 ppm". */
export function scaleStatement(scale: TensorScale): string {
  return `1 Å = ${printed(scale.unitsPerAngstrom)} ${scale.quantity === 'efg' ? 'a.u.' : 'ppm'}`;
}

/** One or two sentences that say in words what is drawn and in which convention. */
export function caption(parts: CaptionParts): string {
  const sentences = [tensorSentence(parts)];
  const { askedFor, scale, notes } = parts;
  if (askedFor && scale) {
    const asked = quantityWords[askedFor];
    sentences.push(
      `There are no ${asked === 'EFG' ? asked : asked.toLowerCase()} tensors here, so this is shown instead.`,
    );
  }
  if (parts.elementsUnasked && scale)
    sentences.push(
      'At the one scale of the picture, large and small tensors of the other elements would drown one another; they are drawn too when ticked under Show.',
    );
  sentences.push(...notes, extentSentence(parts));
  if (parts.cutAt !== null)
    sentences.push(
      `Only the first ${grouped(parts.cutAt)} atoms are drawn, the limit of the picture; there are ${grouped(parts.atomsInCell)}, all of them in the table.`,
    );
  if (parts.hiddenSites > 0)
    sentences.push('Where sites share a position, the one with the largest occupancy is drawn.');
  return sentences.join(' ');
}

function tensorSentence({ scale, legend, onlyElements }: CaptionParts): string {
  if (!scale || !legend) return 'Atoms coloured by element.';
  const of = onlyElements ? ` of ${onlyElements.join(', ')}` : '';
  const name = quantityWords[scale.quantity];
  const middle = scale.quantity === 'efg' ? 'principal value' : 'deviation from the isotropic value';
  const axes =
    scale.kind === 'total'
      ? 'semi-axes = principal values of the symmetric part'
      : `semi-axes = ${printed(scale.baseRadiusAngstrom)} Å + ${middle}`;
  return `${name} ellipsoids${of}: ${axes}, ${scaleStatement(scale)}; colour = ${legend.title}; great circles lie perpendicular to the principal axes that are defined.`;
}

function extentSentence({ extent, hasCell, neighbours }: CaptionParts): string {
  if (!hasCell) return 'Molecule without a cell.';
  if (extent === 'molecules') return 'One unit cell, its molecules drawn whole.';
  const outside = neighbours ? '; small plain spheres outside complete the coordination' : '';
  return `One unit cell; atoms on its faces are repeated${outside}.`;
}
