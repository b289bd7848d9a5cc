import type { PickEntry, Scene } from '#src/scene/scene.ts';
import type { KnownSite } from '#src/store/engine-queries.ts';
import { formatNumber, formatOperation } from '#src/table/number-format.ts';
import { mainNumbers } from '#src/table/printed-value.ts';
import { percent, sharingSentence } from './shared-position.ts';

/**
 * What is under the pointer, in a line: site, operation, main numbers; or the two ends and the length of a bond. Empty
 * while a site is on its way; `siteOf` asks for it.
 */
export function pointedSentence(
  entry: PickEntry,
  scene: Scene,
  siteOf: (siteIndex: number) => KnownSite | null,
): string {
  if (entry.kind === 'bond') {
    const kind = entry.bond === 'hydrogen' ? 'hydrogen bond ' : '';
    const ends = [entry.fromAtomId, entry.toAtomId].map((id) => {
      const index = siteOfAtom(scene, id);
      return (index === null ? null : siteOf(index)?.label) ?? '?';
    });
    return `${kind}${ends.join('–')} ${formatNumber(entry.lengthAngstrom, 3)} Å`;
  }
  const site = siteOf(entry.siteIndex);
  if (!site) return '';
  const atom = site.equivalents.find(({ id }) => id === entry.atomId);
  const operation = atom?.fractional ? [formatOperation(atom.operation)] : [];
  const sharing = sharingSentence(site);
  const shares = sharing ? [`${percent(site.occupancy)}, ${sharing}`] : [];
  return [site.label, ...shares, ...operation, ...mainNumbers(site)].join(' · ');
}

function siteOfAtom({ picks }: Scene, atomId: string): number | null {
  const found = picks.find((pick) => pick.kind === 'atom' && pick.atomId === atomId);
  return found?.kind === 'atom' ? found.siteIndex : null;
}
