import { describe, expect, it } from 'vitest';
import { pixelSize, settleSize, sizeFault } from '#src/figure/figure-size.ts';

const none = { widthMm: null, heightMm: null, widthPx: null, heightPx: null, dpi: null, textPt: null };

describe('size of a figure', () => {
  // Artwork instructions of a journal publisher: pixels of a column of 90 mm and a page of 190 mm at 300, 500 and 1000 dpi.
  it.each([
    [90, 300, 1063],
    [90, 500, 1772],
    [90, 1000, 3543],
    [190, 300, 2244],
    [190, 500, 3740],
    [190, 1000, 7480],
  ])('of %i mm at %i dpi is %i pixels', (widthMm, dpi, pixels) => {
    const size = settleSize({ ...none, widthMm, heightMm: widthMm, dpi });
    expect(pixelSize({ widthPt: size.widthPt, heightPt: size.heightPt! }, size.pxPerPt)).toEqual({
      widthPx: pixels,
      heightPx: pixels,
    });
    expect(size.dpi).toBe(dpi);
  });

  it('takes 300 dpi and 7 pt on paper', () => {
    const size = settleSize({ ...none, widthMm: 83 });
    expect(size.dpi).toBe(300);
    expect(size.textPt).toBe(7);
    // 83 / 25.4 × 300 = 980.3
    expect(Math.round(size.widthPt * size.pxPerPt)).toBe(980);
  });

  it('takes pixels alone as a slide 13⅓ in wide, letters of 18 pt, and says no resolution', () => {
    for (const widthPx of [1920, 3840]) {
      const size = settleSize({ ...none, widthPx, heightPx: (9 * widthPx) / 16 });
      expect(size.widthPt).toBeCloseTo(960, 9);
      expect(size.textPt).toBe(18);
      expect(size.dpi).toBeNull();
    }
  });

  it('refuses what is too small or too large, with the limits', () => {
    expect(sizeFault(8192, 8192)).toBeNull();
    expect(sizeFault(20_000, 100)).toMatch(/20000 × 100.*64 to 16384/);
    expect(sizeFault(63, 100)).toMatch(/64 to 16384/);
    expect(sizeFault(16_384, 16_384)).toMatch(/at most 134 million/);
  });
});
