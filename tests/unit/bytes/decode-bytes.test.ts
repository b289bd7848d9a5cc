import { deflateRawSync, gzipSync } from 'node:zlib';
import { describe, expect, it } from 'vitest';
import { decodeBytes } from '#src/bytes/decode-bytes.ts';
import { firstInvalidUtf8 } from '#src/bytes/text-decoding.ts';

const bytesOf = (...values: number[]): Uint8Array => Uint8Array.from(values);
const utf8 = (text: string): Uint8Array => new TextEncoder().encode(text);
const latin1 = (text: string): Uint8Array => Uint8Array.from(text, (unit) => unit.charCodeAt(0));

function utf16(text: string, bigEndian: boolean): Uint8Array {
  const bytes = new Uint8Array(text.length * 2);
  for (let i = 0; i < text.length; i++) {
    new DataView(bytes.buffer).setUint16(2 * i, text.charCodeAt(i), !bigEndian);
  }
  return bytes;
}

async function decoded(bytes: Uint8Array): Promise<{ text: string | undefined; codes: string[] }> {
  const { source, problems } = await decodeBytes('a.cif', bytes);
  return { text: source?.text, codes: problems.map(({ code }) => code) };
}

describe('encodings', () => {
  it('reads UTF-8 with and without a byte order mark', async () => {
    expect(await decoded(utf8('data_Å\n'))).toEqual({ text: 'data_Å\n', codes: [] });
    expect(await decoded(utf8('\ufeffdata_Å'))).toEqual({ text: 'data_Å', codes: [] });
  });

  it.each([
    ['utf-16le', false],
    ['utf-16be', true],
  ] as const)('reads %s by its mark, and without one by its zeros', async (encoding, bigEndian) => {
    const text = 'data_quartz\r\n_cell_length_a 4.916 # Å\r\n';
    const marked = await decodeBytes('a', utf16(`\ufeff${text}`, bigEndian));
    expect(marked.source).toMatchObject({ text, encoding });
    const bare = await decodeBytes('a', utf16(text, bigEndian));
    expect(bare.source).toMatchObject({ text, encoding });
  });

  it('says that UTF-16 ends in the middle of a character', async () => {
    const bytes = utf16('\ufeffdata_a ', false).slice(0, -1);
    expect(await decoded(bytes)).toEqual({ text: 'data_a', codes: ['bytes-half-character'] });
  });

  it('falls back to windows-1252 and names line and byte', async () => {
    const { source, problems } = await decodeBytes('old.cif', latin1('data_a\r\n# 4.9 \xc5 \x96 caf\xe9\n'));
    expect(source?.encoding).toBe('windows-1252');
    expect(source?.text).toBe('data_a\r\n# 4.9 Å – café\n');
    expect(problems).toMatchObject([
      { code: 'bytes-not-utf8', line: 2, severity: 'warning', got: 'byte 0xc5' },
    ]);
  });

  it.each([
    ['a lone continuation byte', [0x41, 0x80], 1],
    ['an overlong form', [0xc0, 0xaf], 0],
    ['an overlong form of three', [0xe0, 0x80, 0x80], 0],
    ['a surrogate', [0xed, 0xa0, 0x80], 0],
    ['a number past U+10FFFF', [0xf4, 0x90, 0x80, 0x80], 0],
    ['a cut sequence', [0x41, 0xe2, 0x82], 1],
  ])('finds %s', (_name, bytes, at) => {
    expect(firstInvalidUtf8(Uint8Array.from(bytes))).toBe(at);
    expect(() => new TextDecoder('utf-8', { fatal: true }).decode(Uint8Array.from(bytes))).toThrow();
  });

  it('turns single NUL characters into spaces of the same place', async () => {
    const { source, problems } = await decodeBytes('a.cif', latin1('data_a\n_x\x001\n'));
    expect(source?.text).toBe('data_a\n_x 1\n');
    expect(problems).toMatchObject([{ code: 'bytes-nul', line: 2, column: 3 }]);
  });

  it('takes NUL padding at the end for text, but a file full of NUL for binary', async () => {
    expect((await decoded(latin1(`data_a\n${'\0'.repeat(500)}`))).codes).toEqual(['bytes-nul']);
    const mixed = latin1(Array.from({ length: 100 }, (_, i) => `${i % 7}\0\0\x01`).join(''));
    expect(await decoded(mixed)).toEqual({ text: undefined, codes: ['bytes-binary'] });
  });
});

