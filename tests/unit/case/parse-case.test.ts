import { describe, expect, it } from 'vitest';
import { looksLikeCase } from '#src/case/case-document.ts';
import { newCase } from '#src/case/new-case.ts';
import { mostCaseCharacters, parseCase } from '#src/case/parse-case.ts';
import { serialiseCase } from '#src/case/serialise-case.ts';
import { defaultSettings } from '#src/dossier/default-settings.ts';
import { defaultSceneOptions } from '#src/scene/scene-options.ts';
import { changedText, everyDecision } from '#tests/support/every-decision.ts';

const text = serialiseCase(await newCase(everyDecision));

/** Replaces what stands at a dotted path; `undefined` takes it out, as JSON does. */
function withValue(path: string, value: unknown): string {
  return changedText(text, (document) => {
    const keys = path.split('.');
    const last = keys.pop()!;
    let held = document;
    for (const key of keys) held = held[key] as Record<string, unknown>;
    held[last] = value;
    return document;
  });
}

describe('the text of a case', () => {
  it('begins with what it is, has a key a line and ends in a line feed', () => {
    const lines = text.split('\n');
    expect(lines.slice(0, 4)).toEqual([
      '{',
      '  "schema": "ellipsite/case",',
      '  "version": 1,',
      '  "title": "every decision",',
    ]);
    expect(text).toContain('\n      "range": [\n        [0, 0, 0],\n        [1, 1, 1]\n      ],');
    expect(lines.at(-1)).toBe('');
  });

  it('does not depend on the order in which keys were set', async () => {
    const document = await newCase(everyDecision);
    const shuffled = Object.fromEntries(Object.entries(document).reverse()) as unknown as typeof document;
    const { settings } = document.decisions;
    const turned = Object.fromEntries(Object.entries(settings).reverse()) as unknown as typeof settings;
    expect(serialiseCase({ ...shuffled, decisions: { ...document.decisions, settings: turned } })).toBe(text);
  });

  it('changes in one line with one decision', async () => {
    const settings = { ...everyDecision.decisions!.settings!, symmetry: 'none' as const };
    const other = serialiseCase(
      await newCase({ ...everyDecision, decisions: { ...everyDecision.decisions, settings } }),
    );
    const [before, after] = [text.split('\n'), other.split('\n')];
    expect(before.length).toBe(after.length);
    expect(before.filter((line, i) => line !== after[i])).toEqual(['      "symmetry": "find",']);
  });

  it('is known by its first characters', () => {
    expect(looksLikeCase(text.slice(0, 200))).toBe(true);
    expect(looksLikeCase(`\uFEFF\n${text.slice(0, 200)}`)).toBe(true);
    expect(looksLikeCase('{"type": "Feature"}')).toBe(false);
    expect(looksLikeCase('data_x\n# "ellipsite/case"\n')).toBe(false);
  });
});

