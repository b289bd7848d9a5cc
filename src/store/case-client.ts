import type { KeptCase } from './case-exchange.ts';
import type { CaseReply, CaseRequest } from './case-protocol.ts';
import { Cancelled } from './engine-client.ts';
import type { FileInput } from './file-input.ts';
import type { Decisions, Views } from './state.ts';

/** The part of a Worker that is used, so that tests can stand in for it. */
export interface CaseWorker {
  postMessage(message: CaseRequest): void;
  terminate(): void;
  onmessage: ((event: { data: CaseReply }) => void) | null;
  onerror: ((event: { message?: string }) => void) | null;
}

/** Bytes up to which a case is written and read at once: a Worker would take longer to start. Packed ones grow about fivefold. */
const atOnceBytes = { written: 1_000_000, read: 250_000 } as const;

/**
 * Writes and reads case files; large ones in a Worker, which ends with its file so that the memory is given back. One file at
 * a time: a new one gives up the one before, whose promise rejects with `Cancelled`.
 */
export class CaseClient {
  readonly #start: () => CaseWorker;
  #giveUp: (() => void) | null = null;

  constructor(start: () => CaseWorker = startWorker) {
    this.#start = start;
  }

  /** The case as the bytes of its file. Rejects where a file of it can't be read any more. */
  async write(decisions: Decisions, views: Views): Promise<Blob> {
    const size = decisions.sources.reduce((sum, { blob }) => sum + blob.size, 0);
    if (size <= atOnceBytes.written) {
      const { caseTextOf } = await import('./case-exchange.ts');
      return new Blob([await caseTextOf(decisions, views)], { type: 'application/json' });
    }
    const reply = await this.#ask({ kind: 'write', decisions, views });
    if (reply.kind !== 'written') throw new Error('the case was not written');
    return reply.blob;
  }

  /** What a case file says, or why it says nothing. */
  async read(file: FileInput): Promise<KeptCase> {
    if (file.blob.size <= atOnceBytes.read) {
      const { keptCase } = await import('./case-exchange.ts');
      return keptCase(file);
    }
    const reply = await this.#ask({ kind: 'read', file });
    if (reply.kind !== 'read') throw new Error('the case was not read');
    return reply.kept;
  }

  cancel(): void {
    this.#giveUp?.();
  }

  #ask(request: CaseRequest): Promise<CaseReply> {
    this.cancel();
    return new Promise((resolve, reject) => {
      const worker = this.#start();
      const end = (): void => {
        worker.terminate();
        this.#giveUp = null;
      };
      this.#giveUp = () => {
        end();
        reject(new Cancelled('cancelled'));
      };
      worker.onmessage = ({ data }) => {
        end();
        if (data.kind === 'failed') reject(new Error(data.message));
        else resolve(data);
      };
      worker.onerror = ({ message }) => {
        end();
        reject(new Error(message ?? 'the reading of case files stopped without a message'));
      };
      worker.postMessage(request);
    });
  }
}

function startWorker(): CaseWorker {
  return new Worker(new URL('./case-worker.ts', import.meta.url), {
    type: 'module',
    name: 'ellipsite case',
  }) as unknown as CaseWorker;
}
