import { afterEach, beforeEach, describe, expect, it } from 'vitest';
import { createEngineClient } from '#src/store/engine-client.ts';
import type { Store } from '#src/store/store.ts';
import { createStore } from '#src/store/store.ts';
import { addFiles, openFiles } from '#components/open-files.ts';
import { Workbench } from '#components/workbench.ts';
import { nothingDraws, press, settle, textOf } from './mount.ts';

/** Structures and logs are invented. */
const crystal = `2
Lattice="4 0 0 0 4 0 0 0 6" Properties=label:S:1:species:S:1:pos:R:3
Al1 Al 0 0 0
O1 O 1 1 2
`;

/** Without any symmetry, so that no frame can be told from another. */
const triclinic = `2
Lattice="4 0 0 0.7 5 0 -0.9 0.4 6" Properties=label:S:1:species:S:1:pos:R:3
Al1 Al 0 0 0
O1 O 1 1 2
`;

const otherCrystal = `2
Lattice="5 0 0 0 5 0 0 0 6" Properties=label:S:1:species:S:1:pos:R:3
Si1 Si 0 0 0
N1 N 1 1 2
`;

const logOf = (first: string, second: string): string => `Invented run

 Tensors, nothing more is said
 atom ${first}
   520.0   2.0   0.0
    -4.0  530.0  0.0
     0.0   0.0  549.0
 atom ${second}
   120.0   0.0   3.0
     0.0  130.0  0.0
     1.0   0.0  149.0
`;

const input = (name: string, text: string) => ({ name, blob: new Blob([text]) });

let store: Store;
let workbench: Workbench;

async function until<Found>(what: string, find: () => Found | null | undefined | false): Promise<Found> {
  for (let i = 0; i < 300; i++) {
    const found = find();
    if (found) return found;
    await settle();
  }
  throw new Error(`${what} did not come`);
}

const root = (tag: string): ShadowRoot | null => workbench.renderRoot.querySelector(tag)?.shadowRoot ?? null;
const panel = (): Promise<ShadowRoot> =>
  until('the panel', () => {
    const found = root('ellipsite-found-panel');
    return found?.querySelector('summary') ? found : null;
  });
const header = (): ShadowRoot => root('ellipsite-page-header')!;
const foundButton = (): HTMLButtonElement | undefined =>
  [...header().querySelectorAll('button')].find((one) => textOf(one).startsWith('Found'));

async function choose(select: string, value: string): Promise<void> {
  const part = (await panel()).querySelector<HTMLSelectElement>(select)!;
  const before = store.state.derived;
  part.value = value;
  part.dispatchEvent(new Event('change'));
  await until('the effect', () => store.state.derived !== before);
  await settle();
}

async function mount(): Promise<void> {
  document.body.replaceChildren();
  store = createStore(createEngineClient());
  workbench = new Workbench();
  workbench.store = store;
  workbench.probe = nothingDraws;
  document.body.append(workbench);
  await openFiles(store, [input('crystal.xyz', crystal)]);
  await settle();
}

/** Answers the question by its first candidate. */
async function takeAsShielding(): Promise<void> {
  const root = await panel();
  const button = await until('the question', () => root.querySelector<HTMLElement>('.question button'));
  expect(textOf(button)).toBe('shielding');
  button.click();
  await until('the effect', () => store.state.derived?.crystal?.tensorCounts.shielding === 2);
  await settle();
}

beforeEach(mount);
afterEach(() => document.body.replaceChildren());

