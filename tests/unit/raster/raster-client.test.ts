import { describe, expect, it } from 'vitest';
import type { RasterPicture, RasterWorker } from '#src/raster/raster-client.ts';
import { createRasterClient } from '#src/raster/raster-client.ts';
import type { RasterRequest } from '#src/raster/raster-protocol.ts';
import { createRasterizer } from '#src/raster/rasterizer.ts';
import type { RasterView } from '#src/raster/view.ts';
import { bestKernel } from '#src/raster/wasm-kernel.ts';
import { lightTheme } from '#src/scene/theme.ts';
import { askew, randomScene } from '#tests/support/raster-scene.ts';

const view: RasterView = {
  camera: askew,
  viewport: { widthPx: 200, heightPx: 160 },
  theme: lightTheme,
  pixelRatio: 1,
  samplesAcross: 1,
};

interface FakeWorker extends RasterWorker {
  readonly heard: RasterRequest[];
  /** Answers the oldest request to draw. */
  answer(ms: (rowCount: number) => number): void;
  ended: boolean;
}

function fakeWorker(): FakeWorker {
  const rasterizer = createRasterizer(bestKernel());
  const open: Extract<RasterRequest, { kind: 'draw' }>[] = [];
  const worker: FakeWorker = {
    heard: [],
    ended: false,
    onmessage: null,
    onerror: null,
    postMessage(message) {
      worker.heard.push(message);
      if (message.kind === 'scene') rasterizer.setScene(message.scene);
      else if (message.kind === 'states') rasterizer.setStates(message.states);
      else open.push(message);
    },
    answer(ms) {
      const next = open.shift();
      if (!next) return;
      const band = rasterizer.draw(next.view, next.firstRow, next.rowCount);
      worker.onmessage?.({ data: { kind: 'band', id: next.id, ...band, ms: ms(next.rowCount) } });
    },
    terminate: () => (worker.ended = true),
  };
  return worker;
}

function madeClient(count: number) {
  const workers: FakeWorker[] = [];
  const client = createRasterClient(() => {
    const worker = fakeWorker();
    workers.push(worker);
    return worker;
  }, count);
  client.setScene(randomScene(80, 4));
  return { client, workers };
}

function joined(picture: RasterPicture): number[] {
  const ordered = [...picture.bands].sort((a, b) => a.firstRow - b.firstRow);
  return ordered.flatMap(({ pixels }) => [...pixels]);
}

const rowsOf = (worker: FakeWorker): number[] =>
  worker.heard.flatMap((message) => (message.kind === 'draw' ? [message.rowCount] : []));

describe('the raster client', () => {
  it.each([1, 2, 3])('puts the whole picture together from %i Workers, fast or smooth', async (count) => {
    const { client, workers } = madeClient(count);
    for (const samplesAcross of [1, 2]) {
      const asked = client.draw({ ...view, samplesAcross });
      for (let turn = 0; turn < 20; turn++) for (const worker of workers) worker.answer(() => 5);
      const picture = await asked;
      expect(joined(picture!)).toEqual([...client.drawNow({ ...view, samplesAcross }).pixels]);
    }
  });

  it('gives up a picture for a newer one, whose pieces wait for the Workers at work', async () => {
    const { client, workers } = madeClient(2);
    const old = client.draw({ ...view, samplesAcross: 2 });
    const next = client.draw(view);
    expect(await old).toBeNull();
    expect(workers.map((worker) => rowsOf(worker).length)).toEqual([1, 1]);
    for (let turn = 0; turn < 3; turn++) for (const worker of workers) worker.answer(() => 5);
    expect(joined((await next)!)).toEqual([...client.drawNow(view).pixels]);
    expect(workers.map((worker) => rowsOf(worker).length)).toEqual([2, 2]);
  });

  it('moves the cut to where the Workers take equally long', async () => {
    const { client, workers } = madeClient(2);
    for (let frame = 0; frame < 12; frame++) {
      const asked = client.draw(view);
      // the upper rows take three times as long
      workers[0]!.answer((rows) => 3 * rows);
      workers[1]!.answer((rows) => rows);
      const picture = await asked;
      if (frame > 8) expect(picture!.ms).toBeLessThan(135);
    }
    // 3 x = 160 − x gives 40 rows of 160
    expect(rowsOf(workers[0]!).at(-1)).toBeGreaterThanOrEqual(38);
    expect(rowsOf(workers[0]!).at(-1)).toBeLessThanOrEqual(44);
  });

  it('draws by itself once a Worker breaks down, and ends the others', async () => {
    const { client, workers } = madeClient(2);
    const asked = client.draw(view);
    workers[1]!.onerror?.({});
    const picture = await asked;
    expect(joined(picture!)).toEqual([...client.drawNow(view).pixels]);
    expect(workers.every(({ ended }) => ended)).toBe(true);
    expect((await client.draw(view))?.bands).toHaveLength(1);
  });

  it('tells Workers that start later about scene and rings', async () => {
    const { client, workers } = madeClient(1);
    client.setStates(new Uint8Array(80).fill(2));
    const asked = client.draw(view);
    expect(workers[0]!.heard.map(({ kind }) => kind)).toEqual(['scene', 'states', 'draw']);
    workers[0]!.answer(() => 1);
    const ringed = joined((await asked)!);
    client.setStates(new Uint8Array(80));
    expect([...client.drawNow(view).pixels]).not.toEqual(ringed);
  });
});
