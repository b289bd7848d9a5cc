import * as S from '../slots.ts';
import { isDark, shaded } from './colour.ts';
import {
  asReal,
  down,
  least,
  most,
  part,
  real,
  root,
  setPart,
  setWhole,
  setWordPart,
  size,
  smooth,
  whole,
  wordPart,
} from './memory.ts';
import { nearness, setImage, turnedPoint } from './place.ts';
import { clockwiseArea, drawTriangle, setTriangle } from './triangle.ts';

// Signed polar surfaces, as src/scene/polar-mesh.ts describes them.

const bandsPerNorm: f32 = 10;

/** Projects the mesh of a surface and fills its record; false where it isn't drawn. */
export function polar(index: i32, object: i32): boolean {
  const meshes: i32 = whole(S.polarMeshesAt) + 8 * index;
  const level = wordPart(meshes, 0);
  if (level < 0) return false;
  const r: i32 = whole(S.recordsAt) + ((S.recordSize * object) << 2);
  const centre: i32 = whole(S.polarCentresAt) + 12 * index;
  const tensor: i32 = whole(S.polarTensorsAt) + 24 * index;
  for (let k = 0; k < 3; k++) setPart(r, S.sCentre + k, turnedPoint(centre, 3 * k));
  setImage(r, 0, part(r, S.sCentre), part(r, S.sCentre + 1), part(r, S.sCentre + 2));
  setTensor(r, tensor);
  const table: i32 = whole(S.meshTableAt) + ((S.meshSize * level) << 2);
  setVertices(r, tensor, wordPart(table, 0), wordPart(table, 1), wordPart(meshes, 1));
  setWhole(S.polarInScratch, -1);
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

function setVertices(r: i32, t: i32, directions: i32, count: i32, vertices: i32): void {
  const per = real(S.perEye);
  const cx = part(r, S.sCentre);
  const cy = part(r, S.sCentre + 1);
  const cz = part(r, S.sCentre + 2);
  const turn: i32 = S.turn << 2;
  let left: f32 = part(r, 0);
  let right: f32 = left;
  let top: f32 = part(r, 1);
  let bottom: f32 = top;
  let nearest: f32 = part(r, 2);
  for (let k = 0; k < count; k++) {
    const n: i32 = directions + 12 * k;
    const x = part(n, 0);
    const y = part(n, 1);
    const z = part(n, 2);
    const own = part(t, 0) * x * x + part(t, 1) * y * y + part(t, 2) * z * z;
    const radius = own + (part(t, 3) * x * y + part(t, 4) * x * z + part(t, 5) * y * z) * 2;
    const length = size(radius);
    const vx = cx + (part(turn, 0) * x + part(turn, 1) * y + part(turn, 2) * z) * length;
    const vy = cy + (part(turn, 3) * x + part(turn, 4) * y + part(turn, 5) * z) * length;
    const vz = cz + (part(turn, 6) * x + part(turn, 7) * y + part(turn, 8) * z) * length;
    const w: f32 = 1 / -(vz * per - 1);
    const column = real(S.middleColumn) + vx * w;
    const row = real(S.middleRow) - vy * w;
    const v: i32 = vertices + 16 * k;
    setPart(v, 0, column);
    setPart(v, 1, row);
    setPart(v, 2, vz * w);
    setPart(v, 3, radius);
    left = least(left, column);
    right = most(right, column);
    top = least(top, row);
    bottom = most(bottom, row);
    nearest = most(nearest, vz * w);
  }
  setPart(r, S.cMiddle, (left + right) * 0.5 - part(r, 0));
  setPart(r, S.oReach, (right - left) * 0.5);
  setPart(r, S.oBoxRow, (top + bottom) * 0.5);
  setPart(r, S.oBoxHalf, (bottom - top) * 0.5);
  setPart(r, S.oNearest, nearest);
}

/** Depth and object of a surface's samples in rows `top` to `bottom` of the strip that starts at `first`. */
export function drawPolar(object: i32, r: i32, first: i32, top: i32, bottom: i32): void {
  const index = object - whole(S.quadricCount) - whole(S.cylinderCount);
  const meshes: i32 = whole(S.polarMeshesAt) + 8 * index;
  const vertices = wordPart(meshes, 1);
  const table: i32 = whole(S.meshTableAt) + ((S.meshSize * wordPart(meshes, 0)) << 2);
  const triangles = wordPart(table, 2);
  const triangleCount = wordPart(table, 3);
  if (vertices === whole(S.polarScratchAt) && whole(S.polarInScratch) !== object) {
    const tensor: i32 = whole(S.polarTensorsAt) + 24 * index;
    setVertices(r, tensor, wordPart(table, 0), wordPart(table, 1), vertices);
    setWhole(S.polarInScratch, object);
  }
  const highest = asReal(first + top);
  const lowest = asReal(first + bottom);
  for (let k = 0; k < triangleCount; k++) {
    const t: i32 = triangles + 12 * k;
    let a: i32 = vertices + (wordPart(t, 0) << 4);
    let b: i32 = vertices + (wordPart(t, 1) << 4);
    let c: i32 = vertices + (wordPart(t, 2) << 4);
    const isA = part(a, 3) < 0;
    const isB = part(b, 3) < 0;
    const isC = part(c, 3) < 0;
    // a triangle across a nodal cone keeps its two corners of one sign and the centre
    if (isA !== isB || isB !== isC) {
      if (isA === isB) c = r;
      else if (isA === isC) b = r;
      else a = r;
    }
    if (part(a, 1) < highest && part(b, 1) < highest && part(c, 1) < highest) continue;
    if (part(a, 1) > lowest && part(b, 1) > lowest && part(c, 1) > lowest) continue;
    setTriangle(a, b, c);
    if (clockwiseArea() < 0) drawTriangle(object, 0, first, top, bottom);
  }
}

/** Colours of a run of samples that show a polar surface: all follows from the place of each. */
export function polarRun(object: i32, row: i32, start: i32, end: i32, colours: i32, depth: i32): void {
  const r: i32 = whole(S.recordsAt) + ((S.recordSize * object) << 2);
  const offset: i32 = (S.tintSize * (object - whole(S.quadricCount) - whole(S.cylinderCount))) << 2;
  const positive: i32 = whole(S.positiveTintsAt) + offset;
  const negative: i32 = whole(S.negativeTintsAt) + offset;
  if (part(r, S.oShaded) === 0) {
    setPart(r, S.sIsDark, isDark(positive));
    setPart(r, S.sNegativeIsDark, isDark(negative));
    setPart(r, S.oShaded, 1);
  }
  const per = real(S.perEye);
  const t: i32 = r + (S.sTensor << 2);
  const rowOff = real(S.middleRow) - asReal(row);
  for (let x = start; x < end; x++) {
    const imageDepth = part(depth, x);
    const w: f32 = 1 / (imageDepth * per + 1);
    const columnOff = asReal(x) - real(S.middleColumn);
    const px = columnOff * w - part(r, S.sCentre);
    const py = rowOff * w - part(r, S.sCentre + 1);
    const pz = imageDepth * w - part(r, S.sCentre + 2);
    const length = root(px * px + py * py + pz * pz);
    const tx = part(t, 0) * px + part(t, 3) * py + part(t, 4) * pz;
    const ty = part(t, 3) * px + part(t, 1) * py + part(t, 5) * pz;
    const tz = part(t, 4) * px + part(t, 5) * py + part(t, 2) * pz;
    const isNegative = px * tx + py * ty + pz * tz < 0;
    const s: f32 = isNegative ? 2 : -2;
    const gx = px * length * 3 + tx * s;
    const gy = py * length * 3 + ty * s;
    const gz = pz * length * 3 + tz * s;
    let ink: f32 = 1;
    let white: f32 = 0;
    if (part(r, S.sRimInk) > 0) {
      const rim = rimDistance(r, columnOff * per, rowOff * per, px, py, pz, gx, gy, gz, s);
      const away = smooth(rim / (w * real(S.pixelScale)), real(S.rimWidth) - 0.4, 1 / 0.8);
      ink = 1 - part(r, S.sRimInk) * (1 - away);
    }
    if (isNegative) {
      const bands = length * part(r, S.sBands);
      const strength = bands - asReal(down(bands)) < 0.4 ? part(r, S.sBandInk) : 0;
      if (part(r, S.sNegativeIsDark) === 1) white = strength * 0.55;
      else ink *= 1 - strength * 0.88;
    }
    setWordPart(colours, x, shaded(isNegative ? negative : positive, gx, gy, gz, ink, white, imageDepth));
  }
}

/** As polarRimDistance of src/scene/polar-mesh.ts, the viewer in the direction (−vx, −vy, 1). */
function rimDistance(
  r: i32,
  vx: f32,
  vy: f32,
  px: f32,
  py: f32,
  pz: f32,
  gx: f32,
  gy: f32,
  gz: f32,
  s: f32,
): f32 {
  const t: i32 = r + (S.sTensor << 2);
  const per: f32 = 1 / root(vx * vx + vy * vy + 1);
  const x = -vx * per;
  const y = -vy * per;
  const length = most(root(px * px + py * py + pz * pz), 1e-6);
  const along = ((px * x + py * y + pz * per) * 3) / length;
  const hx = x * length * 3 + px * along + (part(t, 0) * x + part(t, 3) * y + part(t, 4) * per) * s;
  const hy = y * length * 3 + py * along + (part(t, 3) * x + part(t, 1) * y + part(t, 5) * per) * s;
  const hz = per * length * 3 + pz * along + (part(t, 4) * x + part(t, 5) * y + part(t, 2) * per) * s;
  const facing = gx * x + gy * y + gz * per;
  const steep = hx * x + hy * y + hz * per;
  const qx = facing * hx - steep * gx;
  const qy = facing * hy - steep * gy;
  const qz = facing * hz - steep * gz;
  const qv = qx * x + qy * y + qz * per;
  const across = root(most(qx * qx + qy * qy + qz * qz - qv * qv, 0));
  return (facing * facing) / most(across * 2, 1e-9);
}
