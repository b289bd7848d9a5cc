import * as S from '../slots.ts';
import { shaded } from './colour.ts';
import { setCylinderRim } from './cylinder.ts';
import {
  asReal,
  least,
  most,
  part,
  real,
  root,
  setPart,
  setWordPart,
  size,
  smooth,
  whole,
} from './memory.ts';
import { nearness, turnedPoint } from './place.ts';

// Cylinders seen in true perspective, by intersecting each sample's line of sight. With r = (X/E, Y/E, −1) for the image point
// (X, Y) and t = E − z, the line is eye + t r; q = eye − start, d the axis. See src/scene/perspective.ts for the image.

/** Image of a ball about a place in view axes, into numbers 37 to 42 of a record: centre (x, y, Z), Σ_xx, Σ_xy, Σ_yy. */
const ballAt = 37;

function setBall(r: i32, x: f32, y: f32, z: f32, radius: f32): void {
  const per = real(S.perEye);
  const square = radius * radius;
  const inner = square * per * per;
  const w = nearness(z);
  const d = w * w - inner;
  const perD: f32 = 1 / d;
  setPart(r, ballAt, w * x * perD);
  setPart(r, ballAt + 1, w * y * perD);
  setPart(
    r,
    ballAt + 2,
    (w * z + square * per + root(square * d + inner * z * z + w * z * square * per * 2 + square * inner)) *
      perD,
  );
  setPart(r, ballAt + 3, (d * square + inner * x * x) * perD * perD);
  setPart(r, ballAt + 4, inner * x * y * perD * perD);
  setPart(r, ballAt + 5, (d * square + inner * y * y) * perD * perD);
}

/** Half width of the ball's image along a direction of the picture. */
function ballReach(r: i32, x: f32, y: f32): f32 {
  const across = part(r, ballAt + 4) * x * y * 2;
  return root(part(r, ballAt + 3) * x * x + across + part(r, ballAt + 5) * y * y);
}

/** Bounds by the images of balls about both ends, and what the lines of sight need; false where it reaches too near to the eye. */
export function perspectiveCylinder(index: i32, object: i32): boolean {
  const r: i32 = whole(S.recordsAt) + ((S.recordSize * object) << 2);
  const start: i32 = whole(S.startsAt) + 12 * index;
  const end: i32 = whole(S.endsAt) + 12 * index;
  const per = real(S.perEye);
  const radius = part(whole(S.radiiAt), index) * real(S.samplesPerAngstrom);
  const x0 = turnedPoint(start, 0);
  const y0 = turnedPoint(start, 3);
  const z0 = turnedPoint(start, 6);
  const x1 = turnedPoint(end, 0);
  const y1 = turnedPoint(end, 3);
  const z1 = turnedPoint(end, 6);
  if (nearness(most(z0, z1) + radius) < real(S.leastNearness)) return false;
  const dx = x1 - x0;
  const dy = y1 - y0;
  const dz = z1 - z0;
  const length = root(dx * dx + dy * dy + dz * dz);
  const perLength: f32 = 1 / length;
  const ax = dx * perLength;
  const ay = dy * perLength;
  const az = dz * perLength;
  const qz: f32 = 1 / per - z0;
  setPart(r, S.pAxis, ax);
  setPart(r, S.pAxis + 1, ay);
  setPart(r, S.pAxis + 2, az);
  setPart(r, S.pToEye, -x0);
  setPart(r, S.pToEye + 1, -y0);
  setPart(r, S.pToEye + 2, qz);
  setPart(r, S.pMomentX, -(y0 * az + qz * ay) * per);
  setPart(r, S.pMomentY, (qz * ax + x0 * az) * per);
  setPart(r, S.pEyeAlong, qz * az - x0 * ax - y0 * ay);
  setPart(r, S.pSize, length);
  setPart(r, S.pRadius, radius);
  setPart(r, S.pColumn, real(S.middleColumn) + x0 / nearness(z0));
  setPart(r, S.pRow, real(S.middleRow) - y0 / nearness(z0));
  setCylinderRim(r, radius / nearness((z0 + z1) * 0.5));
  setBall(r, x0, y0, z0, radius);
  const cx = part(r, ballAt);
  const cy = part(r, ballAt + 1);
  const nearest = part(r, ballAt + 2);
  const reachX = ballReach(r, 1, 0);
  const reachY = ballReach(r, 0, 1);
  setBall(r, x1, y1, z1, radius);
  const runX = part(r, ballAt) - cx;
  const runY = part(r, ballAt + 1) - cy;
  const run = root(runX * runX + runY * runY);
  const isSeen = run > 1e-3;
  const tx: f32 = isSeen ? runX / run : 1;
  const ty: f32 = isSeen ? runY / run : 0;
  const along1 = ballReach(r, tx, ty);
  const across1 = ballReach(r, -ty, tx);
  const low = least(cx - reachX, part(r, ballAt) - ballReach(r, 1, 0));
  const high = most(cx + reachX, part(r, ballAt) + ballReach(r, 1, 0));
  const under = least(cy - reachY, part(r, ballAt + 1) - ballReach(r, 0, 1));
  const above = most(cy + reachY, part(r, ballAt + 1) + ballReach(r, 0, 1));
  setPart(r, S.oNearest, most(nearest, part(r, ballAt + 2)));
  setBall(r, x0, y0, z0, radius);
  setPart(r, S.cLow, -ballReach(r, tx, ty));
  setPart(r, S.cHigh, run + along1);
  setPart(r, S.cRadius, most(across1, ballReach(r, -ty, tx)));
  setPart(r, S.cAlongX, tx);
  setPart(r, S.cAlongY, ty);
  setPart(r, S.cColumn, real(S.middleColumn) + cx);
  setPart(r, S.cRow, real(S.middleRow) - cy);
  setPart(r, S.cMiddle, (low + high) * 0.5 - cx);
  setPart(r, S.oReach, (high - low) * 0.5);
  setPart(r, S.oBoxRow, real(S.middleRow) - (under + above) * 0.5);
  setPart(r, S.oBoxHalf, (above - under) * 0.5);
  return true;
}

