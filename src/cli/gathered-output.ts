/** Pieces of text and bytes on their way out, written many at once. */
export interface GatheredOutput {
  readonly text: (piece: string) => void;
  readonly bytes: (piece: Uint8Array) => void;
  /** Writes what is waiting; to be called at the end. */
  readonly flush: () => void;
}

/** Bytes gathered before they are written. */
const defaultCapacity = 1 << 20;

/** UTF-8 needs at most so many bytes for a UTF-16 unit. */
const bytesPerUnit = 3;

/**
 * Gathers small pieces into large ones before they go to `write`, because a write of its own for each site costs more than
 * making the site. Each array that is written is given away: it is not used again.
 */
export function gatheredOutput(
  write: (bytes: Uint8Array) => void,
  capacity: number = defaultCapacity,
): GatheredOutput {
  const encoder = new TextEncoder();
  let waiting = new Uint8Array(0);
  let used = 0;
  const flush = (): void => {
    if (used > 0) write(waiting.subarray(0, used));
    waiting = new Uint8Array(0);
    used = 0;
  };
  const text = (piece: string): void => {
    const most = bytesPerUnit * piece.length;
    if (used + most > waiting.length) flush();
    if (most > capacity) return write(encoder.encode(piece));
    if (waiting.length === 0) waiting = new Uint8Array(capacity);
    used += encoder.encodeInto(piece, waiting.subarray(used)).written;
  };
  const bytes = (piece: Uint8Array): void => {
    flush();
    write(piece);
  };
  return { text, bytes, flush };
}
