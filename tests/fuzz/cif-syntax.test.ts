import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { seededRandom } from '#src/base/seeded-random.ts';
import { cifLimits } from '#src/readers/cif/limits.ts';
import { readSyntax, show } from '#tests/support/cif-syntax.ts';
import { brokenCif, plainCif, richCif } from '#tests/support/cif-texts.ts';

const magic = '#\\#CIF_2.0\n';
const fixtures = { plain: plainCif, rich: richCif, broken: brokenCif };

/** Whatever is read: places lie inside the text, offsets in blocks too, loops hold whole rows. Returns the reading. */
function sound(text: string) {
  const reading = readSyntax(text);
  const lines = text.split(/\r\n?|\n/);
  for (const problem of reading.problems) {
    if (problem.code === 'more-of-the-same') continue;
    expect(problem.code).toMatch(/^cif-[a-z-]+$/);
    expect(problem.message.length).toBeLessThan(400);
    const line = lines[problem.line! - 1];
    expect(line).toBeDefined();
    expect(problem.column).toBeGreaterThanOrEqual(1);
    expect(problem.column).toBeLessThanOrEqual(line!.length + 2);
  }
  for (const block of reading.document.blocks) {
    expect(block.offset).toBeLessThanOrEqual(text.length);
    for (const loop of block.loops) {
      expect(loop.values.length % loop.names.length).toBe(0);
      for (const value of loop.values) expect(value.offset).toBeLessThan(text.length);
    }
  }
  return reading;
}

describe.each(Object.entries(fixtures))('the %s text', (name, text) => {
  it('can be cut at every character', () => {
    for (let end = 0; end <= text.length; end++) sound(text.slice(0, end));
  });

  it('can lose any one character', () => {
    for (let at = 0; at < text.length; at++) sound(text.slice(0, at) + text.slice(at + 1));
  });

  it('can be read with any line end and either magic code', () => {
    for (const lineEnd of ['\r', '\r\n', '\v', '\0'])
      for (const head of ['', magic]) sound(head + text.replaceAll('\n', lineEnd));
  });

  it('can be mutated', () => {
    const inserts = [
      ...['\n', '\r', '\n;', ';', "'", '"', "'''", '[', ']', '{', '}', ':', '\\', ' ', '\0', '\ufeff', 'é'],
      ...['data_', 'loop_', 'save_', 'stop_', '_x ', '$', '#', '\ud800'],
    ];
    const random = seededRandom(name.length);
    for (let run = 0; run < 1500; run++) {
      let mutated = text;
      for (let change = 0; change < 1 + random() * 4; change++) {
        const at = Math.floor(random() * mutated.length);
        const gone = random() < 0.5 ? 0 : Math.floor(random() * 8);
        const insert = inserts[Math.floor(random() * inserts.length)]!;
        mutated = mutated.slice(0, at) + insert + mutated.slice(at + gone);
      }
      sound(mutated);
    }
  });
});

describe('a cut text', () => {
  it('keeps every block before the one that is cut', () => {
    const secondBlock = plainCif.indexOf('data_second');
    const whole = readSyntax(plainCif).document.blocks[0]!;
    for (let end = secondBlock + 6; end <= plainCif.length; end++) {
      const cut = readSyntax(plainCif.slice(0, end)).document.blocks[0]!;
      expect(cut.items).toEqual(whole.items);
      expect(cut.loops).toEqual(whole.loops);
    }
  });

  it('keeps every item that ends before the cut', () => {
    const whole = readSyntax(richCif).document.blocks[0]!;
    const entries = [...whole.items];
    for (let end = 0; end < richCif.indexOf('loop_'); end++) {
      const cut = readSyntax(richCif.slice(0, end)).document.blocks[0];
      entries.forEach(([itemName, value], index) => {
        const next = entries[index + 1]?.[1].offset;
        if (next !== undefined && next < end) expect(show(cut!.items.get(itemName)!)).toEqual(show(value));
      });
    }
  });
});

