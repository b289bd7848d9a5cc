import { expect, it } from 'vitest';
import { ProblemLog } from '#src/base/problem.ts';
import { seededRandom } from '#src/base/seeded-random.ts';
import { sourceFromText } from '#src/bytes/source-from-text.ts';
import { parseCif } from '#src/readers/cif/parse.ts';
import { recordResult } from './record-result.ts';

/** The same values as a CIF loop of eight columns and as the JSON a program would keep them in. */
function sameContent(characters: number): { cif: string; json: string; values: number } {
  const names = ['label', 'symbol', 'x', 'y', 'z', 'u', 'flag', 'note'].map((name) => `_site_${name}`);
  const random = seededRandom(1);
  const values: string[] = [];
  const rows: string[] = [];
  for (let length = 0, row = 0; length < characters; row++) {
    const numbers = [random(), random(), random()].map((value) => value.toFixed(5));
    const cells = [`C${row}`, 'C', `${numbers[0]}(${row % 10})`, numbers[1]!, numbers[2]!, '0.021', 'Uani'];
    rows.push([...cells, "'x y'"].join(' '));
    values.push(...cells, 'x y');
    length += rows[row]!.length + 1;
  }
  const cif = `data_x\n_a 1\nloop_\n${names.join('\n')}\n${rows.join('\n')}\n`;
  const document = {
    version: '1.1',
    blocks: [{ name: 'x', items: { _a: '1' }, loops: [{ names, values }] }],
  };
  return { cif, json: JSON.stringify(document), values: values.length };
}

function milliseconds(work: () => void): number {
  const start = performance.now();
  work();
  return performance.now() - start;
}

function median(values: number[]): number {
  return values.sort((a, b) => a - b)[values.length >> 1]!;
}

/** Ratio JSON.parse : parseCif, runs of the two by turns, so that load on the machine hits both. */
function ratio(characters: number, rounds: number): number {
  const { cif, json, values } = sameContent(characters);
  const source = sourceFromText('bench.cif', cif);
  const ratios: number[] = [];
  for (let round = 0; round < rounds; round++) {
    const jsonTime = milliseconds(() => JSON.parse(json));
    const cifTime = milliseconds(() => {
      const { blocks } = parseCif(source, new ProblemLog());
      expect(blocks[0]?.loops[0]?.values.length).toBe(values);
    });
    ratios.push(jsonTime / cifTime);
  }
  return median(ratios);
}

it('row 7: reads 10 MB of CIF at a quarter or more of the speed of JSON.parse on the same content', () => {
  ratio(1e6, 10);
  const sizes = [1e6, 1e7];
  const [small, large] = [ratio(sizes[0]!, 15), ratio(sizes[1]!, 9)];
  recordResult('cif-reading', { sizes, speedAgainstJsonParse: [small, large] });
  expect(large).toBeGreaterThan(0.25);
  expect(large / small).toBeGreaterThan(0.4);
});
