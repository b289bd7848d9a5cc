import { beforeEach, describe, expect, it } from 'vitest';
import { problem } from '#src/base/problem.ts';
import { fixtureCase } from '#tests/support/dossier-fixture.ts';
import type { Mounted } from './mount.ts';
import { mountWorkbench, settle, textOf } from './mount.ts';

let page: Mounted;

async function openPanel(button: string, tag: string): Promise<ShadowRoot> {
  const header = page.part('ellipsite-page-header').shadowRoot;
  [...header.querySelectorAll('button')].find((one) => textOf(one) === button)!.click();
  for (let i = 0; i < 100; i++) {
    await settle();
    const found = page.workbench.renderRoot.querySelector(tag)?.shadowRoot;
    if (found && textOf(found) !== '') return found;
  }
  throw new Error(`${tag} did not come`);
}

async function type(root: ShadowRoot, id: string, text: string): Promise<HTMLInputElement> {
  const input = root.querySelector<HTMLInputElement>(`#${CSS.escape(id)}`)!;
  input.value = text;
  input.dispatchEvent(new Event('change'));
  await settle();
  return input;
}

const settings = () => page.store.state.decisions!.settings;

describe('the settings', () => {
  let root: ShadowRoot;

  beforeEach(async () => {
    page = await mountWorkbench();
    root = await openPanel('Settings', 'ellipsite-settings-panel');
  });

  it('take a shift reference for an isotope, typed with a comma, and forget it when emptied', async () => {
    await type(root, 'intercept-27Al', '550,5');
    expect(settings().references['27Al']).toEqual({
      kind: 'simple',
      interceptPpm: 550.5,
      slope: -1,
      isotope: '27Al',
    });
    expect(page.store.state.past.at(-1)?.name).toBe('reference of 27Al');
    await type(root, 'intercept-27Al', '');
    expect(settings().references).toEqual({});
  });

  it('refuse what is no number, and say what is allowed', async () => {
    const input = await type(root, 'tolerance', 'wide');
    expect(input.validationMessage).toBe('A number from 0.000001 to 1 is allowed.');
    expect(input.ariaInvalid).toBe('true');
    expect(settings().symmetryToleranceAngstrom).toBe(0.01);
    await type(root, 'tolerance', '0.05');
    expect(settings().symmetryToleranceAngstrom).toBe(0.05);
  });

  it('take a quadrupole moment in millibarn', async () => {
    await type(root, 'moment-27Al', '150');
    expect(settings().quadrupoleMomentsBarn).toEqual({ '27Al': 0.15 });
  });

  it('offer every setting with a name', () => {
    for (const control of root.querySelectorAll<HTMLInputElement | HTMLSelectElement>('input, select')) {
      const name = control.getAttribute('aria-label') ?? control.labels?.[0]?.textContent ?? '';
      expect(name.trim(), control.id).not.toBe('');
    }
  });
});

describe('the case panel', () => {
  it('lists the files with what they hold and offers the sample cases', async () => {
    page = await mountWorkbench();
    const root = await openPanel('Case', 'ellipsite-case-panel');
    expect(textOf(root.querySelector('li'))).toContain(
      'XYZ, 8 lines, 1 structure, 2 shielding tensors (ppm)',
    );
    expect(root.querySelectorAll('.sample').length).toBeGreaterThanOrEqual(3);
    expect(textOf(root.querySelector('.sample'))).toContain('invented');
  });

  it('takes a proposed column only when told', async () => {
    const proposal = {
      sourceId: 'source-1',
      name: 'tens',
      line: 2,
      quantity: 'shielding' as const,
      reason: 'its trace is large',
    };
    page = await mountWorkbench({ ...fixtureCase(), proposals: [proposal] });
    const root = await openPanel('Case', 'ellipsite-case-panel');
    const group = root.querySelector('[role=region]')!;
    expect(textOf(group)).toContain('Column tens holds nine numbers an atom and was not taken.');
    expect(page.store.state.decisions?.accepted).toEqual({});
    group.querySelectorAll('button')[2]!.click();
    await settle();
    expect(page.store.state.decisions?.accepted).toEqual({ 'source-1': { tens: { quantity: 'efg' } } });
  });
});

describe('a proposed column in the problems', () => {
  it('can be taken from its entry', async () => {
    const proposal = {
      sourceId: 'source-1',
      name: 'tens',
      line: 2,
      quantity: 'unknown' as const,
      reason: 'nothing tells',
    };
    const place = { file: 'invented.xyz', line: 2, column: 1 };
    const found = problem('note', 'xyz-column-proposed', 'Column tens was not taken.', { place });
    page = await mountWorkbench({ ...fixtureCase(), proposals: [proposal], problems: [found] });
    const root = await openPanel('1 note', 'ellipsite-problems-drawer');
    root.querySelectorAll<HTMLElement>('li .commands button')[0]!.click();
    await settle();
    expect(page.store.state.decisions?.accepted).toEqual({ 'source-1': { tens: { quantity: 'shielding' } } });
  });
});

describe('dropping files', () => {
  function fire(target: EventTarget, kind: string): void {
    const dataTransfer = new DataTransfer();
    dataTransfer.items.add(new File(['x'], 'dropped.xyz'));
    target.dispatchEvent(
      new DragEvent(kind, { dataTransfer, bubbles: true, composed: true, cancelable: true }),
    );
  }

  beforeEach(async () => {
    page = await mountWorkbench();
  });

  it('opens them as a new case, wherever they fall', async () => {
    fire(page.workbench, 'dragover');
    await settle();
    const zone = page.part('ellipsite-drop-zone').shadowRoot;
    expect(textOf(zone)).toContain('CIF 1.1 and 2.0, XYZ and extended XYZ');
    fire(page.workbench, 'drop');
    await settle();
    expect(page.store.state.decisions?.sources.map(({ name }) => name)).toEqual(['dropped.xyz']);
    expect(textOf(zone)).toBe('');
  });

  it('adds them to the case on the other field', async () => {
    fire(page.workbench, 'dragover');
    await settle();
    const field = page.part('ellipsite-drop-zone').shadowRoot.querySelector('[data-kind=add]')!;
    fire(field, 'dragover');
    fire(field, 'drop');
    await settle();
    expect(page.store.state.decisions?.sources.map(({ name }) => name)).toEqual([
      'invented.xyz',
      'dropped.xyz',
    ]);
  });
});
