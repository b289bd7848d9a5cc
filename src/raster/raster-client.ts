import { ownScene } from './own-scene.ts';
import type { RasterReply, RasterRequest } from './raster-protocol.ts';
import type { RasterBand, Rasterizer, RasterScene } from './rasterizer.ts';
import { createRasterizer } from './rasterizer.ts';
import type { RasterView } from './view.ts';
import { pictureSize } from './view.ts';
import { bestKernel } from './wasm-kernel.ts';

/** A picture drawn by several Workers. */
export interface RasterPicture {
  readonly width: number;
  readonly height: number;
  readonly bands: readonly RasterBand[];
  /** Longest drawing time of one Worker. */
  readonly ms: number;
}

/** Draws pictures without blocking; one at a time, a newer one overtakes. */
export interface RasterClient {
  setScene(scene: RasterScene): void;
  setStates(states: Uint8Array): void;
  /** Null where a newer picture was asked for before this one was complete. */
  draw(view: RasterView): Promise<RasterPicture | null>;
  /** Draws here and now, on the caller's thread. */
  drawNow(view: RasterView): RasterBand;
  dispose(): void;
}

/** The part of a Worker that is used, so that tests can stand in for it. */
export interface RasterWorker {
  postMessage(message: RasterRequest, transfer?: Transferable[]): void;
  terminate(): void;
  onmessage: ((event: { data: RasterReply }) => void) | null;
  onerror: ((event: { message?: string }) => void) | null;
}

/** Rows of one piece at least; a smooth picture has several pieces a Worker, so that a newer one need not wait long. */
const leastRows = 32;
const piecesWhenSmooth = 4;

export function createRasterClient(
  start: () => RasterWorker = startWorker,
  workerCount: number = usualWorkers(),
): RasterClient {
  return new WorkerRasterClient(start, workerCount);
}

function startWorker(): RasterWorker {
  return new Worker(new URL('./raster-worker.ts', import.meta.url), {
    type: 'module',
    name: 'ellipsite raster',
  }) as unknown as RasterWorker;
}

/** As many as there are processors, four at most: every one holds the whole scene. */
function usualWorkers(): number {
  return Math.max(1, Math.min(4, navigator.hardwareConcurrency || 2));
}

interface Piece {
  readonly firstRow: number;
  readonly rowCount: number;
}

type TimedBand = RasterBand & { readonly ms: number };

interface Job {
  readonly id: number;
  readonly view: RasterView;
  readonly waiting: Piece[];
  readonly bands: TimedBand[];
  readonly pieces: number;
  readonly busyMs: Map<RasterWorker, number>;
  readonly settle: (picture: RasterPicture | null) => void;
}

class WorkerRasterClient implements RasterClient {
  readonly #start: () => RasterWorker;
  readonly #workerCount: number;
  #workers: RasterWorker[] | null = null;
  readonly #busy = new Set<RasterWorker>();
  /** Shares of the rows by which the Workers took equally long last time. */
  #shares: number[];
  #local: Rasterizer | null = null;
  #isLocalOnly = false;
  #scene: RasterScene | null = null;
  #states: Uint8Array | null = null;
  #job: Job | null = null;
  #nextId = 1;

  constructor(start: () => RasterWorker, workerCount: number) {
    this.#start = start;
    this.#workerCount = workerCount;
    this.#shares = Array.from({ length: workerCount }, () => 1 / workerCount);
  }

  setScene(scene: RasterScene): void {
    const { quadrics, cylinders, lines, polars, facets, bounds } = scene;
    this.#scene = {
      quadrics,
      cylinders,
      lines,
      ...(polars && { polars }),
      ...(facets && { facets }),
      bounds,
    };
    this.#states = null;
    this.#local?.setScene(this.#scene);
    for (const worker of this.#workers ?? []) giveScene(worker, this.#scene);
  }

  setStates(states: Uint8Array): void {
    this.#states = states;
    this.#local?.setStates(states);
    this.#tell({ kind: 'states', states });
  }