describe('reading a case', () => {
  it('gives back every decision', async () => {
    const { case: read, problems } = await parseCase(text);
    expect(problems).toEqual([]);
    expect(read).toEqual(await newCase(everyDecision));
  });

  it('fills in what is missing', async () => {
    const short = changedText(text, ({ schema, version, sources }) => ({ schema, version, sources }));
    const { case: read, problems } = await parseCase(short);
    expect(problems).toEqual([]);
    expect(read?.title).toBe('a.cif');
    expect(read?.decisions.settings).toEqual(defaultSettings);
    expect(read?.views.picture).toEqual(defaultSceneOptions);
  });

  it('names line and column where a text was cut off', async () => {
    const cut = text.slice(0, text.indexOf('"version"') + 4);
    const { case: read, problems } = await parseCase(cut, { name: 'cut.json' });
    expect(read).toBeNull();
    expect(problems).toHaveLength(1);
    expect(problems[0]).toMatchObject({ code: 'case-not-json', file: 'cut.json', line: 3, column: 7 });
    expect(problems[0]?.message).toContain('ends too early');
  });

  it.each([
    ['{"schema": "ellipsite/case", "version": 1,}', 1, 43],
    ['{"schema": "ellipsite/case"\n  "version": 1}', 2, 3],
    ['{"schema": "ellipsite/case",\n"version": 01}', 2, 12],
    ['{"schema": "ellipsite/case", "title": "a\nb"}', 1, 41],
    ['{"schema": "ellipsite/case"} x', 1, 30],
    ['{"schema": "ellipsite/case", "x": "\\q"}', 1, 36],
  ])('names the place of what is not JSON: %s', async (broken, line, column) => {
    const { problems } = await parseCase(broken);
    expect(problems).toHaveLength(1);
    expect(problems[0]).toMatchObject({ code: 'case-not-json', severity: 'error', line, column });
  });

  it('refuses a newer version by its number, and other JSON', async () => {
    const newer = await parseCase(withValue('version', 7));
    expect(newer.case).toBeNull();
    expect(newer.problems[0]).toMatchObject({ code: 'case-newer', got: '7', allowed: 'up to 1', line: 3 });
    expect((await parseCase('{"schema": "other"}')).problems[0]?.code).toBe('case-not-ours');
    expect((await parseCase('[]')).problems[0]?.code).toBe('case-not-ours');
    expect((await parseCase(withValue('version', '1'))).problems[0]?.code).toBe('case-version');
    expect((await parseCase(withValue('version', undefined))).problems[0]?.code).toBe('case-version');
  });

  it('migrates an older version, and says where no way leads', async () => {
    const old = withValue('version', 0).replace('"title"', '"name"');
    const steps = {
      0: ({ name, ...rest }: Readonly<Record<string, unknown>>) => ({ ...rest, title: name }),
    };
    const { case: read, problems } = await parseCase(old, { steps, lowestVersion: 0 });
    expect(problems).toEqual([]);
    expect(read).toEqual(await newCase(everyDecision));
    expect((await parseCase(old, { steps: {}, lowestVersion: 0 })).problems[0]?.code).toBe('case-version');
  });

  it('warns of a changed text by the name of its file', async () => {
    const { case: read, problems } = await parseCase(withValue('sources.0.text', 'data_b\n'));
    expect(read?.sources[0]?.text).toBe('data_b\n');
    expect(problems).toHaveLength(1);
    expect(problems[0]).toMatchObject({ code: 'case-text-changed', severity: 'warning', file: 'a.cif' });
  });

  it.each([
    ['sources', []],
    ['sources', undefined],
    ['sources.0.text', 5],
    ['sources.0.sha256', 'abc'],
    ['decisions.settings.symmetry', 'maybe'],
    ['decisions.settings.symmetryToleranceAngstrom', 0],
    ['decisions.settings.isotopes', { Al: 'aluminium' }],
    ['decisions.structure', { source: 2, index: 0 }],
    ['decisions.structure', { source: -1, index: 0 }],
    ['decisions.accepted.0.source', 9],
    ['decisions.accepted.0.columns.tens.quantity', 'mass'],
  ])('opens nothing where %s is wrong', async (path, value) => {
    const { case: read, problems } = await parseCase(withValue(path, value));
    expect(read).toBeNull();
    expect(problems[0]).toMatchObject({ code: 'case-invalid', severity: 'error' });
    expect(problems[0]?.allowed).not.toBeNull();
  });

  it.each([
    ['views.picture.colourBy', 'taste'],
    ['views.picture.displacementProbability', 1],
    ['views.camera', { target: [0, 0], orientation: [0, 0, 0, 1], zoom: 1 }],
    ['views.look.depthCue', 'yes'],
    ['views.saved', [{ name: '' }]],
    ['views.measurements', [{ id: 'm', kind: 'weight', atoms: [] }]],
    ['views', null],
  ])('takes the default where %s is wrong, and says so', async (path, value) => {
    const { case: read, problems } = await parseCase(withValue(path, value));
    expect(problems.map(({ code }) => code)).toEqual(['case-view-dropped']);
    expect(read).toEqual(await newCase(everyDecision));
  });

  it('gives the place of a wrong value', async () => {
    const changed = withValue('views.look.depthCue', 'yes');
    const lines = changed.split('\n');
    const { problems } = await parseCase(changed);
    expect(lines[problems[0]!.line! - 1]).toContain('"depthCue": "yes"');
    expect(lines[problems[0]!.line! - 1]!.slice(problems[0]!.column! - 1)).toMatch(/^"yes"/);
  });

  it('leaves out what it does not know, and says so', async () => {
    const { case: read, problems } = await parseCase(withValue('decisions.settings.mood', 'good'));
    expect(problems[0]).toMatchObject({ code: 'case-unknown-key', severity: 'note', got: 'mood' });
    expect(serialiseCase(read!)).toBe(text);
  });

  it('stays small and quick on hostile texts', async () => {
    const deep = `{"schema": "ellipsite/case", "x": ${'['.repeat(100_000)}`;
    expect((await parseCase(deep)).problems[0]).toMatchObject({ code: 'case-not-json' });
    const views = withValue('views.saved', Array(5000).fill(7));
    const many = await parseCase(views);
    expect(many.problems.length).toBeLessThan(60);
    const long = await parseCase(' '.repeat(mostCaseCharacters + 1));
    expect(long.problems[0]?.code).toBe('case-too-large');
    const polluted = await parseCase(text.replace('"title"', '"__proto__": {"title": "x"}, "title"'));
    expect(polluted.case?.title).toBe('every decision');
    expect(({} as Record<string, unknown>)['title']).toBeUndefined();
  });
});