describe('any text', () => {
  it('of random characters is read', () => {
    const units = fc.constantFrom(...'_a1\'";#[]{}:$?.\\ \n\r\t\0', 'data_', 'loop_', 'save_', '\u00e9');
    const text = fc.oneof(fc.string({ unit: units, maxLength: 200 }), fc.string({ unit: 'binary' }));
    const heads = fc.constantFrom('', magic, `${magic}data_t _v `, 'data_t loop_ _a _b ');
    fc.assert(
      fc.property(heads, text, (head, rest) => void sound(head + rest)),
      { numRuns: 2000 },
    );
  });

  it('of random bytes is read', () => {
    const random = seededRandom(7);
    for (let run = 0; run < 50; run++) {
      const units = Array.from({ length: 2000 }, () => Math.floor(random() * 256));
      sound(`${run % 2 ? magic : ''}data_x ${String.fromCharCode(...units)}`);
    }
  });
});

describe('hostile texts', () => {
  const open = `${magic}data_x\n_a `;
  const two = 2_000_000;
  it.each([
    ['brackets', `${open}${'['.repeat(two)}`],
    ['brackets apart', `${open}${'[ '.repeat(two / 2)}`],
    ['brackets and names', `${open}${'[ _b '.repeat(two / 5)}`],
    ['brackets that close late', `${open}${'['.repeat(two / 2)}1${']'.repeat(two / 2)}`],
    ['tables in lists', `${open}${"{'a':[".repeat(two / 6)}`],
    ['brackets and quotes', `${open}${"a['b [ c' ] ".repeat(two / 12)}`],
    ['three quotes', `${open}${"''' ".repeat(two / 4)}`],
    ['text fields in lists that fail', `${open}${'[ _x\n;a\n;\n'.repeat(two / 10)}`],
    ['text fields that run into names', `data_x\n_a ${'\n;x\n_b '.repeat(two / 7)}`],
    ['text fields of either line end', `data_x\n_a ${'\n;x\r_b '.repeat(two / 7)}`],
    ['backslashes', `data_x\n_a\n;\\\n${'\\ '.repeat(two / 2)}`],
    ['names', `data_x ${'_a '.repeat(two / 3)}`],
    ['one name', `data_x _${'a'.repeat(two)} 1`],
    ['loops', `data_x ${'loop_ _a '.repeat(two / 9)}`],
    ['header of one loop', `data_x loop_ ${'_a '.repeat(two / 3)}`],
    ['blocks', 'data_ '.repeat(two / 6)],
    ['frames', `data_x ${'save_a '.repeat(two / 7)}`],
    ['rows that lack a value', `data_x loop_ _a _b _c\n${'1 2 3\n1\n'.repeat(two / 8)}`],
    ['open quotes', `data_x loop_ _a\n${"'a\n".repeat(two / 3)}`],
    ['words', `data_x _a b${' c'.repeat(two / 2)}`],
    ['plain text', 'word word\n'.repeat(two / 10)],
  ])('%s are read', (_, text) => {
    const { problems } = readSyntax(text);
    expect(problems.length).toBeGreaterThan(0);
    expect(problems.length).toBeLessThan(1000);
  });

  it.each(['1.1', '2.0'])('50 MB of quotes are read as CIF %s', { timeout: 300_000 }, (version) => {
    const head = version === '2.0' ? open : 'data_x\n_a ';
    const { document } = readSyntax(head + "'".repeat(50_000_000));
    expect(document.blocks).toHaveLength(1);
    expect(document.blocks[0]?.items.size).toBe(1);
  });

  it('ends at the limit of loop names and states it', () => {
    const { problems } = readSyntax(`data_x loop_ ${'_a '.repeat(20_000)}`);
    const large = problems.find(({ code }) => code === 'cif-too-large');
    expect(large?.message).toContain(String(cifLimits.loopNames));
    expect(large?.severity).toBe('error');
  });
});
