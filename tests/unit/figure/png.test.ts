import { describe, expect, it } from 'vitest';
import { crc32 } from '#src/base/crc32.ts';
import { seededRandom } from '#src/base/seeded-random.ts';
import { createPngWriter } from '#src/figure/png.ts';
import { decodePng, textChunk } from '#tests/support/decode-png.ts';

/** Flat ground, a slope and noise, so that every filter has its rows. */
function picture(width: number, height: number, alpha: boolean): Uint8ClampedArray {
  const random = seededRandom(7);
  const pixels = new Uint8ClampedArray(4 * width * height);
  for (let y = 0; y < height; y++) {
    for (let x = 0; x < width; x++) {
      const kind = Math.floor((3 * y) / height);
      const value = kind === 0 ? 200 : kind === 1 ? (3 * x + 2 * y) % 256 : 256 * random();
      pixels.set([value, value / 2, 255 - value, alpha ? (x * 7 + y) % 256 : 255], 4 * (y * width + x));
    }
  }
  return pixels;
}

async function written(width: number, height: number, transparent: boolean, bands: readonly number[]) {
  const pixels = picture(width, height, transparent);
  const writer = await createPngWriter({
    width,
    height,
    transparent,
    pixelsPerMetre: 300 / 0.0254,
    texts: [{ keyword: 'Title', text: 'σ – ²⁹Si', compressed: false }],
  });
  let row = 0;
  for (const count of bands) {
    await writer.write(pixels.subarray(4 * width * row, 4 * width * (row + count)), count);
    row += count;
  }
  return { pixels, bytes: await writer.finish() };
}

describe('PNG writer', () => {
  it('has the published check value of its checksum', () => {
    // CRC-32 of "123456789" is CBF43926: check value of ISO 3309 / ITU-T V.42 as catalogues of CRCs give it
    expect(crc32(new TextEncoder().encode('123456789'))).toBe(0xcbf43926);
  });

  it.each([
    ['RGB', false, 2],
    ['RGBA', true, 6],
  ] as const)(
    'writes %s that another decoder reads back pixel by pixel',
    async (_name, transparent, type) => {
      const { pixels, bytes } = await written(61, 47, transparent, [10, 1, 36]);
      const decoded = decodePng(bytes);
      expect([decoded.width, decoded.height, decoded.colourType]).toEqual([61, 47, type]);
      expect(Buffer.compare(Buffer.from(decoded.pixels), Buffer.from(pixels))).toBe(0);
    },
  );

  it('begins with IHDR and sRGB, ends with IEND, and every checksum fits', async () => {
    const { bytes } = await written(20, 20, false, [20]);
    const { chunks } = decodePng(bytes);
    expect(chunks.map(({ type }) => type)).toEqual(['IHDR', 'sRGB', 'pHYs', 'iTXt', 'IDAT', 'IEND']);
    for (const { type, data, crc } of chunks) {
      expect(crc32(Buffer.concat([Buffer.from(type, 'latin1'), data]))).toBe(crc);
    }
  });

  it('says its resolution in pixels per metre and its texts in UTF-8', async () => {
    const { bytes } = await written(20, 20, false, [20]);
    const decoded = decodePng(bytes);
    const physical = decoded.chunks.find(({ type }) => type === 'pHYs')!.data;
    const view = new DataView(physical.buffer, physical.byteOffset);
    // 300 / 0.0254 m = 11811.02
    expect([view.getUint32(0), view.getUint32(4), physical[8]]).toEqual([11_811, 11_811, 1]);
    expect(textChunk(decoded, 'Title')).toBe('σ – ²⁹Si');
  });

  it('gives the same pixels however the rows are parted', async () => {
    const [one, other] = [await written(33, 30, true, [30]), await written(33, 30, true, [7, 7, 7, 9])];
    expect(decodePng(other.bytes).pixels).toEqual(decodePng(one.bytes).pixels);
  });
});
