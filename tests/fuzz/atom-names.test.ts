import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { elementFromLabel, elementOf, elements } from '#src/data/elements.ts';
import { parseMixture, parseSpecies } from '#src/data/species.ts';

const piece = fc.constantFrom(
  ...elements.map(({ symbol }) => symbol),
  ...'0 1 2 3 + - . , / ( ) 0.5 .25 OH H2O va val D T wat x ? _ \u2212 \u0000'.split(' '),
  ' ',
);
const madeUp = fc.oneof(
  fc.string(),
  fc.array(piece, { maxLength: 8 }).map((parts) => parts.join('')),
);

describe('atom names of any kind', () => {
  it('give an element of the table or nothing', () => {
    fc.assert(
      fc.property(madeUp, (text) => {
        const label = elementFromLabel(text);
        if (label) expect(elementOf(label.element)?.symbol).toBe(label.element);
        const single = parseSpecies(text);
        if (single) expect(elementOf(single.element)?.symbol).toBe(single.element);
        if (single?.charge) expect(Number.isFinite(single.charge)).toBe(true);
        const mixture = parseMixture(text);
        for (const { element, share } of mixture?.species ?? []) {
          expect(elementOf(element)?.symbol).toBe(element);
          expect(share).toBeGreaterThanOrEqual(0);
        }
      }),
      { numRuns: 3000 },
    );
  });

  it('are refused when they are longer than any type', () => {
    for (const text of ['A+1'.repeat(1e5), 'Si'.repeat(1e5), '('.repeat(1e6), '1'.repeat(1e6)]) {
      expect(parseSpecies(text)).toBeNull();
      expect(parseMixture(text)).toBeNull();
    }
  });

  it('read every symbol with every charge back', () => {
    fc.assert(
      fc.property(fc.constantFrom(...elements), fc.integer({ min: -8, max: 8 }), ({ symbol }, charge) => {
        const text = `${symbol}${Math.abs(charge)}${charge < 0 ? '-' : '+'}`;
        expect(parseSpecies(text)).toEqual({ element: symbol, charge, massNumber: null, hydrogens: 0 });
      }),
    );
  });
});
