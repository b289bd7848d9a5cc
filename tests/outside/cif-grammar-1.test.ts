import { describe, expect, it } from 'vitest';
import { numberFromText } from '#src/readers/cif/number.ts';
import { readSyntax, showBlock } from '#tests/support/cif-syntax.ts';
import type { GrammarRow } from '#tests/support/grammar-row.ts';
import { block, loop, row, withFrames } from '#tests/support/grammar-row.ts';

/**
 * Every production of CIF 1.1 as named in International Tables for Crystallography, Vol. G (2005), section 2.2.7.1
 * (doi:10.1107/97809553602060000107), with one text it allows and one it does not. The texts are our own. What a text
 * outside the grammar is read as is our choice; that it is reported is what the grammar asks.
 */
const a1 = [block('t', { _a: '1' })];

const structure: readonly GrammarRow[] = [
  row(
    'CIF',
    ['# two blocks\ndata_one _a 1\ndata_two _a 2 ', [block('one', { _a: '1' }), block('two', { _a: '2' })]],
    ['Dear editor,\ndata_t _a 1', 'cif-text-before-data', a1],
  ),
  row(
    'DataBlock',
    ['data_t _a 1 loop_ _b 2 3', [block('t', { _a: '1' }, [loop(['_b'], ['2'], ['3'])])]],
    ['data_t _a 1\nword', 'cif-stray-value', a1],
  ),
  row('DataBlockHeading', ['data_t _a 1', a1], ['data_ _a 1', 'cif-unnamed-block', [block('', { _a: '1' })]]),
  row(
    'SaveFrame',
    ['data_d save_f _a 1 save_ _b 2', [withFrames(block('d', { _b: '2' }), block('f', { _a: '1' }))]],
    ['data_d save_f _a 1', 'cif-unclosed-frame', [withFrames(block('d'), block('f', { _a: '1' }))]],
  ),
  row(
    'SaveFrameHeading',
    ['data_d save_F.one _a 1 save_', [withFrames(block('d'), block('F.one', { _a: '1' }))]],
    ['data_t save_ _a 1', 'cif-stray-save', a1],
  ),
  row('DataItems', ['data_t _a 1', a1], ['data_t _b _a 1', 'cif-missing-value', a1]),
  row(
    'LoopHeader',
    ['data_t loop_ _a _b 1 2', [block('t', {}, [loop(['_a', '_b'], ['1', '2'])])]],
    ['data_t loop_ 7 8 _a 1', 'cif-loop-without-names', a1],
  ),
  row(
    'LoopBody',
    ['data_t loop_ _a _b 1 2 3 4', [block('t', {}, [loop(['_a', '_b'], ['1', '2'], ['3', '4'])])]],
    ['data_t loop_ _a _b 1 2 3', 'cif-loop-row-cut', [block('t', {}, [loop(['_a', '_b'], ['1', '2'])])]],
  ),
];

const reservedWords: readonly GrammarRow[] = [
  row('DATA_', ['DaTa_t _a 1', a1], ['data t a 1', 'cif-no-data-block', []]),
  row(
    'LOOP_',
    ['data_t LOOP_ _a 1 2', [block('t', {}, [loop(['_a'], ['1'], ['2'])])]],
    ['data_t loop__a 1 2', 'cif-missing-blank', [block('t', {}, [loop(['_a'], ['1'], ['2'])])]],
  ),
  row(
    'GLOBAL_',
    ['data_t _a global _b global_x', [block('t', { _a: 'global', _b: 'global_x' })]],
    ['data_t _a 1\nGlobal_\n_b 2', 'cif-global', [...a1, block('global_', { _b: '2' })]],
  ),
  row(
    'SAVE_',
    ['data_d SAVE_f _a 1 Save_', [withFrames(block('d'), block('f', { _a: '1' }))]],
    ['data_t _a 1 save_', 'cif-stray-save', a1],
  ),
  row(
    'STOP_',
    ['data_t _a stop _b stop_x', [block('t', { _a: 'stop', _b: 'stop_x' })]],
    ['data_t loop_ _a 1 STOP_ _b 2', 'cif-stop', [block('t', { _b: '2' }, [loop(['_a'], ['1'])])]],
  ),
];

