import type { Contour } from './font/glyphs.ts';

/** How much of each pixel of a box is covered by a shape, 0 to 1, row by row. */
export interface Coverage {
  readonly left: number;
  readonly top: number;
  readonly width: number;
  readonly height: number;
  readonly values: Float32Array;
}

/** Rows and columns that may be touched. */
export interface PixelWindow {
  readonly width: number;
  readonly firstRow: number;
  readonly rowCount: number;
}

/**
 * Exact share of each pixel inside closed lines (x, y pairs, pixels, y downwards). Each edge adds the area between itself and
 * the right border of the box to its row; a running sum along the row gives the winding number times the share, so that
 * overlapping pieces of one sense of turning count once and holes turn the other way. null where nothing is touched.
 */
export function coverageOf(contours: readonly Contour[], window: PixelWindow): Coverage | null {
  const box = boxOf(contours, window);
  if (!box) return null;
  const { left, top, width, height } = box;
  const stride = width + 2;
  const sums = new Float32Array(stride * height);
  for (const points of contours) {
    const n = points.length;
    for (let k = 0; k < n; k += 2) {
      const next = k + 2 < n ? k + 2 : 0;
      addEdge(sums, stride, height, {
        x0: points[k]! - left,
        y0: points[k + 1]! - top,
        x1: points[next]! - left,
        y1: points[next + 1]! - top,
      });
    }
  }
  const values = new Float32Array(width * height);
  for (let row = 0; row < height; row++) {
    let sum = 0;
    for (let x = 0; x < width; x++) {
      sum += sums[row * stride + x]!;
      values[row * width + x] = Math.min(1, Math.abs(sum));
    }
  }
  return { ...box, values };
}

function boxOf(contours: readonly Contour[], window: PixelWindow): Omit<Coverage, 'values'> | null {
  let [left, right, top, bottom] = [Infinity, -Infinity, Infinity, -Infinity];
  for (const points of contours) {
    for (let k = 0; k < points.length; k += 2) {
      left = Math.min(left, points[k]!);
      right = Math.max(right, points[k]!);
      top = Math.min(top, points[k + 1]!);
      bottom = Math.max(bottom, points[k + 1]!);
    }
  }
  left = Math.max(0, Math.floor(left));
  right = Math.min(window.width, Math.ceil(right));
  top = Math.max(window.firstRow, Math.floor(top));
  bottom = Math.min(window.firstRow + window.rowCount, Math.ceil(bottom));
  if (!(right > left && bottom > top)) return null;
  return { left, top, width: right - left, height: bottom - top };
}

interface Edge {
  readonly x0: number;
  readonly y0: number;
  readonly x1: number;
  readonly y1: number;
}

/** Adds an edge's share to every row it crosses. */
function addEdge(sums: Float32Array, stride: number, height: number, { x0, y0, x1, y1 }: Edge): void {
  if (y0 === y1) return;
  const sense = y0 < y1 ? 1 : -1;
  const [topX, topY, lowX, lowY] = sense > 0 ? [x0, y0, x1, y1] : [x1, y1, x0, y0];
  const slope = (lowX - topX) / (lowY - topY);
  const first = Math.max(0, Math.floor(topY));
  const end = Math.min(height, Math.ceil(lowY));
  for (let row = first; row < end; row++) {
    const from = Math.max(row, topY);
    const to = Math.min(row + 1, lowY);
    if (to <= from) continue;
    const xFrom = topX + (from - topY) * slope;
    const xTo = topX + (to - topY) * slope;
    addPiece(sums, row * stride, stride - 2, xFrom, xTo, sense * (to - from));
  }
}

/** One edge within one row, from xa to xb, `rise` of the row high (signed): the area to its right, pixel by pixel. */
function addPiece(
  sums: Float32Array,
  start: number,
  width: number,
  xa: number,
  xb: number,
  rise: number,
): void {
  const low = Math.min(width, Math.max(0, Math.min(xa, xb)));
  const high = Math.min(width, Math.max(0, Math.max(xa, xb)));
  const first = Math.floor(low);
  const last = Math.ceil(high) - 1;
  if (last <= first) {
    const right = rise * (first + 1 - (low + high) / 2);
    sums[start + first]! += right;
    sums[start + first + 1]! += rise - right;
    return;
  }
  // Area covered up to the right border of each pixel, as differences.
  const perPixel = rise / (high - low);
  let before = 0;
  let beforeStep = 0;
  for (let x = first; x <= last; x++) {
    const from = Math.max(low, x);
    const to = Math.min(high, x + 1);
    const area = before + perPixel * (to - from) * (x + 1 - (from + to) / 2);
    before += perPixel * (to - from);
    sums[start + x]! += area - beforeStep;
    beforeStep = area;
  }
  sums[start + last + 1]! += rise - beforeStep;
}
