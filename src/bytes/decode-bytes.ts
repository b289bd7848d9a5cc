import { countOf, wordFor } from '#src/base/count-of.ts';
import { problem } from '#src/base/problem.ts';
import type { Place, Problem } from '#src/base/problem.ts';
import { binaryKindOf } from './binary-kinds.ts';
import { gunzip, looksGzipped } from './gunzip.ts';
import type { Unpacked, UnpackLimits } from './gunzip.ts';
import { looksLikePng, pngCase } from './png-case.ts';
import { sourceFromText } from './source-from-text.ts';
import type { SourceText } from './source-text.ts';
import { decodeText } from './text-decoding.ts';

/** Bytes turned into a text, or the reason why not. */
export interface DecodedBytes {
  readonly source: SourceText | null;
  readonly problems: Problem[];
}

/** 200 MB unpacked; past 20 MB at most 250 times the packed size. */
export const defaultByteLimits: UnpackLimits = {
  maxUnpackedBytes: 200_000_000,
  maxRatio: 250,
  ratioFromBytes: 20_000_000,
};

/** More NUL characters than this, and than 1 in 100, make a file binary; those that pad its end aside. */
const binaryNulCount = 10;
const binaryNulShare = 0.01;

/**
 * Bytes of a file as one decoded text with its line index: gzip unpacked within limits, other binary formats refused by
 * name, encoding found (strict UTF-8, UTF-16, else windows-1252), single NUL characters turned into spaces. A PNG that holds
 * a case gives the text of that case.
 *
 * Never rejects. Reports `bytes-too-large`, `bytes-unpacks-too-far`, `bytes-gzip-broken`, `bytes-packed-twice`,
 * `bytes-binary`, `bytes-picture-broken`, `bytes-empty`, `bytes-not-utf8`, `bytes-half-character`, `bytes-nul`.
 */
export async function decodeBytes(
  name: string,
  bytes: Uint8Array,
  limits: Partial<UnpackLimits> = {},
): Promise<DecodedBytes> {
  const all = { ...defaultByteLimits, ...limits };
  if (bytes.length > all.maxUnpackedBytes) return refuse(tooLarge(name, bytes.length, all));
  if (looksLikePng(bytes)) return decodePicture(name, bytes, all);
  if (!looksGzipped(bytes)) return decodeUnpacked(name, bytes, []);
  const unpacked = await gunzip(bytes, all);
  const found = unpackProblem(name, bytes.length, unpacked, all);
  if (unpacked.stopped === 'size' || unpacked.stopped === 'ratio' || unpacked.bytes.length === 0) {
    return { source: null, problems: [found ?? emptyFile(name)] };
  }
  if (looksGzipped(unpacked.bytes)) return refuse(packedTwice(name));
  return decodeUnpacked(name, unpacked.bytes, found === null ? [] : [found]);
}

async function decodePicture(name: string, bytes: Uint8Array, limits: UnpackLimits): Promise<DecodedBytes> {
  const found = await pngCase(bytes, limits);
  if (found.kind === 'found') return decodeUnpacked(name, found.bytes, []);
  if (found.kind === 'too-large') return refuse(tooLarge(name, bytes.length, limits));
  if (found.kind === 'broken') return refuse(pictureBroken(name, found.reason));
  return refuse(isBinary(name, 'a PNG picture without a case in it', binaryKindOf(bytes)?.hint ?? ''));
}

function pictureBroken(name: string, reason: string): Problem {
  return problem(
    'error',
    'bytes-picture-broken',
    `The PNG picture is damaged or cut off: ${reason}. No case could be read from it.`,
    {
      place: firstLine(name),
      got: reason,
      allowed: 'a whole picture that was saved with its case',
      hint: 'Fetch the picture again; some mail and chat programs leave out what stands beside the pixels.',
    },
  );
}

function decodeUnpacked(name: string, bytes: Uint8Array, before: readonly Problem[]): DecodedBytes {
  const kind = binaryKindOf(bytes);
  if (kind !== null) return { source: null, problems: [...before, isBinary(name, kind.name, kind.hint)] };
  const { text, encoding, problems } = decodeText(name, bytes);
  const nul = nulCount(text);
  const inside = nul - paddingLength(text);
  if (inside > binaryNulCount && inside > binaryNulShare * text.length) {
    const named = isBinary(name, 'a binary file', 'Open a text file: CIF, XYZ or extended XYZ.');
    return { source: null, problems: [...before, { ...named, got: `${nul} NUL bytes` }] };
  }
  const all = [...before, ...problems];
  if (nul > 0) all.push(nulWarning(name, text, nul));
  // A space keeps every offset where it was.
  const source = sourceFromText(name, nul === 0 ? text : text.replaceAll('\0', ' '), encoding);
  if (source.text.trim() === '') return { source: null, problems: [...all, emptyFile(name)] };
  return { source, problems: all };
}

