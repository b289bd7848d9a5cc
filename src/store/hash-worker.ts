import { sha256OfBytes } from '#src/case/sha256.ts';
import type { HashReply, HashRequest } from './hash-protocol.ts';

/** Reads files and hashes them away from the page's thread; one that cannot be read is answered with the reason. */
self.onmessage = async ({ data: { id, blob } }: MessageEvent<HashRequest>): Promise<void> => {
  const reply = (message: HashReply): void => self.postMessage(message);
  try {
    reply({ id, hash: await sha256OfBytes(new Uint8Array(await blob.arrayBuffer())) });
  } catch (error) {
    reply({ id, fault: error instanceof Error ? error.message : String(error) });
  }
};
