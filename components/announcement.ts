import type { SiteDossier } from '#src/store/dossier-types.ts';
import { countProblems } from '#src/store/state.ts';
import type { WorkbenchState } from '#src/store/state.ts';
import {
  couplingDecimals,
  formatNumber,
  formatOperation,
  isotopeSymbol,
  ppmDecimals,
} from './number-format.ts';
import { problemSummary } from './problem-summary.ts';

/** What the live region says after a change; null when there is nothing to say. */
export function announcement(state: WorkbenchState, before: WorkbenchState | null): string | null {
  if (state.refused && state.refused !== before?.refused) {
    const first = state.refused.problems.find(({ severity }) => severity === 'error');
    return `Could not ${state.refused.what}. ${first?.message ?? ''} What was on screen stayed.`;
  }
  if (state.derived !== before?.derived && state.derived?.dossier) {
    const { name, sites, atomsInCell } = state.derived.dossier;
    return `${name} is on screen: ${sites.length} sites, ${atomsInCell} atoms, ${problemSummary(countProblems(state))}.`;
  }
  if (state.selection === before?.selection) return null;
  return state.selection ? sentenceOf(state) : 'Nothing is selected.';
}

function sentenceOf({ derived, selection }: WorkbenchState): string | null {
  const site = selection && derived?.dossier?.sites[selection.siteIndex];
  if (!site) return null;
  const atom = site.equivalents.find(({ id }) => id === selection.atomId);
  const name = `${site.label}, ${site.isotope ? isotopeSymbol(site.isotope) : site.element}`;
  const where = atom
    ? `atom ${formatOperation(atom.operation)}`
    : `${site.multiplicity} atom${site.multiplicity === 1 ? '' : 's'}`;
  return [`${name} selected`, where, ...mainNumbers(site)].join(', ');
}

function mainNumbers(site: SiteDossier): string[] {
  const ppm = (value: number): string => `${formatNumber(value, ppmDecimals(site.element))} ppm`;
  const { shielding, shift, efg } = site;
  return [
    ...(shielding ? [`isotropic shielding ${ppm(shielding.isotropic)}`] : []),
    ...(shift ? [`isotropic shift ${ppm(shift.isotropic)}`] : []),
    ...(efg && efg.couplingMHz !== null
      ? [`C Q ${formatNumber(efg.couplingMHz, couplingDecimals(site.element))} MHz`]
      : []),
  ];
}