describe('a dropped text that leaves something open', () => {
  beforeEach(async () => {
    expect(foundButton()).toBeUndefined();
    await addFiles(store, [input('a.log', logOf('Al1', 'O1'))]);
    await panel();
  });

  it('opens the panel with the candidates side by side, and nothing is taken unasked', async () => {
    expect(textOf(foundButton())).toBe('Found 0 tensors, 1 question');
    expect(store.state.derived?.crystal?.tensorCounts.shielding).toBe(0);
    const question = await until('the question', () =>
      root('ellipsite-found-panel')!.querySelector('.question'),
    );
    expect([...question.querySelectorAll('th')].map(textOf)).toEqual(['read as', 'Al1', 'O1']);
    const rows = [...question.querySelectorAll('tbody tr')].map(textOf);
    expect(rows[0]).toContain('533.00 ppm');
    expect(rows.at(-1)).toBe('none of these');
    expect(workbench.renderRoot.querySelector('.drawer')?.getAttribute('aria-label')).toBe('Found');
  });

  it('shows the effect of an answer at once, and undo by its name takes it back', async () => {
    await takeAsShielding();
    expect(textOf(foundButton())).toBe('Found 2 tensors');
    expect((await panel()).querySelector('.question')).toBeNull();
    expect(store.state.past.at(-1)?.name).toBe('read line 5 as shielding');
    const [site] = await store.readSites([0]);
    expect(site?.shielding?.isotropic).toBeCloseTo(533, 9);
    await store.undo();
    await until('the question', () => root('ellipsite-found-panel')!.querySelector('.question'));
    expect(store.state.derived?.crystal?.tensorCounts.shielding).toBe(0);
  });

  it('turns sign, quantity and order by hand', async () => {
    await takeAsShielding();
    await choose('select[id$=quantity]', 'shift');
    await choose('select[id$=sign]', '-1');
    await choose('select[id$=order]', 'exchanged');
    const [site] = await store.readSites([0]);
    expect(site?.shift?.isotropic).toBeCloseTo(-533, 9);
    expect(textOf((await panel()).querySelector('tbody .number'))).toContain('−533.00 ppm');
    expect(store.state.past.at(-1)?.name).toBe('exchange rows and columns of line 5');
  });

  it('leads from a number to its line and its site, and from a site to its line', async () => {
    await takeAsShielding();
    const links = (await panel()).querySelectorAll<HTMLElement>('tbody .link');
    links[1]!.click();
    expect(store.state.selection).toEqual({ siteIndex: 1, atomId: null });
    expect(store.state.shownPlace).toEqual({ file: 'a.log', line: 9 });
    const text = await until('the text', () => {
      const found = root('ellipsite-source-view');
      return found?.querySelector('.margin button') ? found : null;
    });
    expect(textOf(text.querySelector('.marked'))).toContain('120.0');
    expect([...text.querySelectorAll('.margin button')].map(textOf)).toEqual(['A', 'A']);
    store.select({ siteIndex: 0, atomId: null });
    await until('the line', () => store.state.shownPlace?.line === 5);
    text.querySelectorAll<HTMLElement>('.margin button')[1]!.click();
    expect(store.state.selection?.siteIndex).toBe(1);
  });

  it('is used again for the next text of the same shape, which says so', async () => {
    await takeAsShielding();
    await openFiles(store, [input('other.xyz', otherCrystal), input('b.log', logOf('Si1', 'N1'))]);
    await settle();
    expect(store.state.derived?.crystal?.tensorCounts.shielding).toBe(2);
    const note = store.state.derived?.problems.find(({ code }) => code === 'find-choice-used');
    expect(note).toMatchObject({ file: 'b.log', line: 5, severity: 'note' });
    expect(note?.message).toBe('An earlier choice was used for 2 tensors: shielding.');
  });

  it('is saved with the case and there again when it is opened', async () => {
    await takeAsShielding();
    const text = await store.caseText();
    await mount();
    expect(store.state.decisions?.textChoices).toEqual([]);
    await openFiles(store, [input('a.ellipsite.json', text)]);
    expect(store.state.decisions?.textChoices).toMatchObject([{ quantity: 'shielding', file: 'a.log' }]);
    expect(store.state.derived?.crystal?.tensorCounts.shielding).toBe(2);
    expect(store.state.derived?.problems.map(({ code }) => code)).not.toContain('find-quantity-open');
  });

  it('lets go with Escape: the text first, then the panel; the header opens it again with the focus in it', async () => {
    store.showPlace(null);
    await settle();
    press(workbench, 'Escape');
    await settle();
    expect(root('ellipsite-found-panel')).toBeNull();
    foundButton()!.click();
    await panel();
    expect(workbench.shadowRoot?.activeElement?.classList.contains('drawer')).toBe(true);
    for (const control of (await panel()).querySelectorAll<HTMLSelectElement>('select, input'))
      expect(control.labels?.length, control.id).toBeGreaterThan(0);
  });

  it('“none of these” ends the question', async () => {
    const root = await panel();
    const buttons = root.querySelectorAll<HTMLElement>('.question button');
    buttons[buttons.length - 1]!.click();
    await until('the effect', () => root.querySelector('.question') === null);
    expect(textOf(foundButton())).toBe('Found 0 tensors');
    expect(textOf(root.querySelector('.fate'))).toBe('not settled');
  });
});

describe('the check of bound tensors', () => {
  it('says how they were bound, marks frames that symmetry leaves open, and leads to the sites', async () => {
    await openFiles(store, [input('low.xyz', triclinic), input('a.log', logOf('Al1', 'O1'))]);
    await takeAsShielding();
    const button = [...header().querySelectorAll('button')].find((one) => textOf(one) === 'Check')!;
    button.click();
    const check = await until('the check', () => {
      const found = root('ellipsite-check-panel');
      return found?.querySelector('td') ? found : null;
    });
    expect(textOf(check)).toContain('Bound by site labels only: weaker evidence. 2 of 2 atoms found');
    const verdicts = [...check.querySelectorAll('.verdict')].map(textOf);
    expect(verdicts).toContain('undetectable by symmetry');
    expect(textOf(check)).toContain('orientations are not to be trusted until a frame is chosen');
    const sites = [...check.querySelectorAll<HTMLElement>('table .link')];
    sites.find((one) => textOf(one) === 'O1')!.click();
    expect(store.state.selection).toEqual({ siteIndex: 1, atomId: null });
    press(workbench, 'Escape');
    press(workbench, 'Escape');
    await settle();
    expect(root('ellipsite-check-panel')).toBeNull();
  });

  it('is not offered where nothing is bound', () => {
    expect([...header().querySelectorAll('button')].map(textOf)).not.toContain('Check');
  });
});

describe('a case without a searched text', () => {
  it('has no count in the header; the panel says what could be added', async () => {
    expect(foundButton()).toBeUndefined();
    const { askForPanel } = await import('#components/panel.ts');
    askForPanel(root('ellipsite-page-header')!.host as HTMLElement, 'found');
    const empty = await until('the panel', () => root('ellipsite-found-panel')?.querySelector('p'));
    expect(textOf(empty)).toContain('No text of this case was searched.');
  });
});
