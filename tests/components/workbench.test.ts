import { beforeEach, describe, expect, it } from 'vitest';
import { problem } from '#src/base/problem.ts';
import { fixtureCase, fixtureDossier, manySites } from '#tests/support/dossier-fixture.ts';
import type { Mounted } from './mount.ts';
import { mountWorkbench, press, settle, textOf } from './mount.ts';

let page: Mounted;

function grid(): HTMLElement {
  return page.part('ellipsite-site-table').shadowRoot.querySelector<HTMLElement>('[role=treegrid]')!;
}

function rows(kind: string): HTMLElement[] {
  return [...grid().querySelectorAll<HTMLElement>(`.body .row${kind}`)];
}

const card = (): string => textOf(page.part('ellipsite-site-card').shadowRoot);
const spoken = (): string => textOf(page.workbench.renderRoot.querySelector('[role=status]'));

describe('the page', () => {
  beforeEach(async () => {
    page = await mountWorkbench();
  });

  it('heads the table with units and fills it with the dossier’s numbers', () => {
    const heads = [...grid().querySelectorAll('[role=columnheader]')].map(textOf);
    expect(heads).toEqual([
      'site',
      'nuclide',
      'mult.',
      'symmetry',
      'σiso/ppm',
      'δiso/ppm',
      'Ω/ppm',
      'κ',
      'CQ/MHz',
      'ηQ',
    ]);
    const cells = [...rows('.site')[0]!.querySelectorAll('[role=gridcell]')].map(textOf);
    expect(cells.slice(1)).toEqual([
      '²⁷Al',
      '2',
      'e · 1',
      '526.67',
      '23.3',
      '60.00',
      '0.33',
      '−5.17',
      '0.33',
    ]);
  });

  it('marks a site by a ring and its value by a swatch in the colour of the colour bar', () => {
    const [first] = rows('.site');
    expect(getComputedStyle(first!.querySelector('.chip')!).backgroundColor).toBe('rgba(0, 0, 0, 0)');
    const swatched = [...grid().querySelectorAll('.swatch')].map((swatch) => textOf(swatch.parentElement));
    expect(swatched).toEqual(['526.67', '200.00']);
    const [one, other] = [...grid().querySelectorAll('.swatch')].map(
      (swatch) => getComputedStyle(swatch).backgroundColor,
    );
    expect(one).not.toBe(other);
  });

  it('says undefined with the reason instead of a number', () => {
    const skew = rows('.site')[1]!.querySelectorAll('[role=gridcell]')[7]!;
    expect(textOf(skew)).toBe('undefined: the tensor is isotropic: its span is zero');
    expect(skew.getAttribute('title')).toContain('isotropic');
  });

  it('leaves cells of absent tensors empty', () => {
    const cells = [...rows('.site')[2]!.querySelectorAll('[role=gridcell]')].map(textOf);
    expect(cells.slice(4)).toEqual(['', '', '', '', '', '']);
  });

  it('opens a site to its atoms with operation, position and turned axes', async () => {
    grid().focus();
    press(grid(), 'ArrowRight');
    await settle();
    const atoms = rows('.atom').map(textOf);
    expect(atoms).toHaveLength(2);
    expect(atoms[1]).toContain('−x, −y, z');
    expect(atoms[1]).toContain('at 0.9, 0.8, 0.3');
    // (0.6, 0.8, 0) under the half turn about z is (−0.6, −0.8, 0): an axis has no sign, the readable one is positive
    expect(atoms[1]).toContain('σ11 (0.600, 0.800, 0.000)');
    expect(rows('.site')[0]!.getAttribute('aria-expanded')).toBe('true');
    press(grid(), 'ArrowLeft');
    await settle();
    expect(rows('.atom')).toHaveLength(0);
  });

  it('moves the selection by keyboard and names the active row', async () => {
    press(grid(), 'ArrowDown');
    await settle();
    expect(page.store.state.selection).toEqual({ siteIndex: 1, atomId: null });
    expect(grid().getAttribute('aria-activedescendant')).toBe('row-1');
    expect(rows('.selected').map((row) => row.id)).toEqual(['row-1']);
    press(grid(), 'End');
    press(grid(), 'ArrowDown');
    await settle();
    expect(page.store.state.selection?.siteIndex).toBe(2);
    press(grid(), 'Escape');
    expect(page.store.state.selection).toBeNull();
  });

  it('shows the selected site in the card and speaks it', async () => {
    expect(card()).toContain('Choose a site');
    rows('.site')[0]!.click();
    await settle();
    expect(card()).toContain('Al1');
    expect(card()).toContain('general position (Wyckoff e), 2 atoms, 2 orientations');
    expect(card()).toContain('−5.17');
    expect(card()).toContain('0.14660');
    // −0.15 a.u. × 9.717362442 (CODATA 2022) = −1.458 × 10²¹ V m⁻²
    expect(card()).toContain('−1.458');
    expect(card()).toContain('seq = undefined: only one of the equivalent atoms has a tensor');
    expect(spoken()).toBe('Al1, ²⁷Al selected, 2 atoms, σiso 526.67 ppm, δiso 23.3 ppm, C_Q −5.17 MHz');
  });

  it('shows position, axes and matrices of the selected atom, named by its operation', async () => {
    page.store.select({ siteIndex: 0, atomId: '0:1' });
    await settle();
    const root = page.part('ellipsite-site-card').shadowRoot;
    const facts = textOf(root.querySelector('.facts'));
    // −x, −y, z of 0.1, 0.2, 0.3
    expect(facts).toContain('position of −x, −y, z 0.9, 0.8, 0.3');
    expect(card()).toContain('Principal axes of the atom −x, −y, z');
    expect(card()).toContain('Tensors of the atom −x, −y, z: those given for the site turned as R T Rᵀ');
  });

  it('turns matrices along: a quarter turn about z exchanges xx and yy and the sign of xy', async () => {
    const quarter = [0, -1, 0, 1, 0, 0, 0, 0, 1] as const;
    const [first, ...others] = fixtureDossier.sites;
    const [own, image] = first!.equivalents;
    const turned = { ...first!, equivalents: [own!, { ...image!, rotation: quarter }] };
    page = await mountWorkbench(fixtureCase({ ...fixtureDossier, sites: [turned, ...others] }));
    const given = async (atomId: string | null): Promise<string[]> => {
      page.store.select({ siteIndex: 0, atomId });
      await settle();
      const matrix = page.part('ellipsite-site-card').shadowRoot.querySelector('.matrix')!;
      return [...matrix.querySelectorAll('td')].map(textOf);
    };
    expect((await given(null)).slice(0, 5)).toEqual(['500.00', '2.00', '0.00', '−2.00', '520.00']);
    // R = (0 −1; 1 0): R T Rᵀ = (Tyy −Tyx; −Txy Txx)
    expect((await given('0:1')).slice(0, 5)).toEqual(['520.00', '2.00', '0.00', '−2.00', '500.00']);
  });

  it('gives angles of axes to the cell, folded', async () => {
    page.store.select({ siteIndex: 0, atomId: null });
    await settle();
    const axes = page.part('ellipsite-site-card').shadowRoot.querySelector('.axes tbody tr');
    // acos 0.6 = 53.13°, acos 0.8 = 36.87°
    expect([...axes!.children].map(textOf)).toEqual([
      'σ11',
      '0.6000',
      '0.8000',
      '0.0000',
      '53.1',
      '36.9',
      '90.0',
      // [230] of a square lies atan 3/2 = 56.31° from a, so 3.18° off
      '[230]',
      '3.2',
    ]);
  });

  it('shows undefined axes as undefined', async () => {
    page.store.select({ siteIndex: 1, atomId: null });
    await settle();
    expect(card()).toContain('σ11 undefined: its principal value is degenerate');
    expect(card()).toContain('κ undefined: the tensor is isotropic');
  });

  it('shows the source line in its text and leads to it', async () => {
    page.store.select({ siteIndex: 0, atomId: null });
    await settle();
    expect(card()).toContain('line 3 of invented.xyz');
    const link = [...page.part('ellipsite-site-card').shadowRoot.querySelectorAll<HTMLElement>('.link')];
    link[0]!.click();
    await customElements.whenDefined('ellipsite-source-view');
    await settle();
    const marked = page.part('ellipsite-source-view').shadowRoot.querySelector('[aria-current=true]');
    expect(textOf(marked)).toBe('3line 3 of invented.xyz');
    press(page.workbench, 'Escape');
    await settle();
    expect(page.workbench.renderRoot.querySelector('ellipsite-source-view')).toBeNull();
  });

  it('lights the row of what is hovered elsewhere, and tells others what is hovered here', async () => {
    page.store.hover({ siteIndex: 2, atomId: '2:0' });
    await settle();
    expect(rows('.hovered').map((row) => row.id)).toEqual(['row-2']);
    rows('.site')[0]!.dispatchEvent(new PointerEvent('pointerenter'));
    expect(page.store.state.hover).toEqual({ siteIndex: 0, atomId: null });
  });

  it('counts problems in the header and lists them with place and advice', async () => {
    const header = page.part('ellipsite-page-header').shadowRoot;
    const button = [...header.querySelectorAll('button')].find((one) => textOf(one).includes('warning'))!;
    expect(textOf(button)).toBe('1 warning, 1 note');
    button.focus();
    button.click();
    await customElements.whenDefined('ellipsite-problems-drawer');
    await settle();
    const drawer = page.part('ellipsite-problems-drawer').shadowRoot;
    const first = textOf(drawer.querySelector('li'));
    for (const part of [
      'warning',
      'cif-missing-value',
      'found ?',
      'allowed a number',
      'Give the coordinate.',
    ]) {
      expect(first).toContain(part);
    }
    drawer.querySelector<HTMLElement>('li .link')!.click();
    await settle();
    expect(page.store.state.shownPlace).toMatchObject({ file: 'invented.xyz', line: 7 });
  });

  it('gives the focus back when a drawer is closed with Escape', async () => {
    const header = page.part('ellipsite-page-header').shadowRoot;
    const button = [...header.querySelectorAll('button')].find((one) => textOf(one).includes('warning'))!;
    button.focus();
    button.click();
    await settle();
    expect(page.workbench.shadowRoot?.activeElement?.getAttribute('role')).toBe('dialog');
    press(page.workbench, 'Escape');
    await settle();
    expect(page.workbench.renderRoot.querySelector('.drawer')).toBeNull();
    expect(header.activeElement).toBe(button);
  });

  it('says in a sentence where the crystal cannot be drawn at all, and what works', () => {
    const view = textOf(page.part('ellipsite-crystal-view').shadowRoot);
    expect(view).toContain('neither WebGL 2 nor a canvas');
    expect(view).toContain('the site table, the site card and all numbers work without it.');
    expect(page.part('ellipsite-crystal-view').shadowRoot.querySelector('canvas')).toBeNull();
  });
});

