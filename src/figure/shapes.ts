import type { Contour } from './font/glyphs.ts';
import { glyphOf } from './font/glyphs.ts';
import { setText } from './font/set-text.ts';
import type { DiscItem, LineItem, RectangleItem, TextItem } from './sheet.ts';

const corners = 48;

/** A regular polygon that stands for a disc, pixels. */
function roundContour(x: number, y: number, radius: number): Contour {
  const points = new Float64Array(2 * corners);
  for (let k = 0; k < corners; k++) {
    points[2 * k] = x + radius * circle[2 * k]!;
    points[2 * k + 1] = y + radius * circle[2 * k + 1]!;
  }
  return points;
}

const circle = Float64Array.from({ length: 2 * corners }, (_, k) => {
  const angle = (2 * Math.PI * (k >> 1)) / corners;
  return k % 2 === 0 ? Math.cos(angle) : Math.sin(angle);
});

/** A straight stroke as a rectangle that turns the same way as `roundContour`. */
function strokeContour(x1: number, y1: number, x2: number, y2: number, width: number): Contour {
  const length = Math.sqrt((x2 - x1) ** 2 + (y2 - y1) ** 2) || 1;
  const dx = ((y1 - y2) / length) * (width / 2);
  const dy = ((x2 - x1) / length) * (width / 2);
  return Float64Array.of(x1 - dx, y1 - dy, x2 - dx, y2 - dy, x2 + dx, y2 + dy, x1 + dx, y1 + dy);
}

export function lineShape(item: LineItem, pxPerPt: number): Contour[] {
  const [x1, y1, x2, y2] = [item.x1Pt, item.y1Pt, item.x2Pt, item.y2Pt].map((v) => v * pxPerPt);
  const width = item.widthPt * pxPerPt;
  const stroke = strokeContour(x1!, y1!, x2!, y2!, width);
  if (item.ends === 'flat') return [stroke];
  return [stroke, roundContour(x1!, y1!, width / 2), roundContour(x2!, y2!, width / 2)];
}

export function discShape(item: DiscItem, pxPerPt: number): Contour[] {
  return [roundContour(item.xPt * pxPerPt, item.yPt * pxPerPt, item.radiusPt * pxPerPt)];
}

export function rectangleShape(item: RectangleItem, pxPerPt: number): Contour[] {
  const [left, top] = [item.xPt * pxPerPt, item.yPt * pxPerPt];
  const [right, low] = [left + item.widthPt * pxPerPt, top + item.heightPt * pxPerPt];
  return [Float64Array.of(left, top, right, top, right, low, left, low)];
}

/** Outlines of the letters of a text, pixels, y downwards. */
export function textShape(item: TextItem, pxPerPt: number): Contour[] {
  const { glyphs } = setText(item.runs, item.sizePt);
  return glyphs.flatMap(({ letter, style, xPt, yPt, sizePt }) => {
    const size = sizePt * pxPerPt;
    const [x, y] = [(item.xPt + xPt) * pxPerPt, (item.yPt - yPt) * pxPerPt];
    return glyphOf(letter, style).contours.map((em) =>
      em.map((value, k) => (k % 2 === 0 ? x + size * value : y - size * value)),
    );
  });
}

/** A rim of a width round outlines: a stroke along each piece and a disc at each corner. */
export function rimOf(outlines: readonly Contour[], width: number): Contour[] {
  return outlines.flatMap((points) => {
    const rim: Contour[] = [];
    for (let k = 0; k < points.length; k += 2) {
      const next = k + 2 < points.length ? k + 2 : 0;
      const [x, y] = [points[k]!, points[k + 1]!];
      rim.push(strokeContour(x, y, points[next]!, points[next + 1]!, 2 * width));
      if (k % 4 === 0) rim.push(roundContour(x, y, width));
    }
    return rim;
  });
}
