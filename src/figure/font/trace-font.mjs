// Writes outlines.data.ts: node src/figure/font/trace-font.mjs
import { readFileSync, writeFileSync } from 'node:fs';
import { createRequire } from 'node:module';
import opentype from 'opentype.js';

const require = createRequire(import.meta.url);

/** Letters in a row of Unicode, both ends included. */
const letters = (first, last) =>
  Array.from({ length: last - first + 1 }, (_, k) => String.fromCodePoint(first + k));

const latin = [...letters(0x20, 0x7e), ...letters(0xa1, 0xac), ...letters(0xae, 0xff)];
const greek = [...letters(0x391, 0x3a1), ...letters(0x3a3, 0x3a9), ...letters(0x3b1, 0x3c9)];
const signs = [...'−–—‘’“”…•′″≤≥≈√∞†‡'];
const italic = [...'abchkluvwxyzCPQVσδηκΔΩ'];

function fontOf(style) {
  const file = readFileSync(require.resolve(`roboto-fontface/fonts/roboto/Roboto-${style}.woff`));
  return opentype.parse(file.buffer.slice(file.byteOffset, file.byteOffset + file.byteLength));
}

/** Steps between points with as few characters as path text allows: a minus sign parts numbers too. */
const compact = (steps) => steps.join(' ').replaceAll(' -', '-');

/** Advance width, then the outline as path text in font units, y upwards: M, and relative l, q, z. */
function traced(font, letter) {
  const glyph = font.charToGlyph(letter);
  if (glyph.index === 0) throw new Error(`The font has no ${letter}.`);
  let [x, y, startX, startY] = [0, 0, 0, 0];
  const path = glyph.path.commands.map((c) => {
    if (c.type === 'Z') return 'z';
    const [fromX, fromY] = [x, y];
    [x, y] = [Math.round(c.x), Math.round(c.y)];
    if (c.type === 'M') {
      [startX, startY] = [x, y];
      return `M${compact([x, y])}`;
    }
    if (c.type === 'Q')
      return `q${compact([c.x1 - fromX, c.y1 - fromY, x - fromX, y - fromY].map(Math.round))}`;
    const goesNowhere = (x === fromX && y === fromY) || (x === startX && y === startY);
    return goesNowhere ? '' : `l${compact([x - fromX, y - fromY])}`;
  });
  return [glyph.advanceWidth, path.join('')];
}

function table(font, wanted) {
  const rows = wanted.map(
    (letter) => `  ${JSON.stringify(letter)}: ${JSON.stringify(traced(font, letter))},`,
  );
  return `{\n${rows.join('\n')}\n}`;
}

const regular = fontOf('Regular');
const text = `/**
 * Outlines of Roboto, regular and italic, Apache License 2.0 (LICENSE in this folder), traced by trace-font.mjs from the package
 * roboto-fontface; only the letters a picture needs. A letter: its advance width, and its outline as path text (M, and
 * relative l, q, z), both in font units, y upwards.
 */
export type OutlineTable = Readonly<Record<string, readonly [advance: number, path: string]>>;

/** Font units of one em. */
export const unitsPerEm = ${regular.unitsPerEm};

// prettier-ignore
export const regularOutlines: OutlineTable = ${table(regular, [...latin, ...greek, ...signs])};

// prettier-ignore
export const italicOutlines: OutlineTable = ${table(fontOf('RegularItalic'), italic)};
`;
writeFileSync(new URL('./outlines.data.ts', import.meta.url), text);
