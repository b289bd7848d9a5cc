/**
 * SHA-256 (FIPS 180-4) of a text in UTF-8, lower-case hexadecimal. By the browser's own cryptography where it has one; a
 * page that came over plain HTTP from another machine has none, and is served by the few lines below.
 *
 * @example await sha256('abc') // → 'ba7816bf8f01cfea414140de5dae2223b00361a396177a9cb410ff61f20015ad'
 */
export async function sha256(text: string): Promise<string> {
  return sha256OfBytes(new TextEncoder().encode(text));
}

/** The same of bytes. */
export async function sha256OfBytes(bytes: Uint8Array<ArrayBuffer>): Promise<string> {
  const subtle = (globalThis.crypto as Partial<Crypto> | undefined)?.subtle;
  return hexadecimal(subtle ? new Uint8Array(await subtle.digest('SHA-256', bytes)) : plainSha256(bytes));
}

function hexadecimal(bytes: Uint8Array): string {
  return [...bytes].map((byte) => byte.toString(16).padStart(2, '0')).join('');
}

const primes = (count: number): number[] => {
  const found: number[] = [];
  for (let n = 2; found.length < count; n++) if (found.every((prime) => n % prime !== 0)) found.push(n);
  return found;
};

/** First 32 bits of the fractional part (FIPS 180-4, 4.2.2 and 5.3.3). */
const fraction = (x: number): number => Math.floor((x - Math.floor(x)) * 2 ** 32) | 0;
const turned = (x: number, by: number): number => (x >>> by) | (x << (32 - by));

/** SHA-256 without the browser's help. */
export function plainSha256(bytes: Uint8Array): Uint8Array {
  const constants = primes(64).map((prime) => fraction(Math.cbrt(prime)));
  const hash = Int32Array.from(primes(8).map((prime) => fraction(Math.sqrt(prime))));
  const length = (((bytes.length + 8) >> 6) + 1) << 6;
  const padded = new DataView(new ArrayBuffer(length));
  new Uint8Array(padded.buffer).set(bytes);
  padded.setUint8(bytes.length, 0x80);
  padded.setUint32(length - 8, Math.floor(bytes.length / 2 ** 29));
  padded.setUint32(length - 4, (bytes.length << 3) >>> 0);
  const words = new Int32Array(64);
  for (let block = 0; block < length; block += 64) {
    for (let t = 0; t < 16; t++) words[t] = padded.getInt32(block + 4 * t);
    for (let t = 16; t < 64; t++) words[t] = scheduled(words, t);
    compress(hash, words, constants);
  }
  const out = new DataView(new ArrayBuffer(32));
  hash.forEach((word, i) => out.setInt32(4 * i, word));
  return new Uint8Array(out.buffer);
}

function scheduled(words: Int32Array, t: number): number {
  const early = words[t - 15]!;
  const late = words[t - 2]!;
  const small0 = turned(early, 7) ^ turned(early, 18) ^ (early >>> 3);
  const small1 = turned(late, 17) ^ turned(late, 19) ^ (late >>> 10);
  return (small1 + words[t - 7]! + small0 + words[t - 16]!) | 0;
}

function compress(hash: Int32Array, words: Int32Array, constants: readonly number[]): void {
  let [a, b, c, d, e, f, g, h] = hash as unknown as [
    number,
    number,
    number,
    number,
    number,
    number,
    number,
    number,
  ];
  for (let t = 0; t < 64; t++) {
    const big1 = turned(e, 6) ^ turned(e, 11) ^ turned(e, 25);
    const first = (h + big1 + ((e & f) ^ (~e & g)) + constants[t]! + words[t]!) | 0;
    const big0 = turned(a, 2) ^ turned(a, 13) ^ turned(a, 22);
    const second = (big0 + ((a & b) ^ (a & c) ^ (b & c))) | 0;
    [h, g, f, e, d, c, b, a] = [g, f, e, (d + first) | 0, c, b, a, (first + second) | 0];
  }
  [a, b, c, d, e, f, g, h].forEach((word, i) => (hash[i] = (hash[i]! + word) | 0));
}
