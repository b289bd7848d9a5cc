import type { ChildProcess } from 'node:child_process';
import { spawn } from 'node:child_process';
import { mkdtemp, readFile, rm } from 'node:fs/promises';
import { tmpdir } from 'node:os';
import { join } from 'node:path';
import { fileURLToPath } from 'node:url';
import type { Browser, Page } from 'playwright';
import { chromium } from 'playwright';
import type { PreviewServer } from 'vite';
import { build, preview } from 'vite';
import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import type { Store } from '#src/store/store.ts';
import { chromiumArguments, findBrowser } from '#tests/support/browser.mjs';
import { runCommand } from '#tests/support/command-io.ts';

/** The built page in a browser with a profile of its own, which is reloaded, closed and killed. */
const root = fileURLToPath(new URL('../..', import.meta.url));
let server: PreviewServer;
let address = '';
let folder = '';

beforeAll(async () => {
  folder = await mkdtemp(join(tmpdir(), 'ellipsite-kept-'));
  const outDir = join(folder, 'page');
  await build({ root, logLevel: 'error', build: { outDir, emptyOutDir: true } });
  const options = { port: 0, host: '127.0.0.1', open: false };
  server = await preview({ root, logLevel: 'error', build: { outDir }, preview: options });
  address = server.resolvedUrls?.local[0] ?? '';
}, 180_000);

afterAll(async () => {
  await server?.close();
  await rm(folder, { recursive: true, force: true, maxRetries: 5 });
});

interface Running {
  readonly process: ChildProcess;
  readonly browser: Browser;
  readonly newPage: () => Promise<Page>;
}

/** A browser of our own process, so that it can be killed. */
async function start(profile: string): Promise<Running> {
  const portFile = join(profile, 'DevToolsActivePort');
  await rm(portFile, { force: true });
  const args = [
    ...chromiumArguments,
    '--headless=new',
    '--remote-debugging-port=0',
    `--user-data-dir=${profile}`,
  ];
  const process = spawn(findBrowser() ?? '', [...args, 'about:blank'], { stdio: 'ignore' });
  const port = await portIn(portFile);
  const browser = await chromium.connectOverCDP(`http://127.0.0.1:${port}`);
  const newPage = async (): Promise<Page> => {
    const page = await browser.contexts()[0]!.newPage();
    await page.goto(address);
    return page;
  };
  return { process, browser, newPage };
}

/** The port a browser has written into its profile. */
async function portIn(file: string): Promise<string> {
  for (let tries = 0; tries < 300; tries++) {
    const port = /^\d+\n/.exec(await readFile(file, 'utf8').catch(() => ''))?.[0];
    if (port) return port.trim();
    await new Promise((resolve) => setTimeout(resolve, 100));
  }
  throw new Error('the browser did not start within 30 s');
}

async function kill({ process }: Running): Promise<void> {
  const ended = new Promise((resolve) => process.once('exit', resolve));
  process.kill('SIGKILL');
  await ended;
}

/** Two invented sites. */
const invented = `2
Lattice="4 0 0 0 4 0 0 0 6" Properties=species:S:1:pos:R:3:shielding:R:9 name="two invented atoms"
Si 0 0 0 400 0 0 0 410 0 0 0 450
O 2 2 3 200 0 0 0 200 0 0 0 260
`;

async function drop(page: Page, name: string, text: string): Promise<void> {
  await page.evaluate(
    ({ name, text }) => {
      const data = new DataTransfer();
      data.items.add(new File([text], name));
      const init = { dataTransfer: data, bubbles: true, composed: true, cancelable: true };
      const target = document.querySelector('ellipsite-workbench')!;
      target.dispatchEvent(new DragEvent('dragover', init));
      target.dispatchEvent(new DragEvent('drop', init));
    },
    { name, text },
  );
}

type HasStore = Element & { readonly store: Store };

/** Everything that has to come back. */
function workOf(page: Page) {
  return page.evaluate(() => {
    const { state } = document.querySelector<HasStore>('ellipsite-workbench')!.store;
    const { decisions, picture, camera, look, savedViews, measurements, table, selection, past, future } =
      state;
    return {
      title: decisions?.title ?? null,
      files: decisions?.sources.map(({ name, blob }) => [name, blob.size]) ?? null,
      settings: decisions?.settings ?? null,
      views: { picture, camera, look, savedViews, measurements, table },
      selection,
      past: past.map(({ name }) => name),
      future: future.map(({ name }) => name),
    };
  });
}

