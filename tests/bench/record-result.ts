import { mkdirSync, writeFileSync } from 'node:fs';
import { join } from 'node:path';
import { projectRoot } from '#tests/guard/project-files.ts';

/** Writes the ratios of one benchmark to tests/bench/results/NAME.json, rounded to three digits. */
export function recordResult(
  name: string,
  ratios: Readonly<Record<string, number | readonly number[]>>,
): void {
  const folder = join(projectRoot, 'tests/bench/results');
  mkdirSync(folder, { recursive: true });
  const short = (value: number) => Number(value.toPrecision(3));
  const rounded = Object.fromEntries(
    Object.entries(ratios).map(([key, value]) => [
      key,
      typeof value === 'number' ? short(value) : value.map(short),
    ]),
  );
  writeFileSync(join(folder, `${name}.json`), `${JSON.stringify(rounded, null, 2)}\n`);
}
