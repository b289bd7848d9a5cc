import { mkdtemp, readdir, readFile, rm } from 'node:fs/promises';
import { tmpdir } from 'node:os';
import { join } from 'node:path';
import { fileURLToPath } from 'node:url';
import type { Browser, Page } from 'playwright';
import { chromium } from 'playwright';
import type { PreviewServer } from 'vite';
import { build, preview } from 'vite';
import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import { chromiumArguments, findBrowser } from '#tests/support/browser.mjs';

/** The page as it is shipped: built, served from loopback, driven in a real browser, with and without WebGL. */
const root = fileURLToPath(new URL('../..', import.meta.url));
let server: PreviewServer;
let address = '';
let folder = '';

beforeAll(async () => {
  folder = await mkdtemp(join(tmpdir(), 'ellipsite-page-'));
  const outDir = join(folder, 'page');
  await build({ root, logLevel: 'error', build: { outDir, emptyOutDir: true } });
  server = await preview({
    root,
    logLevel: 'error',
    build: { outDir },
    preview: { port: 0, host: '127.0.0.1', open: false },
  });
  address = server.resolvedUrls?.local[0] ?? '';
}, 180_000);

afterAll(async () => {
  await server?.close();
  await rm(folder, { recursive: true, force: true });
});

interface Opened {
  readonly page: Page;
  /** Everything that must not happen: errors, refused requests, broken policy. */
  readonly complaints: string[];
  readonly requested: string[];
}

async function openPage(browser: Browser, scheme: 'light' | 'dark' = 'light'): Promise<Opened> {
  const page = await browser.newPage({ viewport: { width: 1280, height: 800 }, colorScheme: scheme });
  const complaints: string[] = [];
  const requested: string[] = [];
  page.on('pageerror', (error) => complaints.push(error.message));
  page.on('requestfailed', (request) => complaints.push(`failed: ${request.url()}`));
  page.on('request', (request) => requested.push(request.url()));
  page.on('console', (message) => {
    if (message.type() === 'error') complaints.push(message.text());
  });
  await page.goto(address);
  await page.getByRole('row', { name: /Si1/ }).waitFor();
  return { page, complaints, requested };
}

async function drop(page: Page, name: string, parts: readonly string[], repeats = 1): Promise<void> {
  await page.evaluate(
    ({ name, parts, repeats }) => {
      const [head = '', ...rest] = parts;
      const body = new Blob(Array.from({ length: repeats }, () => rest.join('')));
      const data = new DataTransfer();
      data.items.add(new File([head, body], name));
      const init = { dataTransfer: data, bubbles: true, composed: true, cancelable: true };
      const target = document.querySelector('ellipsite-workbench')!;
      target.dispatchEvent(new DragEvent('dragover', init));
      target.dispatchEvent(new DragEvent('drop', init));
    },
    { name, parts, repeats },
  );
}

const invented = `2
Lattice="4 0 0 0 4 0 0 0 6" Properties=species:S:1:pos:R:3:shielding:R:9 name="two invented atoms"
Si 0 0 0 400 0 0 0 410 0 0 0 450
O 2 2 3 200 0 0 0 200 0 0 0 260
`;

/** A CIF of about 50 MB with nothing but reflections. */
const reflections = {
  head: 'data_big\nloop_\n_refln_index_h\n_refln_index_k\n_refln_index_l\n_refln_F_squared_meas\n',
  lines: '1 2 3 12.345678901234567890\n'.repeat(40_000),
  repeats: 45,
};

