import { afterEach, beforeEach, describe, expect, it } from 'vitest';
import { openKeeper } from '#src/store/keeper.ts';
import type { Keeper } from '#src/store/keeper.ts';
import { filesOf, storedWork } from '#src/store/kept-work.ts';
import { momentOf } from '#src/store/moment.ts';
import { createStore } from '#src/store/store.ts';
import { WorkDatabase } from '#src/store/work-database.ts';
import { fixtureEngine } from '#tests/support/dossier-fixture.ts';
import type { Mounted } from './mount.ts';
import { mountWorkbench, settle, textOf } from './mount.ts';

let page: Mounted;
let keeper: Keeper;
const hashOf = (blob: Blob): Promise<string> => blob.text();

/** The work of a tab that was closed. */
async function keep(id: string, name: string, savedAt: number, atomCount?: number): Promise<void> {
  const store = createStore(fixtureEngine());
  await store.open([{ name, blob: new Blob([name]) }]);
  store.setPicture({ colourBy: 'span' }, 'colour by span');
  const moment = momentOf(store.state);
  const blobs = new Map(filesOf(moment).map(({ blob }) => [name, blob]));
  const database = await WorkDatabase.open();
  await database.save(
    id,
    storedWork({ moment }, () => name, savedAt, atomCount),
    (key) => blobs.get(key),
  );
}

const list = (): ShadowRoot =>
  page.part('ellipsite-case-panel').shadowRoot.querySelector('ellipsite-earlier-work')!.shadowRoot!;
const rows = (): string[] => [...list().querySelectorAll('li > span')].map(textOf);
const button = (words: string): HTMLButtonElement =>
  [...list().querySelectorAll('button')].find((one) => one.ariaLabel?.startsWith(words))!;

async function eventually(look: () => boolean): Promise<void> {
  for (let i = 0; i < 200 && !look(); i++) await settle();
  expect(look()).toBe(true);
}

describe('earlier work', () => {
  beforeEach(async () => {
    sessionStorage.setItem('ellipsite tab', `tab ${Math.random()}`);
    await keep('older', 'quartz.cif', Date.UTC(2026, 2, 1, 12));
    await keep('newer', 'olivine.cif', Date.UTC(2026, 2, 2, 12), 28);
    keeper = await openKeeper(hashOf);
    page = await mountWorkbench();
    page.workbench.keeper = keeper;
    page.workbench.panel = 'case';
    await import('#components/case-panel.ts');
    await settle();
    await eventually(() => rows().length > 0);
  });

  afterEach(async () => {
    const database = await WorkDatabase.open();
    await database.tidy(await database.ids());
    sessionStorage.clear();
  });

  it('is listed by name, time and number of atoms, the newest first', () => {
    const [first, second] = rows();
    expect(rows()).toHaveLength(2);
    expect(first).toMatch(/^olivine\.cif 2 Mar 2026, .*· 28 atoms$/);
    expect(second).toMatch(/^quartz\.cif 1 Mar 2026, [\d:]+$/);
    expect(textOf(list())).toContain('keeps the last 8 works');
  });

  it('opens with its views as a step that can be undone, and stays in the list', async () => {
    const before = page.store.state.decisions;
    button('Open quartz.cif').click();
    await eventually(() => page.store.state.decisions?.title === 'quartz.cif');
    const { decisions, picture, past } = page.store.state;
    expect(await decisions!.sources[0]!.blob.text()).toBe('quartz.cif');
    expect(decisions!.sources[0]!.id).not.toBe(before!.sources[0]!.id);
    expect(picture.colourBy).toBe('span');
    expect(past.at(-1)?.name).toBe('open quartz.cif');
    expect(rows()).toHaveLength(2);
    await page.store.undo();
    expect(page.store.state.decisions).toBe(before);
  });

  it('is deleted for good, with files nothing else names', async () => {
    button('Delete olivine.cif').click();
    await eventually(() => rows().length === 1);
    expect(textOf(list().querySelector('[role=status]'))).toBe('olivine.cif is deleted.');
    expect(await keeper.load('newer')).toBeNull();
    expect((await keeper.load('older')) === null).toBe(false);
  });
});