/** A decision of every kind, the last one undone. */
async function decide(page: Page): Promise<void> {
  await drop(page, 'mine.xyz', invented);
  await page.getByText('two invented atoms').first().waitFor();
  await page.evaluate(async () => {
    const { store } = document.querySelector<HasStore>('ellipsite-workbench')!;
    await store.changeSettings(
      { references: { '29Si': { kind: 'simple', interceptPpm: 330, slope: -1, isotope: '29Si' } } },
      'reference of silicon',
    );
    store.setPicture({ colourBy: 'span', labels: true }, 'colour by span');
    const camera = { target: [1, 2, 3], orientation: [0.5, 0.5, 0.5, 0.5], zoom: 0.05 } as const;
    store.setCamera(camera, 'turn');
    store.setLook({ outlines: true }, 'show outlines');
    store.saveView('from the side');
    const atoms = ['0:0', '1:0'].map((atomId) => ({ atomId, cellShift: [0, 0, 0] as const }));
    store.addMeasurement({ id: 'm1', kind: 'distance', atoms });
    store.setTable({ sort: { key: 'label', descending: true } }, 'sort by label');
    store.select({ siteIndex: 1, atomId: null });
    store.setLook({ depthCue: false }, 'no depth cue');
    await store.undo();
  });
  await page.getByText('saved in this browser').waitFor();
  // the last write may still be under way: the pause between two is 200 ms
  await page.waitForTimeout(600);
}

async function isBack(page: Page, before: Awaited<ReturnType<typeof workOf>>): Promise<void> {
  await page.getByText('two invented atoms').first().waitFor();
  await expect.poll(() => workOf(page), { timeout: 10_000 }).toEqual(before);
  // 330 − 420 = −90: the numbers are derived again with the kept reference
  expect(await page.getByRole('row', { name: /^Si/ }).textContent()).toMatch(/−90/);
}

describe('work kept in the browser', () => {
  let running: Running;
  let page: Page;
  let before: Awaited<ReturnType<typeof workOf>>;

  beforeAll(async () => {
    running = await start(join(folder, 'profile'));
    page = await running.newPage();
    await page.getByRole('row', { name: /Si1/ }).waitFor();
    await decide(page);
    before = await workOf(page);
  }, 120_000);

  afterAll(async () => {
    await running?.browser.close().catch(() => undefined);
    running?.process.kill('SIGKILL');
  });

  it('has something to lose', () => {
    expect(before.past.length).toBe(9);
    expect(before.past.at(-1)).toBe('select O1');
    expect(before.future).toEqual(['no depth cue']);
    expect(before.selection).toEqual({ siteIndex: 1, atomId: null });
  });

  it('is there after a reload, with the steps to undo and redo', async () => {
    await page.reload();
    await isBack(page, before);
    await page.keyboard.press('Control+Shift+Z');
    await expect.poll(async () => (await workOf(page)).views.look.depthCue).toBe(false);
    await page.keyboard.press('Control+z');
    await expect.poll(async () => (await workOf(page)).future).toEqual(['no depth cue']);
    await page.getByRole('button', { name: 'Undo select O1' }).waitFor();
  });

  it('is left alone by a second tab, which has work of its own', async () => {
    const second = await running.newPage();
    await second.getByRole('row', { name: /Si1/ }).waitFor();
    await drop(second, 'other.xyz', invented.replace('two invented', 'two other'));
    await second.getByText('two other atoms').first().waitFor();
    await second.getByText('saved in this browser').waitFor();
    await second.waitForTimeout(600);
    await page.reload();
    await isBack(page, before);
    await second.reload();
    await second.getByText('two other atoms').first().waitFor();
    await second.close();
  });

  it('is there in a new tab after its own was closed', async () => {
    // a change makes this work the newest of those no tab has
    await page.evaluate(() => {
      const { store } = document.querySelector<HasStore>('ellipsite-workbench')!;
      store.select({ siteIndex: 0, atomId: null });
      store.select({ siteIndex: 1, atomId: null });
    });
    await page.waitForTimeout(600);
    await page.close();
    page = await running.newPage();
    await isBack(page, before);
  });

  it('is there after the browser was killed', async () => {
    await kill(running);
    running = await start(join(folder, 'profile'));
    page = await running.newPage();
    await isBack(page, before);
  }, 60_000);

  it('is cleared by the user, and undo brings it back', async () => {
    await page.getByRole('button', { name: 'Case', exact: true }).click();
    await page.getByRole('button', { name: 'Clear the page' }).click();
    await expect.poll(async () => (await workOf(page)).title).toBeNull();
    await page.waitForTimeout(600);
    await page.reload();
    await page.getByRole('button', { name: 'Undo clear the page' }).click();
    await isBack(page, { ...before, future: ['clear the page'] });
  });

  it('that ended the page twice is left aside, which is said', async () => {
    await page.waitForTimeout(600);
    await page.evaluate(async () => {
      const done = <Result>(request: IDBRequest<Result>): Promise<Result> =>
        new Promise((resolve) => (request.onsuccess = () => resolve(request.result)));
      const database = await done(indexedDB.open('ellipsite'));
      const works = database.transaction('work', 'readwrite').objectStore('work');
      for (const key of await done(works.getAllKeys())) {
        await done(works.put({ ...(await done(works.get(key))), attempts: 2 }, key));
      }
      database.close();
    });
    await page.reload();
    await page.getByText('work-left-aside').waitFor();
    await page.getByRole('row', { name: /Si1/ }).waitFor();
  });
});

