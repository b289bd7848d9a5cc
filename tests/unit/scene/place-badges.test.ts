import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import type { ScreenBox } from '#src/scene/label-room.ts';
import { placeBadges } from '#src/scene/place-badges.ts';

const viewport = { widthPx: 400, heightPx: 300 };
const badge = (xPx: number, yPx: number) => ({ xPx, yPx, widthPx: 46, heightPx: 15 });

function overlap(one: ScreenBox, other: ScreenBox): boolean {
  const across =
    Math.min(one.leftPx + one.widthPx, other.leftPx + other.widthPx) - Math.max(one.leftPx, other.leftPx);
  const down =
    Math.min(one.topPx + one.heightPx, other.topPx + other.heightPx) - Math.max(one.topPx, other.topPx);
  return across > 1e-9 && down > 1e-9;
}

describe('badges', () => {
  it('stand on their points where nothing is in the way', () => {
    expect(placeBadges([badge(100, 100), badge(200, 150)], viewport, [])).toEqual([
      { leftPx: 77, topPx: 92.5, widthPx: 46, heightPx: 15 },
      { leftPx: 177, topPx: 142.5, widthPx: 46, heightPx: 15 },
    ]);
  });

  it('of up to five on one point cover neither each other nor what they are to keep off', () => {
    fc.assert(
      fc.property(
        fc.integer({ min: 120, max: 280 }),
        fc.integer({ min: 90, max: 210 }),
        fc.integer({ min: 1, max: 5 }),
        (x, y, count) => {
          const mark = { leftPx: x - 8, topPx: y - 8, widthPx: 16, heightPx: 16 };
          const boxes = placeBadges(Array(count).fill(badge(x, y)), viewport, [mark]);
          boxes.forEach((box, i) => {
            expect([mark, ...boxes.slice(0, i)].some((other) => overlap(box, other))).toBe(false);
            expect(Math.hypot(box.leftPx + 23 - x, box.topPx + 7.5 - y)).toBeLessThan(60);
          });
        },
      ),
    );
  });

  it('keep within the picture, and stay on their point where there is no room at all', () => {
    const [box] = placeBadges([badge(398, 150)], viewport, []);
    expect(box!.leftPx + box!.widthPx).toBeLessThanOrEqual(400);
    const all = { leftPx: 0, topPx: 0, ...viewport };
    expect(placeBadges([badge(100, 100)], viewport, [all])[0]).toMatchObject({ leftPx: 77, topPx: 92.5 });
  });
});
