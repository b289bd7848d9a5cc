import { describe, expect, it } from 'vitest';
import { defaultSettings } from '#src/dossier/default-settings.ts';
import type { Scene } from '#src/scene/scene.ts';
import { summaryOf } from '#src/store/crystal-summary.ts';
import { Cancelled } from '#src/store/engine-client.ts';
import type { CaseInput } from '#src/store/engine-protocol.ts';
import type { KnownSite } from '#src/store/engine-queries.ts';
import { CrystalDesk, transferablesOf } from '#src/store/engine-queries.ts';
import { createEngine } from '#src/store/engine.ts';
import { NewestOnly } from '#src/store/newest-only.ts';
import { SiteCache } from '#src/store/site-cache.ts';
import { noFilter } from '#src/table/table-settings.ts';
import type { TablePage, TableRequest } from '#src/table/table-settings.ts';
import { symmetryTables } from '#tests/support/derive.ts';
import { answerFor, fixtureCase, fixtureDossier, manySites } from '#tests/support/dossier-fixture.ts';

const request: TableRequest = {
  columns: ['label'],
  sort: null,
  filter: noFilter,
  first: 0,
  count: 2,
  withOrder: true,
};

describe('the summary of a crystal', () => {
  it('counts what the panels ask for and holds no site', () => {
    const summary = summaryOf(fixtureDossier);
    expect(summary).toMatchObject({
      siteCount: 3,
      quantities: ['shielding', 'shift', 'efg'],
      tensorCounts: { shielding: 2, shift: 1, efg: 1 },
      isPartlyOccupied: false,
      hasBonds: true,
      hasHydrogenBonds: false,
      hasCutMolecules: false,
      hasForeignCouplings: false,
    });
    expect(summary.elements[0]).toEqual({
      element: 'Al',
      isotope: '27Al',
      siteCount: 1,
      tensorCounts: { shielding: 1, shift: 1, efg: 1 },
    });
    expect(Object.keys(summary)).not.toContain('sites');
  });
});

describe('questions about a crystal', () => {
  it('answer windows of the table, with the order only when asked', () => {
    const desk = new CrystalDesk(manySites(500));
    const first = desk.answer({ kind: 'table', ask: request }) as TablePage;
    expect(first.order?.sites).toHaveLength(500);
    expect(first.rows.map(({ label }) => label)).toEqual(['O1', 'O2']);
    // what is sent is given away: the next window must not depend on it
    structuredClone(first, { transfer: transferablesOf(first) });
    const second = desk.answer({
      kind: 'table',
      ask: { ...request, first: 499, count: 50, withOrder: false },
    }) as TablePage;
    expect(second).toMatchObject({ order: null, total: 500, first: 499 });
    expect(second.rows.map(({ label }) => label)).toEqual(['O500']);
  });

  it('answer sites, passing over those that do not exist', () => {
    const sites = new CrystalDesk(fixtureDossier).answer({ kind: 'sites', ask: [2, 99] });
    expect((sites as KnownSite[]).map(({ label, sharing }) => [label, sharing])).toEqual([['H1', []]]);
  });

  it('answer a picture whose arrays are given away, not copied', () => {
    const scene = new CrystalDesk(fixtureDossier).answer({ kind: 'scene', ask: {} }) as Scene;
    const buffers = transferablesOf(scene);
    expect(buffers).toContain(scene.quadrics.shapes.buffer);
    expect(buffers).toContain(scene.siteColours!.buffer);
    const sent = structuredClone(scene, { transfer: buffers });
    expect(sent.quadrics.shapes.length).toBe(9 * sent.quadrics.count);
    expect(scene.quadrics.shapes.length).toBe(0);
  });
});

describe('an engine that is asked', () => {
  const blob = new Blob(['1\nLattice="4 0 0 0 4 0 0 0 6" Properties=species:S:1:pos:R:3\nSi 0 0 0\n']);
  const input: CaseInput = {
    sources: [{ id: 'a', name: 'a.xyz', blob }],
    structure: null,
    settings: defaultSettings,
  };
  const label = async (answer: Promise<unknown>): Promise<string | undefined> =>
    ((await answer) as readonly KnownSite[])[0]?.element;

  it('derives a crystal again that it does not hold, as after a cancel', async () => {
    const engine = createEngine(() => Promise.resolve(symmetryTables));
    expect(await label(engine.answer(7, input, { kind: 'sites', ask: [0] }))).toBe('Si');
  });

  it('still answers about the crystal on screen while another one was derived and given up', async () => {
    const engine = createEngine(() => Promise.resolve(symmetryTables));
    await engine.derive(1, input, () => undefined);
    const other = new Blob(['1\n\nO 0 0 0\n']);
    await engine.derive(2, { ...input, sources: [{ id: 'b', name: 'b.xyz', blob: other }] }, () => undefined);
    expect(await label(engine.answer(1, input, { kind: 'sites', ask: [0] }))).toBe('Si');
  });

  it('says so where there is no crystal', async () => {
    const engine = createEngine(() => Promise.resolve(symmetryTables));
    const nothing = { ...input, sources: [{ id: 'c', name: 'c.txt', blob: new Blob(['nothing']) }] };
    await expect(engine.answer(1, nothing, { kind: 'sites', ask: [0] })).rejects.toThrow('no crystal');
  });
});

describe('sites kept on the page', () => {
  const derived = fixtureCase();

  it('are fetched together, once, and then are there', async () => {
    const asked: (readonly number[])[] = [];
    let arrivals = 0;
    const cache = new SiteCache(
      (of, indices) => {
        asked.push(indices);
        return answerFor(of, 'sites', indices);
      },
      () => arrivals++,
    );
    expect([cache.get(derived, 0), cache.get(derived, 1), cache.get(derived, 0)]).toEqual([null, null, null]);
    await new Promise((resolve) => setTimeout(resolve, 0));
    expect(asked).toEqual([[0, 1]]);
    expect(arrivals).toBe(1);
    expect(cache.get(derived, 1)?.label).toBe('O1');
    expect((await cache.read(derived, [1, 2])).map(({ label }) => label)).toEqual(['O1', 'H1']);
    expect(asked).toEqual([[0, 1], [2]]);
  });

  it('are not asked for over and over where they cannot be read', async () => {
    let asked = 0;
    const cache = new SiteCache(
      () => {
        asked++;
        return Promise.reject(new Error('broken'));
      },
      () => undefined,
    );
    for (let i = 0; i < 3; i++) {
      expect(cache.get(derived, 0)).toBeNull();
      await new Promise((resolve) => setTimeout(resolve, 0));
    }
    expect(asked).toBe(1);
    await expect(cache.read(derived, [0])).rejects.toThrow('broken');
  });
});

describe('the newest question only', () => {
  it('is sent after the one underway; those between are cancelled', async () => {
    const sent: number[] = [];
    const answers: (() => void)[] = [];
    const newest = new NewestOnly((ask: number) => {
      sent.push(ask);
      return new Promise<number>((resolve) => answers.push(() => resolve(10 * ask)));
    });
    const [first, second, third] = [newest.ask(1), newest.ask(2), newest.ask(3)];
    await expect(second).rejects.toBeInstanceOf(Cancelled);
    answers[0]!();
    expect(await first).toBe(10);
    await Promise.resolve();
    expect(sent).toEqual([1, 3]);
    answers[1]!();
    expect(await third).toBe(30);
  });
});
