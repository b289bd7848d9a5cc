import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { seededRandom } from '#src/base/seeded-random.ts';
import { arbitraryCif, modelOf } from '#tests/support/arbitrary-cif.ts';
import { readSyntax } from '#tests/support/cif-syntax.ts';
import { writeCif } from '#tests/support/cif-writer.ts';

describe.each(['1.1', '2.0'] as const)('CIF %s', (version) => {
  it.each(['\n', '\r\n', '\r', 'mixed'] as const)(
    'reads back what was written with line ends %j',
    (lineEnd) => {
      fc.assert(
        fc.property(arbitraryCif(version), fc.integer(), (blocks, seed) => {
          const text = writeCif(blocks, { version, lineEnd, random: seededRandom(seed) });
          const { document, problems } = readSyntax(text);
          expect(problems).toEqual([]);
          expect(document.version).toBe(version);
          expect(modelOf(document.blocks)).toEqual(blocks);
        }),
        { numRuns: 150 },
      );
    },
  );

  it('starts each value at the offset it names', () => {
    fc.assert(
      fc.property(arbitraryCif(version), fc.integer(), (blocks, seed) => {
        const text = writeCif(blocks, { version, lineEnd: '\n', random: seededRandom(seed) });
        for (const block of readSyntax(text).document.blocks)
          for (const value of block.items.values()) {
            if (value.kind === 'text' && !value.delimited)
              expect(text.startsWith(value.text, value.offset)).toBe(true);
            else expect('?.\'";[{').toContain(text[value.offset]);
          }
      }),
    );
  });
});
