import { countOf, wordFor } from '#src/base/count-of.ts';
import type { ProblemLog, Severity } from '#src/base/problem.ts';
import type { Site } from '#src/crystal/crystal.ts';
import type { SiteSpecies } from './site-species.ts';

/** Sites named in one problem. */
const mostShown = 8;

interface Remark {
  readonly code: string;
  readonly severity: Severity;
  readonly holds: (species: SiteSpecies) => boolean;
  readonly sentence: (count: number, list: string, reasons: string) => string;
}

const remarks: readonly Remark[] = [
  {
    code: 'cif-unknown-element',
    severity: 'warning',
    holds: ({ from }) => from === 'nothing',
    sentence: (count, list) =>
      `${countOf(count, 'atom has', 'atoms have')} no element that could be told from type or label: ${list}.`,
  },
  {
    code: 'cif-element-guessed',
    severity: 'warning',
    holds: ({ from, certain }) => from !== 'nothing' && !certain,
    sentence: (count, list) => `The element of ${countOf(count, 'atom')} is a guess from the label: ${list}.`,
  },
  {
    code: 'cif-element-from-label',
    severity: 'note',
    holds: ({ from, certain }) => from === 'label' && certain,
    sentence: (count, list) => `The element of ${countOf(count, 'atom')} was read from the label: ${list}.`,
  },
  {
    code: 'cif-type-names-group',
    severity: 'warning',
    holds: ({ group }) => group !== null,
    sentence: (count, list, reasons) =>
      `The ${wordFor(count, 'type')} of ${countOf(count, 'atom is no plain element', 'atoms are no plain elements')}: ${list}. ${reasons}.`,
  },
  {
    code: 'cif-mixture-shares',
    severity: 'warning',
    holds: ({ sharesGiven }) => !sharesGiven,
    sentence: (count, list) =>
      `${countOf(count, 'position holds', 'positions hold')} several elements without their shares; equal shares were taken: ${list}.`,
  },
];

/** Reports elements that are unknown, guessed or read from labels, and positions shared in unknown shares: one problem a kind. */
export function reportSpecies(
  sites: readonly Site[],
  species: readonly SiteSpecies[],
  log: ProblemLog,
): void {
  for (const { code, severity, holds, sentence } of remarks) {
    const found = sites.filter((_, i) => holds(species[i]!));
    const [first] = found;
    if (!first) continue;
    const shown = found
      .slice(0, mostShown)
      .map((site) => `${site.label} = ${site.species.map(({ element }) => element).join('/')}`);
    const list = shown.join(', ') + (found.length > mostShown ? ', …' : '');
    const reasons = [...new Set(found.map(({ index }) => species[index]!.group ?? ''))]
      .slice(0, 4)
      .join('; ');
    log.add(severity, code, sentence(found.length, list, reasons), { place: first.place });
  }
}
