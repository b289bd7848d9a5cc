import { describe, expect, it } from 'vitest';
import { decodeBytes } from '#src/bytes/decode-bytes.ts';
import { createPngWriter } from '#src/figure/png.ts';

const caseText = '{\n  "schema": "ellipsite/case",\n  "title": "σ, ²⁹Si"\n}\n';

async function picture(texts: readonly { keyword: string; text: string; compressed: boolean }[]) {
  const facts = { width: 8, height: 8, transparent: false, pixelsPerMetre: null, texts };
  const writer = await createPngWriter(facts);
  await writer.write(new Uint8ClampedArray(4 * 64).fill(120), 8);
  return writer.finish();
}

const withCase = (compressed = true) =>
  picture([
    { keyword: 'Title', text: 'a picture', compressed: false },
    { keyword: 'ellipsite-case', text: caseText, compressed },
  ]);

describe('a picture as a file to open', () => {
  it.each([true, false])('gives the text of the case in it (compressed: %s)', async (compressed) => {
    const { source, problems } = await decodeBytes('figure.png', await withCase(compressed));
    expect(source?.text).toBe(caseText);
    expect(source?.name).toBe('figure.png');
    expect(problems).toEqual([]);
  });

  it('opens from a picture cut off after the case', async () => {
    const bytes = await withCase();
    const pixels = Buffer.from(bytes).indexOf('IDAT');
    const { source } = await decodeBytes('cut.png', bytes.subarray(0, pixels + 6));
    expect(source?.text).toBe(caseText);
  });

  it('tells a picture cut off within the case, wherever it ends', async () => {
    const bytes = await withCase();
    const end = Buffer.from(bytes).indexOf('IDAT') - 5;
    for (let length = 34; length < end; length += 7) {
      const { source, problems } = await decodeBytes('cut.png', bytes.subarray(0, length));
      expect(source).toBeNull();
      expect(problems).toHaveLength(1);
      expect(problems[0]).toMatchObject({ code: 'bytes-picture-broken', severity: 'error' });
      expect(problems[0]!.message).toContain(`ends after ${length} bytes`);
    }
  });

  it('tells a damaged case by its checksum', async () => {
    const bytes = await withCase();
    bytes[Buffer.from(bytes).indexOf('ellipsite-case') + 25]! ^= 0x10;
    const { source, problems } = await decodeBytes('hurt.png', bytes);
    expect(source).toBeNull();
    expect(problems[0]).toMatchObject({ code: 'bytes-picture-broken' });
    expect(problems[0]!.message).toContain('checksum');
  });

  it('says of another picture that there is no case in it', async () => {
    const { source, problems } = await decodeBytes('photo.png', await picture([]));
    expect(source).toBeNull();
    expect(problems[0]).toMatchObject({ code: 'bytes-binary', got: 'a PNG picture without a case in it' });
    expect(problems[0]!.hint).toContain('structure file');
  });

  it('stops at the limit of unpacking', async () => {
    const bytes = await picture([{ keyword: 'ellipsite-case', text: 'x'.repeat(50_000), compressed: true }]);
    const { source, problems } = await decodeBytes('bomb.png', bytes, { maxUnpackedBytes: 20_000 });
    expect(source).toBeNull();
    expect(problems[0]).toMatchObject({ code: 'bytes-too-large' });
  });
});
