import { createHash } from 'node:crypto';
import { describe, expect, it } from 'vitest';
import { sha256OfBytes } from '#src/case/sha256.ts';
import type { HashReply, HashRequest } from '#src/store/hash-protocol.ts';
import type { HashWorker } from '#src/store/hash.ts';
import { createHasher } from '#src/store/hash.ts';

/** A worker on this thread that answers when told to. */
class TestWorker implements HashWorker {
  onmessage: HashWorker['onmessage'] = null;
  onerror: HashWorker['onerror'] = null;
  readonly asked: HashRequest[] = [];
  isEnded = false;

  postMessage(message: HashRequest): void {
    this.asked.push(message);
  }

  terminate(): void {
    this.isEnded = true;
  }

  answer(reply: HashReply): void {
    this.onmessage?.({ data: reply });
  }

  async hashAll(): Promise<void> {
    for (const { id, blob } of this.asked) {
      this.answer({ id, hash: await sha256OfBytes(new Uint8Array(await blob.arrayBuffer())) });
    }
  }
}

function hasher(): { readonly hashOf: (blob: Blob) => Promise<string>; readonly workers: TestWorker[] } {
  const workers: TestWorker[] = [];
  const start = (): TestWorker => {
    const worker = new TestWorker();
    workers.push(worker);
    return worker;
  };
  return { hashOf: createHasher(start), workers };
}

const nodeHash = (text: string): string => createHash('sha256').update(text).digest('hex');

describe('hashing files in a worker', () => {
  it('gives each file its own hash, from one worker that ends with the last', async () => {
    const { hashOf, workers } = hasher();
    const hashes = Promise.all(['one', 'another'].map((text) => hashOf(new Blob([text]))));
    await workers[0]!.hashAll();
    expect(await hashes).toEqual([nodeHash('one'), nodeHash('another')]);
    expect(workers.map(({ isEnded }) => isEnded)).toEqual([true]);
    const later = hashOf(new Blob(['later']));
    await workers[1]!.hashAll();
    expect(await later).toBe(nodeHash('later'));
  });

  it('rejects what cannot be read and goes on with the rest', async () => {
    const { hashOf, workers } = hasher();
    const bad = hashOf(new Blob(['gone']));
    const good = hashOf(new Blob(['here']));
    workers[0]!.answer({ id: workers[0]!.asked[0]!.id, fault: 'the file is gone' });
    await expect(bad).rejects.toThrow('the file is gone');
    await workers[0]!.hashAll();
    expect(await good).toBe(nodeHash('here'));
  });

  it('rejects all that waits when the worker breaks down, and starts another for the next file', async () => {
    const { hashOf, workers } = hasher();
    const waiting = [hashOf(new Blob(['a'])), hashOf(new Blob(['b']))];
    workers[0]!.onerror?.({ message: 'out of memory' });
    for (const one of waiting) await expect(one).rejects.toThrow('out of memory');
    void hashOf(new Blob(['c']));
    expect(workers).toHaveLength(2);
  });
});
