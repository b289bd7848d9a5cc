import type { CrystalDossier } from '#src/dossier/dossier.ts';
import type { TensorDrawing } from './atom-layer.ts';
import { atomLabels, atomQuadrics } from './atom-layer.ts';
import { atomColour, atomRadius } from './atom-style.ts';
import { bondCylinders, nearPairs } from './bond-layer.ts';
import { caption, scaleStatement } from './caption.ts';
import { cellAxes, cellEdges } from './cell-layer.ts';
import { legendFor } from './colour-scale.ts';
import type { DrawnAtom } from './drawn-atoms.ts';
import { bondedNeighbours, drawnAtoms } from './drawn-atoms.ts';
import { enclosingSphere } from './framing.ts';
import type { ElementKey, Scene, SceneQuantity } from './scene.ts';
import type { SceneOptions } from './scene-options.ts';
import { defaultSceneOptions } from './scene-options.ts';
import type { ScaleChoice } from './tensor-scale.ts';
import { chooseScale } from './tensor-scale.ts';
import type { PrincipalForm } from './tensor-shape.ts';
import { principalForm } from './tensor-shape.ts';

/**
 * The plain description of one picture: everything a renderer needs, in Å, in the Cartesian frame of the crystal's
 * lattice. Options not given are automatic; what was chosen stands in the caption. Linear in atoms and bonds.
 */
export function buildScene(dossier: CrystalDossier, options: Partial<SceneOptions> = {}): Scene {
  const chosen: SceneOptions = { ...defaultSceneOptions, ...options };
  const extent = chooseExtent(dossier, chosen.extent);
  const own = drawnAtoms(dossier, extent);
  const completed = extent === 'cell' && chosen.bonds && chosen.bondedNeighbours;
  const atoms = completed ? [...own, ...bondedNeighbours(dossier, own)] : own;
  const quantity = chooseQuantity(dossier, chosen);
  const tensors = quantity ? drawTensors(dossier, atoms, quantity, chosen) : null;
  const { quadrics, picks } = atomQuadrics(atoms, tensors);
  const bonds = bondCylinders(dossier, atoms, chosen, picks.length);
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
    elements: elementKeys(atoms),
    scale,
    scaleStatement: scale && scaleStatement(scale),
    caption: caption({
      scale,
      legend,
      notes: tensors?.notes ?? [],
      askedFor: chosen.quantity !== 'auto' && chosen.quantity !== quantity ? chosen.quantity : null,
      extent,
      neighbours: atoms.length > own.length,
      hasCell: dossier.lattice !== null,
      onlyElements: chosen.tensorElements,
    }),
    extent,
  };
}

function chooseExtent(dossier: CrystalDossier, asked: SceneOptions['extent']): 'cell' | 'molecules' {
  if (asked !== 'auto') return asked;
  return Object.keys(dossier.wholeMolecules).length > 0 ? 'molecules' : 'cell';
}

/** Shielding before shift before EFG, where nothing is asked for or what is asked for does not exist. */
function chooseQuantity(dossier: CrystalDossier, options: SceneOptions): SceneQuantity | null {
  if (!options.showTensors) return null;
  const asked = options.quantity === 'auto' ? [] : [options.quantity];
  const order: readonly SceneQuantity[] = [...asked, 'shielding', 'shift', 'efg'];
  return order.find((quantity) => dossier.sites.some((site) => site[quantity] !== null)) ?? null;
}

interface ChosenTensors extends TensorDrawing {
  readonly notes: ScaleChoice['notes'];
}

function drawTensors(
  dossier: CrystalDossier,
  atoms: readonly DrawnAtom[],
  quantity: SceneQuantity,
  options: SceneOptions,
): ChosenTensors | null {
  const forms = new Map<number, PrincipalForm>();
  for (const site of dossier.sites) {
    const form = principalForm(site, quantity);
    const wanted = !options.tensorElements || options.tensorElements.includes(site.element);
    if (form && wanted) forms.set(site.index, form);
  }
  if (forms.size === 0) return null;
  const { scale, notes } = chooseScale(forms, nearPairs(dossier, atoms), quantity, options, (site) =>
    atomRadius(site.element),
  );
  const values = [...forms.values()].map((form) => form.colourValue);
  return { forms, scale, legend: legendFor(quantity, values, options.colourLimits), notes };
}

function elementKeys(atoms: readonly DrawnAtom[]): ElementKey[] {
  const elements = [...new Set(atoms.map(({ site }) => site.element))];
  return elements.map((element) => ({ element, colour: atomColour(element) }));
}
