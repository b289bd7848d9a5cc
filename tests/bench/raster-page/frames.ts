import { createRasterClient } from '#src/raster/raster-client.ts';
import { createCrystalRenderer } from '#src/render/create-renderer.ts';
import type { Camera } from '#src/scene/camera.ts';
import { turn } from '#src/scene/camera.ts';
import { pick } from '#src/scene/pick.ts';
import type { MeasureText } from '#src/scene/place-labels.ts';
import { placeLabels } from '#src/scene/place-labels.ts';
import type { Scene } from '#src/scene/scene.ts';
import { lightTheme } from '#src/scene/theme.ts';
import { askew, randomScene } from '#tests/support/raster-scene.ts';
import { instancedMesh } from './instanced-mesh.ts';
import { instancedQuadrics } from './instanced-quadrics.ts';

/** Milliseconds of a frame by each way, the least of the rounds; NaN where a way was left out. */
export interface FrameTimes {
  readonly mesh: number;
  readonly webgl: number;
  readonly raster: number;
  readonly pick: number;
}

/** Milliseconds, the least of the rounds. */
export interface GlyphTimes {
  readonly ellipsoids: number;
  readonly polars: number;
  readonly labels: number;
}

const viewport = { widthPx: 1600, heightPx: 900 };
/** Nearer than a picture is first shown: more of it is covered, which costs the ways by pixels, and not the mesh. */
const nearer = 1.3;

function newCanvas(width: number, height: number): HTMLCanvasElement {
  const canvas = document.createElement('canvas');
  canvas.width = width;
  canvas.height = height;
  return canvas;
}

/** Waits until what was asked of a context is drawn. */
function finish(canvas: HTMLCanvasElement): void {
  const gl = canvas.getContext('webgl2')!;
  gl.readPixels(0, 0, 1, 1, gl.RGBA, gl.UNSIGNED_BYTE, new Uint8Array(4));
}

async function timed(work: () => void | Promise<void>): Promise<number> {
  const start = performance.now();
  await work();
  return performance.now() - start;
}

/** The ways take turns, so that what else the machine does meets all of them alike. */
async function frameTimes(
  count: number,
  rounds: number,
  withMesh: boolean,
  isClose: boolean,
): Promise<FrameTimes> {
  const close: Camera = { ...askew, zoom: (isClose ? nearer : 1) * askew.zoom };
  const scene = randomScene(count, 1, 0);
  const [meshCanvas, glCanvas] = [newCanvas(1600, 900), newCanvas(1600, 900)];
  const drawMesh = withMesh ? instancedMesh(meshCanvas, scene) : null;
  const webgl = createCrystalRenderer(glCanvas, { samplesAcross: 1 });
  webgl.resize(1600, 900, 1);
  webgl.setScene(scene);
  const client = createRasterClient();
  client.setScene(scene);
  const paper = newCanvas(1600, 900).getContext('2d', { alpha: false })!;
  const raster = async (camera: Camera): Promise<void> => {
    const picture = await client.draw({
      camera,
      viewport,
      theme: lightTheme,
      pixelRatio: 1,
      samplesAcross: 1,
    });
    for (const { pixels, firstRow, rowCount, width } of picture!.bands) {
      paper.putImageData(new ImageData(pixels, width, rowCount), 0, firstRow);
    }
  };
  const best = { mesh: Infinity, webgl: Infinity, raster: Infinity, pick: Infinity };
  const keep = (way: keyof FrameTimes, ms: number): void => void (best[way] = Math.min(best[way], ms));
  for (let round = 0; round <= rounds; round++) {
    for (let step = 0; step < 15; step++) {
      const camera = turn(close, 10 * round + step, 5, viewport);
      const ms = await timed(() => raster(camera));
      if (round > 0) keep('raster', ms);
    }
    for (let step = 0; step < (count > 2_000 ? 1 : 2); step++) {
      webgl.setCamera(turn(close, 10 * round + step, 5, viewport));
      keep('webgl', await timed(() => (webgl.render(), finish(glCanvas))));
    }
    if (drawMesh)
      keep('mesh', await timed(() => (drawMesh(turn(close, 10 * round, 5, viewport)), finish(meshCanvas))));
    keep('pick', (await timed(() => manyPicks(20))) / 20);
  }
  webgl.dispose();
  client.dispose();
  meshCanvas.getContext('webgl2')?.getExtension('WEBGL_lose_context')?.loseContext();
  return best;

  function manyPicks(picks: number): void {
    for (let k = 0; k < picks; k++) pick(scene, close, 800 + k, 450, viewport);
  }
}

