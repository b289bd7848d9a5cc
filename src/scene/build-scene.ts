import type { CrystalDossier } from '#src/dossier/dossier.ts';
import type { TensorDrawing } from './atom-layer.ts';
import { atomLabels, atomQuadrics } from './atom-layer.ts';
import { atomColour, atomRadius } from './atom-style.ts';
import { bondCylinders, nearPairs } from './bond-layer.ts';
import { caption, scaleStatement } from './caption.ts';
import { cellAxes, cellEdges } from './cell-layer.ts';
import type { DrawnAtom } from './drawn-atoms.ts';
import { bondedNeighbours, drawnAtoms, mostAtoms } from './drawn-atoms.ts';
import { enclosingSphere } from './framing.ts';
import type { ElementKey, Scene } from './scene.ts';
import type { SceneOptions } from './scene-options.ts';
import { defaultSceneOptions } from './scene-options.ts';
import { sharedPositions } from './shared-positions.ts';
import type { ChosenTensors } from './tensor-choice.ts';
import { chooseTensors } from './tensor-choice.ts';
import type { ScaleChoice } from './tensor-scale.ts';
import { chooseScale } from './tensor-scale.ts';

/**
 * The plain description of one picture: everything a renderer needs, in Å, in the Cartesian frame of the crystal's
 * lattice. Options not given are automatic; what was chosen stands in the caption. Linear in atoms and bonds.
 */
export function buildScene(whole: CrystalDossier, options: Partial<SceneOptions> = {}): Scene {
  const dossier = drawableSites(whole);
  const chosen: SceneOptions = { ...defaultSceneOptions, ...options };
  const extent = chooseExtent(dossier, chosen.extent);
  const own = drawnAtoms(dossier, extent);
  const isCut = own.length >= mostAtoms;
  const completed = extent === 'cell' && chosen.bonds && chosen.bondedNeighbours && !isCut;
  const atoms = completed ? [...own, ...bondedNeighbours(dossier, own)] : own;
  const choice = chooseTensors(dossier, chosen);
  const tensors = choice && drawTensors(dossier, atoms, choice, chosen);
  const { quadrics, picks } = atomQuadrics(atoms, tensors);
  const bonds = bondCylinders(dossier, atoms, { ...chosen, neutral: tensors !== null }, picks.length);
  const lines = cellEdges(dossier, chosen.cellEdges);
  const scale = tensors?.scale ?? null;
  const legend = tensors?.legend ?? null;
  return {
    quadrics,
    cylinders: bonds.cylinders,
    lines,
    labels: chosen.labels ? atomLabels(atoms, quadrics) : [],
    axes: cellAxes(dossier),
    bounds: enclosingSphere({ quadrics, lines }),
    picks: [...picks, ...bonds.picks],
    legend,
    elements: elementKeys(atoms, tensors),
    scale,
    scaleStatement: scale && scaleStatement(scale),
    caption: caption({
      scale,
      legend,
      notes: tensors?.notes ?? [],
      askedFor: chosen.quantity !== 'auto' && chosen.quantity !== choice?.quantity ? chosen.quantity : null,
      extent,
      neighbours: atoms.length > own.length,
      hasCell: dossier.lattice !== null,
      onlyElements: choice?.elements ?? null,
      elementsUnasked: choice?.isOwnChoice ?? false,
      cutAt: isCut ? own.length : null,
      atomsInCell: dossier.atomsInCell,
      hiddenSites: sharedPositions(dossier).drawnInstead.size,
    }),
    extent,
  };
}

/** The dossier with only as many of its first sites as can come into the picture, so that a huge one costs no more. */
function drawableSites(dossier: CrystalDossier): CrystalDossier {
  let atoms = 0;
  // Twice the limit: sites that share a position with a fuller one are passed over.
  const past = dossier.sites.findIndex((site) => (atoms += site.equivalents.length) > 2 * mostAtoms);
  return past < 0 ? dossier : { ...dossier, sites: dossier.sites.slice(0, past + 1) };
}

function chooseExtent(dossier: CrystalDossier, asked: SceneOptions['extent']): 'cell' | 'molecules' {
  if (asked !== 'auto') return asked === 'molecules' ? 'molecules' : 'cell';
  return Object.keys(dossier.wholeMolecules).length > 0 ? 'molecules' : 'cell';
}

/** Forms, one scale and the colour bar of the tensors of the picture; null where none is drawn. */
function drawTensors(
  dossier: CrystalDossier,
  atoms: readonly DrawnAtom[],
  { quantity, forms, legend }: ChosenTensors,
  options: SceneOptions,
): TensorDrawing & Pick<ScaleChoice, 'notes'> {
  const { scale, notes } = chooseScale(forms, nearPairs(dossier, atoms), quantity, options, (site) =>
    atomRadius(site.element),
  );
  return { forms, scale, legend, notes };
}

/** Elements of which some atom is drawn in its element's colour. */
function elementKeys(atoms: readonly DrawnAtom[], tensors: TensorDrawing | null): ElementKey[] {
  const plain = atoms.filter(({ site, context }) => !context && !tensors?.forms.has(site.index));
  const elements = [...new Set(plain.map(({ site }) => site.element))];
  return elements.map((element) => ({ element, colour: atomColour(element) }));
}
