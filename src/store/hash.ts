import type { HashReply, HashRequest } from './hash-protocol.ts';

/** The part of a Worker that is used, so that tests can stand in for it. */
export interface HashWorker {
  postMessage(message: HashRequest): void;
  terminate(): void;
  onmessage: ((event: { data: HashReply }) => void) | null;
  onerror: ((event: { message?: string }) => void) | null;
}

interface Waiting {
  readonly resolve: (hash: string) => void;
  readonly reject: (reason: Error) => void;
}

/**
 * SHA-256 of files, lower-case hexadecimal, read and computed in a Worker: hashing copies a file whole, which would stop the
 * page. The Worker ends when nothing waits, so that the memory of a large file is given back.
 */
class WorkerHasher {
  readonly #start: () => HashWorker;
  readonly #waiting = new Map<number, Waiting>();
  #worker: HashWorker | null = null;
  #nextId = 1;

  constructor(start: () => HashWorker) {
    this.#start = start;
  }

  hashOf(blob: Blob): Promise<string> {
    return new Promise((resolve, reject) => {
      const worker = this.#running();
      const id = this.#nextId++;
      this.#waiting.set(id, { resolve, reject });
      worker.postMessage({ id, blob });
    });
  }

  #running(): HashWorker {
    if (this.#worker) return this.#worker;
    const worker = this.#start();
    worker.onmessage = ({ data }) => this.#receive(data);
    worker.onerror = ({ message }) => this.#fail(message ?? 'the hashing stopped without a message');
    this.#worker = worker;
    return worker;
  }

  #receive(reply: HashReply): void {
    const waiting = this.#waiting.get(reply.id);
    this.#waiting.delete(reply.id);
    if (this.#waiting.size === 0) this.#end();
    if ('hash' in reply) waiting?.resolve(reply.hash);
    else waiting?.reject(new Error(reply.fault));
  }

  #fail(message: string): void {
    this.#end();
    const all = [...this.#waiting.values()];
    this.#waiting.clear();
    for (const { reject } of all) reject(new Error(message));
  }

  #end(): void {
    this.#worker?.terminate();
    this.#worker = null;
  }
}

/** Hashes files away from the page's thread. Rejects where a file cannot be read or the Worker does not load. */
export function createHasher(
  start: () => HashWorker = () =>
    new Worker(new URL('./hash-worker.ts', import.meta.url), {
      type: 'module',
      name: 'ellipsite hash',
    }) as unknown as HashWorker,
): (blob: Blob) => Promise<string> {
  const hasher = new WorkerHasher(start);
  return (blob) => hasher.hashOf(blob);
}