describe('a file that cannot be opened', () => {
  it('leaves the case, opens the problems and says so', async () => {
    const answer = fixtureCase();
    page = await mountWorkbench(answer);
    const refusedProblems = [problem('error', 'bytes-empty', 'The file is empty.')];
    Object.assign(answer, { crystal: null, problems: refusedProblems });
    await page.store.open([{ name: 'empty.cif', blob: new Blob([]) }]);
    await settle();
    const drawer = textOf(page.part('ellipsite-problems-drawer').shadowRoot);
    expect(drawer).toContain('Could not open empty.cif; what was on screen stayed.');
    expect(drawer).toContain('The file is empty.');
    expect(spoken()).toContain('Could not open empty.cif. The file is empty.');
    expect(page.store.state.decisions?.title).toBe('invented.xyz');
  });
});

describe('a table of thousands of sites', () => {
  it('draws only rows near the visible part and reaches the last by keyboard', async () => {
    page = await mountWorkbench(fixtureCase(manySites(20_000)));
    expect(grid().getAttribute('aria-rowcount')).toBe('20001');
    expect(rows('').length).toBeGreaterThan(5);
    expect(rows('').length).toBeLessThan(120);
    press(grid(), 'End');
    await settle();
    await settle();
    const last = grid().querySelector('#row-19999');
    expect(last?.getAttribute('aria-rowindex')).toBe('20001');
    const box = last!.getBoundingClientRect();
    expect(box.bottom).toBeLessThanOrEqual(grid().getBoundingClientRect().bottom + 1);
    expect(rows('').length).toBeLessThan(120);
  });
});

describe('a crystal without tensors', () => {
  it('leaves their columns out', async () => {
    const sites = fixtureDossier.sites.map((site) => ({ ...site, shielding: null, shift: null, efg: null }));
    page = await mountWorkbench(fixtureCase({ ...fixtureDossier, sites }));
    expect([...grid().querySelectorAll('[role=columnheader]')].map(textOf)).toEqual([
      'site',
      'nuclide',
      'mult.',
      'symmetry',
    ]);
    page.store.select({ siteIndex: 0, atomId: null });
    await settle();
    expect(card()).toContain('The files hold no tensor for this site.');
  });
});