/** Where a sample's line of sight meets the cylinder: t, or −1; `hitAlong` and the rest tell about the last hit. */
let hitAlong: f32 = 0;
let hitIsSide: boolean = false;
let hitEdge: f32 = 0;

function meet(r: i32, column: f32, row: f32): f32 {
  const per = real(S.perEye);
  const x = (column - real(S.middleColumn)) * per;
  const y = (real(S.middleRow) - row) * per;
  const ax = part(r, S.pAxis);
  const ay = part(r, S.pAxis + 1);
  const az = part(r, S.pAxis + 2);
  const along = x * ax + y * ay - az;
  const square = x * x + y * y - along * along + 1;
  const moment =
    part(r, S.pMomentX) * (column - part(r, S.pColumn)) + part(r, S.pMomentY) * (part(r, S.pRow) - row);
  const radius = part(r, S.pRadius);
  const bulge = square * radius * radius - moment * moment;
  if (bulge < 0) return -1;
  const eye = part(r, S.pEyeAlong);
  const b = part(r, S.pToEye) * x + part(r, S.pToEye + 1) * y - part(r, S.pToEye + 2) - eye * along;
  const t = (-b - root(bulge)) / square;
  hitAlong = eye + t * along;
  hitIsSide = hitAlong >= 0 && hitAlong <= part(r, S.pSize);
  hitEdge = (radius - size(moment) / root(square)) / (t * per);
  if (hitIsSide) return t;
  if (eye >= 0 && eye <= part(r, S.pSize)) return -1;
  hitAlong = eye < 0 ? 0 : part(r, S.pSize);
  const capT = (hitAlong - eye) / along;
  const off = capT * square + b;
  return capT > 0 && off * off <= bulge ? capT : -1;
}

/** Depth and object of the samples from column `start` to `end` of a row; `rowAt` is the row's offset in bytes. */
export function perspectiveCylinderSpan(
  object: i32,
  r: i32,
  row: i32,
  start: i32,
  end: i32,
  rowAt: i32,
): void {
  const eye: f32 = 1 / real(S.perEye);
  const depth: i32 = whole(S.depthAt) + rowAt;
  const ids: i32 = whole(S.idsAt) + rowAt;
  for (let x = start; x <= end; x++) {
    const t = meet(r, asReal(x), asReal(row));
    if (t <= 0) continue;
    const z = ((eye - t) * eye) / t;
    if (z <= part(depth, x)) continue;
    setPart(depth, x, z);
    setWordPart(ids, x, object + 1);
  }
}

/** Colours of a run of samples that show the cylinder. */
export function perspectiveCylinderRun(
  object: i32,
  row: i32,
  start: i32,
  end: i32,
  colours: i32,
  depth: i32,
): void {
  const r: i32 = whole(S.recordsAt) + ((S.recordSize * object) << 2);
  const offset: i32 = (S.tintSize * (object - whole(S.quadricCount))) << 2;
  const per = real(S.perEye);
  const perRadius: f32 = 1 / part(r, S.pRadius);
  for (let x = start; x < end; x++) {
    const t = meet(r, asReal(x), asReal(row));
    const ax = part(r, S.pAxis);
    const ay = part(r, S.pAxis + 1);
    const az = part(r, S.pAxis + 2);
    const facing: f32 = hitAlong > 0 ? 1 : -1;
    let nx = ax * facing;
    let ny = ay * facing;
    let nz = az * facing;
    if (hitIsSide) {
      const run = t * per;
      const columnOff = asReal(x) - real(S.middleColumn);
      const rowOff = real(S.middleRow) - asReal(row);
      nx = (part(r, S.pToEye) + columnOff * run - ax * hitAlong) * perRadius;
      ny = (part(r, S.pToEye + 1) + rowOff * run - ay * hitAlong) * perRadius;
      nz = (part(r, S.pToEye + 2) - t - az * hitAlong) * perRadius;
    }
    const edge: f32 = 1 - smooth(hitEdge, part(r, S.cRimLow), part(r, S.cRimPer));
    const ink: f32 = 1 - part(r, S.cRimInk) * edge;
    const isStart = hitAlong < part(r, S.pSize) * 0.5;
    const tint: i32 = whole(isStart ? S.startTintsAt : S.endTintsAt) + offset;
    setWordPart(colours, x, shaded(tint, nx, ny, nz, ink, 0, part(depth, x)));
  }
}
