import { crc32 } from '#src/base/crc32.ts';

/** What stands in a PNG beside its pixels (ISO/IEC 15948, the PNG specification). */
export interface PngFacts {
  readonly width: number;
  readonly height: number;
  /** With alpha, straight; else RGB. */
  readonly transparent: boolean;
  /** Pixels per metre in both directions; null says nothing about size. */
  readonly pixelsPerMetre: number | null;
  /** Texts in UTF-8, each under a keyword of 1 to 79 Latin letters. */
  readonly texts: readonly PngText[];
}

export interface PngText {
  readonly keyword: string;
  readonly text: string;
  readonly compressed: boolean;
}

/** Takes rows of RGBA pixels from the top and gives the file's bytes at the end. */
export interface PngWriter {
  /** Resolves when the rows are taken, so that no more than a few bands wait in memory. */
  readonly write: (pixels: Uint8ClampedArray, rowCount: number) => Promise<void>;
  readonly finish: () => Promise<Uint8Array<ArrayBuffer>>;
  /** Ends the compression of a picture that is not wanted any more. */
  readonly abort: () => void;
}

const signature = Uint8Array.of(0x89, 0x50, 0x4e, 0x47, 0x0d, 0x0a, 0x1a, 0x0a);

/** A chunk: length, type, data, checksum of type and data. */
function chunk(type: string, data: Uint8Array): Uint8Array<ArrayBuffer> {
  const bytes = new Uint8Array(data.length + 12);
  const view = new DataView(bytes.buffer);
  view.setUint32(0, data.length);
  for (let k = 0; k < 4; k++) bytes[4 + k] = type.charCodeAt(k);
  bytes.set(data, 8);
  view.setUint32(data.length + 8, crc32(bytes.subarray(4, data.length + 8)));
  return bytes;
}

function header({ width, height, transparent }: PngFacts): Uint8Array {
  const data = new Uint8Array(13);
  const view = new DataView(data.buffer);
  view.setUint32(0, width);
  view.setUint32(4, height);
  data.set([8, transparent ? 6 : 2, 0, 0, 0], 8);
  return chunk('IHDR', data);
}

function physicalSize(pixelsPerMetre: number): Uint8Array {
  const data = new Uint8Array(9);
  const view = new DataView(data.buffer);
  view.setUint32(0, Math.round(pixelsPerMetre));
  view.setUint32(4, Math.round(pixelsPerMetre));
  data[8] = 1;
  return chunk('pHYs', data);
}

async function textChunk({ keyword, text, compressed }: PngText): Promise<Uint8Array> {
  const encoder = new TextEncoder();
  const plain = encoder.encode(text);
  const body = compressed ? await deflated(plain) : plain;
  const name = encoder.encode(keyword);
  const data = new Uint8Array(name.length + 5 + body.length);
  data.set(name);
  // keyword, 0, compressed, method, language, 0, translated keyword, 0
  data[name.length + 1] = compressed ? 1 : 0;
  data.set(body, name.length + 5);
  return chunk('iTXt', data);
}

async function deflated(plain: Uint8Array<ArrayBuffer>): Promise<Uint8Array> {
  const stream = new Blob([plain]).stream().pipeThrough(new CompressionStream('deflate'));
  return new Uint8Array(await new Response(stream).arrayBuffer());
}

/** Writes a PNG band by band; its own memory is what is packed so far. */
export async function createPngWriter(facts: PngFacts): Promise<PngWriter> {
  const parts: Uint8Array<ArrayBufferLike>[] = [signature, header(facts), chunk('sRGB', Uint8Array.of(0))];
  if (facts.pixelsPerMetre !== null) parts.push(physicalSize(facts.pixelsPerMetre));
  for (const text of facts.texts) parts.push(await textChunk(text));
  const packing = new CompressionStream('deflate');
  const feed = packing.writable.getWriter();
  const collected = collect(packing.readable, parts);
  collected.catch(() => undefined);
  let above: Uint8Array = new Uint8Array((facts.transparent ? 4 : 3) * facts.width);
  return {
    async write(pixels, rowCount) {
      const { bytes, last } = filteredRows(pixels, rowCount, facts, above);
      above = last;
      await feed.ready;
      await feed.write(bytes);
    },
    async finish() {
      await feed.close();
      await collected;
      parts.push(chunk('IEND', new Uint8Array()));
      return joined(parts);
    },
    abort: () => void feed.abort().catch(() => undefined),
  };
}

