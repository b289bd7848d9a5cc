import { beforeEach, describe, expect, it } from 'vitest';
import type { SiteDossier } from '#src/dossier/dossier.ts';
import { fixtureCase, fixtureDossier } from '#tests/support/dossier-fixture.ts';
import type { Mounted } from './mount.ts';
import { mountWorkbench, settle, textOf } from './mount.ts';

let page: Mounted;
const card = (): ShadowRoot => page.part('ellipsite-site-card').shadowRoot;
const facts = (): string => textOf(card().querySelector('.facts'));

describe('the site card', () => {
  beforeEach(async () => {
    page = await mountWorkbench();
    page.store.select({ siteIndex: 0, atomId: null });
    await settle();
  });

  it('gives the formula, the convention and its source of each number on demand', () => {
    const details = [...card().querySelectorAll('details')];
    const skew = details.find((one) => textOf(one.querySelector('summary')).includes('κ = 3(σiso − σ22)/Ω'))!;
    expect(skew.open).toBe(false);
    skew.querySelector('summary')!.click();
    expect(skew.open).toBe(true);
    // shielding and shift side by side have a formula each
    expect(textOf(skew)).toContain('κ = 3(σiso − σ22)/Ω, −1 to 1');
    expect(textOf(skew)).toContain('Mason');
    for (const one of details) expect(textOf(one.querySelector('summary'))).not.toBe('');
  });

  it('has shielding and shift side by side, and the matrices as given and symmetrised', () => {
    const heads = [...card().querySelectorAll('.conventions')[0]!.querySelectorAll('thead th')].map(textOf);
    expect(heads).toEqual(['', 'shielding', 'shift', 'definition']);
    const captions = [...card().querySelectorAll('.matrix caption')].map(textOf);
    expect(captions).toContain('σ/ppm as given');
    expect(captions).toContain('symmetrised by the site');
  });

  it('says where the site is in both frames and what its symmetry forces', () => {
    expect(facts()).toContain('position 0.1, 0.2, 0.3');
    expect(facts()).toContain('Cartesian 0.5, 1, 2.1 Å');
    expect(facts()).toContain('nothing: six independent components');
  });

  it('keeps the site of before until the next one has come, then shows it', async () => {
    expect(textOf(card().querySelector('.title'))).toContain('Al1');
    page.store.select({ siteIndex: 1, atomId: null });
    await settle();
    expect(textOf(card().querySelector('.title'))).toContain('O1');
    page.store.select(null);
    await settle();
    expect(textOf(card())).toContain('Choose a site');
  });
});

describe('the site card of an atom with displacements', () => {
  it('prints U as given', async () => {
    const [first, ...others] = fixtureDossier.sites as readonly [SiteDossier, ...SiteDossier[]];
    const displacement = {
      uAniso: [0.01, 0.02, 0.03, 0.001, -0.002, 0],
      uEquivalent: 0.02,
      given: 'U',
    } as const;
    page = await mountWorkbench(
      fixtureCase({ ...fixtureDossier, sites: [{ ...first, displacement }, ...others] }),
    );
    page.store.select({ siteIndex: 0, atomId: null });
    await settle();
    expect(facts()).toContain('U = 0.0200 Å² equivalent, given as U');
    expect(facts()).toContain('0.0100, 0.0200, 0.0300, 0.0010, −0.0020, 0.0000 Å²');
  });
});

describe('the site card of a crystal whose tensors have no settled frame', () => {
  it('says so', async () => {
    const sentence = 'The frame of the tensors is undetectable by symmetry: orientations are shown as if.';
    const orientation = { sentence, sets: ['t'], inUse: 'x', open: ['x', 'y'] };
    page = await mountWorkbench(fixtureCase({ ...fixtureDossier, orientation }));
    page.store.select({ siteIndex: 0, atomId: null });
    await settle();
    expect(textOf(card().querySelector('.orientation'))).toContain('undetectable by symmetry');
  });
});
