import { mkdtempSync, readFileSync, readdirSync, rmSync } from 'node:fs';
import { tmpdir } from 'node:os';
import { join } from 'node:path';
import { gzipSync } from 'node:zlib';
import { afterAll, beforeAll, describe, expect, it, vi } from 'vitest';
import { build } from 'vite';
import { kernelText } from '#src/raster/kernel-text.generated.ts';
import { projectRoot } from './project-files.ts';

const page = mkdtempSync(join(tmpdir(), 'ellipsite-size-'));
const textOf = (name: string): string => readFileSync(join(page, name), 'utf8');

function gzipKilobytes(path: string): number {
  return gzipSync(readFileSync(path)).length / 1000;
}

/** These files, and all they load statically. */
function withImports(names: readonly string[]): string[] {
  const open = [...names];
  const seen = new Set<string>();
  for (let name = open.pop(); name !== undefined; name = open.pop()) {
    if (seen.has(name)) continue;
    seen.add(name);
    for (const match of textOf(name).matchAll(/(?:from|import)\s*["'`]\.\/([^"'`]+\.js)["'`]/g)) {
      open.push(join(name, '..', match[1] ?? ''));
    }
  }
  return [...seen].sort();
}

/** Files the page loads before anything is asked for: what index.html names, and what those name statically. */
function firstLoad(): string[] {
  const html = textOf('index.html');
  const named = [...html.matchAll(/(?:src|href)="\.?\/?([^"]+\.(?:js|css))"/g)];
  return withImports(named.map((match) => match[1] ?? ''));
}

const assets = (): string[] => readdirSync(join(page, 'assets'));

beforeAll(async () => {
  // as npm run build does it: in a test run packages would give their development versions
  vi.stubEnv('NODE_ENV', 'production');
  await build({ root: projectRoot, logLevel: 'error', build: { outDir: page, emptyOutDir: true } });
  vi.unstubAllEnvs();
}, 240_000);

afterAll(() => rmSync(page, { recursive: true, force: true }));

describe('size of the page', () => {
  it('loads at most 60 kB gzip before three.js', () => {
    const names = firstLoad();
    expect(names.length).toBeGreaterThan(0);
    const total =
      gzipKilobytes(join(page, 'index.html')) +
      names.reduce((sum, name) => sum + gzipKilobytes(join(page, name)), 0);
    expect(total).toBeLessThan(60);
    expect(names.map(textOf).join('')).not.toContain('WebGLRenderer');
  });

  // the aim is 300 kB; what step 2 added weighs more, see DEVELOPERS.md: it may not grow unnoticed
  it('weighs at most 430 kB gzip as a whole, the symmetry module and the texts of the samples apart', () => {
    const samples = readdirSync(join(projectRoot, 'samples'))
      .filter((name) => /\.(cif|xyz)$/.test(name))
      .map((name) => name.replace(/\.[^.]*$/, ''));
    const isSample = (name: string) => samples.some((sample) => name.startsWith(`${sample}-`));
    const counted = assets().filter((name) => !isSample(name) && !/^moyo_wasm.*\.wasm$/.test(name));
    expect(counted.length).toBeGreaterThan(5);
    const total = counted.reduce((sum, name) => sum + gzipKilobytes(join(page, 'assets', name)), 0);
    expect(total).toBeLessThan(430);
  });
});

describe('workers', () => {
  const workers = (): string[] => assets().filter((name) => /-worker-[\w-]+\.js$/.test(name));

  it('share their code with the page: the kernel is in one file', () => {
    const part = kernelText.slice(1000, 1100);
    const holders = assets().filter(
      (name) => name.endsWith('.js') && textOf(`assets/${name}`).includes(part),
    );
    expect(holders).toHaveLength(1);
  });

  it('load nothing that needs a document', () => {
    expect(workers().length).toBeGreaterThanOrEqual(3);
    for (const name of withImports(workers().map((worker) => `assets/${worker}`))) {
      expect(textOf(name), name).not.toMatch(
        /\bcustomElements\.define\b|\bdocument\.(?:body|createElement|head)\b/,
      );
    }
  });
});
