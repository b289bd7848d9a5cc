import * as S from '../slots.ts';
import { layFaded } from './colour.ts';
import { asReal, down, least, leastWhole, most, mostWhole, part, size, up, whole } from './memory.ts';

// One triangle at a time: corners (column, row, depth).
let ax: f32 = 0;
let ay: f32 = 0;
let az: f32 = 0;
let bx: f32 = 0;
let by: f32 = 0;
let bz: f32 = 0;
let cx: f32 = 0;
let cy: f32 = 0;
let cz: f32 = 0;

/** Corners by addresses of three floats each. */
function setTriangle(a: i32, b: i32, c: i32): void {
  ax = part(a, 0);
  ay = part(a, 1);
  az = part(a, 2);
  bx = part(b, 0);
  by = part(b, 1);
  bz = part(b, 2);
  cx = part(c, 0);
  cy = part(c, 1);
  cz = part(c, 2);
}

/** Twice the area, positive where the corners run clockwise in the picture. */
function clockwiseArea(): f32 {
  return (bx - ax) * (cy - ay) - (by - ay) * (cx - ax);
}

/** Column at which the side from (x0, y0) to (x1, y1) passes a row: by the same steps for both triangles that share it. */
function sideAt(x0: f32, y0: f32, x1: f32, y1: f32, row: f32): f32 {
  if (y0 > y1 || (y0 === y1 && x0 > x1)) return x1 + ((row - y1) / (y0 - y1)) * (x0 - x1);
  return x0 + ((row - y0) / (y1 - y0)) * (x1 - x0);
}

let spanLow: f32 = 0;
let spanHigh: f32 = 0;

function widen(x0: f32, y0: f32, x1: f32, y1: f32, row: f32): void {
  if ((row < y0 && row < y1) || (row > y0 && row > y1) || y0 === y1) return;
  const x = sideAt(x0, y0, x1, y1, row);
  spanLow = least(spanLow, x);
  spanHigh = most(spanHigh, x);
}

/** Lays the colour of the set triangle over what is behind it, in `count` rows of the strip that starts at `first`. */
function layTriangle(facet: i32, first: i32, count: i32): void {
  const area = clockwiseArea();
  if (size(area) < 1e-9) return;
  const low = mostWhole(first, up(least(ay, least(by, cy))));
  const high = leastWhole(first + count - 1, down(most(ay, most(by, cy))));
  const slopeX = ((bz - az) * (cy - ay) - (cz - az) * (by - ay)) / area;
  const slopeY = ((cz - az) * (bx - ax) - (bz - az) * (cx - ax)) / area;
  const farthest = least(az, least(bz, cz));
  const nearest = most(az, most(bz, cz));
  const last = whole(S.columns) - 1;
  const own: i32 = facet + 36;
  for (let y = low; y <= high; y++) {
    const row = asReal(y);
    spanLow = 1e9;
    spanHigh = -1e9;
    widen(ax, ay, bx, by, row);
    widen(bx, by, cx, cy, row);
    widen(cx, cy, ax, ay, row);
    const start = mostWhole(0, up(spanLow));
    const end = leastWhole(last, down(spanHigh));
    if (start > end) continue;
    const rowAt = y - first;
    const depth: i32 = whole(S.depthAt) + ((rowAt * whole(S.stride)) << 2);
    const colours: i32 = whole(S.coloursAt) + ((rowAt * whole(S.colourStride)) << 2);
    const base = az + slopeY * (row - ay);
    for (let x = start; x <= end; x++) {
      const z = least(nearest, most(farthest, base + slopeX * (asReal(x) - ax)));
      if (z <= part(depth, x)) continue;
      layFaded(colours + (x << 2), part(own, 0), part(own, 1), part(own, 2), part(own, 3), z);
    }
  }
}

/** Facets of a strip, the farther ones first, over all that is opaque. */
export function facetPass(first: i32, count: i32): void {
  const facets = whole(S.facetCount);
  const top = asReal(first);
  const bottom = asReal(first + count - 1);
  for (let k = 0; k < facets; k++) {
    const facet: i32 = whole(S.facetsAt) + ((S.facetSize * k) << 2);
    setTriangle(facet, facet + 12, facet + 24);
    if (most(ay, most(by, cy)) < top || least(ay, least(by, cy)) > bottom) continue;
    layTriangle(facet, first, count);
  }
}
