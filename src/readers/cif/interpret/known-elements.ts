import { parseSpecies } from '#src/data/species.ts';
import type { BlockView } from './block-view.ts';
import { textOf, valuesOf } from './block-view.ts';
import type { ElementCounts } from './formula.ts';

/**
 * Elements that labels may stand for: those of the formula sum, else those of the list of atom types; empty where the file
 * gives neither.
 */
export function knownElements(view: BlockView, formula: ElementCounts | null): ReadonlySet<string> {
  if (formula) return new Set(Object.keys(formula).filter((element) => formula[element]! > 0));
  const types = (view.items.get('_atom_type_symbol') ?? []).flatMap((found) => valuesOf(found));
  return new Set(
    types.map((value) => parseSpecies(textOf(value) ?? '')?.element).filter((one) => one !== undefined),
  );
}
