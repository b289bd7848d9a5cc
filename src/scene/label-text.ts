import type { SiteDossier } from '#src/dossier/dossier.ts';
import type { ColouredValue } from './colour-meaning.ts';
import { printedDigits } from './colour-meaning.ts';
import type { DrawnAtom } from './drawn-atoms.ts';
import type { LabelAnchor } from './scene.ts';
import type { SceneOptions } from './scene-options.ts';

/** One label for each atom of the picture's own: its site's label, its element, or the number colours say. */
export function atomLabels(
  atoms: readonly DrawnAtom[],
  content: SceneOptions['labelContent'],
  coloured: ColouredValue | null,
): LabelAnchor[] {
  const texts = new Map<number, string>();
  return atoms.flatMap(({ site, position, context }, i) => {
    if (context) return [];
    const text = texts.get(site.index) ?? labelText(site, content, coloured);
    texts.set(site.index, text);
    return [{ text, position, pickId: i + 1, quadric: i }];
  });
}

/** Sites without the number, or with an undefined one, keep their label. */
function labelText(
  site: SiteDossier,
  content: SceneOptions['labelContent'],
  coloured: ColouredValue | null,
): string {
  if (content === 'element') return site.element;
  return (content === 'value' && coloured && valueText(site, coloured)) || site.label;
}

/** A number with the digits its convention has in the table; ± where the tensor leaves its sign open; null where there is none. */
export function valueText(site: SiteDossier, coloured: ColouredValue): string | null {
  const value = coloured.valueOf(site);
  if (value === null || !Number.isFinite(value)) return null;
  const text = value.toFixed(printedDigits(site, coloured));
  const isZero = Number(text) === 0;
  const isOpen = coloured.isSignOpen?.(site) ?? false;
  if (isZero || isOpen) return (isZero ? '' : '±') + text.replace('-', '');
  return text.replace('-', '−');
}
