import type { PickEntry, Scene, SceneQuantity } from '#src/scene/scene.ts';
import type { KnownSite } from '#src/store/engine-queries.ts';
import { formatNumber, formatOperation, formatPosition } from '#src/table/number-format.ts';
import { knownConvention, siteNumber } from '#src/table/printed-value.ts';
import { percent, sharingSentence } from './shared-position.ts';

/** Three numbers that say most about a tensor, by quantity. */
const tellingNumbers: Readonly<Record<SceneQuantity, readonly string[]>> = {
  shielding: ['isotropic', 'span', 'skew'],
  shift: ['isotropic', 'span', 'skew'],
  efg: ['couplingMHz', 'asymmetry', 'Vzz'],
};

/**
 * What is under the pointer: site, operation, position and three numbers of the quantity that is drawn (or of one the site
 * has); or the two ends and the length of a bond. Empty while a site is on its way; `siteOf` asks for it.
 */
export function pointedSentence(
  entry: PickEntry,
  scene: Scene,
  siteOf: (siteIndex: number) => KnownSite | null,
): string {
  if (entry.kind === 'bond') {
    const kind = entry.bond === 'hydrogen' ? 'hydrogen bond ' : '';
    const ends = [entry.fromAtomId, entry.toAtomId].map(
      (id) => siteOf(Number.parseInt(id, 10))?.label ?? '?',
    );
    return `${kind}${ends.join('–')} ${formatNumber(entry.lengthAngstrom, 3)} Å`;
  }
  const site = siteOf(entry.siteIndex);
  if (!site) return '';
  const atom = site.equivalents.find(({ id }) => id === entry.atomId);
  const sharing = sharingSentence(site);
  const parts = [
    site.label,
    ...(sharing ? [`${percent(site.occupancy)}, ${sharing}`] : []),
    ...(atom?.fractional
      ? [
          formatOperation(atom.operation),
          `at ${formatPosition(
            atom.fractional.map((x, k) => x + entry.cellShift[k]!),
            4,
          )}`,
        ]
      : []),
    ...threeNumbers(site, scene.scale?.quantity ?? null),
  ];
  return parts.join(' · ');
}

/** `σiso 526.67 ppm`, `Ω 30.10 ppm`, `κ 0.30`; nothing for a site without tensors. */
function threeNumbers(site: KnownSite, drawn: SceneQuantity | null): string[] {
  const quantity = ([drawn, 'shielding', 'shift', 'efg'] as const).find((one) => one && site[one]);
  if (!quantity) return [];
  return tellingNumbers[quantity].map((key) => {
    const entry = knownConvention(quantity, key);
    const text = siteNumber(site, entry);
    const isNumber = /\d/.test(text);
    return `${entry.symbol} ${isNumber ? `${text} ${entry.unit}`.trim() : 'undefined'}`;
  });
}
