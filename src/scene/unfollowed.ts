import { grouped, rangeWords } from './caption.ts';
import { mostAtoms } from './drawn-atoms.ts';
import type { ChosenAtoms } from './extent.ts';
import type { SceneOptions } from './scene-options.ts';
import { defaultSceneOptions } from './scene-options.ts';
import type { ChosenTensors } from './tensor-choice.ts';
import type { TensorScale } from './scene.ts';

/** What came of the wishes in the options. */
export interface DrawnInstead {
  readonly choice: ChosenTensors | null;
  readonly scale: TensorScale | null;
  readonly hasDisplacement: boolean;
  readonly polyhedra: number;
  readonly atoms: ChosenAtoms;
  readonly hasCell: boolean;
}

const quantityNames = { shielding: 'shielding', shift: 'shift', efg: 'EFG' } as const;
const kindNames = { total: 'totals', deviation: 'deviations from the isotropic value' } as const;

/**
 * Sentences on every wish that the picture could not follow, each with what is drawn instead. Wishes are options that differ from
 * the usual ones; the scene never fails for one.
 */
export function unfollowedWishes(asked: SceneOptions, drawn: DrawnInstead): string[] {
  const found: string[] = extentWishes(asked, drawn);
  if (asked.displacement !== 'none' && !drawn.hasDisplacement) {
    const instead = drawn.scale ? 'tensors are drawn' : 'plain spheres are drawn';
    found.push(
      `The file gives no displacements, so no displacement ellipsoids are drawn${asked.displacement === 'instead' ? `: ${instead}` : ''}.`,
    );
  }
  if (asked.polyhedra.length > 0 && drawn.polyhedra === 0)
    found.push(`No atom of ${asked.polyhedra.join(', ')} has a polyhedron here, so none is drawn.`);
  // displacement ellipsoids instead of tensors leave no tensor to ask about
  if (!asked.showTensors || (asked.displacement === 'instead' && drawn.hasDisplacement)) return found;
  return [...found, ...tensorWishes(asked, drawn)];
}

/** Which atoms are drawn: a range without a cell, one cut down to its middle or to one cell, a shell round nothing, too many atoms. */
function extentWishes({ extent: asked }: SceneOptions, { atoms, hasCell }: DrawnInstead): string[] {
  const { extent, range, isNarrowed, isCut, ownCount, unrepeated } = atoms;
  if (asked === 'range' && !hasCell)
    return ['The file gives no cell, so there is no range of cells: the atoms are drawn as given.'];
  const found: string[] = [];
  if (asked === 'shell' && extent !== 'shell')
    found.push('No site is chosen for the middle of the shell: the usual picture is drawn.');
  if (unrepeated.length > 0)
    found.push(
      `The cell does not repeat along ${unrepeated.join(', ')}: one cell is drawn there instead of the range asked for.`,
    );
  if (isNarrowed && range)
    found.push(
      `The range asked for holds more than the ${grouped(mostAtoms)} atoms that can be drawn: its middle is drawn, ${rangeWords(range)}.`,
    );
  if (isCut) found.push(`Only the first ${grouped(ownCount)} atoms are drawn, the limit of the picture.`);
  return found;
}

function tensorWishes(asked: SceneOptions, { choice, scale }: DrawnInstead): string[] {
  if (!choice || !scale) return tensorsMissed(asked);
  const found: string[] = [];
  if (asked.quantity !== 'auto' && asked.quantity !== choice.quantity) {
    const [wanted, taken] = [quantityNames[asked.quantity], quantityNames[choice.quantity]];
    found.push(`There are no ${wanted} tensors here: ${taken} tensors are drawn instead.`);
  }
  if (asked.part === 'antisymmetric' && scale.part !== 'antisymmetric')
    found.push('These tensors have no antisymmetric part: the symmetric part is drawn.');
  const kind = scale.part === 'antisymmetric' ? asked.ellipsoid : scale.kind;
  if (asked.ellipsoid !== 'auto' && asked.ellipsoid !== kind) found.push(sizeMissed(scale));
  const isScale = asked.unitsPerAngstrom !== null && asked.unitsPerAngstrom !== scale.unitsPerAngstrom;
  if (isScale)
    found.push('The scale asked for would turn an ellipsoid inside out; the nearest possible one is taken.');
  if (asked.colourBy !== defaultSceneOptions.colourBy && asked.colourBy !== choice.colourBy) {
    const instead = choice.legend ? choice.legend.title : 'the sign of the lobes';
    found.push(`There is no ${asked.colourBy} of these tensors to colour by: colours say the ${instead}.`);
  }
  return found;
}

function sizeMissed({ quantity, glyph, kind }: TensorScale): string {
  if (quantity === 'efg' && kind === 'total')
    return 'A field gradient has no isotropic value to take off: principal values are drawn as they are.';
  if (quantity === 'efg')
    return 'Sizes are principal values about a base radius: totals that are not positive have no ellipsoid.';
  const isEllipsoid = glyph === undefined || glyph === 'ellipsoid';
  return `Sizes are ${kindNames[kind]}${isEllipsoid ? ': totals that are not positive have no ellipsoid' : ''}.`;
}

/** Nothing is drawn of tensors that were asked for. */
function tensorsMissed(asked: SceneOptions): string[] {
  const { quantity, tensorElements, tensorSites, glyph, part } = asked;
  const isAsked =
    quantity !== 'auto' || tensorSites !== null || Array.isArray(tensorElements) || glyph !== 'auto';
  if (!isAsked && part === 'symmetric') return [];
  const which = quantity === 'auto' ? 'such' : quantityNames[quantity];
  return [`There are no ${which} tensors here: none is drawn.`];
}
