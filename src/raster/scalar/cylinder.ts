import * as S from '../slots.ts';
import { most, part, real, root, setPart, size, smooth, whole } from './memory.ts';
import { setImage, turnedPoint } from './place.ts';

/** Record of a cylinder without perspective, as `cylinderSurface` of src/scene/pick.ts needs it. */
export function cylinder(index: i32, object: i32): boolean {
  const r: i32 = whole(S.recordsAt) + ((S.recordSize * object) << 2);
  const start: i32 = whole(S.startsAt) + 12 * index;
  const end: i32 = whole(S.endsAt) + 12 * index;
  const x = turnedPoint(end, 0) - turnedPoint(start, 0);
  const y = turnedPoint(end, 3) - turnedPoint(start, 3);
  const z = turnedPoint(end, 6) - turnedPoint(start, 6);
  setImage(r, 0, turnedPoint(start, 0), turnedPoint(start, 3), turnedPoint(start, 6));
  const flat = root(x * x + y * y);
  const length = root(x * x + y * y + z * z);
  const isSeen = flat > length * 1e-4;
  const radius = part(whole(S.radiiAt), index) * real(S.samplesPerAngstrom);
  const lie = flat / length;
  const rise = z / length;
  const cap = radius * size(rise);
  const capAt: f32 = rise > 0 ? length : 0;
  const isLying = lie > 1e-6;
  const hasCap = size(rise) >= 1e-6;
  setPart(r, S.cAlongX, isSeen ? x / flat : 1);
  setPart(r, S.cAlongY, isSeen ? y / flat : 0);
  setPart(r, S.cRadius, radius);
  setPart(r, S.cSize, length);
  setPart(r, S.cLie, lie);
  setPart(r, S.cRise, rise);
  setPart(r, S.cLow, -cap);
  setPart(r, S.cHigh, flat + cap);
  setPart(r, S.cPerLie, isLying ? 1 / lie : 0);
  setPart(r, S.cBias, isLying ? 0 : -1);
  setPart(r, S.cPerRise, hasCap ? 1 / rise : 0);
  setPart(r, S.cCapBias, hasCap ? (capAt * lie) / rise : 1e15);
  setPart(r, S.cCapAt, capAt * rise);
  setPart(r, S.cFacing, rise > 0 ? 1 : -1);
  setCylinderRim(r, radius);
  const across = radius + cap;
  setPart(r, S.oNearest, part(r, S.cDepth) + most(z, 0) + radius);
  setPart(r, S.cMiddle, x * 0.5);
  setPart(r, S.oReach, size(x) * 0.5 + across);
  setPart(r, S.oBoxRow, part(r, S.cRow) - y * 0.5);
  setPart(r, S.oBoxHalf, size(y) * 0.5 + across);
  return true;
}

/** Edge of a cylinder with a radius on screen. */
export function setCylinderRim(r: i32, radius: f32): void {
  const scale = real(S.pixelScale);
  const shown = smooth(radius / scale, real(S.cylinderRimFrom), real(S.cylinderRimPer));
  setPart(r, S.cRimInk, real(S.cylinderRimInk) * shown);
  setPart(r, S.cRimLow, (real(S.cylinderRimWidth) - 0.4) * scale);
  setPart(r, S.cRimPer, 1 / (scale * 0.8));
}
