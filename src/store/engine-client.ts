import type { ReportProgress } from '#src/base/progress.ts';
import { unpackPicks } from '#src/scene/packed-picks.ts';
import type {
  CaseInput,
  DerivedCase,
  EngineReply,
  EngineRequest,
  LinePage,
  SourceFile,
} from './engine-protocol.ts';
import type { Queries, Query, QueryAnswer, QueryKind } from './engine-queries.ts';

/** What the store needs of an engine; the worker client is one, tests bring their own. */
export interface EngineClient {
  /** Derives a case. A derivation still running is given up for the new one. */
  derive(input: CaseInput, report: ReportProgress): Promise<DerivedCase>;
  /** Asks about the crystal of a derived case: sites, rows of the table, a picture. */
  ask<Kind extends QueryKind>(
    derived: DerivedCase,
    kind: Kind,
    ask: Queries[Kind]['ask'],
  ): Promise<Queries[Kind]['answer']>;
  lines(source: SourceFile, first: number, count: number): Promise<LinePage>;
  /** Stops the running derivation, whose promise rejects with `Cancelled`. */
  cancel(): void;
}

/** The part of a Worker that is used, so that tests can stand in for it. */
export interface WorkerLike {
  postMessage(message: EngineRequest): void;
  terminate(): void;
  onmessage: ((event: { data: EngineReply }) => void) | null;
  onerror: ((event: { message?: string }) => void) | null;
}

/** Rejection of what was cancelled or overtaken by a newer request: nothing to show. */
export class Cancelled extends Error {}

interface Pending {
  readonly request: EngineRequest;
  readonly report: ReportProgress;
  readonly settle: (reply: EngineReply) => void;
  readonly reject: (reason: Error) => void;
}

/**
 * Talks to the engine in a worker. A synchronous read cannot be interrupted, so cancelling ends the worker and
 * starts a new one, which reads the files again from their blobs when it needs them.
 */
class WorkerEngineClient implements EngineClient {
  readonly #start: () => WorkerLike;
  readonly #pending = new Map<number, Pending>();
  /** What a case was derived from, as long as someone holds it: a worker started afresh derives it again. */
  readonly #inputs = new WeakMap<DerivedCase, CaseInput>();
  #worker: WorkerLike | null = null;
  #nextId = 1;

  constructor(start: () => WorkerLike) {
    this.#start = start;
  }

  async derive(input: CaseInput, report: ReportProgress): Promise<DerivedCase> {
    this.cancel();
    const derived = await this.#request({ id: this.#nextId++, kind: 'derive', input }, report, (reply) =>
      reply.kind === 'derived' ? reply.result : null,
    );
    this.#inputs.set(derived, input);
    return derived;
  }

  ask<Kind extends QueryKind>(
    derived: DerivedCase,
    kind: Kind,
    ask: Queries[Kind]['ask'],
  ): Promise<Queries[Kind]['answer']> {
    const input = this.#inputs.get(derived);
    if (!input) return Promise.reject(new RangeError('this case is not of this engine'));
    const query = { kind, ask } as Query;
    const request = {
      id: this.#nextId++,
      kind: 'query',
      derivation: derived.derivation,
      input,
      query,
    } as const;
    return this.#request(request, () => undefined, answerIn) as Promise<Queries[Kind]['answer']>;
  }

  lines(source: SourceFile, first: number, count: number): Promise<LinePage> {
    const request: EngineRequest = { id: this.#nextId++, kind: 'lines', source, first, count };
    return this.#request(
      request,
      () => undefined,
      (reply) => (reply.kind === 'lines' ? reply.page : null),
    );
  }

  cancel(): void {
    const running = [...this.#pending.values()].filter(({ request }) => request.kind === 'derive');
    if (running.length === 0) return;
    this.#worker?.terminate();
    this.#worker = null;
    for (const { request, reject } of running) {
      this.#pending.delete(request.id);
      reject(new Cancelled('cancelled'));
    }
    for (const { request } of this.#pending.values()) this.#running().postMessage(request);
  }

  #request<Result>(
    request: EngineRequest,
    report: ReportProgress,
    take: (reply: EngineReply) => Result | null,
  ): Promise<Result> {
    return new Promise<Result>((resolve, reject) => {
      const settle = (reply: EngineReply): void => {
        const result = take(reply);
        if (result !== null) resolve(result);
        else reject(new Error(reply.kind === 'failed' ? reply.message : `unexpected ${reply.kind}`));
      };
      this.#pending.set(request.id, { request, report, settle, reject });
      this.#running().postMessage(request);
    });
  }

  #running(): WorkerLike {
    if (this.#worker) return this.#worker;
    const worker = this.#start();
    worker.onmessage = ({ data }) => this.#receive(data);
    worker.onerror = (event) => this.#crash(event.message ?? 'the engine stopped without a message');
    this.#worker = worker;
    return worker;
  }

  #receive(reply: EngineReply): void {
    const pending = this.#pending.get(reply.id);
    if (!pending) return;
    if (reply.kind === 'progress') {
      pending.report(reply.share, reply.stage);
      return;
    }
    this.#pending.delete(reply.id);
    pending.settle(reply);
  }

  /** A crashed worker (out of memory, a script that did not load) rejects all that waits; the next request starts afresh. */
  #crash(message: string): void {
    this.#worker?.terminate();
    this.#worker = null;
    const waiting = [...this.#pending.values()];
    this.#pending.clear();
    for (const { reject } of waiting) reject(new Error(message));
  }
}

function answerIn(reply: EngineReply): QueryAnswer | null {
  if (reply.kind === 'scene') return { ...reply.scene, picks: unpackPicks(reply.scene.picks) };
  return reply.kind === 'answer' ? reply.answer : null;
}

export function createEngineClient(
  start: () => WorkerLike = () =>
    new Worker(new URL('./engine-worker.ts', import.meta.url), {
      type: 'module',
      name: 'ellipsite engine',
    }) as unknown as WorkerLike,
): EngineClient {
  return new WorkerEngineClient(start);
}
