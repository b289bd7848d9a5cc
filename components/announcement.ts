import { countProblems } from '#src/store/state.ts';
import type { KnownSite } from '#src/store/engine-queries.ts';
import type { Selection, WorkbenchState } from '#src/store/state.ts';
import { counted, formatOperation, isotopeSymbol, raiseIsotopes } from '#src/table/number-format.ts';
import { mainNumbers } from '#src/table/printed-value.ts';
import { problemSummary } from './problem-summary.ts';

/** What the live region says after a change but for a selected site; null when there is nothing to say. */
export function announcement(state: WorkbenchState, before: WorkbenchState | null): string | null {
  if (state.refused && state.refused !== before?.refused) {
    const first = state.refused.problems.find(({ severity }) => severity === 'error');
    return `Could not ${state.refused.what}. ${raiseIsotopes(first?.message ?? '')} What was on screen stayed.`;
  }
  if (state.derived !== before?.derived && state.derived?.crystal) {
    const { name, siteCount, atomsInCell } = state.derived.crystal;
    return `${name} is on screen: ${counted(siteCount, 'site')}, ${counted(atomsInCell, 'atom')}, ${problemSummary(countProblems(state))}.`;
  }
  if (!state.decisions && before?.decisions) return 'The page is cleared.';
  if (!state.selection && before?.selection) return 'Nothing is selected.';
  // what could not be opened is not spoken of any more
  return before?.refused && !state.refused ? '' : null;
}

/** What the live region says of a selected site. */
export function selectionSentence({ atomId }: Selection, site: KnownSite): string {
  const atom = site.equivalents.find(({ id }) => id === atomId);
  const name = `${site.label}, ${site.isotope ? isotopeSymbol(site.isotope) : site.element}`;
  const where = atom ? `atom ${formatOperation(atom.operation)}` : counted(site.multiplicity, 'atom');
  return [`${name} selected`, where, ...mainNumbers(site)].join(', ');
}