describe('the built page in a browser with WebGL', () => {
  let browser: Browser;
  let opened: Opened;

  beforeAll(async () => {
    browser = await chromium.launch({ executablePath: findBrowser() ?? '', args: chromiumArguments });
    opened = await openPage(browser);
  }, 60_000);

  afterAll(async () => {
    await browser?.close();
  });

  it('has a sample case on screen, drawn, with its caption and colour bar', async () => {
    const { page } = opened;
    await page
      .locator('#caption')
      .filter({ hasText: /ellipsoids/ })
      .waitFor();
    expect(await page.locator('canvas').count()).toBe(1);
    expect(await page.locator('.legend').textContent()).toMatch(/ppm/);
  });

  it('asks nobody but its own server for anything, and its policy is not broken', () => {
    expect(opened.requested.length).toBeGreaterThan(3);
    const origin = new URL(address).origin;
    expect(opened.requested.filter((url) => !url.startsWith(origin) && !url.startsWith('data:'))).toEqual([]);
    expect(opened.complaints).toEqual([]);
  });

  it('is worked by keyboard alone: to the table, along it, into a site, undo', async () => {
    const { page } = opened;
    for (let i = 0; i < 40; i++) {
      await page.keyboard.press('Tab');
      const role = await page.evaluate(() => {
        let focused = document.activeElement;
        while (focused?.shadowRoot?.activeElement) focused = focused.shadowRoot.activeElement;
        return focused?.getAttribute('role');
      });
      if (role === 'treegrid') break;
    }
    await page.keyboard.press('ArrowDown');
    expect(await page.getByRole('article', { name: 'Site O1' }).isVisible()).toBe(true);
    await page.keyboard.press('Home');
    await page.keyboard.press('ArrowRight');
    await page.keyboard.press('ArrowRight');
    expect(await page.locator('[role=treegrid] [aria-level="2"]').count()).toBe(3);
    await page
      .getByRole('status')
      .filter({ hasText: /^\s*Si1, ²⁹Si selected, atom/ })
      .waitFor({ state: 'attached' });
    await page.keyboard.press('Escape');
    expect(await page.getByRole('article', { name: 'Crystal' }).isVisible()).toBe(true);
  });

  it('shows a dropped file with its tensors', async () => {
    const { page } = opened;
    await drop(page, 'mine.xyz', [invented]);
    await page.getByText('two invented atoms').first().waitFor();
    const row = page.getByRole('row', { name: /^Si/ });
    await row.click();
    // (400 + 410 + 450)/3 = 420; span 50; skew 3(420 − 410)/50 = 0.6
    expect(await row.textContent()).toMatch(/420\.00\s*50\.00\s*0\.60/);
    expect(await page.getByRole('article').textContent()).toContain('Si 0 0 0 400 0 0 0 410 0 0 0 450');
  });

  it('keeps the case when a broken file is dropped, and says what is wrong', async () => {
    const { page } = opened;
    await drop(page, 'broken.cif', ['data_x\nloop_\n_atom_site_label\n_atom_site_fract_x\nA1 0.1 B2\n']);
    const drawer = page.getByRole('dialog', { name: 'Problems' });
    await drawer.getByText('Could not open broken.cif').waitFor();
    expect(await drawer.locator('li.error').count()).toBeGreaterThan(0);
    await drawer
      .getByRole('button', { name: /^broken\.cif, line/ })
      .first()
      .click();
    await page.getByText('A1 0.1 B2').waitFor();
    await page.keyboard.press('Escape');
    await page.keyboard.press('Escape');
    expect(await page.getByText('two invented atoms').first().isVisible()).toBe(true);
  });

  it('goes back and forth between cases by undo and redo', async () => {
    const { page } = opened;
    await page.keyboard.press('Control+z');
    await page.getByRole('row', { name: /O1/ }).waitFor();
    await page.keyboard.press('Control+Shift+Z');
    await page.getByText('two invented atoms').first().waitFor();
  });

  it('shows progress of a file of 50 MB, stays usable meanwhile, and can be cancelled', async () => {
    const { page } = opened;
    await drop(page, 'big.cif', [reflections.head, reflections.lines], reflections.repeats);
    await page.getByRole('progressbar', { name: 'open big.cif' }).waitFor();
    await page.getByRole('row', { name: /^O/ }).click();
    expect(await page.getByRole('article', { name: /Site O/ }).isVisible()).toBe(true);
    await page.getByRole('button', { name: 'Cancel' }).click();
    await page.getByRole('progressbar').waitFor({ state: 'detached' });
    expect(await page.getByText('two invented atoms').first().isVisible()).toBe(true);
    await drop(page, 'again.xyz', [invented.replace('two invented', 'the same')]);
    await page.getByText('the same atoms').first().waitFor();
  });

  it('follows the dark scheme of the system', async () => {
    const { page, complaints } = await openPage(browser, 'dark');
    const ground = await page
      .locator('ellipsite-workbench')
      .evaluate((workbench) => getComputedStyle(workbench).backgroundColor);
    expect(ground).toBe('rgb(27, 26, 24)');
    await page.getByLabel('Theme').selectOption('light');
    await expect
      .poll(() =>
        page.locator('ellipsite-workbench').evaluate((one) => getComputedStyle(one).backgroundColor),
      )
      .toBe('rgb(250, 248, 243)');
    expect(complaints).toEqual([]);
    await page.close();
  });

  it('fits a screen of 390 px without scrolling sideways', async () => {
    const { page } = await openPage(browser);
    await page.setViewportSize({ width: 390, height: 844 });
    const overhang = await page.evaluate(
      () => document.documentElement.scrollWidth - document.documentElement.clientWidth,
    );
    expect(overhang).toBe(0);
    await page.close();
  });
});

