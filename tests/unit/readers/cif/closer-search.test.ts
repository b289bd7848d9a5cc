import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { CloserSearch } from '#src/readers/cif/closer-search.ts';

describe('CloserSearch', () => {
  it('finds what a plain search finds, in whatever order it is asked', () => {
    const text = fc.string({ unit: fc.constantFrom('\n', ';', "'", 'x'), maxLength: 60 });
    fc.assert(
      fc.property(text, fc.array(fc.nat(70), { maxLength: 20 }), (content, offsets) => {
        for (const closer of ['\n;', "'''"] as const) {
          const search = new CloserSearch(content, closer);
          for (const offset of offsets) {
            const from = Math.min(offset, content.length);
            expect(search.after(from)).toBe(content.indexOf(closer, from));
          }
        }
      }),
    );
  });
});
