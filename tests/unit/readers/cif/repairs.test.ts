import { describe, expect, it } from 'vitest';
import { readOne, readSyntax, showBlock } from '#tests/support/cif-syntax.ts';
import { plainCif, richCif } from '#tests/support/cif-texts.ts';
import { block, loop } from '#tests/support/grammar-row.ts';

function first(text: string) {
  const { document, codes } = readSyntax(text);
  return { block: showBlock(document.blocks[0]!), codes };
}

describe('single items', () => {
  it('keeps the first known value of a repeated name', () => {
    const text = "data_m\n_chemical_formula_sum 'Si O2'\n_x 1\n_CHEMICAL_formula_sum ''\n_x 1\n";
    const { block: read, codes } = first(text);
    expect(read.items).toEqual({ _chemical_formula_sum: '«Si O2»', _x: '1' });
    expect(codes).toEqual(['cif-repeated-item', 'cif-repeated-item']);
  });

  it('takes the second value where the first is unknown or empty', () => {
    expect(first("data_m _a ? _a 1 _b '' _b 2 _c . _c ?").block.items).toEqual({ _a: '1', _b: '2', _c: '.' });
  });

  it('reports a repeated name whose second value is missing, and keeps the first', () => {
    const { block: read, codes } = first('data_m\n_f Si\n_f\n_g 1\n');
    expect(read.items).toEqual({ _f: 'Si', _g: '1' });
    expect(codes).toEqual(['cif-missing-value']);
  });

  it('takes unquoted words of one line as one value, but lets numbers stand alone', () => {
    expect(readOne('P 21/c')).toEqual({ value: 'P 21/c', codes: ['cif-unquoted-words'] });
    expect(readOne('5.43(2) Å')).toEqual({
      value: '5.43(2)',
      codes: ['cif-beyond-ascii', 'cif-words-after-number'],
    });
    expect(readOne("'P 21/c' c")).toEqual({ value: '«P 21/c»', codes: ['cif-stray-value'] });
  });

  it('reads names and values without a loop_ as the loop they look like', () => {
    const { block: read, codes } = first("data_x\n_symop\n'x,y,z'\n'-x,-y,-z'\n_a 1\n");
    expect(read).toEqual(block('x', { _a: '1' }, [loop(['_symop'], ['«x,y,z»'], ['«-x,-y,-z»'])]));
    expect(codes).toEqual(['cif-missing-loop']);
  });
});

it('reads a number and drops a unit or a parted uncertainty behind it', () => {
  expect(readOne('8.012 (3)')).toEqual({ value: '8.012', codes: ['cif-words-after-number'] });
  expect(readOne('293 K')).toEqual({ value: '293', codes: ['cif-words-after-number'] });
  expect(readOne('293\nK')).toEqual({ value: '293', codes: ['cif-stray-value'] });
});

