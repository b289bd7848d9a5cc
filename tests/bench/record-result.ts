import { mkdirSync, writeFileSync } from 'node:fs';
import { join } from 'node:path';
import { projectRoot } from '#tests/guard/project-files.ts';

/** Ratios by name; a group of them may have names of its own. */
export interface Ratios {
  readonly [name: string]: number | readonly number[] | Ratios;
}

const short = (value: number) => Number(value.toPrecision(3));

function rounded(value: number | readonly number[] | Ratios): unknown {
  if (typeof value === 'number') return short(value);
  if (Array.isArray(value)) return value.map(short);
  return Object.fromEntries(Object.entries(value).map(([name, part]) => [name, rounded(part)]));
}

/** Writes the ratios of one benchmark to tests/bench/results/NAME.json, rounded to three digits. */
export function recordResult(name: string, ratios: Ratios): void {
  const folder = join(projectRoot, 'tests/bench/results');
  mkdirSync(folder, { recursive: true });
  writeFileSync(join(folder, `${name}.json`), `${JSON.stringify(rounded(ratios), null, 2)}\n`);
}
