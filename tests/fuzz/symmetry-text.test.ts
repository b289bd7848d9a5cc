import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { isClosed } from '#src/crystal/group.ts';
import { operationsFromHall } from '#src/crystal/hall-symbol.ts';
import { settingFromHall, settingFromHermannMauguin } from '#src/crystal/space-group.ts';
import { allSettings } from '#src/crystal/space-group-settings.ts';
import { formatOperation, parseOperation } from '#src/crystal/symmetry-operation.ts';

const characters = [...'xyzXYZ+-/.,0123456789 ()"\'*=_:~{}[]abcnmdePABCIRFHSZ\u2212\t\n?'];
const noise = fc.string({ unit: fc.constantFrom(...characters), maxLength: 40 });

/** A real symbol with one stretch replaced by noise. */
const damaged = (symbols: readonly string[]) =>
  fc
    .tuple(
      fc.constantFrom(...symbols),
      fc.nat(),
      fc.nat(3),
      fc.string({ unit: fc.constantFrom(...characters), maxLength: 3 }),
    )
    .map(([symbol, place, removed, put]) => {
      const at = place % (symbol.length + 1);
      return symbol.slice(0, at) + put + symbol.slice(at + removed);
    });

const halls = allSettings().map(({ hall }) => hall);
const symbols = allSettings().flatMap(({ hermannMauguinShort, hermannMauguinFull }) => [
  hermannMauguinShort,
  hermannMauguinFull,
]);

describe('symmetry texts of any content', () => {
  it('are operations or nothing', () => {
    fc.assert(
      fc.property(fc.oneof(noise, damaged(['-x+1/2,y,-z+1/4', 'x-y,x,z+5/6']), fc.string()), (text) => {
        const operation = parseOperation(text);
        if (operation) expect(parseOperation(formatOperation(operation))).not.toBeNull();
      }),
      { numRuns: 2000 },
    );
  });

  it('are whole groups or nothing as Hall symbols', () => {
    fc.assert(
      fc.property(fc.oneof(noise, damaged(halls), fc.string()), (text) => {
        const operations = operationsFromHall(text);
        settingFromHall(text);
        if (operations)
          expect(isClosed(operations)).toMatchObject({ closed: true, hasIdentity: true, duplicates: [] });
      }),
      { numRuns: 500 },
    );
  });

  it('are whole groups or nothing as Hermann–Mauguin symbols', () => {
    fc.assert(
      fc.property(fc.oneof(noise, damaged(symbols), fc.string()), (text) => {
        const match = settingFromHermannMauguin(text);
        if (match)
          expect(isClosed(match.operations)).toMatchObject({
            closed: true,
            hasIdentity: true,
            duplicates: [],
          });
      }),
      { numRuns: 500 },
    );
  });

  it('of great length are answered at once', () => {
    for (const piece of ['x', 'x+', '2', '(', '((', '-', ' ', 'P 21/c', "'", '{', 'a,']) {
      const long = piece.repeat(100_000);
      expect(parseOperation(long)).toBeNull();
      expect(operationsFromHall(long)).toBeNull();
      expect(settingFromHermannMauguin(long)).toBeNull();
    }
  });
});
