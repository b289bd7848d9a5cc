import { describe, expect, it } from 'vitest';
import { fontHeights, glyphOf } from '#src/figure/font/glyphs.ts';
import { breakLines, runsOf, setText } from '#src/figure/font/set-text.ts';

const heightOf = (letter: string): number =>
  Math.max(
    ...glyphOf(letter, 'regular').contours.flatMap((points) => [...points.filter((_, k) => k % 2 === 1)]),
  );

describe('letters', () => {
  it('have the heights the layout counts with', () => {
    expect(heightOf('H')).toBeCloseTo(fontHeights.capitalEm, 2);
    expect(heightOf('x')).toBeCloseTo(fontHeights.smallEm, 2);
  });

  it('are there for all that NMR needs', () => {
    const box = glyphOf('\u{1F600}', 'regular').contours;
    for (const letter of 'σδηκΩΔχγαβµÅ°×−±·≈≤≥éöø') {
      expect(glyphOf(letter, 'regular').contours, letter).not.toEqual(box);
      expect(glyphOf(letter, 'regular').contours.length, letter).toBeGreaterThan(0);
    }
  });

  it('lose their accent rather than becoming a box', () => {
    expect(glyphOf('č', 'regular').contours).toEqual(glyphOf('c', 'regular').contours);
  });

  it('turn italic where there is an italic, else stay upright', () => {
    expect(glyphOf('c', 'italic').contours).not.toEqual(glyphOf('c', 'regular').contours);
    expect(glyphOf('9', 'italic').contours).toEqual(glyphOf('9', 'regular').contours);
  });
});

describe('a line of text', () => {
  it('scales with its size and is as wide as its letters', () => {
    const runs = [{ text: 'Si1' }];
    const widths = [...'Si1'].map((letter) => glyphOf(letter, 'regular').advanceEm);
    expect(setText(runs, 10).widthPt).toBeCloseTo(10 * widths.reduce((sum, width) => sum + width, 0), 9);
    expect(setText(runs, 20).widthPt).toBeCloseTo(2 * setText(runs, 10).widthPt, 9);
  });

  it('sets symbols with a true subscript in smaller, lower letters', () => {
    expect(runsOf('isotropic shielding σ(iso)/ppm')).toEqual([
      { text: 'isotropic shielding ' },
      { text: 'σ', style: 'italic' },
      { text: 'iso', script: 'sub' },
      { text: '/ppm' },
    ]);
    expect(runsOf('V_zz, C(Q)').map(({ text, script }) => [text, script])).toEqual([
      ['V', undefined],
      ['zz', 'sub'],
      [', ', undefined],
      ['C', undefined],
      ['Q', 'sub'],
    ]);
    const { glyphs } = setText(runsOf('σ(iso)'), 10);
    expect(glyphs[1]!.yPt).toBeLessThan(0);
    expect(glyphs[1]!.sizePt).toBeLessThan(10);
  });

  it('raises the digits of a nuclide', () => {
    expect(runsOf('²⁷Al')).toEqual([{ text: '27', script: 'super' }, { text: 'Al' }]);
    expect(setText(runsOf('²⁷Al'), 10).glyphs[0]!.yPt).toBeGreaterThan(0);
  });

  it('leaves words and labels alone', () => {
    expect(runsOf('Value of C1 (V)')).toEqual([{ text: 'Value of C1 (V)' }]);
  });

  it('breaks at blanks, within the width', () => {
    const lines = breakLines('semi-axes = 0.45 Å + deviation from isotropic', 7, 60);
    expect(lines.length).toBeGreaterThan(1);
    for (const runs of lines) expect(setText(runs, 7).widthPt).toBeLessThanOrEqual(60);
    expect(
      lines
        .flat()
        .map(({ text }) => text)
        .join(' '),
    ).toBe('semi-axes = 0.45 Å + deviation from isotropic');
  });

  it('breaks between words, never between a number and its unit', () => {
    const sentence = 'value, 1 Å = 900 ppm; great circles of 5 ppmv';
    for (let widthPt = 10; widthPt < 200; widthPt += 3) {
      const lines = breakLines(sentence, 7, widthPt).map((runs) => runs.map(({ text }) => text).join(''));
      expect(lines.join(' ')).toBe(sentence);
      for (const line of lines) {
        expect(line).not.toMatch(/\b(?:1|900)$/);
        expect(line).not.toContain('\u00a0');
      }
    }
    // what only begins like a unit may stand on the next line
    expect(breakLines('of 5 ppmv', 7, 20).length).toBe(2);
  });
});