describe('loops', () => {
  const header = 'data_x loop_ _label _x _y\n';

  it('leaves out only the row that lacks a value', () => {
    const { block: read, codes } = first(`${header}A 1 2\nB 3\nC 5 6\nD 7 8\n_after 1`);
    const rows = [
      ['A', '1', '2'],
      ['C', '5', '6'],
      ['D', '7', '8'],
    ];
    expect(read.loops).toEqual([loop(['_label', '_x', '_y'], ...rows)]);
    expect(codes).toEqual(['cif-loop-row-broken']);
  });

  it.each([
    ['A 0.25 (3) 1\nB 0.5 2\nC 0.75 (12) 3\n', '0.25(3)', '0.75(12)'],
    ['A - 0.25 1\nB 0.5 2\nC 0.75 3\n', '-0.25', '0.75'],
    ['A 0.25 (3) 1\nB 0.5 (3) 2\nC -0.75 (2) 3\nD 1 (1) 2', '0.25(3)', '-0.75(2)'],
  ])('closes blanks inside the numbers of %j', (rows, start, end) => {
    const { block: read, codes } = first(header + rows);
    expect(read.loops[0]!.rows[0]).toEqual(['A', start, '1']);
    expect(read.loops[0]!.rows[2]).toEqual(['C', end, '3']);
    expect(codes).toEqual(['cif-split-number']);
  });

  it('leaves a number and a bracketed number apart where rows are whole', () => {
    const { block: read, codes } = first(`${header}A 1 (2)\nB 3 (4)\n`);
    expect(read.loops[0]!.rows).toEqual([
      ['A', '1', '(2)'],
      ['B', '3', '(4)'],
    ]);
    expect(codes).toEqual([]);
  });

  it('leaves out only the row that holds a stray word, and keeps rows on two lines', () => {
    const { block: read } = first(`${header}A 1 2\nB 3\n4\nC 5 6 oops\nD 7 8\nE 9 0\nF 1 1`);
    expect(read.loops[0]?.rows.map(([label]) => label)).toEqual(['A', 'B', 'D', 'E', 'F']);
  });

  it('says how many values of an incomplete last row were cut', () => {
    const { problems } = readSyntax(`${header}A 1 2 B 3 4 C 5`);
    expect(problems).toHaveLength(1);
    expect(problems[0]).toMatchObject({
      code: 'cif-loop-row-cut',
      line: 2,
      column: 13,
      got: '8 values',
      allowed: 'a multiple of 3',
    });
    expect(problems[0]?.message).toContain('the last 2 were left out');
  });

  it('joins unquoted words at their commas where a row is too long', () => {
    const { block: read, codes } = first("data_x loop_ _id _op\n1 x,y,z\n2 -x, -y,-z\n3 'x, -y, z'\n");
    expect(read.loops[0]?.rows).toEqual([
      ['1', 'x,y,z'],
      ['2', '-x, -y,-z'],
      ['3', '«x, -y, z»'],
    ]);
    expect(codes).toEqual(['cif-unquoted-words']);
  });

  it('ends a text field that ran over what follows, where the rows do not fit', () => {
    const text = 'data_x loop_ _id _text\n1\n;one\n;\n2\n;two\n_b 2\n_c\n;\nthree words here\n;\n_d 4\n';
    const { block: read, codes } = first(text);
    expect(read).toEqual(
      block('x', { _b: '2', _c: '«\nthree words here»', _d: '4' }, [
        loop(['_id', '_text'], ['1', '«one»'], ['2', '«two»']),
      ]),
    );
    expect(new Set(codes)).toEqual(new Set(['cif-unclosed-text-field']));
  });

  it('keeps both where a name heads columns of two loops, and finds the filled one', () => {
    const { document, codes } = readSyntax('data_x loop_ _a loop_ _a 1 loop_ _a 2');
    expect(codes).toEqual(['cif-empty-loop', 'cif-repeated-column', 'cif-repeated-column']);
    expect(document.blocks[0]?.loopOf.get('_a')).toBe(document.blocks[0]?.loops[1]);
  });

  it('reads a loop of 200,000 values as it stands', () => {
    const rows = Array.from({ length: 100_000 }, (_, row) => `A${row} ${row}`);
    const { document, problems } = readSyntax(`data_x loop_ _a _b\n${rows.join('\n')}\n_c 1`);
    const values = document.blocks[0]!.loops[0]!.values;
    expect(problems).toEqual([]);
    expect(values).toHaveLength(200_000);
    expect(values.every((value) => value.kind === 'text')).toBe(true);
    expect(values.at(-2)).toMatchObject({ text: 'A99999' });
    expect(document.blocks[0]?.items.size).toBe(1);
  });
});

describe('text fields that are not closed', () => {
  it('end before the next name when the field that follows would close them', () => {
    const text = 'data_x\n_a\n;one\n_b 2\n_c\n;three\n;\n_d 4\n';
    const { block: read, codes } = first(text);
    expect(read.items).toEqual({ _a: '«one»', _b: '2', _c: '«three»', _d: '4' });
    expect(codes).toEqual(['cif-unclosed-text-field']);
  });

  it('end before the next name when the text after the wrong end is stray', () => {
    const text = 'data_x\n_a\n;one\nloop_\n_b\n1\n2\n_c\n;\nthree\n;\n_d 4\n';
    const { block: read, codes } = first(text);
    expect(read).toEqual(block('x', { _a: '«one»', _c: '«\nthree»', _d: '4' }, [loop(['_b'], ['1'], ['2'])]));
    expect(codes).toEqual(['cif-unclosed-text-field']);
  });

  it('that open where no value belongs cost nothing but themselves', () => {
    const { block: read } = first('data_x\n_a 1\n;\n_b 2\n_c\n;\ntext\n;\n');
    expect(read.items).toEqual({ _a: '1', _b: '2', _c: '«\ntext»' });
  });

  it('may hold lines that look like names', () => {
    const text = 'data_x\n_a\n;\n_b 2\nloop_\n;\n_c 3\n';
    const { block: read, codes } = first(text);
    expect(read.items).toEqual({ _a: '«\n_b 2\nloop_»', _c: '3' });
    expect(codes).toEqual([]);
  });

  it('run to the end of a file cut short', () => {
    const { block: read, codes } = first('data_x\n_a\n; 1 0 0  12.3\n 1 1 0  4');
    expect(read.items).toEqual({ _a: '« 1 0 0  12.3\n 1 1 0  4»' });
    expect(codes).toEqual(['cif-unclosed-text-field']);
  });
});

