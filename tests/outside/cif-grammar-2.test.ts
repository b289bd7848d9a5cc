import { describe, expect, it } from 'vitest';
import { readSyntax, showBlock } from '#tests/support/cif-syntax.ts';
import type { GrammarRow } from '#tests/support/grammar-row.ts';
import { block, loop, row, withFrames } from '#tests/support/grammar-row.ts';

/**
 * Every production of CIF 2.0: Bernstein et al., J. Appl. Cryst. 49 (2016) 277, doi:10.1107/S1600576715021871, formal grammar
 * in the appendix; each with one text it allows and one it does not. The texts are our own; the magic code is put before
 * them. What a text outside the grammar is read as is our choice (by CIF 1.1 where that gives sense).
 */
const magic = '#\\#CIF_2.0\n';
const one = (value: Parameters<typeof block>[1]) => [block('t', value)];
const a1 = one({ _a: '1' });

const file: readonly GrammarRow[] = [
  row('CIF2-file', ['data_t _a 1\ndata_u', [...a1, block('u')]], ['one two', 'cif-no-data-block', []]),
  row('data-block', ['data_t _a 1', a1], ['data_t 1 _a 1', 'cif-stray-value', a1]),
  row(
    'data-heading',
    ['data_t_1 _a 1', [block('t_1', { _a: '1' })]],
    ['_a 1', 'cif-no-data-header', [block('', { _a: '1' })]],
  ),
  row('data-token', ['DATA_t _a 1', a1], ['data-t _a 1', 'cif-no-data-block', []]),
  row(
    'container-code',
    ['data_[x]{é} _a 1', [block('[x]{é}', { _a: '1' })]],
    ['data_ _a 1', 'cif-unnamed-block', [block('', { _a: '1' })]],
  ),
  row(
    'save-frame',
    ['data_t save_f _a 1 save_', [withFrames(block('t'), block('f', { _a: '1' }))]],
    [
      'data_t save_f save_g _a 1 save_ save_',
      'cif-nested-frame',
      [withFrames(block('t'), withFrames(block('f'), block('g', { _a: '1' })))],
    ],
  ),
  row(
    'save-heading',
    ['data_t Save_F _a 1 SAVE_', [withFrames(block('t'), block('F', { _a: '1' }))]],
    ['data_t save_ _a 1', 'cif-stray-save', a1],
  ),
  row(
    'save-token',
    ['data_t save_f save_', [withFrames(block('t'), block('f'))]],
    ['data_t save_f _a 1', 'cif-unclosed-frame', [withFrames(block('t'), block('f', { _a: '1' }))]],
  ),
  row(
    'block-content',
    ['data_t _a 1 _b 2', one({ _a: '1', _b: '2' })],
    ['data_t _a 1 stop_', 'cif-stop', a1],
  ),
  row(
    'frame-content',
    ['data_t save_f loop_ _a 1 save_', [withFrames(block('t'), block('f', {}, [loop(['_a'], ['1'])]))]],
    ['data_t save_f word save_', 'cif-stray-value', [withFrames(block('t'), block('f'))]],
  ),
];

const data: readonly GrammarRow[] = [
  row('data', ['data_t _a 1', a1], ['data_t _a 1 _b', 'cif-missing-value', a1]),
  row(
    'data-loop',
    ['data_t loop_ _a _b 1 [2 3]', [block('t', {}, [loop(['_a', '_b'], ['1', ['2', '3']])])]],
    ['data_t loop_ _a', 'cif-empty-loop', [block('t', {}, [loop(['_a'])])]],
  ),
  row(
    'loop-token',
    ['data_t Loop_ _a 1', [block('t', {}, [loop(['_a'], ['1'])])]],
    [
      'data_t\n_a\n_b\n1 2\n3 4',
      'cif-missing-loop',
      [block('t', {}, [loop(['_a', '_b'], ['1', '2'], ['3', '4'])])],
    ],
  ),
  row(
    'data-name',
    ["data_t _É'[x] 1", one({ "_é'[x]": '1' })],
    ['data_t _a 1 _A 2', 'cif-repeated-item', a1],
  ),
  row(
    'data-value',
    ['data_t _a . _b ?', one({ _a: '.', _b: '?' })],
    ['data_t _a data_u', 'cif-missing-value', [block('t'), block('u')]],
  ),
  row(
    'wspace-data-value',
    ['data_t _a\n;1\n;', one({ _a: '«1»' })],
    ["data_t _a 'x'_b 1", 'cif-missing-blank', one({ _a: '«x»', _b: '1' })],
  ),
  row(
    'nospace-value',
    ["data_t _a [ 'x' [y] {'k':z}]", one({ _a: ['«x»', ['y'], { k: 'z' }] })],
    ["data_t _a ['x'y ]", 'cif-missing-blank', one({ _a: ['«x»', 'y'] })],
  ),
];

