import { describe, expect, it } from 'vitest';
import type { SrgbBytes } from '#src/data/element-colour.ts';
import { elementColour } from '#src/data/element-colour.ts';
import { elements } from '#src/data/elements.ts';

type Triple = readonly [number, number, number];

const lightPaper: SrgbBytes = [0xfa, 0xf8, 0xf3];
const darkPaper: SrgbBytes = [0x1b, 0x1a, 0x18];

function linear([r, g, b]: SrgbBytes): Triple {
  const one = (byte: number): number => {
    const x = byte / 255;
    return x <= 0.04045 ? x / 12.92 : ((x + 0.055) / 1.055) ** 2.4;
  };
  return [one(r), one(g), one(b)];
}

/** Contrast ratio of WCAG 2.2. */
function contrast(p: SrgbBytes, q: SrgbBytes): number {
  const [a, b] = [p, q].map((colour) => {
    const [r, g, blue] = linear(colour);
    return 0.2126 * r + 0.7152 * g + 0.0722 * blue + 0.05;
  }) as [number, number];
  return Math.max(a, b) / Math.min(a, b);
}

/** CIE 1976 L*a*b* under D65: another perceptual space than the one the rule works in. */
function cielab(colour: SrgbBytes): Triple {
  const [r, g, b] = linear(colour);
  const f = (t: number): number => (t > 216 / 24389 ? Math.cbrt(t) : (841 / 108) * t + 4 / 29);
  const x = f((0.4124 * r + 0.3576 * g + 0.1805 * b) / 0.9505);
  const y = f(0.2126 * r + 0.7152 * g + 0.0722 * b);
  const z = f((0.0193 * r + 0.1192 * g + 0.9505 * b) / 1.089);
  return [116 * y - 16, 500 * (x - y), 200 * (y - z)];
}

function difference(p: string, q: string): number {
  const [a, b] = [cielab(elementColour(p)), cielab(elementColour(q))];
  return Math.hypot(a[0] - b[0], a[1] - b[1], a[2] - b[2]);
}

describe('element colours', () => {
  it('keep 3:1 with light and dark paper', () => {
    for (const { symbol } of elements) {
      expect(contrast(elementColour(symbol), lightPaper), symbol).toBeGreaterThan(3);
      expect(contrast(elementColour(symbol), darkPaper), symbol).toBeGreaterThan(3);
    }
  });

  /** 2.3 is the usual just noticeable difference of CIE 1976 (Mahy, Van Eycken & Oosterlinck 1994). */
  it('differ by five just noticeable steps among elements that often meet', () => {
    const common = 'H C N O F Na Mg Al Si P S Cl K Ca Ti V Mn Fe Cu Zn'.split(' ');
    for (const p of common) {
      for (const q of common) {
        if (p !== q) expect(difference(p, q), `${p} ${q}`).toBeGreaterThan(5 * 2.3);
      }
    }
  });

  it('iron is as unlike carbon, silicon, magnesium and calcium as their elements beside it on a site ask for', () => {
    for (const q of ['C', 'Si', 'Mg', 'Ca']) expect(difference('Fe', q), q).toBeGreaterThan(10 * 2.3);
  });

  it('tell the elements of one group apart', () => {
    for (const group of [1, 2, 13, 14, 15, 16, 17]) {
      const column = elements.filter((e) => e.group === group && e.period < 7).map((e) => e.symbol);
      column.slice(1).forEach((symbol, i) => {
        expect(difference(symbol, column[i]!), `${symbol} ${column[i]}`).toBeGreaterThan(2 * 2.3);
      });
    }
  });

  it('are whole bytes, and a grey for what is no element', () => {
    for (const { symbol } of elements) {
      expect(elementColour(symbol).every((x) => Number.isInteger(x) && x >= 0 && x <= 255)).toBe(true);
    }
    const [r, g, b] = elementColour('X');
    expect(Math.max(r, g, b) - Math.min(r, g, b)).toBeLessThan(16);
    expect(elementColour('SI')).toEqual(elementColour('Si'));
  });
});
