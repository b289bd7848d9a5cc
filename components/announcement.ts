import { countProblems } from '#src/store/state.ts';
import type { WorkbenchState } from '#src/store/state.ts';
import { mainNumbers } from './convention-symbol.ts';
import { counted, formatOperation, isotopeSymbol, raiseIsotopes } from './number-format.ts';
import { problemSummary } from './problem-summary.ts';

/** What the live region says after a change; null when there is nothing to say. */
export function announcement(state: WorkbenchState, before: WorkbenchState | null): string | null {
  if (state.refused && state.refused !== before?.refused) {
    const first = state.refused.problems.find(({ severity }) => severity === 'error');
    return `Could not ${state.refused.what}. ${raiseIsotopes(first?.message ?? '')} What was on screen stayed.`;
  }
  if (state.derived !== before?.derived && state.derived?.dossier) {
    const { name, sites, atomsInCell } = state.derived.dossier;
    return `${name} is on screen: ${counted(sites.length, 'site')}, ${counted(atomsInCell, 'atom')}, ${problemSummary(countProblems(state))}.`;
  }
  if (state.selection === before?.selection) return null;
  return state.selection ? sentenceOf(state) : 'Nothing is selected.';
}

function sentenceOf({ derived, selection }: WorkbenchState): string | null {
  const site = selection && derived?.dossier?.sites[selection.siteIndex];
  if (!site) return null;
  const atom = site.equivalents.find(({ id }) => id === selection.atomId);
  const name = `${site.label}, ${site.isotope ? isotopeSymbol(site.isotope) : site.element}`;
  const where = atom ? `atom ${formatOperation(atom.operation)}` : counted(site.multiplicity, 'atom');
  return [`${name} selected`, where, ...mainNumbers(site)].join(', ');
}
