/** A kind of file that holds no readable text, with what the user can do about it. */
export interface BinaryKind {
  /** With its article, as it stands in a sentence. */
  readonly name: string;
  readonly hint: string;
}

interface Signature extends BinaryKind {
  /** First bytes; -1 matches any byte. */
  readonly bytes: readonly number[];
}

const unpack = 'Unpack it and open the files inside.';
const picture = 'A picture holds no coordinates; open the structure file it was made from.';
const archive = (name: string, ...bytes: number[]): Signature => ({ name, hint: unpack, bytes });
const image = (name: string, ...bytes: number[]): Signature => ({ name, hint: picture, bytes });

/** First bytes of common binary formats, as their published specifications give them. */
const signatures: readonly Signature[] = [
  archive('a ZIP archive (or an office document, which is one)', 0x50, 0x4b, 0x03, 0x04),
  archive('an empty ZIP archive', 0x50, 0x4b, 0x05, 0x06),
  archive('a bzip2 file', 0x42, 0x5a, 0x68, -1, 0x31, 0x41, 0x59, 0x26, 0x53, 0x59),
  archive('an XZ file', 0xfd, 0x37, 0x7a, 0x58, 0x5a, 0x00),
  archive('a Zstandard file', 0x28, 0xb5, 0x2f, 0xfd),
  archive('a 7z archive', 0x37, 0x7a, 0xbc, 0xaf, 0x27, 0x1c),
  archive('a RAR archive', 0x52, 0x61, 0x72, 0x21, 0x1a, 0x07),
  {
    name: 'a PNG picture',
    hint: 'Only pictures saved here with their case open again; open the structure file it was made from.',
    bytes: [0x89, 0x50, 0x4e, 0x47, 0x0d, 0x0a, 0x1a, 0x0a],
  },
  image('a JPEG picture', 0xff, 0xd8, 0xff),
  image('a GIF picture', 0x47, 0x49, 0x46, 0x38),
  image('a TIFF picture', 0x49, 0x49, 0x2a, 0x00),
  image('a TIFF picture', 0x4d, 0x4d, 0x00, 0x2a),
  image('a WebP picture or a sound', 0x52, 0x49, 0x46, 0x46),
  {
    name: 'a PDF document',
    hint: 'Numbers cannot be taken from a PDF; open the CIF or XYZ file deposited with it.',
    bytes: [0x25, 0x50, 0x44, 0x46, 0x2d],
  },
  {
    name: 'an HDF5 container',
    hint: 'Write the structure and its tensors as CIF or extended XYZ from the program that made it.',
    bytes: [0x89, 0x48, 0x44, 0x46, 0x0d, 0x0a, 0x1a, 0x0a],
  },
  {
    name: 'an old office document',
    hint: 'Save the table in it as plain text.',
    bytes: [0xd0, 0xcf, 0x11, 0xe0, 0xa1, 0xb1, 0x1a, 0xe1],
  },
  {
    name: 'a program (ELF)',
    hint: 'Open the text file it wrote instead.',
    bytes: [0x7f, 0x45, 0x4c, 0x46],
  },
];

/** What the first bytes say the file is, null where they match no known binary format. */
export function binaryKindOf(bytes: Uint8Array): BinaryKind | null {
  const found = signatures.find((signature) =>
    signature.bytes.every((byte, index) => byte === -1 || bytes[index] === byte),
  );
  if (found !== undefined) return { name: found.name, hint: found.hint };
  if (isTapeArchive(bytes)) return { name: 'a tar archive', hint: unpack };
  return null;
}

/** The POSIX header carries `ustar` at byte 257. */
function isTapeArchive(bytes: Uint8Array): boolean {
  return [0x75, 0x73, 0x74, 0x61, 0x72].every((byte, index) => bytes[257 + index] === byte);
}
