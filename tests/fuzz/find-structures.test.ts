import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { structureFinder } from '#src/readers/text/find-structures.ts';
import { tokenise } from '#src/readers/text/tokenise.ts';
import { unfinishedFinder } from '#src/readers/text/unfinished-lines.ts';

/** Pieces that finders of structures look for, in senseless order. */
const piece = fc.oneof(
  fc.constantFrom(
    'Si',
    'O1',
    'T',
    'Bq',
    'fractional',
    'coordinates',
    'lattice',
    'vectors',
    'alat',
    '(Å)',
    'bohr',
    'a',
    'alpha',
  ),
  fc.constantFrom(
    '=',
    ':',
    '(',
    ')',
    '|',
    '1',
    '2',
    '0',
    '1e300',
    '-0.5',
    '90.0',
    '4.2',
    '*****',
    'N/A',
    'types',
    'not converged',
    '',
  ),
  fc.double({ noNaN: false }).map(String),
  fc.string({ maxLength: 6 }),
);
const line = fc.array(piece, { maxLength: 12 }).map((pieces) => pieces.join(' '));
/** The same line a few times over, so that tables come about. */
const text = fc
  .array(fc.tuple(line, fc.integer({ min: 1, max: 5 })), { maxLength: 30 })
  .map((parts) => parts.flatMap(([one, times]) => Array<string>(times).fill(one)));

describe('structures in senseless text', () => {
  it('never throws, and what comes back is whole', () => {
    fc.assert(
      fc.property(text, (lines) => {
        const finder = structureFinder();
        const unfinished = unfinishedFinder('log.txt');
        lines.forEach((one, i) => {
          finder.take(tokenise(one, i + 1));
          unfinished.take(tokenise(one, i + 1));
        });
        unfinished.finish();
        const found = finder.finish();
        expect(structuredClone(found)).toEqual(found);
        for (const structure of found) {
          expect(structure.atoms.length).toBeGreaterThan(0);
          for (const { fractional, cartesian } of structure.atoms) {
            expect([...(fractional ?? []), ...(cartesian ?? [])].every(Number.isFinite)).toBe(true);
          }
        }
      }),
      { numRuns: 400 },
    );
  });
});
