import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { newCase } from '#src/case/new-case.ts';
import { parseCase } from '#src/case/parse-case.ts';
import { serialiseCase } from '#src/case/serialise-case.ts';
import { arbitraryNewCase } from '#tests/support/arbitrary-case.ts';

describe('a case file', () => {
  it('gives back what was saved, and saves as the same text', async () => {
    await fc.assert(
      fc.asyncProperty(arbitraryNewCase, async (made) => {
        const document = await newCase(made);
        const text = serialiseCase(document);
        const { case: read, problems } = await parseCase(text);
        expect(problems).toEqual([]);
        expect(read).toEqual(document);
        expect(serialiseCase(read!)).toBe(text);
      }),
      { numRuns: 300 },
    );
  });

  it('saved by any other writer of JSON is the same case', async () => {
    await fc.assert(
      fc.asyncProperty(arbitraryNewCase, async (made) => {
        const document = await newCase(made);
        expect((await parseCase(JSON.stringify(document))).case).toEqual(document);
      }),
    );
  });
});
