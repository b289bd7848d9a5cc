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
  /** Elements whose tensors are drawn, where not all are. */
  readonly elements: readonly string[] | null;
  /** True where nobody asked for these elements. */
  readonly isOwnChoice: boolean;
}

/** What goes into the choice of tensors. */
type ChoiceOptions = Pick<SceneOptions, 'quantity' | 'showTensors' | 'tensorElements' | 'colourLimits'>;

/** The tensors the options ask for, or those of the nearest quantity that exists; null where none is drawn. */
export function chooseTensors(dossier: CrystalDossier, options: ChoiceOptions): ChosenTensors | null {
  const quantity = chooseQuantity(dossier, options);
  if (!quantity) return null;
  const all = formsOf(dossier, quantity);
  const elements =
    options.tensorElements === 'auto' ? mainElements(dossier, quantity, all) : options.tensorElements;
  const kept = [...all].filter(([index]) => elements?.includes(dossier.sites[index]!.element) ?? true);
  const forms = new Map(kept);
  if (forms.size === 0) return null;
  const values = [...forms.values()].map((form) => form.colourValue);
  return {
    quantity,
    forms,
    legend: legendFor(quantity, values, options.colourLimits),
    elements,
    isOwnChoice: options.tensorElements === 'auto' && elements !== null,
  };
}

function formsOf(dossier: CrystalDossier, quantity: SceneQuantity): Map<number, PrincipalForm> {
  const forms = new Map<number, PrincipalForm>();
  for (const site of dossier.sites) {
    const form = principalForm(site, quantity);
    if (form) forms.set(site.index, form);
  }
  return forms;
}

/** Elements whose tensors of a quantity some site has, in the order of the sites. */
export function elementsWithTensors(dossier: CrystalDossier, quantity: SceneQuantity): string[] {
  return [...new Set(dossier.sites.filter((site) => site[quantity]).map(({ element }) => element))];
}

/** Largest deviations of two elements more unequal than this drown the smaller one at one scale. Our own choice. */
const drowningRatio = 6;
/** Their field gradients are large for want of a surrounding, and seldom what the picture is looked at for. */
const lightElements = new Set(['H', 'D', 'T', 'O']);

/** Elements to draw unasked: null for all. */
function mainElements(
  dossier: CrystalDossier,
  quantity: SceneQuantity,
  forms: ReadonlyMap<number, PrincipalForm>,
): readonly string[] | null {
  if (quantity !== 'efg') return null;
  const largest = new Map<string, number>();
  const main = new Set<string>();
  for (const [index, { values }] of forms) {
    const { element, efg } = dossier.sites[index]!;
    const size = values.reduce((most, value) => Math.max(most, Math.abs(value)), 0);
    largest.set(element, Math.max(size, largest.get(element) ?? 0));
    if (efg?.couplingMHz !== null && !lightElements.has(element)) main.add(element);
  }
  const sizes = [...largest.values()];
  const isDrowning = Math.max(...sizes) > drowningRatio * Math.min(...sizes);
  return isDrowning && main.size > 0 && main.size < largest.size ? [...main] : null;
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