describe('a case file', () => {
  let running: Running;
  let page: Page;

  beforeAll(async () => {
    running = await start(join(folder, 'case-profile'));
    page = await running.newPage();
    await page.getByRole('row', { name: /Si1/ }).waitFor();
    await decide(page);
  }, 120_000);

  afterAll(async () => {
    await running?.browser.close().catch(() => undefined);
    running?.process.kill('SIGKILL');
  });

  it('saved from the page opens there and on the command line with the same decisions', async () => {
    const before = await workOf(page);
    const text = await page.evaluate(() =>
      document.querySelector<HasStore>('ellipsite-workbench')!.store.caseText(),
    );
    const { out } = await runCommand(['sites', 'saved.ellipsite.json', '--json'], {
      'saved.ellipsite.json': text,
    });
    const { sites } = JSON.parse(out) as { sites: { shift: { isotropic: number } }[] };
    expect(sites[0]?.shift.isotropic).toBeCloseTo(330 - 420, 9);
    await drop(page, 'between.xyz', invented.replace('two invented', 'two other'));
    await page.getByText('two other atoms').first().waitFor();
    await drop(page, 'any name at all', text);
    await isBack(page, {
      ...before,
      selection: null,
      past: [...before.past, 'open between.xyz', 'open mine.xyz'],
      future: [],
    });
  });

  it('is saved by Ctrl+S under a name of its title', async () => {
    const coming = page.waitForEvent('download');
    await page.keyboard.press('Control+s');
    expect((await coming).suggestedFilename()).toBe('mine.ellipsite.json');
  });

  it('that is broken is refused with its place, and the crystal stays', async () => {
    await drop(page, 'broken.json', '{"schema": "ellipsite/case",\n "version": }');
    const drawer = page.getByRole('dialog', { name: 'Problems' });
    await drawer.getByRole('button', { name: 'broken.json, line 2, column 13' }).click();
    expect(await page.getByText('two invented atoms').first().isVisible()).toBe(true);
  });
});

describe('a browser without storage', () => {
  it('says so once and works', async () => {
    const browser = await chromium.launch({ executablePath: findBrowser() ?? '', args: chromiumArguments });
    try {
      const page = await browser.newPage();
      await page.addInitScript(() => {
        indexedDB.open = () => {
          throw new DOMException('denied', 'SecurityError');
        };
      });
      await page.goto(address);
      await page.getByRole('row', { name: /Si1/ }).waitFor();
      expect(await page.getByText('not saved in this browser').getAttribute('title')).toContain('denied');
      await drop(page, 'mine.xyz', invented);
      await page.getByText('two invented atoms').first().waitFor();
    } finally {
      await browser.close();
    }
  });
});
