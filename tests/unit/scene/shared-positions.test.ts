import { describe, expect, it } from 'vitest';
import type { Mat3, Vec3 } from '#src/base/matrix3.ts';
import type { CrystalDossier } from '#src/dossier/dossier.ts';
import { buildScene } from '#src/scene/build-scene.ts';
import { sharedPositions } from '#src/scene/shared-positions.ts';
import { summaryOf } from '#src/store/crystal-summary.ts';
import { CrystalDesk } from '#src/store/engine-queries.ts';
import type { KnownSite } from '#src/store/engine-queries.ts';
import { defaultColumns, siteColumn } from '#src/table/site-columns.ts';
import { pointedSentence } from '#components/pointed-sentence.ts';
import { madeDossier } from '#tests/support/made-dossier.ts';

const rows: Mat3 = [4, 0, 0, 1, 5, 0, 0, 0, 6];
const inversion = { w: [-1, 0, 0, 0, -1, 0, 0, 0, -1] as Mat3, t: [0, 0, 0] as Vec3 };
const both = [{ w: [1, 0, 0, 0, 1, 0, 0, 0, 1] as Mat3, t: [0, 0, 0] as Vec3 }, inversion];

/** Nb shares the position of Al, listed at its inversion image and a rounding error away; O is alone and full. */
function mixed(): CrystalDossier {
  const made = madeDossier({
    rows,
    sites: [
      { label: 'Nb1', element: 'Nb', position: [0.8999999, 0.8, 0], operations: both },
      { label: 'Al1', element: 'Al', position: [0.1, 0.2, 0], operations: both },
      { label: 'O1', element: 'O', position: [0.5, 0.5, 0.5] },
      { label: 'O2', element: 'O', position: [0.5, 0.5, 0.6] },
    ],
  });
  const shares = [0.059, 0.941, 1, 0.5];
  return { ...made, sites: made.sites.map((site, i) => ({ ...site, occupancy: shares[i]! })) };
}

describe('sites that share a position', () => {
  it('are found through symmetry and across the cell faces', () => {
    const { others, drawnInstead } = sharedPositions(mixed());
    expect([...others].map(([index, sites]) => [index, sites.map(({ label }) => label)])).toEqual([
      [0, ['Al1']],
      [1, ['Nb1']],
    ]);
    expect([...drawnInstead]).toEqual([[0, 1]]);
  });

  it('are drawn and picked as the one with the larger occupancy, and the caption says so', () => {
    const scene = buildScene(mixed());
    const sites = new Set(scene.picks.flatMap((pick) => (pick.kind === 'atom' ? [pick.siteIndex] : [])));
    expect(sites).toEqual(new Set([1, 2, 3]));
    expect(scene.caption).toContain('share a position');
    expect(scene.elements.map(({ element }) => element)).toEqual(['Al', 'O', 'Nb']);
  });

  it('are both named under the pointer, and a column of occupancies appears', () => {
    const dossier = mixed();
    const scene = buildScene(dossier);
    const pick = scene.picks.find((one) => one.kind === 'atom' && one.siteIndex === 1)!;
    const desk = new CrystalDesk(dossier);
    const siteOf = (index: number): KnownSite | null =>
      (desk.answer({ kind: 'sites', ask: [index] }) as readonly KnownSite[])[0] ?? null;
    expect(pointedSentence(pick, scene, siteOf)).toContain(
      'Al1 · 94.1 %, shares its position with Nb1 (5.9 %)',
    );
    const columns = (made: CrystalDossier) => defaultColumns(summaryOf(made));
    expect(columns(dossier)).toContain('occupancy');
    expect(siteColumn('occupancy')?.text(dossier.sites[0]!)).toBe('0.059');
    expect(columns({ ...dossier, sites: [dossier.sites[2]!] })).not.toContain('occupancy');
  });
});
