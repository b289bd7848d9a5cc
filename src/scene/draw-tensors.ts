import type { Vec3 } from '#src/base/matrix3.ts';
import { length } from '#src/base/vector3.ts';
import { axialVectorOf } from '#src/dossier/axial-vector.ts';
import type { CrystalDossier } from '#src/dossier/dossier.ts';
import { atomRadius } from './atom-style.ts';
import { nearPairs } from './bond-layer.ts';
import type { DrawnAtom } from './drawn-atoms.ts';
import type { EllipsoidKind } from './scene.ts';
import type { SceneOptions } from './scene-options.ts';
import type { ChosenTensors } from './tensor-choice.ts';
import type { TensorDrawing } from './tensor-drawing.ts';
import { lobeCentreColour } from './tensor-drawing.ts';
import type { ScaleChoice } from './tensor-scale.ts';
import { chooseLengthScale, chooseScale } from './tensor-scale.ts';
import { largestReach } from './tensor-shape.ts';

/** How the chosen tensors are drawn: form, one scale for all, on which atoms; with sentences where another way was taken than asked. */
export function drawTensors(
  dossier: CrystalDossier,
  atoms: readonly DrawnAtom[],
  choice: ChosenTensors,
  options: SceneOptions,
): { readonly drawing: TensorDrawing; readonly notes: readonly string[] } {
  const carries = carryingAtoms(atoms, choice, options.tensorCopies);
  const axial = options.part === 'antisymmetric' ? axialVectorsOf(dossier, choice) : noVectors;
  const isAxial = axial.size > 0;
  const { scale, notes } = scaleOf(dossier, atoms, choice, axial, options);
  const isLobes = !isAxial && choice.glyph === 'polar';
  const drawing: TensorDrawing = {
    choice,
    forms: choice.forms,
    axial,
    scale,
    carries,
    centreColourOf: (index) => (isLobes ? lobeCentreColour : choice.colours.get(index)!),
  };
  const missing =
    options.part === 'antisymmetric' && !isAxial
      ? ['These tensors have no antisymmetric part: the symmetric part is drawn.']
      : [];
  return { drawing, notes: [...missing, ...notes] };
}

const noVectors: ReadonlyMap<number, Vec3> = new Map();

function scaleOf(
  dossier: CrystalDossier,
  atoms: readonly DrawnAtom[],
  choice: ChosenTensors,
  axial: ReadonlyMap<number, Vec3>,
  options: SceneOptions,
): ScaleChoice {
  const { quantity, glyph, forms } = choice;
  const pairs = nearPairs(dossier, atoms);
  if (axial.size === 0 && glyph === 'ellipsoid') {
    return chooseScale(forms, pairs, quantity, options, (site) => atomRadius(site.element));
  }
  const kind = lengthKind(quantity, options.ellipsoid);
  const part = axial.size > 0 ? ('antisymmetric' as const) : ('symmetric' as const);
  const reaches = new Map<number, number>(
    axial.size > 0
      ? [...axial].map(([index, vector]) => [index, length(vector)])
      : [...forms].map(([index, form]) => [index, largestReach(form, kind)]),
  );
  const drawn = { quantity, kind, glyph, part };
  return { scale: chooseLengthScale(reaches, pairs, drawn, options.unitsPerAngstrom), notes: [] };
}

/** A field gradient has no isotropic value to take off; of the others the deviation shows what the total hides. */
function lengthKind(quantity: ChosenTensors['quantity'], asked: SceneOptions['ellipsoid']): EllipsoidKind {
  if (quantity === 'efg') return 'total';
  return asked === 'total' ? 'total' : 'deviation';
}

/** Axial vectors smaller than this share of the largest principal value or deviation are rounding. */
const dustShare = 1e-6;

/** Empty where none of the tensors has an antisymmetric part. */
function axialVectorsOf(
  dossier: CrystalDossier,
  { quantity, forms }: ChosenTensors,
): ReadonlyMap<number, Vec3> {
  const vectors = new Map<number, Vec3>();
  let largest = 0;
  let reach = 0;
  for (const [index, form] of forms) {
    const vector = axialVectorOf(dossier.sites[index]!, quantity);
    reach = Math.max(reach, largestReach(form, 'total'));
    if (!vector) continue;
    vectors.set(index, vector);
    largest = Math.max(largest, length(vector));
  }
  return largest > dustShare * reach ? vectors : noVectors;
}

/** For each drawn atom 1 where its tensor is drawn: on all of the picture's own, on the first of each site or of each orientation. */
function carryingAtoms(
  atoms: readonly DrawnAtom[],
  { forms }: ChosenTensors,
  copies: SceneOptions['tensorCopies'],
): Uint8Array {
  const carries = new Uint8Array(atoms.length);
  const seen = new Set<string>();
  atoms.forEach(({ atom, site, context }, i) => {
    if (context || !forms.has(site.index)) return;
    if (copies !== 'all') {
      const key = copies === 'first' ? `${site.index}` : `${site.index} ${atom.orientation}`;
      if (seen.has(key)) return;
      seen.add(key);
    }
    carries[i] = 1;
  });
  return carries;
}
