import { describe, expect, it } from 'vitest';
import { filesBelow, textOf } from './project-files.ts';

interface Limit {
  readonly name: string;
  readonly matches: (path: string) => boolean;
  readonly lines: number;
}

/** First match decides; data tables have no limit. */
const limits: readonly Limit[] = [
  { name: 'data table', matches: (path) => /\.data\.ts$/.test(path), lines: Infinity },
  { name: 'lit element', matches: (path) => path.startsWith('components/'), lines: 350 },
  { name: 'shader', matches: (path) => path.endsWith('.glsl'), lines: 200 },
  { name: 'test', matches: (path) => path.startsWith('tests/'), lines: 500 },
  { name: 'source', matches: (path) => path.startsWith('src/') || path.startsWith('shaders/'), lines: 450 },
];

const files = ['src', 'components', 'shaders', 'tests']
  .flatMap(filesBelow)
  .filter((path) => /\.(ts|mjs|glsl)$/.test(path));

describe('file lengths', () => {
  it('stay within the limits of DEVELOPERS.md', () => {
    const tooLong = files.flatMap((path) => {
      const limit = limits.find(({ matches }) => matches(path));
      const lines = textOf(path).trimEnd().split('\n').length;
      return limit && lines > limit.lines ? [`${path}: ${lines} lines, ${limit.name} ≤ ${limit.lines}`] : [];
    });
    expect(tooLong).toEqual([]);
  });

  it('has no drawer for everything', () => {
    const drawer = /(^|[/-])(utils?|helpers?|misc|common|manager)([/.-]|$)/;
    expect(files.filter((path) => !path.startsWith('tests/') && drawer.test(path))).toEqual([]);
  });

  it('keeps the top level of the design card', () => {
    const folders = new Set(
      filesBelow('.')
        .filter((path) => path.includes('/'))
        .map((path) => path.split('/')[0] ?? '')
        .filter((name) => !name.startsWith('.')),
    );
    expect([...folders].sort()).toEqual(['components', 'samples', 'shaders', 'src', 'tests']);
  });
});
