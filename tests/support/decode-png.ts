import { inflateSync } from 'node:zlib';

/** A PNG taken apart independently of the program: chunks by name, and pixels as RGBA. */
export interface DecodedPng {
  readonly width: number;
  readonly height: number;
  readonly colourType: number;
  readonly chunks: readonly { readonly type: string; readonly data: Uint8Array; readonly crc: number }[];
  readonly pixels: Uint8Array;
}

/** Reads 8-bit RGB and RGBA without interlace (PNG specification, ISO/IEC 15948). */
export function decodePng(bytes: Uint8Array): DecodedPng {
  const view = new DataView(bytes.buffer, bytes.byteOffset, bytes.byteLength);
  const chunks: { type: string; data: Uint8Array; crc: number }[] = [];
  for (let at = 8; at < bytes.length;) {
    const length = view.getUint32(at);
    const type = String.fromCharCode(...bytes.subarray(at + 4, at + 8));
    const data = bytes.subarray(at + 8, at + 8 + length);
    chunks.push({ type, data, crc: view.getUint32(at + 8 + length) });
    at += 12 + length;
  }
  const head = chunks[0]!.data;
  const headView = new DataView(head.buffer, head.byteOffset, head.byteLength);
  const [width, height, colourType] = [headView.getUint32(0), headView.getUint32(4), head[9]!];
  const packed = Buffer.concat(chunks.filter(({ type }) => type === 'IDAT').map(({ data }) => data));
  const pixels = unfiltered(inflateSync(packed), width, height, colourType === 6 ? 4 : 3);
  return { width, height, colourType, chunks, pixels };
}

function unfiltered(raw: Uint8Array, width: number, height: number, channels: number): Uint8Array {
  const length = width * channels;
  const rows = new Uint8Array(length * height);
  const pixels = new Uint8Array(4 * width * height).fill(255);
  for (let y = 0; y < height; y++) {
    const filter = raw[y * (length + 1)]!;
    for (let k = 0; k < length; k++) {
      const left = k < channels ? 0 : rows[y * length + k - channels]!;
      const above = y === 0 ? 0 : rows[(y - 1) * length + k]!;
      const corner = y === 0 || k < channels ? 0 : rows[(y - 1) * length + k - channels]!;
      const guess = [0, left, above, (left + above) >> 1, nearest(left, above, corner)][filter]!;
      const value = (raw[y * (length + 1) + 1 + k]! + guess) & 255;
      rows[y * length + k] = value;
      pixels[4 * (y * width + Math.floor(k / channels)) + (k % channels)] = value;
    }
  }
  return pixels;
}

function nearest(a: number, b: number, c: number): number {
  const p = a + b - c;
  const [pa, pb, pc] = [Math.abs(p - a), Math.abs(p - b), Math.abs(p - c)];
  if (pa <= pb && pa <= pc) return a;
  return pb <= pc ? b : c;
}

/** Text of an iTXt chunk by its keyword; undefined where there is none. */
export function textChunk({ chunks }: DecodedPng, keyword: string): string | undefined {
  for (const { type, data } of chunks) {
    if (type !== 'iTXt') continue;
    const end = data.indexOf(0);
    if (Buffer.from(data.subarray(0, end)).toString('latin1') !== keyword) continue;
    const language = data.indexOf(0, end + 3);
    const start = data.indexOf(0, language + 1) + 1;
    const body = data.subarray(start);
    return Buffer.from(data[end + 1] === 1 ? inflateSync(body) : body).toString('utf8');
  }
  return undefined;
}
