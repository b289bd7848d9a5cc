import { expect, it } from 'vitest';
import { countWatch, partOf } from '#src/base/progress.ts';

it('passes shares of a part on as shares of the whole', () => {
  const told: [number, string][] = [];
  const part = partOf((share, stage) => void told.push([share, stage]), 0.5, 0.75);
  part(0, 'a');
  part(1, 'b');
  expect(told).toEqual([
    [0.5, 'a'],
    [0.75, 'b'],
  ]);
});

it.each([1, 29, 30, 31, 1000, 450_000])('reports a loop of %i rising from 0, at most 30 times', (count) => {
  const told: number[] = [];
  const reached = countWatch(count, 'sites', (share) => void told.push(share));
  for (let index = 0; index < count; index += 1) reached(index);
  expect(told[0]).toBe(0);
  expect(told.length).toBeLessThanOrEqual(30);
  expect(told.length).toBeGreaterThanOrEqual(Math.min(count, 15));
  expect([...told].sort((a, b) => a - b)).toEqual(told);
  expect(told.at(-1)).toBeLessThan(1);
});
