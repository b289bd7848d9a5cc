/** What unpacking gave: the bytes, and why it stopped early if it did. */
export interface Unpacked {
  readonly bytes: Uint8Array;
  readonly stopped: 'size' | 'ratio' | 'broken' | null;
}

export interface UnpackLimits {
  readonly maxUnpackedBytes: number;
  /** Unpacked to packed bytes; asked only past `ratioFromBytes`, as small texts of one repeated line are harmless. */
  readonly maxRatio: number;
  readonly ratioFromBytes: number;
}

export function looksGzipped(bytes: Uint8Array): boolean {
  return bytes[0] === 0x1f && bytes[1] === 0x8b;
}

/**
 * Unpacks gzip (RFC 1952) by the platform's own stream, piece by piece, so that a bomb is stopped at the limit and
 * never held in memory. A damaged or cut file keeps what came out before the damage.
 */
export async function gunzip(packed: Uint8Array, limits: UnpackLimits): Promise<Unpacked> {
  return unpack(packed, 'gzip', limits);
}

/** Unpacks a zlib stream (RFC 1950) in the same way. */
export async function inflate(packed: Uint8Array, limits: UnpackLimits): Promise<Unpacked> {
  return unpack(packed, 'deflate', limits);
}

async function unpack(
  packed: Uint8Array,
  format: 'gzip' | 'deflate',
  limits: UnpackLimits,
): Promise<Unpacked> {
  const stream = new DecompressionStream(format);
  const feeding = feed(stream.writable, packed);
  const reader = stream.readable.getReader();
  const pieces: Uint8Array[] = [];
  let length = 0;
  let stopped: Unpacked['stopped'] = null;
  try {
    for (;;) {
      const { done, value } = await reader.read();
      if (done) break;
      pieces.push(value);
      length += value.length;
      stopped = limitReached(length, packed.length, limits);
      if (stopped !== null) break;
    }
  } catch {
    stopped = 'broken';
  }
  if (stopped !== null) await reader.cancel().catch(() => undefined);
  await feeding;
  return { bytes: join(pieces, length), stopped };
}

function limitReached(unpacked: number, packed: number, limits: UnpackLimits): Unpacked['stopped'] {
  if (unpacked > limits.maxUnpackedBytes) return 'size';
  return unpacked > limits.ratioFromBytes && unpacked > limits.maxRatio * packed ? 'ratio' : null;
}

/** Writes in small pieces, so that what stands before a damaged place has come out when it is met. */
async function feed(writable: WritableStream<BufferSource>, packed: Uint8Array): Promise<void> {
  const writer = writable.getWriter();
  const piece = 1 << 14;
  try {
    for (let start = 0; start < packed.length; start += piece) {
      await writer.ready;
      await writer.write(packed.slice(start, start + piece));
    }
    await writer.close();
  } catch {
    // The reading side meets the same fault and reports it.
  }
}

function join(pieces: readonly Uint8Array[], length: number): Uint8Array {
  const whole = new Uint8Array(length);
  let at = 0;
  for (const piece of pieces) {
    whole.set(piece, at);
    at += piece.length;
  }
  return whole;
}
