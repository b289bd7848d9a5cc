import * as S from '../slots.ts';
import {
  divided,
  down,
  least,
  leastWhole,
  most,
  mostWhole,
  part,
  real,
  root,
  setPart,
  setWhole,
  setWordPart,
  size,
  smooth,
  up,
  whole,
  wordPart,
} from './memory.ts';
import { layPatch, openPatch, patchBytes, patchTriangle } from './patch.ts';
import { nearness, setImage, turnedPoint } from './place.ts';

// Signed polar surfaces, as src/scene/polar-mesh.ts describes them. When a surface is first met and not hidden its mesh is projected
// and drawn, once, into a patch of depths of its own; strips take their rows of it from there.

const bandsPerNorm: f32 = 10;

/** Record of a surface, with the box of the ball round it; false where it isn't drawn. */
export function polar(index: i32, object: i32): boolean {
  if (wordPart(whole(S.polarMeshesAt), index) < 0) return false;
  const r: i32 = whole(S.recordsAt) + ((S.recordSize * object) << 2);
  const centre: i32 = whole(S.polarCentresAt) + 12 * index;
  for (let k = 0; k < 3; k++) setPart(r, S.sCentre + k, turnedPoint(centre, 3 * k));
  const x = part(r, S.sCentre);
  const y = part(r, S.sCentre + 1);
  const z = part(r, S.sCentre + 2);
  setImage(r, 0, x, y, z);
  setTensor(r, whole(S.polarTensorsAt) + 24 * index);
  const reach = part(whole(S.polarReachesAt), index) * real(S.samplesPerAngstrom);
  const front = nearness(z + reach);
  // no point of the ball is seen farther from the image of its centre
  const half = (reach / front) * ((root(x * x + y * y) * real(S.perEye)) / nearness(z) + 1);
  setPart(r, S.cMiddle, 0);
  setPart(r, S.oReach, half);
  setPart(r, S.oBoxRow, part(r, S.sRow));
  setPart(r, S.oBoxHalf, half);
  setPart(r, S.oNearest, (z + reach) / front);
  setWordPart(r, S.sEpoch, -1);
  return true;
}

/** T in view axes and what follows from its size. */
function setTensor(r: i32, t: i32): void {
  const per: f32 = 1 / real(S.samplesPerAngstrom);
  let at = S.sTensor;
  for (let k = 0; k < 6; k++, at++) {
    // xx, yy, zz, xy, xz, yz
    const p = k < 3 ? k : k < 5 ? 0 : 1;
    const q = k < 3 ? k : k === 3 ? 1 : 2;
    const u: i32 = (S.turn + 3 * p) << 2;
    const v: i32 = (S.turn + 3 * q) << 2;
    const x = part(t, 0) * part(v, 0) + part(t, 3) * part(v, 1) + part(t, 4) * part(v, 2);
    const y = part(t, 3) * part(v, 0) + part(t, 1) * part(v, 1) + part(t, 5) * part(v, 2);
    const z = part(t, 4) * part(v, 0) + part(t, 5) * part(v, 1) + part(t, 2) * part(v, 2);
    setPart(r, at, (part(u, 0) * x + part(u, 1) * y + part(u, 2) * z) * per);
  }
  const own = part(r, S.sTensor) * part(r, S.sTensor) + part(r, S.sTensor + 1) * part(r, S.sTensor + 1);
  const mixed =
    part(r, S.sTensor + 3) * part(r, S.sTensor + 3) +
    part(r, S.sTensor + 4) * part(r, S.sTensor + 4) +
    part(r, S.sTensor + 5) * part(r, S.sTensor + 5);
  const norm = root(own + part(r, S.sTensor + 2) * part(r, S.sTensor + 2) + mixed * 2);
  const shown = norm / (nearness(part(r, S.sCentre + 2)) * real(S.pixelScale));
  setPart(r, S.sBands, bandsPerNorm / most(norm, 1e-6));
  setPart(r, S.sBandInk, smooth(shown / bandsPerNorm, 1.5, 1 / 1.5) * 0.45);
  setPart(r, S.sRimInk, real(S.rimInk) * smooth(shown, real(S.rimFrom) * 2, real(S.rimPer) * 0.5));
  setPart(r, S.oShaded, 0);
}

// Box of the image of a mesh: columns and rows.
let boxLeft: f32 = 0;
let boxRight: f32 = 0;
let boxTop: f32 = 0;
let boxBottom: f32 = 0;