const long = 'n'.repeat(75);
const values: readonly GrammarRow[] = [
  row(
    'Tag',
    ['data_t _Atom_Site[1].x%y 1', [block('t', { '_atom_site[1].x%y': '1' })]],
    [`data_t _${long} 1`, 'cif-long-name', [block('t', { [`_${long}`]: '1' })]],
  ),
  row(
    'Value',
    [
      "data_t _a ? _b . _c 1.5(2) _d word _e 'two words'\n_f\n;text\n;",
      [block('t', { _a: '?', _b: '.', _c: '1.5(2)', _d: 'word', _e: '«two words»', _f: '«text»' })],
    ],
    ['data_t _a loop_ _b 1', 'cif-missing-value', [block('t', {}, [loop(['_b'], ['1'])])]],
  ),
  row(
    'CharString',
    [`data_t _a 'x' _b "x" _c x _d '?'`, [block('t', { _a: '«x»', _b: '«x»', _c: 'x', _d: '«?»' })]],
    ['data_t _a x y', 'cif-unquoted-words', [block('t', { _a: 'x y' })]],
  ),
  row(
    'UnquotedString',
    [`data_t _a C1'#_"$[]{}; _b ;x`, [block('t', { _a: `C1'#_"$[]{};`, _b: ';x' })]],
    ['data_t _a $frame', 'cif-reserved-start', [block('t', { _a: '$frame' })]],
  ),
  row(
    'SingleQuotedString',
    [
      `data_t _a 'a dog's life' _b '' _c 'O5'' _d 'say "x"'`,
      [block('t', { _a: "«a dog's life»", _b: '«»', _c: "«O5'»", _d: '«say "x"»' })],
    ],
    ["data_t _a 'P 21/c\n_b 2", 'cif-unclosed-quote', [block('t', { _a: '«P 21/c»', _b: '2' })]],
  ),
  row(
    'DoubleQuotedString',
    [`data_t _a "6"-nails" _b "it's"`, [block('t', { _a: '«6"-nails»', _b: "«it's»" })]],
    ['data_t _a "P 21/c\n_b 2', 'cif-unclosed-quote', [block('t', { _a: '«P 21/c»', _b: '2' })]],
  ),
  row(
    'TextField',
    ['data_t _a\n;one\n two ; three\n; _b 2', [block('t', { _a: '«one\n two ; three»', _b: '2' })]],
    ['data_t _a\n;one\n_b 2\n', 'cif-unclosed-text-field', [block('t', { _a: '«one»', _b: '2' })]],
  ),
  row(
    'SemiColonTextField',
    ["data_t _a\n;\n'# _b loop_\n;", [block('t', { _a: "«\n'# _b loop_»" })]],
    ['data_t _a\n;one\n;_b 2', 'cif-missing-blank', [block('t', { _a: '«one»', _b: '2' })]],
  ),
];

const blanks: readonly GrammarRow[] = [
  row('WhiteSpace', ['data_t\t _a\r\n\r\n1\n \t', a1], ['data_t\f_a\v1', 'cif-control-character', a1]),
  row(
    'Comments',
    ["#one\n# 'two\n\ndata_t # three _b 3\n_a #four\n1#5\n", [block('t', { _a: '1#5' })]],
    ['data_t _a 1\n; # text after all\n', 'cif-unclosed-text-field', a1],
  ),
  row(
    'TokenizedComments',
    ['data_t _a 1 #x\n#y', a1],
    ["data_t _a '1'#x\n_b 2", 'cif-missing-blank', [block('t', { _a: '«1»', _b: '2' })]],
  ),
];

const characters: readonly GrammarRow[] = [
  row(
    'OrdinaryChar',
    ['data_t _a !%&()*+,-./0:<=>?@AZ\\^`az{|}~', [block('t', { _a: '!%&()*+,-./0:<=>?@AZ\\^`az{|}~' })]],
    ['data_t _a Å', 'cif-beyond-ascii', [block('t', { _a: 'Å' })]],
  ),
  row(
    'NonBlankChar',
    [`data_t _a"#$'_;[] 1`, [block('t', { [`_a"#$'_;[]`]: '1' })]],
    ['data_t _a\u00a01', 'cif-beyond-ascii', a1],
  ),
  row(
    'TextLeadChar',
    ['data_t _a\n;\n "\n#\n$\n\'\n_\n[\n;', [block('t', { _a: '«\n "\n#\n$\n\'\n_\n[»' })]],
    ['data_t _a\n;x\n;;\n_b 2', 'cif-missing-blank', [block('t', { _a: '«x»', _b: '2' })]],
  ),
  row(
    'AnyPrintChar',
    [`data_t _a ' !"#$%&()[]_~\t'`, [block('t', { _a: '« !"#$%&()[]_~\t»' })]],
    ["data_t _a 'x\u0001y'", 'cif-control-character', [block('t', { _a: '«x\u0001y»' })]],
  ),
  row(
    'line of at most 2048 characters (2.2.7.1, syntax paragraph on lengths)',
    [`data_t _a ${'x'.repeat(2038)}`, [block('t', { _a: 'x'.repeat(2038) })]],
    [`data_t _a ${'x'.repeat(2039)}`, 'cif-long-line', [block('t', { _a: 'x'.repeat(2039) })]],
  ),
];

describe.each([
  ['basic structure', structure],
  ['reserved words', reservedWords],
  ['tags and values', values],
  ['white space and comments', blanks],
  ['character sets and lengths', characters],
])('CIF 1.1 grammar: %s', (_, rows) => {
  it.each(rows.map((one) => [one.production, one] as const))('%s', (_production, { good, bad }) => {
    const allowed = readSyntax(good.text);
    expect(allowed.problems).toEqual([]);
    expect(allowed.document.blocks.map(showBlock)).toEqual(good.blocks);
    const refused = readSyntax(bad.text);
    expect(refused.codes).toContain(bad.code);
    expect(refused.document.blocks.map(showBlock)).toEqual(bad.blocks);
  });
});

describe('CIF 1.1 grammar: numeric values', () => {
  it.each([
    ['Numeric', '34.5(12)', 34.5, 1.2, '34.5(12'],
    ['Number', '-7', -7, null, '--7'],
    ['Integer', '+12', 12, null, '1 2'],
    ['Float', '.5', 0.5, null, '.'],
    ['Float', '5.', 5, null, '5..'],
    ['Exponent', '1.5E-3(2)', 0.0015, 0.0002, '1.5E'],
    ['UnsignedInteger', '007', 7, null, '(7)'],
    ['Digit', '9', 9, null, '٣'],
  ])('%s', (_production, good, value, uncertainty, bad) => {
    const read = numberFromText(good);
    expect(read?.value).toBeCloseTo(value, 15);
    if (uncertainty === null) expect(read?.uncertainty).toBeNull();
    else expect(read?.uncertainty).toBeCloseTo(uncertainty, 15);
    expect(numberFromText(bad)).toBeNull();
  });
});
