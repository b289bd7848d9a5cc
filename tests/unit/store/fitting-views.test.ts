import { describe, expect, it } from 'vitest';
import { summaryOf } from '#src/store/crystal-summary.ts';
import type { CrystalSummary } from '#src/store/crystal-summary.ts';
import type { EngineClient } from '#src/store/engine-client.ts';
import { fittingViews } from '#src/store/fitting-views.ts';
import { defaultViews } from '#src/store/state.ts';
import type { Views } from '#src/store/state.ts';
import { createStore } from '#src/store/store.ts';
import { fixtureCase, fixtureDossier, fixtureEngine } from '#tests/support/dossier-fixture.ts';

const full = summaryOf(fixtureDossier);
const sites = fixtureDossier.sites.map((site) => ({ ...site, efg: null }));
const withoutEfg: CrystalSummary = summaryOf({ ...fixtureDossier, sites });

const chosen: Views = {
  ...defaultViews,
  picture: { ...defaultViews.picture, quantity: 'efg', glyph: 'axes', colourBy: 'coupling', labels: true },
  table: {
    ...defaultViews.table,
    columns: ['label', 'efg-couplingMHz', 'shielding-span'],
    sort: { key: 'efg-couplingMHz', descending: true },
  },
};

describe('views of one structure for another', () => {
  it('stay as they are where the other one has all of it', () => {
    expect(fittingViews(chosen, full)).toEqual(chosen);
  });

  it('lose what was chosen for tensors the other one does not have, and nothing else', () => {
    const { picture, table } = fittingViews(chosen, withoutEfg);
    expect(picture).toEqual({ ...defaultViews.picture, labels: true });
    expect(table.columns).toEqual(['label', 'shielding-span']);
    expect(table.sort).toBeNull();
  });

  it('keep a glyph chosen for a quantity both have, and a column of both', () => {
    const views: Views = {
      ...chosen,
      picture: { ...chosen.picture, quantity: 'shielding', colourBy: 'span' },
      table: { ...chosen.table, sort: { key: 'shielding-span', descending: false } },
    };
    const { picture, table } = fittingViews(views, withoutEfg);
    expect(picture.glyph).toBe('axes');
    expect(picture.colourBy).toBe('span');
    expect(table.sort).toEqual({ key: 'shielding-span', descending: false });
  });

  it('are fitted when a structure is chosen, and given back by undo', async () => {
    const engine = fixtureEngine();
    const other: EngineClient = {
      ...engine,
      derive: (input) =>
        Promise.resolve(fixtureCase(input.structure ? { ...fixtureDossier, sites } : fixtureDossier)),
    };
    const store = createStore(other);
    await store.open([{ name: 'a.cif', blob: new Blob(['a']) }]);
    store.setPicture(chosen.picture, 'as chosen');
    store.setTable(chosen.table, 'sort');
    await store.chooseStructure({ sourceId: 'source-1', index: 1 }, 'second');
    expect(store.state.picture.quantity).toBe('auto');
    expect(store.state.picture.glyph).toBe('auto');
    expect(store.state.picture.labels).toBe(true);
    expect(store.state.table.sort).toBeNull();
    expect(store.state.refused).toBeNull();
    await store.undo();
    expect(store.state.picture.glyph).toBe('axes');
    expect(store.state.table.sort?.key).toBe('efg-couplingMHz');
  });
});
