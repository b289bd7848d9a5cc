import { beforeEach, describe, expect, it, vi } from 'vitest';
import { gridOf } from '#components/column-widths.ts';
import type { SiteDossier } from '#src/dossier/dossier.ts';
import { columnsOf, defaultColumns } from '#src/table/site-columns.ts';
import { fixtureCase, fixtureDossier } from '#tests/support/dossier-fixture.ts';
import type { Mounted } from './mount.ts';
import { mountWorkbench, press, settle, textOf } from './mount.ts';

let page: Mounted;

const root = (): ShadowRoot => page.part('ellipsite-site-table').shadowRoot;
const grid = (): HTMLElement => root().querySelector<HTMLElement>('[role=treegrid]')!;
const labels = (): string[] => [...grid().querySelectorAll('.site .label')].map(textOf);
const heads = (): string[] => [...grid().querySelectorAll('[role=columnheader]')].map(textOf);
const said = (): string => textOf(root().querySelector('[role=status]'));

function button(text: string, within: ParentNode = root()): HTMLElement {
  return [...within.querySelectorAll<HTMLElement>('button')].find((one) => textOf(one) === text)!;
}

async function openPanel(text: string, tag: string): Promise<ShadowRoot> {
  button(text).click();
  for (let i = 0; i < 100; i++) {
    await settle();
    const found = root().querySelector(tag)?.shadowRoot;
    if (found && textOf(found) !== '') return found;
  }
  throw new Error(`${tag} did not come`);
}

async function change(
  control: HTMLInputElement | HTMLSelectElement,
  kind: 'input' | 'change',
): Promise<void> {
  control.dispatchEvent(new Event(kind));
  await settle();
}

describe('the order of the table', () => {
  beforeEach(async () => {
    page = await mountWorkbench();
  });

  it('follows a heading that is pressed: up, down, as in the file; those without a value stay last', async () => {
    const head = () => grid().querySelectorAll<HTMLElement>('[role=columnheader]')[4]!;
    expect(labels()).toEqual(['Al1', 'O1', 'H1']);
    head().querySelector('button')!.click();
    await settle();
    expect(labels()).toEqual(['O1', 'Al1', 'H1']);
    expect(head().getAttribute('aria-sort')).toBe('ascending');
    expect(said()).toBe('Sites sorted by isotropic shielding, ascending.');
    head().querySelector('button')!.click();
    await settle();
    expect(labels()).toEqual(['Al1', 'O1', 'H1']);
    expect(head().getAttribute('aria-sort')).toBe('descending');
    head().querySelector('button')!.click();
    await settle();
    expect(head().getAttribute('aria-sort')).toBe('none');
  });

  it('keeps the selected site the active row, and its atoms with it', async () => {
    press(grid(), 'ArrowRight');
    page.store.select({ siteIndex: 0, atomId: '0:1' });
    await settle();
    expect(grid().getAttribute('aria-activedescendant')).toBe('row-2');
    page.store.setTable({ sort: { key: 'label', descending: true } }, 'test');
    await settle();
    expect(labels()).toEqual(['O1', 'H1', 'Al1']);
    expect(grid().getAttribute('aria-activedescendant')).toBe('row-4');
  });

  it('is one focus stop of headings, moved through by arrow keys', async () => {
    const buttons = [...grid().querySelectorAll<HTMLElement>('.head button')];
    expect(buttons.map(({ tabIndex }) => tabIndex)).toEqual(buttons.map((_, i) => (i === 0 ? 0 : -1)));
    buttons[0]!.focus();
    press(buttons[0]!, 'ArrowRight');
    expect(root().activeElement).toBe(buttons[1]);
    press(buttons[1]!, 'End');
    expect(root().activeElement).toBe(buttons.at(-1));
    press(buttons.at(-1)!, 'ArrowDown');
    expect(root().activeElement).toBe(grid());
    // Enter on a heading opens no row
    press(buttons[0]!, 'Enter');
    await settle();
    expect(grid().querySelectorAll('.atom')).toHaveLength(0);
  });
});

