import { existsSync, readFileSync, readdirSync } from 'node:fs';
import { join } from 'node:path';
import { gzipSync } from 'node:zlib';
import { beforeAll, describe, expect, it } from 'vitest';
import { build } from 'vite';
import { projectRoot } from './project-files.ts';

const page = join(projectRoot, 'dist/page');

function gzipKilobytes(path: string): number {
  return gzipSync(readFileSync(path)).length / 1000;
}

/** Files the page loads before anything is asked for: what index.html names, and what those name statically. */
function firstLoad(): string[] {
  const html = readFileSync(join(page, 'index.html'), 'utf8');
  const open = [...html.matchAll(/(?:src|href)="\.?\/?([^"]+\.(?:js|css))"/g)].map((match) => match[1] ?? '');
  const seen = new Set<string>();
  for (let name = open.pop(); name !== undefined; name = open.pop()) {
    if (seen.has(name)) continue;
    seen.add(name);
    const text = readFileSync(join(page, name), 'utf8');
    for (const match of text.matchAll(/(?:from|import)\s*["']\.\/([^"']+\.js)["']/g)) {
      open.push(join(name, '..', match[1] ?? ''));
    }
  }
  return [...seen].sort();
}

describe('size of the page', () => {
  beforeAll(async () => {
    if (!existsSync(join(page, 'index.html'))) await build({ root: projectRoot, logLevel: 'error' });
  }, 120_000);

  it('loads at most 60 kB gzip before three.js', () => {
    const names = firstLoad();
    expect(names.length).toBeGreaterThan(0);
    const total =
      gzipKilobytes(join(page, 'index.html')) +
      names.reduce((sum, name) => sum + gzipKilobytes(join(page, name)), 0);
    expect(total).toBeLessThan(60);
    const text = names.map((name) => readFileSync(join(page, name), 'utf8')).join('');
    expect(text).not.toContain('WebGLRenderer');
  });

  it('weighs at most 300 kB gzip as a whole, the symmetry module and the texts of the samples apart', () => {
    const samples = readdirSync(join(projectRoot, 'samples')).map((name) => name.replace(/\.[^.]*$/, ''));
    const isSample = (name: string) => samples.some((sample) => name.startsWith(`${sample}-`));
    const assets = readdirSync(join(page, 'assets')).filter(
      (name) => /\.(js|css)$/.test(name) && !isSample(name),
    );
    const total = assets.reduce((sum, name) => sum + gzipKilobytes(join(page, 'assets', name)), 0);
    expect(total).toBeLessThan(300);
  });
});