function nulCount(text: string): number {
  let count = 0;
  for (let at = text.indexOf('\0'); at >= 0; at = text.indexOf('\0', at + 1)) count++;
  return count;
}

/** NUL characters at the very end, where some systems fill up the last record. */
function paddingLength(text: string): number {
  let end = text.length;
  while (end > 0 && text.charCodeAt(end - 1) === 0) end--;
  return text.length - end;
}

function refuse(found: Problem): DecodedBytes {
  return { source: null, problems: [found] };
}

function firstLine(name: string): Place {
  return { file: name, line: 1, column: 1 };
}

function megabytes(bytes: number): string {
  return `${Number((bytes / 1e6).toPrecision(3))} MB`;
}

function tooLarge(name: string, length: number, limits: UnpackLimits): Problem {
  const most = megabytes(limits.maxUnpackedBytes);
  return problem(
    'error',
    'bytes-too-large',
    `The file has ${megabytes(length)}; at most ${most} are read. Nothing was read.`,
    {
      place: firstLine(name),
      got: megabytes(length),
      allowed: `up to ${most}`,
      hint: 'Cut the file down to the structure you need.',
    },
  );
}

function unpackProblem(
  name: string,
  packed: number,
  unpacked: Unpacked,
  limits: UnpackLimits,
): Problem | null {
  if (unpacked.stopped === null) return null;
  const place = firstLine(name);
  const sizes = `${megabytes(packed)} packed, ${megabytes(unpacked.bytes.length)} unpacked so far`;
  if (unpacked.stopped === 'broken') {
    const kept = unpacked.bytes.length > 0;
    return problem(
      'error',
      'bytes-gzip-broken',
      kept
        ? `The gzip file is damaged or cut off; the first ${countOf(unpacked.bytes.length, 'byte')} of its text ${wordFor(unpacked.bytes.length, 'was', 'were')} kept.`
        : 'The gzip file is damaged or cut off; nothing could be unpacked.',
      { place, hint: 'Fetch or pack the file again.' },
    );
  }
  const allowed =
    unpacked.stopped === 'size'
      ? `up to ${megabytes(limits.maxUnpackedBytes)} unpacked`
      : `up to ${limits.maxRatio} times the packed size once past ${megabytes(limits.ratioFromBytes)}`;
  return problem(
    'error',
    unpacked.stopped === 'size' ? 'bytes-too-large' : 'bytes-unpacks-too-far',
    `The gzip file unpacks too far (${sizes}); ${allowed} is read. Nothing was read.`,
    { place, got: sizes, allowed, hint: 'Unpack it yourself and cut it down to the structure you need.' },
  );
}

function packedTwice(name: string): Problem {
  return problem(
    'error',
    'bytes-packed-twice',
    'The gzip file holds another gzip file; only one layer is unpacked.',
    {
      place: firstLine(name),
      hint: 'Unpack it once and open what comes out.',
    },
  );
}

function isBinary(name: string, kind: string, hint: string): Problem {
  return problem('error', 'bytes-binary', `This is ${kind}, not a text; it was not read.`, {
    place: firstLine(name),
    got: kind,
    allowed: 'text (CIF, XYZ, extended XYZ), plain or packed by gzip',
    hint,
  });
}

function emptyFile(name: string): Problem {
  return problem('error', 'bytes-empty', 'The file is empty.', {
    place: firstLine(name),
    hint: 'Check that it was saved or transferred completely.',
  });
}

function nulWarning(name: string, text: string, count: number): Problem {
  const at = text.indexOf('\0');
  const before = text.slice(0, at).split(/\r\n|\r|\n/);
  const column = (before.at(-1)?.length ?? 0) + 1;
  return problem(
    'warning',
    'bytes-nul',
    count === 1 ? 'A NUL character was read as a space.' : `${count} NUL characters were read as spaces.`,
    {
      place: { file: name, line: before.length, column },
      got: `NUL, ${count} in all`,
      hint: 'The file may have been damaged on the way; compare it with the original.',
    },
  );
}
