import { describe, expect, it } from 'vitest';
import { siteColour } from '#src/store/site-colour.ts';
import { darkTokens, lightTokens } from '#components/theme-tokens.ts';
import { mountWorkbench, settle } from './mount.ts';

/** sRGB bytes of any CSS colour, as the browser paints it. */
function painted(colour: string): readonly [number, number, number] {
  const context = new OffscreenCanvas(1, 1).getContext('2d', { willReadFrequently: true })!;
  context.fillStyle = colour;
  context.fillRect(0, 0, 1, 1);
  const [r = 0, g = 0, b = 0] = context.getImageData(0, 0, 1, 1).data;
  return [r, g, b];
}

/** Relative luminance and contrast ratio of WCAG 2.2, https://www.w3.org/TR/WCAG22/#dfn-relative-luminance. */
function luminance(colour: string): number {
  const [r, g, b] = painted(colour).map((byte) => {
    const share = byte / 255;
    return share <= 0.04045 ? share / 12.92 : ((share + 0.055) / 1.055) ** 2.4;
  }) as [number, number, number];
  return 0.2126 * r + 0.7152 * g + 0.0722 * b;
}

function contrast(one: string, other: string): number {
  const [high, low] = [luminance(one), luminance(other)].sort((a, b) => b - a) as [number, number];
  return (high + 0.05) / (low + 0.05);
}

describe('the contrast function', () => {
  it('gives the ends of the scale', () => {
    expect(contrast('#000', '#fff')).toBeCloseTo(21, 6);
    expect(contrast('#777', '#777')).toBe(1);
  });
});

describe.each([
  ['light', lightTokens],
  ['dark', darkTokens],
] as const)('the %s theme', (_, tokens) => {
  const grounds = ['paper', 'raised', 'lit', 'hovered'] as const;

  it.each(['ink', 'soft', 'accent', 'error', 'warning'] as const)(
    'has %s text at 4.5:1 on every ground',
    (name) => {
      for (const ground of grounds) {
        expect(contrast(tokens[name], tokens[ground]), `${name} on ${ground}`).toBeGreaterThanOrEqual(4.5);
      }
    },
  );

  it('has borders of controls at 3:1', () => {
    expect(contrast(tokens.line, tokens.paper)).toBeGreaterThanOrEqual(3);
    expect(contrast(tokens.line, tokens.raised)).toBeGreaterThanOrEqual(3);
  });

  it('has the colour of every site at 3:1 on paper and on the selected row', () => {
    for (let site = 0; site < 200; site++) {
      for (const ground of ['paper', 'hovered', 'lit'] as const) {
        expect(
          contrast(siteColour(site), tokens[ground]),
          `site ${site} on ${ground}`,
        ).toBeGreaterThanOrEqual(3);
      }
    }
  });
});

describe('the theme of the page', () => {
  it('follows the choice and is kept', async () => {
    const { workbench, store } = await mountWorkbench();
    store.setTheme('dark');
    await settle();
    expect(getComputedStyle(workbench).getPropertyValue('--paper').trim()).toBe(darkTokens.paper);
    expect(getComputedStyle(workbench).backgroundColor).toBe(`rgb(${painted(darkTokens.paper).join(', ')})`);
    expect(localStorage.getItem('ellipsite-theme')).toBe('dark');
    store.setTheme('light');
    await settle();
    expect(getComputedStyle(workbench).colorScheme).toBe('light');
    localStorage.removeItem('ellipsite-theme');
  });
});
