import type { CrystalDossier } from '#src/dossier/dossier.ts';
import { legendColour, legendFor } from './colour-scale.ts';
import type { Legend, SceneQuantity } from './scene.ts';
import type { SceneOptions } from './scene-options.ts';
import type { PrincipalForm } from './tensor-shape.ts';
import { principalForm } from './tensor-shape.ts';

/** Which tensors a picture shows, and what their colour means. */
export interface ChosenTensors {
  readonly quantity: SceneQuantity;
  /** By site index. */
  readonly forms: ReadonlyMap<number, PrincipalForm>;
  readonly legend: Legend;
}

/** What goes into the choice of tensors. */
type ChoiceOptions = Pick<SceneOptions, 'quantity' | 'showTensors' | 'tensorElements' | 'colourLimits'>;

/** The tensors the options ask for, or those of the nearest quantity that exists; null where none is drawn. */
export function chooseTensors(dossier: CrystalDossier, options: ChoiceOptions): ChosenTensors | null {
  const quantity = chooseQuantity(dossier, options);
  if (!quantity) return null;
  const forms = new Map<number, PrincipalForm>();
  for (const site of dossier.sites) {
    const form = principalForm(site, quantity);
    const wanted = !options.tensorElements || options.tensorElements.includes(site.element);
    if (form && wanted) forms.set(site.index, form);
  }
  if (forms.size === 0) return null;
  const values = [...forms.values()].map((form) => form.colourValue);
  return { quantity, forms, legend: legendFor(quantity, values, options.colourLimits) };
}

/** Colour of a site's ellipsoids in the picture of these options, sRGB bytes; null where it has none. */
export function ellipsoidColour(
  chosen: ChosenTensors | null,
  siteIndex: number,
): readonly [number, number, number] | null {
  const form = chosen?.forms.get(siteIndex);
  return chosen && form ? legendColour(chosen.legend, form.colourValue) : null;
}

/** Shielding before shift before EFG, where nothing is asked for or what is asked for does not exist. */
function chooseQuantity(
  dossier: CrystalDossier,
  options: Pick<SceneOptions, 'quantity' | 'showTensors'>,
): SceneQuantity | null {
  if (!options.showTensors) return null;
  const asked = options.quantity === 'auto' ? [] : [options.quantity];
  const order: readonly SceneQuantity[] = [...asked, 'shielding', 'shift', 'efg'];
  return order.find((quantity) => dossier.sites.some((site) => site[quantity] !== null)) ?? null;
}
