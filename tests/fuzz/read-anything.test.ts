import { readdirSync, readFileSync } from 'node:fs';
import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import type { Problem } from '#src/base/problem.ts';
import { decodeBytes } from '#src/bytes/decode-bytes.ts';
import { lineCount, lineText, sourceFromText } from '#src/bytes/source-from-text.ts';
import type { SourceText } from '#src/bytes/source-text.ts';
import { readText } from '#src/readers/read.ts';
import type { Reading } from '#src/readers/reading.ts';
import { readXyz } from '#src/readers/xyz/read-xyz.ts';

const samples = new URL('../../samples/', import.meta.url);
const filesIn = (folder: string): string[] =>
  readdirSync(new URL(folder, samples), { withFileTypes: true })
    .filter((entry) => entry.isFile() && /\.(cif|xyz|gz)$/.test(entry.name))
    .map(({ name }) => `${folder}${name}`);
const bytesOf = (name: string): Uint8Array => new Uint8Array(readFileSync(new URL(name, samples)));
const texts = [...filesIn('./'), ...filesIn('formats/'), ...filesIn('hostile/')]
  .filter((name) => /\.(cif|xyz)$/.test(name))
  .map((name) => bytesOf(name))
  .filter(({ length }) => length < 4000)
  .map((bytes) => new TextDecoder('latin1').decode(bytes));
const extended = texts.filter((text) => /^\s*\d+\s*[\r\n]/.test(text));

function assertProblems(problems: readonly Problem[], source: SourceText | null): void {
  for (const found of problems) {
    expect(found.code).toMatch(/^[a-z][a-z0-9-]+$/);
    expect(found.message.length).toBeGreaterThan(8);
    expect(['error', 'warning', 'note']).toContain(found.severity);
    if (source === null || found.line === null) continue;
    expect(found.line).toBeGreaterThanOrEqual(1);
    expect(found.line, found.code).toBeLessThanOrEqual(lineCount(source));
    if (found.column === null) continue;
    expect(found.column).toBeGreaterThanOrEqual(1);
    expect(found.column, found.code).toBeLessThanOrEqual(lineText(source, found.line - 1).length + 1);
  }
}

/** What must hold of any reading, whatever was read. */
function assertReading(reading: Reading, source: SourceText): void {
  assertProblems(reading.problems, source);
  if (reading.structures.length === 0 && reading.tensorSets.length === 0) {
    expect(reading.problems.some(({ severity }) => severity === 'error')).toBe(true);
  }
  for (const { sites, lattice, symmetry } of reading.structures) {
    expect(symmetry.operations.length).toBeGreaterThan(0);
    sites.forEach((site, index) => {
      expect(site.index).toBe(index);
      expect(site.cartesian.every(Number.isFinite)).toBe(true);
      expect(site.fractional === null).toBe(lattice === null);
      expect(site.fractional?.every(Number.isFinite) ?? true).toBe(true);
      expect(site.place.line).toBeLessThanOrEqual(lineCount(source));
    });
  }
  for (const { entries, structureIndex } of reading.tensorSets) {
    const atoms = structureIndex === null ? 0 : reading.structures[structureIndex]!.sites.length;
    for (const { tensor, atomIndex, place } of entries) {
      expect(tensor.every(Number.isFinite)).toBe(true);
      expect(tensor).toHaveLength(9);
      if (atomIndex !== null) expect(atomIndex).toBeLessThan(atoms);
      expect(place.line).toBeLessThanOrEqual(lineCount(source));
    }
  }
  for (const { structureIndex } of reading.proposals) expect(structureIndex).toBeGreaterThanOrEqual(0);
}

function readAndAssert(text: string): void {
  const source = sourceFromText('fuzz', text);
  assertReading(readText(source), source);
  const asXyz = readXyz(source);
  assertReading(asXyz, source);
  expect(structuredClone(asXyz)).toEqual(asXyz);
}