const strings: readonly GrammarRow[] = [
  row(
    'wsdelim-string',
    ['data_t _a x"y\'z#;$_', one({ _a: 'x"y\'z#;$_' })],
    ['data_t _a Cu[II]', 'cif-bracket-in-bare-value', one({ _a: 'Cu[II]' })],
  ),
  row(
    'wsdelim-string-sol',
    ['data_t _a\nx;', one({ _a: 'x;' })],
    ['data_t _a\n;x', 'cif-unclosed-text-field', one({ _a: '«x»' })],
  ),
  row(
    'lead-char',
    ['data_t _a ;x', one({ _a: ';x' })],
    ['data_t _a $x', 'cif-reserved-start', one({ _a: '$x' })],
  ),
  row(
    'restrict-char',
    ['data_t _a [Ω €]', one({ _a: ['Ω', '€'] })],
    ['data_t _a ]x', 'cif-bracket-in-bare-value', one({ _a: ']x' })],
  ),
  row(
    'quoted-string',
    [`data_t _a 'x "y"' _b "it's"`, one({ _a: '«x "y"»', _b: "«it's»" })],
    ["data_t _a 'a dog's life'", 'cif-quote-inside', one({ _a: "«a dog's life»" })],
  ),
  row(
    'triple-quoted-string',
    [`data_t _a '''it's\r\n''two''\n''' _b """x""y"""`, one({ _a: "«it's\n''two''\n»", _b: '«x""y»' })],
    ["data_t _a '''x'\n_b 2", 'cif-unclosed-triple-quote', one({ _a: "«''x»", _b: '2' })],
  ),
  row(
    'text-field',
    ['data_t _a\n;[\n]]\n;', one({ _a: '«[\n]]»' })],
    ['data_t _a\n;x\n_b 2', 'cif-unclosed-text-field', one({ _a: '«x»', _b: '2' })],
  ),
  row(
    'text-delim',
    ['data_t _a\r\n;x\r\n y\r\n;\r\n', one({ _a: '«x\n y»' })],
    ['data_t _a\n;x\n ;\n_b 2', 'cif-unclosed-text-field', one({ _a: '«x»', _b: '2' })],
  ),
  row(
    'text-content, folded lines',
    ['data_t _a\n;\\\none \\  \ntwo\n;', one({ _a: '«one two»' })],
    [
      'data_t _a\n;\\\\\none \\\ntwo\n;_b 2',
      'cif-missing-blank',
      one({ _a: '«\\\\\none \\\ntwo»', _b: '2' }),
    ],
  ),
  row(
    'text-content, prefixed lines',
    ['data_t _a\n;>\\\n>;x\n>\n;', one({ _a: '«;x\n»' })],
    ['data_t _a\n;>\\\n>;x\ny\n;_b 2', 'cif-missing-blank', one({ _a: '«>\\\n>;x\ny»', _b: '2' })],
  ),
];

const collections: readonly GrammarRow[] = [
  row(
    'list',
    ['data_t _a [ ] _b [1 [2\n#x\n3] ? .]', one({ _a: [], _b: ['1', ['2', '3'], '?', '.'] })],
    ['data_t _a [1 2\n_b 3', 'cif-unclosed-list', one({ _a: '[1 2', _b: '3' })],
  ),
  row(
    'table',
    [`data_t _a {} _b { 'k':1 "l": [2] '''m''':"3" }`, one({ _a: {}, _b: { k: '1', l: ['2'], m: '«3»' } })],
    ["data_t _a {'k':1]", 'cif-wrong-bracket', one({ _a: { k: '1' } })],
  ),
  row(
    'table-entry',
    ["data_t _a {'k':'v'}", one({ _a: { k: '«v»' } })],
    ["data_t _a {'k':}", 'cif-missing-value', one({ _a: { k: '?' } })],
  ),
  row(
    'table-key',
    [`data_t _a {"":1 ' ':2}`, one({ _a: { '': '1', ' ': '2' } })],
    ['data_t _a {k:1}', 'cif-bare-key', one({ _a: { k: '1' } })],
  ),
];

const blanks: readonly GrammarRow[] = [
  row('comment', ['data_t # ä\n_a 1 #', a1], ["data_t _a '1'#x", 'cif-missing-blank', one({ _a: '«1»' })]),
  row('wspace', ['data_t\t_a \r\r1', a1], ['data_t\v_a 1', 'cif-control-character', a1]),
  row('line-term', ['data_t\r_a\r\n1\n', a1], ['data_t\f_a 1', 'cif-control-character', a1]),
  row(
    'allchars',
    ['data_t _a "Å𝕏\u00a0"', one({ _a: '«Å𝕏\u00a0»' })],
    ['data_t _a 1 \ufeff_b 2', 'cif-byte-order-mark', one({ _a: '1', _b: '2' })],
  ),
];

describe.each([
  ['file, blocks and frames', file],
  ['items and loops', data],
  ['strings', strings],
  ['lists and tables', collections],
  ['white space and characters', blanks],
])('CIF 2.0 grammar: %s', (_, rows) => {
  it.each(rows.map((each) => [each.production, each] as const))('%s', (_production, { good, bad }) => {
    const allowed = readSyntax(magic + good.text);
    expect(allowed.problems).toEqual([]);
    expect(allowed.document.version).toBe('2.0');
    expect(allowed.document.blocks.map(showBlock)).toEqual(good.blocks);
    const refused = readSyntax(magic + bad.text);
    expect(refused.codes).toContain(bad.code);
    expect(refused.document.blocks.map(showBlock)).toEqual(bad.blocks);
  });
});

describe('CIF 2.0 grammar: magic-code and file-heading', () => {
  it.each([
    ['#\\#CIF_2.0\ndata_t _a [1]', '2.0', []],
    ['\ufeff#\\#CIF_2.0 \ndata_t _a [1]', '2.0', []],
    ['#\\#CIF_1.1\ndata_t _a 1', '1.1', []],
    ['data_t _a 1', '1.1', []],
    ['# late\n#\\#CIF_2.0\ndata_t _a [1]', '2.0', ['cif-late-magic-code']],
    ['#\\#CIF_2.1\ndata_t _a [1]', '2.0', ['cif-unknown-version']],
    ['data_t\n#\\#CIF_2.0\n_a 1', '1.1', []],
  ])('%j is read as CIF %s', (text, version, codes) => {
    const reading = readSyntax(text);
    expect(reading.document.version).toBe(version);
    expect(reading.codes).toEqual(codes);
  });
});
