import { afterEach, describe, expect, it } from 'vitest';
import type { Periodicity } from '#src/base/periodicity.ts';
import { fixtureCase, fixtureDossier } from '#tests/support/dossier-fixture.ts';
import { settle, textOf } from './mount.ts';
import { drawnPage, eventually, openPanel } from './picture-driver.ts';

/** The Show panel with a range of cells chosen, for the fixture's cell repeating along some axes only. */
async function rangePanel(periodic: Periodicity): Promise<{ panel: ShadowRoot; caption: () => string }> {
  const { root, store } = await drawnPage(fixtureCase({ ...fixtureDossier, periodic }));
  store.setPicture({ extent: 'range' }, 'draw a range of cells');
  const panel = await openPanel(root, 'Show', 'ellipsite-show-panel');
  await eventually(() => panel.querySelector('#extent'));
  await settle();
  return { panel, caption: () => textOf(root.querySelector('#caption')) };
}

const fields = (panel: ShadowRoot): string[] =>
  [...panel.querySelectorAll('.range input')].map(({ id }) => id);

describe('a range of cells in the Show panel', () => {
  afterEach(() => document.body.replaceChildren());

  it('is typed along axes that repeat; of the others panel and caption say that there is one cell', async () => {
    const { panel, caption } = await rangePanel([true, true, false]);
    expect(fields(panel)).toEqual(['range-0-0', 'range-1-0', 'range-0-1', 'range-1-1']);
    expect(textOf(panel)).toContain('The cell does not repeat along c: one cell is drawn there.');
    await eventually(() => caption().includes('The cell does not repeat along c'));
  });

  it('is not offered where nothing repeats', async () => {
    const { panel } = await rangePanel([false, false, false]);
    expect(fields(panel)).toEqual([]);
    const range = [...panel.querySelectorAll('option')].find((one) => textOf(one).startsWith('a range'));
    expect(range?.disabled).toBe(true);
    expect(textOf(range)).toContain('(the cell does not repeat)');
  });

  it('has all six ends in a crystal', async () => {
    const { panel } = await rangePanel([true, true, true]);
    expect(fields(panel)).toHaveLength(6);
    expect(textOf(panel)).not.toContain('does not repeat');
  });
});