/** Vertices of opposite directions stand opposite: the second half is the first, mirrored in the centre. */
function setVertices(r: i32, t: i32, directions: i32, half: i32): void {
  const vertices = whole(S.polarVerticesAt);
  const cx = part(r, S.sCentre);
  const cy = part(r, S.sCentre + 1);
  const cz = part(r, S.sCentre + 2);
  const turn: i32 = S.turn << 2;
  boxLeft = part(r, S.sColumn);
  boxRight = boxLeft;
  boxTop = part(r, S.sRow);
  boxBottom = boxTop;
  for (let k = 0; k < half; k++) {
    const n: i32 = directions + 12 * k;
    const x = part(n, 0);
    const y = part(n, 1);
    const z = part(n, 2);
    const own = part(t, 0) * x * x + part(t, 1) * y * y + part(t, 2) * z * z;
    const radius = own + (part(t, 3) * x * y + part(t, 4) * x * z + part(t, 5) * y * z) * 2;
    const length = size(radius);
    const dx = (part(turn, 0) * x + part(turn, 1) * y + part(turn, 2) * z) * length;
    const dy = (part(turn, 3) * x + part(turn, 4) * y + part(turn, 5) * z) * length;
    const dz = (part(turn, 6) * x + part(turn, 7) * y + part(turn, 8) * z) * length;
    const v: i32 = vertices + (k << 4);
    const opposite: i32 = v + (half << 4);
    setImage(v, 0, cx + dx, cy + dy, cz + dz);
    setImage(opposite, 0, cx - dx, cy - dy, cz - dz);
    setPart(v, 3, radius);
    setPart(opposite, 3, radius);
    boxLeft = least(boxLeft, least(part(v, 0), part(opposite, 0)));
    boxRight = most(boxRight, most(part(v, 0), part(opposite, 0)));
    boxTop = least(boxTop, least(part(v, 1), part(opposite, 1)));
    boxBottom = most(boxBottom, most(part(v, 1), part(opposite, 1)));
  }
}

/** Draws a surface into a patch of its rows from `row` on. */
function setPatch(index: i32, r: i32, row: i32): void {
  const table: i32 = whole(S.meshTableAt) + ((S.meshSize * wordPart(whole(S.polarMeshesAt), index)) << 2);
  setVertices(r, whole(S.polarTensorsAt) + 24 * index, wordPart(table, 0), wordPart(table, 1));
  const left = mostWhole(0, up(boxLeft));
  const right = leastWhole(whole(S.columns) - 1, down(boxRight));
  const top = mostWhole(row, up(boxTop));
  const last = leastWhole(whole(S.endRow) - 1, down(boxBottom));
  const rowBytes = patchBytes(left, right);
  const most = mostWhole(16, divided(S.mostPatchSamples << 2, mostWhole(rowBytes, 16)));
  const bottom = leastWhole(last, top + most - 1);
  setWordPart(r, S.sLeft, left);
  setWordPart(r, S.sRight, right);
  setWordPart(r, S.sTop, top);
  setWordPart(r, S.sBottom, left > right ? top - 1 : bottom);
  setWordPart(r, S.sUntil, bottom < last ? bottom : whole(S.endRow));
  setWordPart(r, S.sEpoch, whole(S.polarEpoch));
  if (left > right || top > bottom) return;
  const bytes = rowBytes * (bottom - top + 1);
  if (whole(S.polarFree) + bytes > whole(S.polarPoolEnd)) {
    setWhole(S.polarEpoch, whole(S.polarEpoch) + 1);
    setWhole(S.polarFree, whole(S.polarPoolAt));
    setWordPart(r, S.sEpoch, whole(S.polarEpoch));
  }
  const patch = whole(S.polarFree);
  setWhole(S.polarFree, patch + bytes);
  setWordPart(r, S.sPatch, patch);
  openPatch(patch, left, right, top, bottom);
  const triangles = wordPart(table, 2);
  const end: i32 = triangles + 12 * wordPart(table, 3);
  for (let t = triangles; t < end; t += 12) drawMeshTriangle(r, t);
}

function drawMeshTriangle(r: i32, t: i32): void {
  const vertices = whole(S.polarVerticesAt);
  const a: i32 = vertices + (wordPart(t, 0) << 4);
  const b: i32 = vertices + (wordPart(t, 1) << 4);
  const c: i32 = vertices + (wordPart(t, 2) << 4);
  const isA = part(a, 3) < 0;
  const isB = part(b, 3) < 0;
  const isC = part(c, 3) < 0;
  // a triangle across a nodal cone keeps its two corners of one sign and the centre
  if (isA === isB && isB === isC) patchTriangle(a, b, c);
  else if (isA === isB) patchTriangle(a, b, r);
  else if (isA === isC) patchTriangle(a, r, c);
  else patchTriangle(r, b, c);
}

/** Depth and object of a surface's samples in rows `top` to `bottom` of the strip that starts at `first`. */
export function drawPolar(object: i32, r: i32, first: i32, top: i32, bottom: i32): void {
  if (wordPart(r, S.sEpoch) !== whole(S.polarEpoch) || first + bottom > wordPart(r, S.sUntil)) {
    setPatch(object - whole(S.quadricCount) - whole(S.cylinderCount), r, first + top);
  }
  const from = mostWhole(first + top, wordPart(r, S.sTop));
  const to = leastWhole(first + bottom, wordPart(r, S.sBottom));
  if (from <= to) layPatch(object, r, first, from, to);
}
