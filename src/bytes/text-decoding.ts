import { problem } from '#src/base/problem.ts';
import type { Problem } from '#src/base/problem.ts';
import type { SourceText } from './source-text.ts';

interface Decoded {
  readonly text: string;
  readonly encoding: SourceText['encoding'];
  readonly problems: readonly Problem[];
}

/**
 * Bytes as text: a byte order mark decides first, then strict UTF-8, then UTF-16 without a mark where every other
 * byte of the beginning is zero, and what is left is windows-1252 (W3C Encoding Standard), with a warning that names
 * the first byte that is not UTF-8. Never fails.
 */
export function decodeText(name: string, bytes: Uint8Array): Decoded {
  if (bytes[0] === 0xef && bytes[1] === 0xbb && bytes[2] === 0xbf)
    return decodeBytewise(name, bytes.subarray(3));
  if (bytes[0] === 0xff && bytes[1] === 0xfe) return decodeUtf16(name, bytes.subarray(2), 'utf-16le');
  if (bytes[0] === 0xfe && bytes[1] === 0xff) return decodeUtf16(name, bytes.subarray(2), 'utf-16be');
  const unmarked = unmarkedUtf16(bytes);
  return unmarked === null ? decodeBytewise(name, bytes) : decodeUtf16(name, bytes, unmarked);
}

function decodeBytewise(name: string, bytes: Uint8Array): Decoded {
  try {
    const text = new TextDecoder('utf-8', { fatal: true, ignoreBOM: true }).decode(bytes);
    return { text, encoding: 'utf-8', problems: [] };
  } catch {
    const at = firstInvalidUtf8(bytes);
    const warning = problem(
      'warning',
      'bytes-not-utf8',
      `Byte ${at + 1} is not valid UTF-8; the text was read as windows-1252 (Latin-1).`,
      {
        place: { file: name, line: lineOfByte(bytes, at) },
        got: `byte 0x${(bytes[at] ?? 0).toString(16).padStart(2, '0')}`,
        allowed: 'UTF-8, UTF-16 with a byte order mark, windows-1252',
        hint: 'Names with accents may read wrong; save the file as UTF-8.',
      },
    );
    return { text: decodeWindows1252(bytes), encoding: 'windows-1252', problems: [warning] };
  }
}

function decodeUtf16(name: string, bytes: Uint8Array, encoding: 'utf-16le' | 'utf-16be'): Decoded {
  const whole = bytes.length % 2 === 0 ? bytes : bytes.subarray(0, bytes.length - 1);
  // Byte order is turned by hand: engines built with few locales lack the big-endian decoder.
  const littleEndian = encoding === 'utf-16le' ? whole : swapPairs(whole);
  const text = new TextDecoder('utf-16le', { ignoreBOM: true }).decode(littleEndian);
  const problems =
    whole === bytes
      ? []
      : [
          problem('warning', 'bytes-half-character', 'The text ends in the middle of a UTF-16 character.', {
            place: { file: name, line: 1 },
            hint: 'The file may be cut off.',
          }),
        ];
  return { text, encoding, problems };
}

/** UTF-16 of mainly Latin text has a zero in every other byte; asked of the first 4096 bytes. */
function unmarkedUtf16(bytes: Uint8Array): 'utf-16le' | 'utf-16be' | null {
  const length = Math.min(bytes.length, 4096) & ~1;
  if (length < 8) return null;
  let evenZeros = 0;
  let oddZeros = 0;
  for (let i = 0; i < length; i += 2) {
    if (bytes[i] === 0) evenZeros++;
    if (bytes[i + 1] === 0) oddZeros++;
  }
  const half = length / 2;
  if (oddZeros > 0.7 * half && evenZeros < 0.1 * half) return 'utf-16le';
  if (evenZeros > 0.7 * half && oddZeros < 0.1 * half) return 'utf-16be';
  return null;
}

function swapPairs(bytes: Uint8Array): Uint8Array {
  const swapped = new Uint8Array(bytes.length);
  for (let i = 0; i + 1 < bytes.length; i += 2) {
    swapped[i] = bytes[i + 1]!;
    swapped[i + 1] = bytes[i]!;
  }
  return swapped;
}

/** Characters of bytes 0x80 to 0x9F (W3C Encoding Standard, index windows-1252); unassigned bytes stay C1 controls. */
const upperControls = '€\u0081‚ƒ„…†‡ˆ‰Š‹Œ\u008dŽ\u008f\u0090‘’“”•–—˜™š›œ\u009džŸ';

function decodeWindows1252(bytes: Uint8Array): string {
  const chunk = 1 << 15;
  const units = new Uint16Array(Math.min(chunk, bytes.length));
  const parts: string[] = [];
  for (let start = 0; start < bytes.length; start += chunk) {
    const length = Math.min(chunk, bytes.length - start);
    for (let i = 0; i < length; i++) {
      const byte = bytes[start + i]!;
      units[i] = byte >= 0x80 && byte < 0xa0 ? upperControls.charCodeAt(byte - 0x80) : byte;
    }
    parts.push(String.fromCharCode(...units.subarray(0, length)));
  }
  return parts.join('');
}

/** Index of the first byte that strict UTF-8 (RFC 3629) refuses; the length where all is valid. */
export function firstInvalidUtf8(bytes: Uint8Array): number {
  let i = 0;
  while (i < bytes.length) {
    const length = sequenceLength(bytes, i);
    if (length === 0) return i;
    i += length;
  }
  return bytes.length;
}

/** Length of the well-formed sequence that starts at `i`, 0 where there is none (Unicode, table 3-7). */
function sequenceLength(bytes: Uint8Array, i: number): number {
  const first = bytes[i]!;
  if (first < 0x80) return 1;
  if (first < 0xc2 || first > 0xf4) return 0;
  const length = first < 0xe0 ? 2 : first < 0xf0 ? 3 : 4;
  const second = bytes[i + 1] ?? 0;
  const low = first === 0xe0 ? 0xa0 : first === 0xf0 ? 0x90 : 0x80;
  const high = first === 0xed ? 0x9f : first === 0xf4 ? 0x8f : 0xbf;
  if (second < low || second > high) return 0;
  for (let k = 2; k < length; k++) {
    const next = bytes[i + k] ?? 0;
    if (next < 0x80 || next > 0xbf) return 0;
  }
  return length;
}

/** Line (from 1) of a byte of an 8-bit text. */
function lineOfByte(bytes: Uint8Array, index: number): number {
  let line = 1;
  for (let i = 0; i < index; i++) {
    if (bytes[i] === 10 || (bytes[i] === 13 && bytes[i + 1] !== 10)) line++;
  }
  return line;
}
