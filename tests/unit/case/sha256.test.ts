import { createHash } from 'node:crypto';
import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { plainSha256, sha256 } from '#src/case/sha256.ts';

const hex = (bytes: Uint8Array): string => Buffer.from(bytes).toString('hex');

describe('SHA-256', () => {
  // FIPS 180-4, examples of the standard: "abc", the empty message, the message of two blocks.
  it.each([
    ['abc', 'ba7816bf8f01cfea414140de5dae2223b00361a396177a9cb410ff61f20015ad'],
    ['', 'e3b0c44298fc1c149afbf4c8996fb92427ae41e4649b934ca495991b7852b855'],
    [
      'abcdbcdecdefdefgefghfghighijhijkijkljklmklmnlmnomnopnopq',
      '248d6a61d20638b8e5c026930c3e6039a33ce45964ff2167f6ecedd419db06c1',
    ],
  ])('of %s is that of the standard', async (message, digest) => {
    expect(await sha256(message)).toBe(digest);
    expect(hex(plainSha256(new TextEncoder().encode(message)))).toBe(digest);
  });

  it('without the browser’s help is that of another library', () => {
    fc.assert(
      fc.property(fc.uint8Array({ maxLength: 300 }), (bytes) => {
        expect(hex(plainSha256(bytes))).toBe(createHash('sha256').update(bytes).digest('hex'));
      }),
    );
  });
});
