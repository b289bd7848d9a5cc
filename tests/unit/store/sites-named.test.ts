import { describe, expect, it } from 'vitest';
import { createStore } from '#src/store/store.ts';
import { fixtureCase, fixtureEngine, manySites } from '#tests/support/dossier-fixture.ts';

describe('sites named in a text', () => {
  it('are found wherever they stand and whether they were read before, longest labels first', async () => {
    const dossier = manySites(3000);
    const store = createStore(fixtureEngine(fixtureCase(dossier)));
    await store.open([{ name: 'many.xyz', blob: new Blob(['x']) }]);
    const far = dossier.sites[2900]!;
    const [first] = await store.sitesNamed(`V33 of ${far.label.toUpperCase()}`);
    expect(first?.index).toBe(2900);
    expect(first?.equivalents.length).toBeGreaterThan(0);
    expect(await store.sitesNamed('[1 1 0]')).toEqual([]);
  });

  it('are none on an empty page', async () => {
    expect(await createStore(fixtureEngine()).sitesNamed('Al1 Vzz')).toEqual([]);
  });
});
