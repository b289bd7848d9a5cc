import type { PickEntry } from '#src/scene/scene.ts';
import type { CrystalDossier } from '#src/store/dossier-types.ts';
import { mainNumbers } from './convention-symbol.ts';
import { formatNumber, formatOperation } from './number-format.ts';
import { percent, sharingSentence } from './shared-position.ts';

/** What is under the pointer, in a line: site, operation, main numbers; or the two ends and the length of a bond. */
export function pointedSentence(entry: PickEntry, dossier: CrystalDossier): string {
  if (entry.kind === 'bond') {
    const kind = entry.bond === 'hydrogen' ? 'hydrogen bond ' : '';
    const ends = [entry.fromAtomId, entry.toAtomId].map((id) => labelOf(id, dossier));
    return `${kind}${ends.join('–')} ${formatNumber(entry.lengthAngstrom, 3)} Å`;
  }
  const site = dossier.sites[entry.siteIndex];
  if (!site) return '';
  const atom = site.equivalents.find(({ id }) => id === entry.atomId);
  const operation = atom && dossier.lattice ? [formatOperation(atom.operation)] : [];
  const sharing = sharingSentence(site, dossier);
  const shares = sharing ? [`${percent(site.occupancy)}, ${sharing}`] : [];
  return [site.label, ...shares, ...operation, ...mainNumbers(site)].join(' · ');
}

function labelOf(atomId: string, dossier: CrystalDossier): string {
  return dossier.sites.find(({ equivalents }) => equivalents.some(({ id }) => id === atomId))?.label ?? '?';
}