  draw(view: RasterView): Promise<RasterPicture | null> {
    this.#job?.settle(null);
    this.#job = null;
    const workers = this.#running();
    if (workers.length === 0) return Promise.resolve(this.#drawHere(view));
    return new Promise((settle) => {
      const pieces = this.#pieces(view);
      const waiting = [...pieces];
      const id = this.#nextId++;
      this.#job = { id, view, waiting, bands: [], pieces: pieces.length, busyMs: new Map(), settle };
      for (const worker of workers) if (!this.#busy.has(worker)) this.#feed(worker);
    });
  }

  drawNow(view: RasterView): RasterBand {
    if (!this.#local) {
      this.#local = createRasterizer(bestKernel());
      if (this.#scene) this.#local.setScene(this.#scene);
      if (this.#states) this.#local.setStates(this.#states);
    }
    return this.#local.draw(view);
  }

  dispose(): void {
    this.#job?.settle(null);
    this.#job = null;
    for (const worker of this.#workers ?? []) worker.terminate();
    this.#workers = [];
    this.#isLocalOnly = true;
  }

  #drawHere(view: RasterView): RasterPicture {
    const start = performance.now();
    const band = this.drawNow(view);
    return { ...pictureSize(view), bands: [band], ms: performance.now() - start };
  }

  /** The Workers, started when first needed; none where they cannot be had. */
  #running(): RasterWorker[] {
    if (this.#isLocalOnly) return [];
    if (this.#workers) return this.#workers;
    try {
      this.#workers = Array.from({ length: this.#workerCount }, () => this.#startOne());
    } catch {
      this.#workers = [];
      this.#isLocalOnly = true;
    }
    return this.#workers;
  }

  #startOne(): RasterWorker {
    const worker = this.#start();
    worker.onmessage = ({ data }) => this.#receive(worker, data);
    worker.onerror = () => this.#giveUp();
    if (this.#scene) giveScene(worker, this.#scene);
    if (this.#states) worker.postMessage({ kind: 'states', states: this.#states });
    return worker;
  }

  #tell(request: RasterRequest): void {
    for (const worker of this.#workers ?? []) worker.postMessage(request);
  }

  /** Bands of the picture, one a Worker cut where they would take equally long; more and smaller ones for a smooth picture. */
  #pieces(view: RasterView): Piece[] {
    const { height } = pictureSize(view);
    const isSmooth = view.samplesAcross > 1;
    const wanted = isSmooth ? this.#workerCount * piecesWhenSmooth : this.#workerCount;
    const shares = isSmooth ? Array.from({ length: wanted }, () => 1 / wanted) : this.#shares;
    const pieces: Piece[] = [];
    let firstRow = 0;
    let sum = 0;
    for (const share of shares) {
      sum += share;
      const isLast = pieces.length === shares.length - 1;
      const end = isLast
        ? height
        : Math.min(height, Math.max(firstRow + leastRows, Math.round(height * sum)));
      if (end > firstRow) pieces.push({ firstRow, rowCount: end - firstRow });
      firstRow = end;
    }
    if (firstRow < height) pieces.push({ firstRow, rowCount: height - firstRow });
    return pieces;
  }

  #feed(worker: RasterWorker): void {
    const piece = this.#job?.waiting.shift();
    if (!this.#job || !piece) return;
    this.#busy.add(worker);
    worker.postMessage({ kind: 'draw', id: this.#job.id, view: this.#job.view, ...piece });
  }

  #receive(worker: RasterWorker, reply: RasterReply): void {
    this.#busy.delete(worker);
    const job = this.#job;
    if (reply.kind === 'failed') {
      this.#giveUp();
      return;
    }
    if (job && reply.id === job.id) {
      job.bands.push(reply);
      job.busyMs.set(worker, (job.busyMs.get(worker) ?? 0) + reply.ms);
      if (job.bands.length === job.pieces) this.#finish(job);
    }
    this.#feed(worker);
  }

  #finish(job: Job): void {
    this.#job = null;
    const ms = Math.max(...job.busyMs.values());
    if (job.view.samplesAcross === 1 && job.pieces === this.#workerCount) {
      const cuts = equalCuts([...job.bands].sort((a, b) => a.firstRow - b.firstRow));
      const { height } = pictureSize(job.view);
      this.#shares = this.#shares.map((share, k) => (share + cuts[k]! / height) / 2);
    }
    job.settle({ ...pictureSize(job.view), bands: job.bands, ms });
  }

  /** A Worker that does not load or breaks down: from here on pictures are drawn on the page's thread. */
  #giveUp(): void {
    for (const worker of this.#workers ?? []) worker.terminate();
    this.#workers = [];
    this.#busy.clear();
    this.#isLocalOnly = true;
    const job = this.#job;
    this.#job = null;
    job?.settle(this.#drawHere(job.view));
  }
}

/** Gives a worker the scene as its own. */
function giveScene(worker: RasterWorker, scene: RasterScene): void {
  const own = ownScene(scene);
  worker.postMessage({ kind: 'scene', scene: own.scene }, own.buffers);
}

/** Row counts of as many bands that would have taken equally long, from the times of these. */
function equalCuts(bands: readonly TimedBand[]): number[] {
  const goal = bands.reduce((sum, { ms }) => sum + ms, 0) / bands.length;
  const cuts: number[] = [];
  let rows = 0;
  let time = 0;
  for (const { rowCount, ms } of bands) {
    const perRow = Math.max(ms, 1e-3) / rowCount;
    let left = rowCount;
    while (cuts.length < bands.length - 1 && time + left * perRow >= goal) {
      const part = Math.max(0, (goal - time) / perRow);
      cuts.push(rows + part);
      left -= part;
      rows = 0;
      time = 0;
    }
    rows += left;
    time += left * perRow;
  }
  return [...cuts, rows];
}
