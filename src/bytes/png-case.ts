import { countOf } from '#src/base/count-of.ts';
import { caseKeyword } from '#src/base/case-keyword.ts';
import { crc32 } from '#src/base/crc32.ts';
import type { UnpackLimits } from './gunzip.ts';
import { inflate } from './gunzip.ts';

/** What a picture holds of a case. */
export type PngCase =
  | { readonly kind: 'found'; readonly bytes: Uint8Array }
  /** A whole picture without a case. */
  | { readonly kind: 'none' }
  /** Damaged or cut off before the case was whole; in words where. */
  | { readonly kind: 'broken'; readonly reason: string }
  | { readonly kind: 'too-large' };

const signature = [0x89, 0x50, 0x4e, 0x47, 0x0d, 0x0a, 0x1a, 0x0a];

export function looksLikePng(bytes: Uint8Array): boolean {
  return signature.every((byte, index) => bytes[index] === byte);
}

/**
 * The case text in a PNG (ISO/IEC 15948): the first iTXt chunk with our keyword, its checksum compared, unpacked within limits.
 * A picture cut off after it still opens; what doesn't begin with a picture's header is no picture.
 */
export async function pngCase(bytes: Uint8Array, limits: UnpackLimits): Promise<PngCase> {
  if (![0x49, 0x48, 0x44, 0x52].every((letter, k) => bytes[12 + k] === letter)) return { kind: 'none' };
  const view = new DataView(bytes.buffer, bytes.byteOffset, bytes.byteLength);
  for (let at = signature.length; ;) {
    if (at + 12 > bytes.length)
      return { kind: 'broken', reason: `it ends after ${countOf(bytes.length, 'byte')}` };
    const length = view.getUint32(at);
    const type = String.fromCharCode(...bytes.subarray(at + 4, at + 8));
    const end = at + 12 + length;
    if (type === 'IEND') return { kind: 'none' };
    if (end > bytes.length) {
      return {
        kind: 'broken',
        reason: `it ends after ${countOf(bytes.length, 'byte')}, within a piece of ${length}`,
      };
    }
    const data = bytes.subarray(at + 8, end - 4);
    if (type === 'iTXt' && startsWith(data, caseKeyword)) {
      if (crc32(bytes.subarray(at + 4, end - 4)) !== view.getUint32(end - 4)) {
        return { kind: 'broken', reason: 'the checksum of the case in it is wrong' };
      }
      return textIn(data, limits);
    }
    at = end;
  }
}

function startsWith(data: Uint8Array, keyword: string): boolean {
  return [...keyword].every((letter, k) => data[k] === letter.charCodeAt(0)) && data[keyword.length] === 0;
}

/** Keyword, 0, compressed?, method, language, 0, translated keyword, 0, text. */
async function textIn(data: Uint8Array, limits: UnpackLimits): Promise<PngCase> {
  const flags = caseKeyword.length + 1;
  const language = data.indexOf(0, flags + 2);
  const translated = language < 0 ? -1 : data.indexOf(0, language + 1);
  if (translated < 0) return { kind: 'broken', reason: 'the case in it has no text' };
  const text = data.subarray(translated + 1);
  if (data[flags] === 0) return { kind: 'found', bytes: text };
  const unpacked = await inflate(text, limits);
  if (unpacked.stopped === 'broken') return { kind: 'broken', reason: 'the case in it cannot be unpacked' };
  return unpacked.stopped === null ? { kind: 'found', bytes: unpacked.bytes } : { kind: 'too-large' };
}
