import { mkdtemp, rm } from 'node:fs/promises';
import { loadavg, tmpdir } from 'node:os';
import { join } from 'node:path';
import type { Browser, Page } from 'playwright';
import { chromium } from 'playwright';
import type { PreviewServer } from 'vite';
import { build, preview } from 'vite';
import { afterAll, beforeAll, expect, it } from 'vitest';
import { projectRoot } from '#tests/guard/project-files.ts';
import { chromiumArguments, findBrowser } from '#tests/support/browser.mjs';
import type { FrameTimes } from './raster-page/frames.ts';
import { recordResult } from './record-result.ts';

/** Frames of 1600 × 900 in a browser without a graphics chip: our CPU renderer, our WebGL way and an instanced mesh in software WebGL. */
let folder = '';
let server: PreviewServer;
let browser: Browser;
let page: Page;

beforeAll(async () => {
  folder = await mkdtemp(join(tmpdir(), 'ellipsite-frames-'));
  const root = join(projectRoot, 'tests/bench/raster-page');
  const outDir = join(folder, 'page');
  await build({
    root,
    configFile: false,
    logLevel: 'error',
    base: './',
    worker: { format: 'es' },
    build: { outDir, target: 'es2022' },
  });
  server = await preview({
    root,
    configFile: false,
    logLevel: 'error',
    build: { outDir },
    preview: { port: 0, host: '127.0.0.1' },
  });
  browser = await chromium.launch({ executablePath: findBrowser() ?? '', args: chromiumArguments });
  page = await browser.newPage({ viewport: { width: 800, height: 600 } });
  await page.goto(server.resolvedUrls?.local[0] ?? '');
}, 180_000);

afterAll(async () => {
  await browser?.close();
  await server?.close();
  await rm(folder, { recursive: true, force: true });
});

it('rows 1 to 4 and 6: frames by the CPU renderer, by WebGL in software, by an instanced mesh', async () => {
  const sizes = [500, 2_000, 10_000, 50_000];
  const times: FrameTimes[] = [];
  for (const count of sizes) {
    const rounds = count > 2_000 ? 1 : 3;
    times.push(
      await page.evaluate(([n, r, mesh]) => window.frameTimes(n, r, mesh), [
        count,
        rounds,
        count <= 10_000,
      ] as const),
    );
  }
  console.log(times);
  recordResult('raster-frames', {
    sizes,
    loadWhenMeasured: loadavg()[0]!,
    meshTimesOfCpuFrame: times.slice(0, 3).map(({ mesh, raster }) => mesh / raster),
    webglTimesOfCpuFrame: times.map(({ webgl, raster }) => webgl / raster),
    growthFrom2000To50000: times[3]!.raster / times[1]!.raster,
    meshTimesOfWebglFrame: times.slice(0, 3).map(({ mesh, webgl }) => mesh / webgl),
    pickShareOfCpuFrame: times.map(({ pick, raster }) => pick / raster),
  });
  for (const { webgl, raster } of times) expect(webgl).toBeGreaterThan(raster);
});

it('row 5: a still of 4096 × 4096 with 2 × 2 samples by the CPU against WebGL without', async () => {
  const { raster, webgl } = await page.evaluate(() => window.stillTimes(4096));
  console.log({ raster, webgl });
  recordResult('raster-still', {
    loadWhenMeasured: loadavg()[0]!,
    cpuSmoothedAgainstWebglUnsmoothed: raster / webgl,
  });
  expect(raster).toBeGreaterThan(0);
});