describe('the filter of the table', () => {
  let panel: ShadowRoot;

  beforeEach(async () => {
    page = await mountWorkbench();
    panel = await openPanel('Filter', 'ellipsite-table-filter');
  });

  it('keeps rows by text and says how many', async () => {
    const field = panel.querySelector<HTMLInputElement>('input[type=search]')!;
    field.value = 'al';
    await change(field, 'input');
    expect(labels()).toEqual(['Al1']);
    expect(textOf(root().querySelector('h2'))).toContain('1 of 3 sites');
    field.value = 'zz';
    await change(field, 'input');
    expect(labels()).toEqual([]);
    expect(textOf(root().querySelector('.empty'))).toContain('No site passes the filter.');
    button('Show all').click();
    await settle();
    expect(labels()).toHaveLength(3);
  });

  it('keeps rows by element', async () => {
    panel.querySelectorAll<HTMLInputElement>('input[type=checkbox]')[0]!.click();
    await settle();
    expect(labels()).toEqual(['O1', 'H1']);
    expect(page.store.state.table.filter.elements).toEqual(['O', 'H']);
  });

  it('keeps rows by the range of a number, with its unit beside it', async () => {
    const select = panel.querySelector('select')!;
    select.selectedIndex = [...select.options].findIndex(({ text }) => text.startsWith('σiso'));
    await change(select, 'change');
    const group = panel.querySelector('[role=group]')!;
    expect(textOf(group)).toContain('ppm');
    expect(labels()).toHaveLength(3);
    const low = panel.querySelector<HTMLInputElement>('#low-0')!;
    low.value = '300';
    await change(low, 'change');
    expect(labels()).toEqual(['Al1']);
    button('×', panel).click();
    await settle();
    expect(labels()).toHaveLength(3);
  });

  it('closes with Escape and gives the focus back', async () => {
    press(panel.querySelector('input')!, 'Escape');
    await settle();
    expect(root().querySelector('ellipsite-table-filter')).toBeNull();
    expect(textOf(root().activeElement)).toBe('Filter');
  });
});

describe('the columns of the table', () => {
  it('are chosen, moved and put back', async () => {
    page = await mountWorkbench();
    const chooser = await openPanel('Columns', 'ellipsite-column-chooser');
    const box = (words: string): HTMLInputElement =>
      [...chooser.querySelectorAll('label')]
        .find((label) => textOf(label).includes(words))!
        .querySelector('input')!;
    box('most shielded').click();
    await settle();
    expect(heads().at(-1)).toBe('σ33/ppm');
    box('isotope or element').click();
    await settle();
    expect(heads().slice(0, 3)).toEqual(['site', 'mult.', 'symmetry']);
    const up = chooser.querySelector<HTMLElement>('[aria-label^="Move most shielded"][aria-label$="left"]')!;
    up.focus();
    up.click();
    await settle();
    expect(heads().at(-2)).toBe('σ33/ppm');
    expect(chooser.activeElement?.getAttribute('aria-label')).toBe(
      'Move most shielded principal component to the left',
    );
    button('As usual for this crystal', chooser).click();
    await settle();
    expect(page.store.state.table.columns).toBeNull();
    expect(heads()).toContain('nuclide');
  });

  it('offer nothing of tensors the crystal has not, and never leave the table without one', async () => {
    const sites = fixtureDossier.sites.map((site) => ({ ...site, shielding: null, shift: null, efg: null }));
    page = await mountWorkbench(fixtureCase({ ...fixtureDossier, sites }));
    page.store.setTable({ columns: ['label'] }, 'test');
    const chooser = await openPanel('Columns', 'ellipsite-column-chooser');
    expect([...chooser.querySelectorAll('legend')].map(textOf)).toEqual([
      'Site',
      'Position',
      'Where it stands',
    ]);
    expect(chooser.querySelector<HTMLInputElement>('input:checked')!.disabled).toBe(true);
  });
});