describe('CIF 1 content under the CIF 2.0 magic code', () => {
  it.each([
    ["'a dog's life'", "«a dog's life»", ['cif-quote-inside']],
    ["'O5''", "«O5'»", ['cif-quote-inside']],
    ['Cu[II]x', 'Cu[II]x', ['cif-bracket-in-bare-value']],
    ['[Fe(CN)6]4-', '[Fe(CN)6]4-', ['cif-bracket-in-bare-value']],
    ['{Cu}n', '{Cu}n', ['cif-bracket-in-bare-value']],
    ['[open', '[open', ['cif-unclosed-list', 'cif-bracket-in-bare-value']],
    ["''x'", "«'x»", ['cif-quote-inside']],
  ])('reads %s as one value', (written, value, codes) => {
    expect(readOne(written, '2.0')).toEqual({ value, codes });
  });

  it('keeps brackets as text in CIF 1.1', () => {
    expect(readOne('{1 2}')).toEqual({ value: '{1 2}', codes: ['cif-unquoted-words'] });
    expect(readOne('[001]')).toEqual({ value: '[001]', codes: ['cif-reserved-start'] });
  });
});

describe('lists and tables', () => {
  it.each([
    ["['a','b']", ['«a»', '«b»'], ['cif-comma-in-list']],
    ['[1,2]', ['1,2'], []],
    ["{'a' : 1}", { a: '1' }, ['cif-blank-before-colon']],
    ["{'a':1 'a':2}", { a: '1' }, ['cif-repeated-key']],
    ["{'a':1 2}", { a: '1' }, ['cif-missing-key']],
    ['{ : 1}', {}, ['cif-missing-key', 'cif-missing-key']],
    ["{'a': 1 'b':\n;x\n;}", { a: '1', b: '«x»' }, []],
  ])('reads %s', (written, value, codes) => {
    expect(readOne(written, '2.0')).toEqual({ value, codes });
  });

  it('keeps what is nested deeper than 64 levels as text', () => {
    const { value, codes } = readOne(`${'['.repeat(66)}1${']'.repeat(66)}`, '2.0');
    expect(codes).toEqual(['cif-nesting-too-deep']);
    expect(JSON.stringify(value)).toBe(`${'['.repeat(64)}"«[[1]]»"${']'.repeat(64)}`);
  });
});

describe('places and the rest', () => {
  it.each([plainCif, richCif])('finds nothing to report in a text that keeps the rules', (text) => {
    expect(readSyntax(text).problems).toEqual([]);
  });

  it('names line and column whatever the line ends', () => {
    for (const lineEnd of ['\n', '\r\n', '\r']) {
      const { problems } = readSyntax(['data_x', '_a 1', "  _b 'open", '_c 2'].join(lineEnd));
      expect(problems).toMatchObject([{ code: 'cif-unclosed-quote', file: 'test.cif', line: 3, column: 6 }]);
    }
  });

  it('takes the rest of the line after an open quote, without a wrong closing quote', () => {
    expect(readOne('\'x, y, z"').value).toBe('«x, y, z»');
    expect(readOne("'x, y',").value).toBe('«x, y»');
  });

  it('takes a string that was broken over two lines, and no more', () => {
    expect(readOne("'one\ntwo'")).toEqual({ value: '«one\ntwo»', codes: ['cif-quote-over-lines'] });
    expect(readOne("'one\r\ntwo'").value).toBe('«one\ntwo»');
    const { block: read } = first("data_x\nloop_\n_author\n'A, B.\n'C, D.'\n_c 1");
    expect(read.loops[0]?.rows).toEqual([['«A, B.»'], ['«C, D.»']]);
  });

  it('reports control characters once, and reads them as blanks outside strings', () => {
    const { block: read, codes } = first('data_x\0_a\x0c1\n_b 2\n\x1a');
    expect(read.items).toEqual({ _a: '1', _b: '2' });
    expect(codes).toEqual(['cif-control-character']);
  });

  it('says that an empty text and a text of another kind hold no data block', () => {
    expect(readSyntax('').codes).toEqual(['cif-no-data-block']);
    expect(readSyntax('# only a comment').codes).toEqual(['cif-no-data-block']);
    const { problems } = readSyntax('2\nwater\nO 0 0 0\nH 0 0 1\n');
    expect(problems[0]).toMatchObject({ code: 'cif-no-data-block', got: '2…' });
  });

  it('keeps two blocks of one name and says so', () => {
    const { document, codes } = readSyntax('data_a _x 1 data_A _x 2');
    expect(document.blocks.map(({ name }) => name)).toEqual(['a', 'A']);
    expect(codes).toEqual(['cif-repeated-block']);
  });

  it('stops at the limit of blocks and states it', () => {
    const { document, problems } = readSyntax('data_a\n'.repeat(100_010));
    expect(document.blocks.length).toBeLessThanOrEqual(100_001);
    expect(problems.find(({ code }) => code === 'cif-too-large')?.message).toContain('100000');
  });
});