describe('gzip', () => {
  it('unpacks it', async () => {
    const text = 'data_a\n'.repeat(5000);
    expect(await decoded(gzipSync(text))).toEqual({ text, codes: [] });
  });

  it('stops a bomb at the size limit and names it', async () => {
    const bomb = gzipSync(new Uint8Array(3_000_000));
    const { source, problems } = await decodeBytes('bomb.gz', bomb, { maxUnpackedBytes: 1_000_000 });
    expect(source).toBeNull();
    expect(problems).toMatchObject([{ code: 'bytes-too-large', allowed: 'up to 1 MB unpacked' }]);
  });

  it('stops a bomb at the ratio limit and names it', async () => {
    const bomb = gzipSync(new Uint8Array(3_000_000));
    const limits = { maxRatio: 100, ratioFromBytes: 500_000 };
    const { source, problems } = await decodeBytes('bomb.gz', bomb, limits);
    expect(source).toBeNull();
    expect(problems[0]?.code).toBe('bytes-unpacks-too-far');
    expect(problems[0]?.allowed).toContain('100 times');
  });

  it('keeps what stands before a cut', async () => {
    let seed = 1;
    const line = (): string => `${(seed = (seed * 48271) % 2147483647)}\n`;
    const text = Array.from({ length: 60_000 }, line).join('');
    const packed = gzipSync(text);
    const { source, problems } = await decodeBytes('cut.gz', packed.subarray(0, packed.length * 0.8));
    expect(problems).toMatchObject([{ code: 'bytes-gzip-broken', severity: 'error' }]);
    expect(source?.text.length).toBeGreaterThan(1000);
    expect(text.startsWith(source?.text ?? 'nothing')).toBe(true);
  });

  it('says that nothing came out of a damaged file', async () => {
    expect(await decoded(bytesOf(0x1f, 0x8b, 8, 0, 1, 2, 3))).toEqual({
      text: undefined,
      codes: ['bytes-gzip-broken'],
    });
  });

  it('unpacks one layer only', async () => {
    expect(await decoded(gzipSync(gzipSync('data_a')))).toEqual({
      text: undefined,
      codes: ['bytes-packed-twice'],
    });
  });
});

describe('what is not read', () => {
  it.each([
    ['ZIP', [0x50, 0x4b, 3, 4], /unpack/i],
    ['PNG', [0x89, 0x50, 0x4e, 0x47, 0x0d, 0x0a, 0x1a, 0x0a], /picture/i],
    ['JPEG', [0xff, 0xd8, 0xff, 0xe0], /picture/i],
    ['PDF', [0x25, 0x50, 0x44, 0x46, 0x2d, 0x31], /CIF or XYZ/],
    ['HDF5', [0x89, 0x48, 0x44, 0x46, 0x0d, 0x0a, 0x1a, 0x0a], /extended XYZ/],
    ['XZ', [0xfd, 0x37, 0x7a, 0x58, 0x5a, 0], /unpack/i],
  ])('names %s and says what to do', async (name, start, hint) => {
    const bytes = new Uint8Array(300).fill(1);
    bytes.set(start);
    const { source, problems } = await decodeBytes('a', bytes);
    expect(source).toBeNull();
    expect(problems).toHaveLength(1);
    expect(problems[0]).toMatchObject({ code: 'bytes-binary', severity: 'error', line: 1 });
    expect(problems[0]?.got).toContain(name);
    expect(problems[0]?.hint).toMatch(hint);
  });

  it('finds a tar archive by its header', async () => {
    const bytes = new Uint8Array(512).fill(0x41);
    bytes.set(utf8('ustar'), 257);
    expect((await decoded(bytes)).codes).toEqual(['bytes-binary']);
  });

  it('sees through gzip around a binary file', async () => {
    const inside = bytesOf(0x50, 0x4b, 3, 4, ...deflateRawSync('x'));
    expect((await decoded(gzipSync(inside))).codes).toEqual(['bytes-binary']);
  });

  it('refuses a file over the limit, whose value it states', async () => {
    const { problems } = await decodeBytes('a', new Uint8Array(2000).fill(65), { maxUnpackedBytes: 1000 });
    expect(problems).toMatchObject([{ code: 'bytes-too-large', got: '0.002 MB', allowed: 'up to 0.001 MB' }]);
  });

  it('says that a file is empty', async () => {
    expect((await decoded(new Uint8Array(0))).codes).toEqual(['bytes-empty']);
    expect((await decoded(utf8(' \n '))).codes).toEqual(['bytes-empty']);
    expect((await decoded(gzipSync(''))).codes).toEqual(['bytes-empty']);
  });
});
