import { unbroken } from '#src/scene/printed.ts';
import type { FontStyle } from './glyphs.ts';
import { fontHeights, glyphOf } from './glyphs.ts';

/** A piece of a text in one style. */
export interface TextRun {
  readonly text: string;
  readonly script?: 'sub' | 'super';
  readonly style?: FontStyle;
}

/** A letter where it stands: points right of the text's start and above its baseline. */
export interface PlacedGlyph {
  readonly letter: string;
  readonly style: FontStyle;
  readonly xPt: number;
  readonly yPt: number;
  readonly sizePt: number;
}

/** A line of text set: its letters and its size. */
export interface SetText {
  readonly glyphs: readonly PlacedGlyph[];
  readonly widthPt: number;
}

/** Size and place of raised and lowered letters, as shares of the size around them. */
const small = { size: 0.72, lower: -0.16, raise: 0.36 } as const;

const scripts: Readonly<Record<string, readonly [letter: string, script: 'sub' | 'super']>> =
  Object.fromEntries([
    ...[...'⁰¹²³⁴⁵⁶⁷⁸⁹⁺⁻'].map((sign, k) => [sign, ['0123456789+−'[k]!, 'super'] as const] as const),
    ...[...'₀₁₂₃₄₅₆₇₈₉'].map((sign, k) => [sign, ['0123456789'[k]!, 'sub'] as const] as const),
  ]);

/**
 * The runs of a sentence of the program: `σ(iso)`, `V(zz)` and `σ_iso` get a true subscript, raised and lowered digits are set
 * from ordinary ones, so that ²⁷Al looks the same whatever the font holds.
 */
export function runsOf(sentence: string): TextRun[] {
  const runs: TextRun[] = [];
  const add = (text: string, script?: 'sub' | 'super', style?: FontStyle): void => {
    const last = runs.at(-1);
    if (last && last.script === script && last.style === style) {
      runs[runs.length - 1] = { ...last, text: last.text + text };
    } else if (text !== '') runs.push({ text, ...(script && { script }), ...(style && { style }) });
  };
  const symbol = /(?<![\p{L}])([σδηκΩΔVCP])(?:\(([a-z]{2,3}|Q)\)|_([A-Za-z]{1,3})\b)?(?![\p{L}(])/gu;
  let end = 0;
  for (const match of sentence.matchAll(symbol)) {
    plain(sentence.slice(end, match.index), add);
    const index = match[2] ?? match[3];
    const isQuantity = index !== undefined || /[σδηκΩΔ]/.test(match[1]!);
    add(match[1]!, undefined, isQuantity ? 'italic' : undefined);
    if (index !== undefined) add(index, 'sub');
    end = match.index + match[0].length;
  }
  plain(sentence.slice(end), add);
  return runs;
}

function plain(text: string, add: (text: string, script?: 'sub' | 'super') => void): void {
  for (const letter of text) {
    const [own, script] = scripts[letter] ?? [letter];
    add(own, script);
  }
}

/** Sets runs on one line, letters side by side by their advance widths. */
export function setText(runs: readonly TextRun[], sizePt: number): SetText {
  const glyphs: PlacedGlyph[] = [];
  let xPt = 0;
  for (const { text, script, style = 'regular' } of runs) {
    const size = script ? small.size * sizePt : sizePt;
    const yPt = script === 'sub' ? small.lower * sizePt : script === 'super' ? small.raise * sizePt : 0;
    for (const letter of text) {
      glyphs.push({ letter, style, xPt, yPt, sizePt: size });
      xPt += size * glyphOf(letter, style).advanceEm;
    }
  }
  return { glyphs, widthPt: xPt };
}

/** Breaks a sentence into lines of at most a width, never between a number and its unit; a longer word stands alone. */
export function breakLines(sentence: string, sizePt: number, widthPt: number): TextRun[][] {
  const lines: string[] = [];
  const words = unbroken(sentence).split(' ');
  for (const word of words.filter((part) => part !== '').map((part) => part.replaceAll('\u00a0', ' '))) {
    const longer = lines.length > 0 ? `${lines.at(-1)} ${word}` : word;
    const fits = lines.length > 0 && setText(runsOf(longer), sizePt).widthPt <= widthPt;
    if (fits) lines[lines.length - 1] = longer;
    else lines.push(word);
  }
  return lines.map(runsOf);
}

/** Height of a line with room for sub- and superscripts, points. */
export function lineHeight(sizePt: number): number {
  return 1.32 * sizePt;
}

/** From the top of a line to its baseline, points. */
export function baselineOf(sizePt: number): number {
  return (0.5 * (1.32 - fontHeights.capitalEm) + fontHeights.capitalEm) * sizePt;
}