/** Milliseconds of a still: the CPU with 2 × 2 samples, WebGL with one. */
async function stillTimes(side: number): Promise<{ readonly raster: number; readonly webgl: number }> {
  const scene = randomScene(2000, 1, 0);
  const square = { widthPx: side, heightPx: side };
  const canvas = newCanvas(side, side);
  const webgl = createCrystalRenderer(canvas, { samplesAcross: 1 });
  webgl.resize(side, side, 1);
  webgl.setScene(scene);
  webgl.setCamera(askew);
  const client = createRasterClient();
  client.setScene(scene);
  const view = { camera: askew, viewport: square, theme: lightTheme, pixelRatio: 1, samplesAcross: 2 };
  const best = { raster: Infinity, webgl: Infinity };
  for (let round = 0; round < 2; round++) {
    best.raster = Math.min(best.raster, await timed(async () => void (await client.draw(view))));
    best.webgl = Math.min(best.webgl, await timed(() => (webgl.render(), finish(canvas))));
  }
  webgl.dispose();
  client.dispose();
  return best;
}

/** The same tensors as polar surfaces: T = A/2 as far as it is symmetric, without its mean, so that both signs show. */
function asPolars(scene: ReturnType<typeof randomScene>): Scene {
  const { count, centres, shapes, colours, pickIds } = scene.quadrics;
  const tensors = new Float32Array(6 * count);
  for (let k = 0; k < count; k++) {
    const at = (row: number, column: number): number =>
      (shapes[9 * k + 3 * row + column]! + shapes[9 * k + 3 * column + row]!) / 2;
    const mean = (at(0, 0) + at(1, 1) + at(2, 2)) / 3;
    tensors.set([at(0, 0) - mean, at(1, 1) - mean, at(2, 2) - mean, at(0, 1), at(0, 2), at(1, 2)], 6 * k);
  }
  const polars = {
    ...{ count, centres, tensors, pickIds },
    positiveColours: colours,
    negativeColours: colours.map((value) => 0.6 * value),
  };
  return { ...scene, quadrics: randomScene(0).quadrics, polars };
}

/** Milliseconds of a CPU frame of ellipsoids and of as many polar surfaces, and of placing labels beside atoms; least of the rounds. */
async function glyphTimes(count: number, labelCount: number, rounds: number): Promise<GlyphTimes> {
  const solid = randomScene(count, 1, 0);
  const labelled: Scene = {
    ...solid,
    labels: Array.from({ length: labelCount }, (_none, k) => ({
      text: `Si${k + 1}`,
      position: [0, 1, 2].map((axis) => solid.quadrics.centres[3 * k + axis]!) as [number, number, number],
      pickId: k + 1,
      quadric: k,
    })),
  };
  const [solidClient, polarClient] = [createRasterClient(), createRasterClient()];
  solidClient.setScene(solid);
  polarClient.setScene(asPolars(solid));
  const view = { viewport, theme: lightTheme, pixelRatio: 1, samplesAcross: 1 };
  const measure: MeasureText = (text) => ({ widthPx: 7 * text.length, heightPx: 15 });
  const best = { ellipsoids: Infinity, polars: Infinity, labels: Infinity };
  const keep = (way: keyof GlyphTimes, ms: number): void => void (best[way] = Math.min(best[way], ms));
  for (let step = 0; step <= rounds; step++) {
    const camera = turn(askew, 10 * step, 5, viewport);
    const ellipsoids = await timed(async () => void (await solidClient.draw({ ...view, camera })));
    const polars = await timed(async () => void (await polarClient.draw({ ...view, camera })));
    const labels = await timed(() => void placeLabels(labelled, camera, viewport, measure));
    if (step === 0) continue;
    keep('ellipsoids', ellipsoids);
    keep('polars', polars);
    keep('labels', labels);
  }
  solidClient.dispose();
  polarClient.dispose();
  return best;
}

/** Milliseconds of a WebGL frame as we draw it and with instances, the least of the rounds, in turn. */
async function instancingTimes(
  count: number,
  rounds: number,
): Promise<{ readonly merged: number; readonly instanced: number }> {
  const scene = randomScene(count, 1, 0);
  const [mergedCanvas, instancedCanvas] = [newCanvas(1600, 900), newCanvas(1600, 900)];
  const webgl = createCrystalRenderer(mergedCanvas, { samplesAcross: 1 });
  webgl.resize(1600, 900, 1);
  webgl.setScene(scene);
  const drawInstanced = instancedQuadrics(instancedCanvas, scene);
  const best = { merged: Infinity, instanced: Infinity };
  for (let round = 0; round <= rounds; round++) {
    const camera = turn(askew, 10 * round, 5, viewport);
    webgl.setCamera(camera);
    const merged = await timed(() => (webgl.render(), finish(mergedCanvas)));
    const instanced = await timed(() => (drawInstanced(camera), finish(instancedCanvas)));
    if (round === 0) continue;
    best.merged = Math.min(best.merged, merged);
    best.instanced = Math.min(best.instanced, instanced);
  }
  webgl.dispose();
  instancedCanvas.getContext('webgl2')?.getExtension('WEBGL_lose_context')?.loseContext();
  return best;
}

declare global {
  interface Window {
    frameTimes: typeof frameTimes;
    stillTimes: typeof stillTimes;
    glyphTimes: typeof glyphTimes;
    instancingTimes: typeof instancingTimes;
  }
}

window.frameTimes = frameTimes;
window.stillTimes = stillTimes;
window.glyphTimes = glyphTimes;
window.instancingTimes = instancingTimes;