/** Bytes of a chunk of pixels: always the same cuts, however the stream hands out its pieces. */
const chunkBytes = 1 << 18;

async function collect(packed: ReadableStream<Uint8Array>, parts: Uint8Array[]): Promise<void> {
  const reader = packed.getReader();
  let waiting = new Uint8Array(chunkBytes);
  let filled = 0;
  for (;;) {
    const { done, value } = await reader.read();
    if (done) break;
    for (let at = 0; at < value.length;) {
      const taken = Math.min(value.length - at, chunkBytes - filled);
      waiting.set(value.subarray(at, at + taken), filled);
      filled += taken;
      at += taken;
      if (filled === chunkBytes) {
        parts.push(chunk('IDAT', waiting));
        waiting = new Uint8Array(chunkBytes);
        filled = 0;
      }
    }
  }
  if (filled > 0) parts.push(chunk('IDAT', waiting.subarray(0, filled)));
}

function joined(parts: readonly Uint8Array[]): Uint8Array<ArrayBuffer> {
  const whole = new Uint8Array(parts.reduce((sum, part) => sum + part.length, 0));
  let at = 0;
  for (const part of parts) {
    whole.set(part, at);
    at += part.length;
  }
  return whole;
}

/** Each row after its filter's number: the filter with the smallest sum of absolute differences of None, Sub, Up, Paeth. */
function filteredRows(
  pixels: Uint8ClampedArray,
  rowCount: number,
  { width, transparent }: PngFacts,
  before: Uint8Array,
): { readonly bytes: Uint8Array<ArrayBuffer>; readonly last: Uint8Array } {
  const channels = transparent ? 4 : 3;
  const length = channels * width;
  const bytes = new Uint8Array((length + 1) * rowCount);
  const rows = [new Uint8Array(length), new Uint8Array(length)];
  let above = before;
  for (let r = 0; r < rowCount; r++) {
    const row = rows[r % 2]!;
    takeRow(pixels, 4 * width * r, row, channels);
    const filter = bestFilter(row, above, channels);
    bytes[(length + 1) * r] = filter;
    applyFilter(filter, row, above, channels, bytes, (length + 1) * r + 1);
    above = row;
  }
  return { bytes, last: above.slice() };
}

function takeRow(pixels: Uint8ClampedArray, start: number, row: Uint8Array, channels: number): void {
  if (channels === 4) {
    row.set(pixels.subarray(start, start + row.length));
    return;
  }
  for (let k = 0, at = start; k < row.length; k += 3, at += 4) {
    row[k] = pixels[at]!;
    row[k + 1] = pixels[at + 1]!;
    row[k + 2] = pixels[at + 2]!;
  }
}

const none = 0;
const sub = 1;
const up = 2;
const paeth = 4;

/** The sums are estimated from every fourth byte group: the choice costs little and loses nothing to speak of. */
function bestFilter(row: Uint8Array, above: Uint8Array, channels: number): number {
  const sums = [0, 0, 0, 0];
  const size = (value: number): number => (value < 128 ? value : 256 - value);
  for (let k = channels; k < row.length; k += 5) {
    const [x, a, b, c] = [row[k]!, row[k - channels]!, above[k]!, above[k - channels]!];
    sums[0]! += size(x);
    sums[1]! += size((x - a) & 255);
    sums[2]! += size((x - b) & 255);
    sums[3]! += size((x - predicted(a, b, c)) & 255);
  }
  return [none, sub, up, paeth][sums.indexOf(Math.min(...sums))]!;
}

/** The nearest of left, above and upper left to left + above − upper left. */
function predicted(a: number, b: number, c: number): number {
  const [pa, pb, pc] = [Math.abs(b - c), Math.abs(a - c), Math.abs(a + b - 2 * c)];
  return pa <= pb && pa <= pc ? a : pb <= pc ? b : c;
}

function applyFilter(
  filter: number,
  row: Uint8Array,
  above: Uint8Array,
  channels: number,
  out: Uint8Array,
  at: number,
): void {
  for (let k = 0; k < row.length; k++) {
    const a = k < channels ? 0 : row[k - channels]!;
    const b = above[k]!;
    if (filter === none) out[at + k] = row[k]!;
    else if (filter === sub) out[at + k] = row[k]! - a;
    else if (filter === up) out[at + k] = row[k]! - b;
    else out[at + k] = row[k]! - predicted(a, b, k < channels ? 0 : above[k - channels]!);
  }
}
