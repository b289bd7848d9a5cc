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

const sizes = [500, 2_000, 10_000, 50_000];

/** Frames of one framing, at each size; 50,000 without the mesh. */
async function framesOf(isClose: boolean): Promise<FrameTimes[]> {
  const times: FrameTimes[] = [];
  for (const count of sizes) {
    const asked = [count, count > 2_000 ? 2 : 4, count <= 10_000, isClose] as const;
    times.push(
      await page.evaluate(([n, rounds, mesh, near]) => window.frameTimes(n, rounds, mesh, near), asked),
    );
  }
  return times;
}

const ratios = (times: readonly FrameTimes[]) => ({
  meshTimesOfCpuFrame: times.slice(0, 3).map(({ mesh, raster }) => mesh / raster),
  webglTimesOfCpuFrame: times.map(({ webgl, raster }) => webgl / raster),
  growthFrom2000To50000: times[3]!.raster / times[1]!.raster,
  meshTimesOfWebglFrame: times.slice(0, 3).map(({ mesh, webgl }) => mesh / webgl),
  pickShareOfCpuFrame: times.map(({ pick, raster }) => pick / raster),
});

it('rows 1 to 4 and 6: frames by the CPU renderer, by WebGL in software, by an instanced mesh', async () => {
  const asFirstShown = await framesOf(false);
  const nearer = await framesOf(true);
  console.log(asFirstShown, nearer);
  recordResult('raster-frames', {
    sizes,
    loadWhenMeasured: loadavg()[0]!,
    asFirstShown: ratios(asFirstShown),
    nearerByAThird: ratios(nearer),
  });
  for (const { webgl, raster } of asFirstShown) expect(webgl).toBeGreaterThan(raster);
});

it('row 4: our WebGL frame against an instanced version of itself', async () => {
  const { merged, instanced } = await page.evaluate(() => window.instancingTimes(10_000, 5));
  console.log({ merged, instanced });
  recordResult('webgl-instancing', {
    ellipsoids: 10_000,
    loadWhenMeasured: loadavg()[0]!,
    instancedTimesOfMerged: instanced / merged,
  });
  expect(instanced).toBeGreaterThan(merged);
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

it('polar surfaces against as many ellipsoids, and placing 500 labels against one frame, by the CPU', async () => {
  const { ellipsoids, polars, labels } = await page.evaluate(() => window.glyphTimes(2_000, 500, 12));
  console.log({ ellipsoids, polars, labels });
  recordResult('glyph-frames', {
    surfaces: 2_000,
    labels: 500,
    loadWhenMeasured: loadavg()[0]!,
    polarTimesOfEllipsoidFrame: polars / ellipsoids,
    labelsShareOfCpuFrame: labels / ellipsoids,
  });
  expect(polars).toBeGreaterThan(0);
});