describe('texts', () => {
  it('cut anywhere are read without a fault', () => {
    fc.assert(
      fc.property(fc.constantFrom(...texts), fc.double({ min: 0, max: 1, noNaN: true }), (text, share) => {
        readAndAssert(text.slice(0, Math.floor(share * text.length)));
      }),
      { numRuns: 150 },
    );
  });

  it('cut at every place of one extended XYZ are read without a fault', () => {
    const text = extended.find((one) => one.includes('efg_unit')) ?? '';
    expect(text.length).toBeGreaterThan(100);
    for (let end = 0; end <= text.length; end++) readAndAssert(text.slice(0, end));
  });

  it('with parts taken out, doubled or replaced are read without a fault', () => {
    const piece = fc.constantFrom(
      ...[
        '"',
        "'",
        '[',
        ']',
        '{',
        '}',
        '=',
        ':',
        '\n',
        '\r',
        '\0',
        ' ',
        '\t',
        '-',
        '.',
        '1e400',
        'nan',
        '0',
        '999999999',
      ],
      ...[
        'Lattice="',
        'Properties=',
        'data_',
        'loop_',
        '_atom_site_label',
        ';',
        '\n;\n',
        '#',
        '\u2212',
        '\ufeff',
        '😀',
        '\ud800',
      ],
    );
    const edit = fc.record({ at: fc.double({ min: 0, max: 1, noNaN: true }), gone: fc.nat(40), piece });
    fc.assert(
      fc.property(
        fc.constantFrom(...texts),
        fc.array(edit, { minLength: 1, maxLength: 8 }),
        (text, edits) => {
          const changed = edits.reduce((before, { at, gone, piece: added }) => {
            const place = Math.floor(at * before.length);
            return before.slice(0, place) + added + before.slice(place + gone);
          }, text);
          readAndAssert(changed);
        },
      ),
      { numRuns: 250 },
    );
  });

  it('made of scraps of both formats are read without a fault', () => {
    const lines = texts.flatMap((text) => text.split(/\r\n|\r|\n/)).filter((line) => line.length < 500);
    const mixture = fc.array(fc.constantFrom(...lines), { maxLength: 40 }).map((parts) => parts.join('\n'));
    fc.assert(fc.property(mixture, readAndAssert), { numRuns: 150 });
  });

  it('of random characters are read without a fault', () => {
    fc.assert(fc.property(fc.string({ unit: 'binary', maxLength: 300 }), readAndAssert), { numRuns: 150 });
  });
});

describe('bytes', () => {
  it('of any kind become a text or a problem', async () => {
    const start = fc.constantFrom(
      [],
      [0x1f, 0x8b, 8, 0],
      [0xff, 0xfe],
      [0xfe, 0xff],
      [0xef, 0xbb, 0xbf],
      [0x50, 0x4b],
    );
    const bytes = fc
      .tuple(start, fc.uint8Array({ maxLength: 400 }))
      .map(([first, rest]) => Uint8Array.from([...first, ...rest]));
    await fc.assert(
      fc.asyncProperty(bytes, async (given) => {
        const { source, problems } = await decodeBytes('fuzz', given);
        assertProblems(problems, source);
        if (source === null) expect(problems.some(({ severity }) => severity === 'error')).toBe(true);
        else assertReading(readText(source), source);
      }),
      { numRuns: 150 },
    );
  });

  it('of a damaged gzip file become a text or a problem', async () => {
    const packed = bytesOf('formats/packed.cif.gz');
    await fc.assert(
      fc.asyncProperty(fc.nat(packed.length - 1), fc.nat(255), async (at, value) => {
        const damaged = packed.slice();
        damaged[at] = value;
        const { source, problems } = await decodeBytes('fuzz.gz', damaged);
        assertProblems(problems, source);
        if (source !== null) assertReading(readText(source), source);
      }),
      { numRuns: 150 },
    );
  });
});
