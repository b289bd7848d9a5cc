import { afterEach, describe, expect, it } from 'vitest';
import { createStore } from '#src/store/store.ts';
import { Cancelled } from '#src/store/engine-client.ts';
import { Workbench } from '#components/workbench.ts';
import { fixtureEngine } from '#tests/support/dossier-fixture.ts';
import { nothingDraws, settle, textOf } from './mount.ts';
import { eventually } from './picture-driver.ts';

describe('cancelling a long read by keyboard', () => {
  afterEach(() => document.body.replaceChildren());

  it('says so and gives the focus back', async () => {
    const usual = fixtureEngine();
    let isFirst = true;
    let refuse: (reason: Error) => void = () => undefined;
    const store = createStore({
      ...usual,
      derive: (input, report) => {
        if (!isFirst) return new Promise((_resolve, reject) => (refuse = reject));
        isFirst = false;
        return usual.derive(input, report);
      },
      cancel: () => refuse(new Cancelled('cancelled')),
    });
    await store.open([{ name: 'first.xyz', blob: new Blob(['x']) }]);
    const workbench = new Workbench();
    workbench.store = store;
    workbench.probe = nothingDraws;
    document.body.append(workbench);
    await settle();
    const table = workbench.renderRoot.querySelector('ellipsite-site-table')!.shadowRoot!;
    const grid = table.querySelector<HTMLElement>('[role=treegrid]')!;
    grid.focus();
    void store.open([{ name: 'big.xyz', blob: new Blob(['x']) }]);
    const bar = workbench.renderRoot.querySelector('ellipsite-progress-bar')!.shadowRoot!;
    const button = await eventually(() => bar.querySelector('button'));
    button.focus();
    button.click();
    await settle();
    const spoken = textOf(workbench.renderRoot.querySelector('[role=status]'));
    expect(spoken).toContain('Cancelled: open big.xyz');
    expect(spoken).toContain('stays on screen');
    expect(document.activeElement).toBe(workbench);
    expect(workbench.renderRoot instanceof ShadowRoot && workbench.renderRoot.activeElement).not.toBeNull();
    await settle();
    expect(bar.querySelector('button')).toBeNull();
    expect((workbench.renderRoot as ShadowRoot).activeElement?.shadowRoot?.activeElement).not.toBe(button);
  });
});
