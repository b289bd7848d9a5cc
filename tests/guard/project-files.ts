import { readFileSync, readdirSync, statSync } from 'node:fs';
import { join, relative } from 'node:path';
import { fileURLToPath } from 'node:url';

export const projectRoot = fileURLToPath(new URL('../..', import.meta.url));

const skipped = new Set(['node_modules', 'dist', '.git', 'out', '__screenshots__']);

/** Every file below a folder, as paths from the project's root with forward slashes. */
export function filesBelow(folder: string): string[] {
  const start = join(projectRoot, folder);
  const found: string[] = [];
  const open = [start];
  for (let here = open.pop(); here !== undefined; here = open.pop()) {
    for (const name of readdirSync(here)) {
      if (skipped.has(name)) continue;
      const path = join(here, name);
      if (statSync(path).isDirectory()) open.push(path);
      else found.push(relative(projectRoot, path).split('\\').join('/'));
    }
  }
  return found.sort();
}

export function textOf(path: string): string {
  return readFileSync(join(projectRoot, path), 'utf8');
}

export interface ImportLine {
  readonly specifier: string;
  readonly line: number;
}

const importPattern =
  /(?:^|\n)[^\S\n]*(?:import|export)\b[^'"`;]*?\bfrom\s*['"]([^'"]+)['"]|(?:^|\n)[^\S\n]*import\s*['"]([^'"]+)['"]|\bimport\(\s*['"]([^'"]+)['"]\s*\)|\bnew URL\(\s*['"]([^'"]+\.ts)['"]\s*,\s*import\.meta\.url/g;

/** Static, side-effect, type and dynamic imports of a TypeScript file, and workers named by URL. */
export function importsOf(text: string): ImportLine[] {
  const found: ImportLine[] = [];
  for (const match of text.matchAll(importPattern)) {
    const specifier = match[1] ?? match[2] ?? match[3] ?? match[4];
    if (specifier === undefined) continue;
    const line = text.slice(0, match.index + match[0].length).split('\n').length;
    found.push({ specifier, line });
  }
  return found;
}