/** Shares of the canvas: pixels that are not paper, and different colours in a thousand of them. */
async function looksOf(page: Page): Promise<{ drawn: number; colours: number; picture: string }> {
  return page.locator('canvas').evaluate((canvas: HTMLCanvasElement) => {
    const { data } = canvas.getContext('2d')!.getImageData(0, 0, canvas.width, canvas.height);
    const words = new Uint32Array(data.buffer);
    const paper = words[0];
    const colours = new Set(words);
    const drawn = words.reduce((sum, word) => sum + (word === paper ? 0 : 1), 0);
    return { drawn: drawn / words.length, colours: colours.size, picture: canvas.toDataURL() };
  });
}

describe('the built page in a browser without WebGL', () => {
  it('draws the crystal by the CPU, turned by keyboard; three.js is not loaded', async () => {
    const args = [
      ...chromiumArguments.filter((argument) => !argument.includes('swiftshader')),
      '--disable-software-rasterizer',
    ];
    const browser = await chromium.launch({ executablePath: findBrowser() ?? '', args });
    try {
      const { page, complaints, requested } = await openPage(browser);
      await page.locator('#caption', { hasText: 'Drawn by the CPU.' }).waitFor();
      await expect.poll(async () => (await looksOf(page)).drawn).toBeGreaterThan(0.02);
      const first = await looksOf(page);
      expect(first.drawn).toBeLessThan(0.9);
      expect(first.colours).toBeGreaterThan(100);
      await page.getByRole('application', { name: 'Picture of the crystal' }).focus();
      await page.keyboard.press('ArrowRight');
      await expect.poll(async () => (await looksOf(page)).picture).not.toBe(first.picture);
      await page.getByRole('row', { name: /O1/ }).click();
      expect(await page.getByRole('article', { name: 'Site O1' }).isVisible()).toBe(true);
      const scripts = requested.filter((url) => url.endsWith('.js'));
      const texts = await Promise.all(scripts.map(async (url) => (await fetch(url)).text()));
      expect(texts.length).toBeGreaterThan(0);
      expect(texts.some((text) => text.includes('WebGLRenderer'))).toBe(false);
      expect(complaints).toEqual([]);
    } finally {
      await browser.close();
    }
  });
});

describe('the page’s policy', () => {
  it('allows no source but its own, and stands in the built page', async () => {
    const html = await readFile(join(folder, 'page/index.html'), 'utf8');
    const policy = /Content-Security-Policy"\s+content="([^"]+)"/.exec(html)?.[1] ?? '';
    expect(policy).toContain("default-src 'none'");
    expect(policy).toContain("connect-src 'self'");
    expect(policy).not.toMatch(/https?:|\*|unsafe-inline|'unsafe-eval'/);
    const script = (await readdir(join(folder, 'page/assets'))).find((name) =>
      name.startsWith('engine-worker'),
    );
    const worker = await fetch(new URL(`assets/${script}`, address));
    expect(worker.headers.get('content-security-policy')).toBe(policy);
  });
});
