import { dirname, posix } from 'node:path';
import { describe, expect, it } from 'vitest';
import { filesBelow, importsOf, textOf } from './project-files.ts';

/** DEVELOPERS.md's table as data: folder → folders of ours it may import. A folder may always import itself. */
const mayImport: Readonly<Record<string, readonly string[]>> = {
  'src/base': [],
  'src/data': ['src/base'],
  'src/bytes': ['src/base'],
  'src/crystal': ['src/base', 'src/data'],
  'src/tensor': ['src/base', 'src/data', 'src/crystal'],
  'src/readers': ['src/base', 'src/data', 'src/bytes', 'src/crystal', 'src/tensor'],
  'src/attach': ['src/base', 'src/crystal', 'src/tensor'],
  'src/dossier': ['src/base', 'src/data', 'src/crystal', 'src/tensor', 'src/attach'],
  'src/scene': ['src/base', 'src/data', 'src/dossier'],
  'src/table': ['src/base', 'src/dossier'],
  'src/case': ['src/base', 'src/tensor', 'src/dossier', 'src/scene', 'src/table'],
  'src/raster': ['src/base', 'src/scene'],
  'src/figure': ['src/base', 'src/scene', 'src/raster', 'src/table', 'src/case'],
  'src/render': ['src/base', 'src/scene', 'src/raster', 'shaders'],
  'src/store': [
    ...['src/base', 'src/data', 'src/bytes', 'src/crystal', 'src/tensor', 'src/readers'],
    ...['src/attach', 'src/dossier', 'src/scene', 'src/table', 'src/case'],
  ],
  'src/cli': [
    ...['src/base', 'src/data', 'src/bytes', 'src/crystal', 'src/tensor', 'src/readers'],
    ...['src/attach', 'src/dossier', 'src/scene', 'src/case', 'src/raster', 'src/figure'],
  ],
  components: ['src/store', 'src/scene', 'src/table', 'src/render', 'src/figure', 'samples'],
  shaders: [],
};

/** Packages that live in one folder only. */
const packageHomes: readonly { readonly name: RegExp; readonly homes: readonly string[] }[] = [
  { name: /^three($|\/)/, homes: ['src/render'] },
  { name: /^lit($|\/)/, homes: ['components'] },
  { name: /^node:/, homes: ['src/cli'] },
  { name: /^gl-matrix($|\/)/, homes: ['src/scene', 'src/render'] },
  { name: /^@spglib\/moyo-wasm/, homes: ['src/crystal', 'src/store', 'src/cli'] },
];

const browserHomes = ['components', 'src/render'];

function homeOf(path: string): string {
  const parts = path.split('/');
  return parts[0] === 'src' ? parts.slice(0, 2).join('/') : (parts[0] ?? '');
}

/** Path from the project's root of an import of ours; null for a package. */
function targetOf(importer: string, specifier: string): string | null {
  const bare = specifier.split('?')[0] ?? specifier;
  if (bare.startsWith('#')) return bare.slice(1);
  if (bare.startsWith('.')) return posix.normalize(posix.join(dirname(importer), bare));
  return null;
}

const sources = ['src', 'components', 'shaders'].flatMap(filesBelow).filter((path) => path.endsWith('.ts'));

/** Every broken rule of one file, as sentences. */
function brokenRules(path: string, text: string): string[] {
  const home = homeOf(path);
  const allowed = mayImport[home];
  if (!allowed) return [`${path}: folder ${home} is not in the import table`];
  const broken: string[] = [];
  for (const { specifier, line } of importsOf(text)) {
    const target = targetOf(path, specifier);
    if (target === null) {
      const rule = packageHomes.find(({ name }) => name.test(specifier));
      if (rule && !rule.homes.includes(home))
        broken.push(`${path}:${line} ${specifier} lives in ${rule.homes}`);
      continue;
    }
    const targetHome = homeOf(target);
    if (targetHome !== home && !allowed.includes(targetHome)) {
      broken.push(`${path}:${line} ${home} may not import ${targetHome}`);
    }
    if (targetHome !== home && specifier.startsWith('.')) {
      broken.push(`${path}:${line} ${specifier} crosses folders: write #${target}`);
    }
  }
  return broken;
}

/** Cycles of value and type imports among files, each as the path that closes it. */
function cycles(graph: ReadonlyMap<string, readonly string[]>): string[] {
  const state = new Map<string, 'open' | 'done'>();
  const found: string[] = [];
  const visit = (path: string, trail: readonly string[]): void => {
    if (state.get(path) === 'done') return;
    if (state.get(path) === 'open') {
      found.push([...trail.slice(trail.indexOf(path)), path].join(' → '));
      return;
    }
    state.set(path, 'open');
    for (const next of graph.get(path) ?? []) visit(next, [...trail, path]);
    state.set(path, 'done');
  };
  for (const path of graph.keys()) visit(path, []);
  return found;
}

describe('who may import whom', () => {
  it('finds the sources', () => {
    expect(sources.length).toBeGreaterThan(15);
  });

  it('keeps the table', () => {
    expect(sources.flatMap((path) => brokenRules(path, textOf(path)))).toEqual([]);
  });

  it('sees a broken rule when there is one', () => {
    expect(brokenRules('src/base/x.ts', "import { a } from '#src/crystal/lattice.ts';")).toHaveLength(1);
    expect(brokenRules('src/scene/x.ts', "import type { Mesh } from 'three';")).toHaveLength(1);
    expect(brokenRules('src/tensor/x.ts', "import { b } from '../base/matrix3.ts';")).toHaveLength(1);
    expect(brokenRules('src/store/x.ts', "const x = await import('node:fs');")).toHaveLength(1);
  });

  it('has no cycles', () => {
    const graph = new Map(
      sources.map((path) => [
        path,
        importsOf(textOf(path)).flatMap(({ specifier }) => targetOf(path, specifier) ?? []),
      ]),
    );
    expect(cycles(graph)).toEqual([]);
  });

  it('sees a cycle when there is one', () => {
    const graph = new Map([
      ['a', ['b']],
      ['b', ['c']],
      ['c', ['a']],
    ]);
    expect(cycles(graph)).toEqual(['a → b → c → a']);
  });

  it('touches document and window only where pictures are made', () => {
    const plain = (text: string) => text.replace(/\/\*[\s\S]*?\*\/|\/\/.*$|'[^'\n]*'|`[^`]*`/gm, '');
    const usesGlobal = (text: string, name: string) =>
      new RegExp(`\\b${name}\\.\\w`).test(text) &&
      !new RegExp(`\\b(?:const|let) ${name}\\b|\\b${name}: \\w`).test(text);
    const found = sources
      .filter((path) => !browserHomes.includes(homeOf(path)))
      .filter((path) => ['document', 'window'].some((name) => usesGlobal(plain(textOf(path)), name)));
    expect(found).toEqual([]);
  });

  it('exports nothing by default', () => {
    expect(sources.filter((path) => /^export default/m.test(textOf(path)))).toEqual([]);
  });
});
