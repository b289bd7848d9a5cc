import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { jsonFault } from '#src/case/json-text.ts';
import { newCase } from '#src/case/new-case.ts';
import { parseCase } from '#src/case/parse-case.ts';
import { serialiseCase } from '#src/case/serialise-case.ts';
import { changedText, everyDecision } from '#tests/support/every-decision.ts';

const text = serialiseCase(await newCase(everyDecision));

function isJson(candidate: string): boolean {
  try {
    JSON.parse(candidate);
    return true;
  } catch {
    return false;
  }
}

describe('any text as a case', () => {
  it('is opened or refused with a reason, never thrown back', async () => {
    const damaged = fc
      .tuple(fc.nat(text.length), fc.nat(40), fc.string({ maxLength: 4 }))
      .map(([at, gone, put]) => text.slice(0, at) + put + text.slice(at + gone));
    const swapped = fc
      .tuple(fc.constantFrom('title', 'decisions', 'views', 'sources', 'version'), fc.jsonValue())
      .map(([key, value]) => changedText(text, (document) => ({ ...document, [key]: value })));
    await fc.assert(
      fc.asyncProperty(fc.oneof(damaged, swapped, fc.string(), fc.json()), async (candidate) => {
        const { case: read, problems } = await parseCase(candidate);
        if (read === null) expect(problems.some(({ severity }) => severity === 'error')).toBe(true);
        else expect((await parseCase(serialiseCase(read))).problems).toEqual([]);
      }),
      { numRuns: 500 },
    );
  });

  it('has a fault exactly where JSON.parse refuses it', () => {
    const bits = fc.constantFrom(
      '{',
      '}',
      '[',
      ']',
      ',',
      ':',
      '"a"',
      '1',
      '-',
      '.5',
      'e3',
      'null',
      ' ',
      '\n',
      '"',
    );
    const pieces = fc.array(bits, { maxLength: 12 }).map((some) => some.join(''));
    fc.assert(
      fc.property(fc.oneof(pieces, fc.json(), fc.string()), (candidate) => {
        expect(jsonFault(candidate) === null).toBe(isJson(candidate));
      }),
      { numRuns: 3000 },
    );
  });
});
