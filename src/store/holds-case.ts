import { looksLikeCase } from '#src/case/case-document.ts';

/** Bytes of a file that are looked at. */
const headBytes = 2000;

/**
 * Whether a file is a case file by its first bytes, or a picture that may hold one; its name decides nothing. False where
 * it can't be read: the engine says why.
 */
export async function holdsCase(blob: Blob): Promise<boolean> {
  try {
    const head = new Uint8Array(await blob.slice(0, headBytes).arrayBuffer());
    const isPicture = [0x89, 0x50, 0x4e, 0x47].every((byte, i) => head[i] === byte);
    const isPacked = head[0] === 0x1f && head[1] === 0x8b;
    const plain = isPacked ? await unpackedHead(blob) : head;
    return isPicture || looksLikeCase(new TextDecoder().decode(plain));
  } catch {
    return false;
  }
}

async function unpackedHead(blob: Blob): Promise<Uint8Array> {
  const reader = blob.stream().pipeThrough(new DecompressionStream('gzip')).getReader();
  const { value } = await reader.read();
  void reader.cancel().catch(() => undefined);
  return (value ?? new Uint8Array()).slice(0, headBytes);
}
