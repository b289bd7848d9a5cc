import { afterEach, describe, expect, it } from 'vitest';
import type { EngineClient } from '#src/store/engine-client.ts';
import { createStore } from '#src/store/store.ts';
import { Workbench } from '#components/workbench.ts';
import { fixtureCase, fixtureEngine, manySites } from '#tests/support/dossier-fixture.ts';
import { nothingDraws, settle, textOf } from './mount.ts';
import { eventually } from './picture-driver.ts';

const file = (name: string) => ({ name, blob: new Blob([name]) });

/** Two crystals one after another; the rows of the second wait until they are let go. */
function slowRows(): { readonly engine: EngineClient; readonly letGo: () => void } {
  const usual = fixtureEngine();
  const second = {
    ...fixtureCase({ ...manySites(40), name: 'second' }),
    chosen: { sourceId: 'source-2', index: 0 },
  };
  const answers = [fixtureCase(), second];
  let letGo = (): void => undefined;
  const gate = new Promise<void>((resolve) => (letGo = resolve));
  const engine: EngineClient = {
    ...usual,
    derive: () => Promise.resolve(answers.shift() ?? second),
    ask: async (derived, kind, ask) => {
      const answer = await usual.ask(derived, kind, ask);
      if (kind === 'table' && derived === second) await gate;
      return answer;
    },
  };
  return { engine, letGo: () => letGo() };
}

async function mounted(engine: EngineClient, withPicture: boolean): Promise<Workbench> {
  const store = createStore(engine);
  await store.open([file('first.xyz')]);
  const workbench = new Workbench();
  workbench.store = store;
  if (!withPicture) workbench.probe = nothingDraws;
  document.body.append(workbench);
  await settle();
  return workbench;
}

const inside = (workbench: Workbench, tag: string): ShadowRoot =>
  workbench.renderRoot.querySelector(tag)!.shadowRoot!;
const spoken = (workbench: Workbench): string => textOf(workbench.renderRoot.querySelector('[role=status]'));

describe('another crystal comes on screen', () => {
  afterEach(() => document.body.replaceChildren());

  it('has no row of the one before, and is spoken of once its rows are here', async () => {
    const { engine, letGo } = slowRows();
    const workbench = await mounted(engine, false);
    const grid = inside(workbench, 'ellipsite-site-table').querySelector('[role=treegrid]')!;
    const body = (): string => textOf(grid.querySelector('.body'));
    expect(body()).toContain('526.67');
    workbench.store!.select({ siteIndex: 0, atomId: null });
    await workbench.store!.open([file('second.xyz')]);
    await settle();
    expect(textOf(workbench.renderRoot.querySelector('ellipsite-site-table')!.shadowRoot)).toContain(
      '40 sites',
    );
    expect(grid.querySelectorAll('.row.site').length).toBeGreaterThan(8);
    expect(body().replaceAll('…', '').trim()).toBe('');
    expect(textOf(inside(workbench, 'ellipsite-site-card'))).not.toContain('Al1');
    expect(spoken(workbench)).not.toContain('is on screen');
    letGo();
    await settle();
    expect(body()).toContain('O1');
    expect(body()).not.toContain('526.67');
    expect(spoken(workbench)).toContain('second is on screen: 40 sites');
  });

  it('hides the picture of the one before until its own is drawn', async () => {
    const { engine, letGo } = slowRows();
    letGo();
    const workbench = await mounted(engine, true);
    const view = inside(workbench, 'ellipsite-crystal-view');
    const canvas = await eventually(() => view.querySelector('canvas'));
    const seen = (): boolean => getComputedStyle(canvas).visibility === 'visible';
    await eventually(seen);
    let wasHidden = false;
    let spokenWhileHidden = false;
    const watching = setInterval(() => {
      wasHidden ||= !seen();
      spokenWhileHidden ||= !seen() && spoken(workbench).includes('second is on screen');
    }, 0);
    await workbench.store!.open([file('second.xyz')]);
    await workbench.updateComplete;
    wasHidden ||= !seen();
    await eventually(() => spoken(workbench).includes('second is on screen'));
    clearInterval(watching);
    expect(wasHidden).toBe(true);
    expect(spokenWhileHidden).toBe(false);
    expect(seen()).toBe(true);
  });
});
