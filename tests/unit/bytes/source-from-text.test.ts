import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { lineCount, lineStartsOf, lineText, sourceFromText } from '#src/bytes/source-from-text.ts';
import { placeOf } from '#src/bytes/source-text.ts';

const textWithEndings = fc
  .array(fc.constantFrom('\n', '\r', '\r\n', 'a', 'bc', ' ', 'é'), { maxLength: 60 })
  .map((parts) => parts.join(''));

describe('line index', () => {
  it('ends lines at LF, CR LF and CR', () => {
    expect([...lineStartsOf('a\r\nb\rc\n')]).toEqual([0, 3, 5, 7]);
    expect([...lineStartsOf('')]).toEqual([0]);
    expect([...lineStartsOf('\r\r\n\n')]).toEqual([0, 1, 3, 4]);
  });

  it('gives the same lines as splitting', () => {
    fc.assert(
      fc.property(textWithEndings, (text) => {
        const source = sourceFromText('a', text);
        const lines = Array.from({ length: lineCount(source) }, (_, i) => lineText(source, i));
        expect(lines).toEqual(text.split(/\r\n|\r|\n/));
      }),
    );
  });

  it('leads every offset to the line and column it stands in', () => {
    fc.assert(
      fc.property(textWithEndings, fc.nat(60), (text, raw) => {
        const offset = Math.min(raw, text.length);
        const before = text.slice(0, offset);
        const cut = text[offset - 1] === '\r' && text[offset] === '\n';
        const lines = (cut ? before.slice(0, -1) : before).split(/\r\n|\r|\n/);
        const expected = { line: lines.length, column: (lines.at(-1)?.length ?? 0) + (cut ? 2 : 1) };
        expect(placeOf(sourceFromText('a', text), offset)).toMatchObject(expected);
      }),
    );
  });

  it('grows past its first size', () => {
    const starts = lineStartsOf('x\n'.repeat(5000));
    expect(starts).toHaveLength(5001);
    expect(starts.at(-1)).toBe(10_000);
  });

  it('is empty past the end', () => {
    expect(lineText(sourceFromText('a', 'x\ny'), 2)).toBe('');
  });
});
