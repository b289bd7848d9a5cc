import type { Scene } from '#src/scene/scene.ts';
import type { FigureFileFacts } from './figure-png.ts';
import type { FigureMessage, FigurePreview, FigureReply } from './figure-protocol.ts';
import type { FigureRequest } from './figure-request.ts';

/** Draws figures without blocking. */
export interface FigureClient {
  readonly setScene: (scene: Scene) => void;
  /** The figure at a small size; null where a newer preview was asked for meanwhile. */
  readonly preview: (request: FigureRequest, pxPerPt: number) => Promise<FigurePreview | null>;
  /** The bytes of the PNG; null where it was cancelled. */
  readonly file: (
    request: FigureRequest,
    pxPerPt: number,
    facts: FigureFileFacts,
    progress: (share: number) => void,
  ) => Promise<Uint8Array<ArrayBuffer> | null>;
  /** Stops what is being drawn. */
  readonly cancel: () => void;
  readonly dispose: () => void;
}

/** The part of a Worker that is used, so that tests can stand in for it. */
export interface FigureWorker {
  postMessage(message: FigureMessage): void;
  terminate(): void;
  onmessage: ((event: { data: FigureReply }) => void) | null;
  onerror: ((event: { message?: string }) => void) | null;
}

function startWorker(): FigureWorker {
  return new Worker(new URL('./figure-worker.ts', import.meta.url), {
    type: 'module',
    name: 'ellipsite figure',
  }) as unknown as FigureWorker;
}

export function createFigureClient(start: () => FigureWorker = startWorker): FigureClient {
  const client = new WorkerFigureClient(start);
  return {
    setScene: (scene) => client.setScene(scene),
    preview: (request, pxPerPt) => client.preview(request, pxPerPt),
    file: (request, pxPerPt, facts, progress) => client.file(request, pxPerPt, facts, progress),
    cancel: () => client.cancel(),
    dispose: () => client.cancel(),
  };
}

interface Job {
  readonly done: (reply: FigureReply | null) => void;
  readonly failed: (error: Error) => void;
  readonly progress: (share: number) => void;
}

/** One Worker, started at the first picture. One preview is in it at a time; of those that wait only the newest is drawn. */
class WorkerFigureClient {
  readonly #start: () => FigureWorker;
  #worker: FigureWorker | null = null;
  #scene: Scene | null = null;
  #nextId = 1;
  readonly #jobs = new Map<number, Job>();
  #isPreviewing = false;
  #waiting: { readonly go: () => void; readonly drop: () => void } | null = null;

  constructor(start: () => FigureWorker) {
    this.#start = start;
  }

  setScene(scene: Scene): void {
    if (scene === this.#scene) return;
    this.#scene = scene;
    this.#worker?.postMessage({ kind: 'scene', scene });
  }

  async preview(request: FigureRequest, pxPerPt: number): Promise<FigurePreview | null> {
    this.#waiting?.drop();
    this.#waiting = null;
    if (this.#isPreviewing) {
      const isMine = await new Promise<boolean>((resolve) => {
        this.#waiting = { go: () => resolve(true), drop: () => resolve(false) };
      });
      if (!isMine) return null;
    }
    this.#isPreviewing = true;
    try {
      const reply = await this.#ask((id) => ({ kind: 'preview', id, request, pxPerPt }));
      return reply?.kind === 'preview' ? reply.preview : null;
    } finally {
      this.#isPreviewing = false;
      this.#startWaiting();
    }
  }

  #startWaiting(): void {
    const next = this.#waiting;
    this.#waiting = null;
    next?.go();
  }

  async file(
    request: FigureRequest,
    pxPerPt: number,
    facts: FigureFileFacts,
    progress: (share: number) => void,
  ): Promise<Uint8Array<ArrayBuffer> | null> {
    const reply = await this.#ask((id) => ({ kind: 'file', id, request, pxPerPt, facts }), progress);
    return reply?.kind === 'file' ? reply.bytes : null;
  }

  /** A picture cannot be interrupted: its Worker ends, the next picture starts another. */
  cancel(): void {
    this.#worker?.terminate();
    this.#worker = null;
    const jobs = [...this.#jobs.values()];
    this.#jobs.clear();
    jobs.forEach(({ done }) => done(null));
  }

  #ask(
    message: (id: number) => FigureMessage,
    progress: (share: number) => void = () => undefined,
  ): Promise<FigureReply | null> {
    const id = this.#nextId++;
    return new Promise((resolve, reject) => {
      this.#jobs.set(id, { done: resolve, failed: reject, progress });
      this.#running().postMessage(message(id));
    });
  }

  #running(): FigureWorker {
    if (this.#worker) return this.#worker;
    const worker = this.#start();
    this.#worker = worker;
    worker.onmessage = ({ data }) => this.#receive(data);
    worker.onerror = ({ message }) =>
      this.#fail(`The picture could not be drawn: ${message ?? 'its Worker stopped'}.`);
    if (this.#scene) worker.postMessage({ kind: 'scene', scene: this.#scene });
    return worker;
  }

  #receive(reply: FigureReply): void {
    const job = this.#jobs.get(reply.id);
    if (!job) return;
    if (reply.kind === 'progress') {
      job.progress(reply.share);
      return;
    }
    this.#jobs.delete(reply.id);
    if (reply.kind === 'failed') job.failed(new Error(reply.message));
    else job.done(reply);
  }

  #fail(message: string): void {
    this.#worker?.terminate();
    this.#worker = null;
    const jobs = [...this.#jobs.values()];
    this.#jobs.clear();
    jobs.forEach(({ failed }) => failed(new Error(message)));
  }
}