describe('copying the table', () => {
  it('gives all rows in their order and columns as text and as a table', async () => {
    page = await mountWorkbench();
    page.store.setTable(
      { columns: ['label', 'efg-couplingMHz'], sort: { key: 'label', descending: true } },
      'test',
    );
    await settle();
    const written: ClipboardItem[] = [];
    const write = vi.spyOn(navigator.clipboard, 'write').mockImplementation((items) => {
      written.push(...items);
      return Promise.resolve();
    });
    press(grid(), 'c', { ctrlKey: true });
    await settle();
    const [item] = written;
    expect(item!.types).toEqual(['text/plain', 'text/html']);
    const text = await (await item!.getType('text/plain')).text();
    expect(text.split('\n').slice(1)).toEqual(['O1\t', 'H1\t', 'Al1\t-5.17', '']);
    expect(await (await item!.getType('text/html')).text()).toContain('<sub>Q</sub>/MHz');
    await settle();
    expect(said()).toBe('3 rows copied as a table.');
    button('Copy as text').click();
    await settle();
    expect(written[1]!.types).toEqual(['text/plain']);
    write.mockRestore();
  });

  it('says why where the browser refuses', async () => {
    page = await mountWorkbench();
    const write = vi.spyOn(navigator.clipboard, 'write').mockRejectedValue(new Error('not allowed'));
    button('Copy').click();
    await settle();
    expect(said()).toBe('Nothing was copied: not allowed');
    write.mockRestore();
  });
});

describe('a file with other sites', () => {
  it('opens to atoms that are fetched when they come into view', async () => {
    const [first, ...others] = fixtureDossier.sites as readonly [SiteDossier, ...SiteDossier[]];
    page = await mountWorkbench(fixtureCase({ ...fixtureDossier, sites: [first, ...others] }));
    press(grid(), 'Enter');
    await settle();
    expect([...grid().querySelectorAll('.atom')].map(textOf)[0]).toContain('x, y, z at 0.1, 0.2, 0.3');
  });
});

describe('the panels of the table', () => {
  beforeEach(async () => {
    page = await mountWorkbench();
  });

  it.each([
    ['Filter', 'ellipsite-table-filter'],
    ['Columns', 'ellipsite-column-chooser'],
  ])('%s takes the focus in and gives it back on Escape', async (words, tag) => {
    button(words).focus();
    const panel = await openPanel(words, tag);
    await vi.waitFor(() => expect(panel.activeElement).not.toBeNull());
    press(panel.activeElement!, 'Escape');
    await settle();
    expect(root().querySelector(tag)).toBeNull();
    expect(root().activeElement).toBe(button(words));
  });

  it('close on Escape from their button too', async () => {
    await openPanel('Filter', 'ellipsite-table-filter');
    button('Filter').focus();
    press(button('Filter'), 'Escape');
    await settle();
    expect(root().querySelector('ellipsite-table-filter')).toBeNull();
  });
});

describe('the width of the table', () => {
  it('holds all usual columns on a page 1280 px wide', () => {
    const traits = { quantities: ['shielding', 'shift', 'efg'], isPartlyOccupied: false } as const;
    const { leastPx } = gridOf(columnsOf(defaultColumns(traits)), false);
    // half the page, less a hairline, the padding on the left and a scroll bar
    expect(leastPx).toBeLessThanOrEqual(1280 / 2 - 1 - 16 - 15);
  });

  it('scrolls sideways where it is wider, past the site, which stays', async () => {
    page = await mountWorkbench();
    const many = ['label', 'nuclide', 'forced', 'species', 'file', 'shielding-span', 'efg-asymmetry'];
    page.store.setTable({ columns: many }, 'columns');
    page.part('ellipsite-site-table').setAttribute('style', 'width: 420px');
    await settle();
    await settle();
    const left = (selector: string): number =>
      grid().querySelector(selector)!.getBoundingClientRect().left - grid().getBoundingClientRect().left;
    grid().scrollLeft = 200;
    expect(grid().scrollLeft).toBe(200);
    for (const site of ['.head [role=columnheader]', '.site .name']) expect(left(site)).toBeCloseTo(0, 0);
    expect(left('.head [role=columnheader]:nth-child(2)')).toBeLessThan(0);
  });
});
