import type { LedBox, ScreenBox } from './label-room.ts';
import type { ScreenAtoms } from './screen-atoms.ts';
import { isCovered, outlineShare } from './screen-atoms.ts';

/** Directions along which boxes and outlines are tried apart: a 32nd of a turn errs by 0.5 % of the distance of their middles. */
const normals = Array.from({ length: 32 }, (_, k): readonly [number, number] => {
  const angle = (2 * Math.PI * k) / 32;
  return [Math.cos(angle), Math.sin(angle)];
});

/**
 * Distance of a box from the outline of what is drawn as i, CSS pixels; below 0 where they overlap, by the least shift that
 * would part them. Two convex shapes are as far apart as the farthest pair of parallel lines between them.
 */
export function distanceToOutline(atoms: ScreenAtoms, i: number, box: ScreenBox): number {
  const [w, h] = [box.widthPx / 2, box.heightPx / 2];
  const [x, y] = [box.leftPx + w - atoms.xPx[i]!, box.topPx + h - atoms.yPx[i]!];
  const [xx, yy, xy] = [atoms.halfWidthPx[i]! ** 2, atoms.halfHeightPx[i]! ** 2, atoms.tiltPx2[i]!];
  let most = -Infinity;
  for (const [nx, ny] of normals) {
    const apart = nx * x + ny * y;
    if (apart <= most) continue;
    const reach = Math.sqrt(Math.max(0, xx * nx * nx + 2 * xy * nx * ny + yy * ny * ny));
    most = Math.max(most, apart - w * Math.abs(nx) - h * Math.abs(ny) - reach);
  }
  return most;
}

/** Points of an outline, as share of the way from the centre, at which it is looked whether an atom is seen. */
const lookedShare = 0.75;
const lookedDirections = normals.filter((_, k) => k % 4 === 0);

/** Points of what is drawn as i that nothing nearer covers: its centre alone where that is seen, else some round it. */
export function seenPoints(atoms: ScreenAtoms, i: number): { readonly xPx: number; readonly yPx: number }[] {
  const [depthPx, ownId] = [atoms.depthPx[i]!, atoms.pickIds[i]!];
  const centre = { xPx: atoms.xPx[i]!, yPx: atoms.yPx[i]!, depthPx };
  if (!isCovered(centre, ownId, atoms)) return [centre];
  return lookedDirections
    .map(([dx, dy]) => {
      const share = outlineShare(atoms, i, centre.xPx + dx, centre.yPx + dy);
      const out = lookedShare / share;
      return { xPx: centre.xPx + out * dx, yPx: centre.yPx + out * dy, depthPx };
    })
    .filter((at) => Number.isFinite(at.xPx) && !isCovered(at, ownId, atoms));
}

/** What labels ask of the atoms on screen; atoms that are not seen at all don't count. */
export interface Clearness {
  readonly atoms: ScreenAtoms;
  readonly isSeen: (i: number) => boolean;
}

export function clearness(atoms: ScreenAtoms): Clearness {
  // 0: not looked at yet
  const known = new Uint8Array(atoms.count);
  const isSeen = (i: number): boolean => {
    if (known[i] === 0) known[i] = seenPoints(atoms, i).length > 0 ? 1 : 2;
    return known[i] === 1;
  };
  return { atoms, isSeen };
}

/** An atom nearer than so many times the own distance, or the own distance and so many pixels, makes a label doubtful. */
const clearFactor = 1.7;
const clearPx = 2.5;
/** Farther than this from its atom no label stands without a leader, CSS pixels. */
const farthestPx = 6;

/** Whether everybody takes a label without a leader for that of its own atom: every other atom is clearly farther away. */
export function isPlain(box: ScreenBox, ownId: number, { atoms, isSeen }: Clearness): boolean {
  const { leftPx: left, topPx: top } = box;
  const [right, bottom] = [left + box.widthPx, top + box.heightPx];
  const pad = clearFactor * farthestPx;
  let own = farthestPx;
  let other = Infinity;
  atoms.within(left - pad, top - pad, right + pad, bottom + pad, (i) => {
    if (atoms.pickIds[i] === ownId) own = Math.min(own, distanceToOutline(atoms, i, box));
    else if (isSeen(i)) other = Math.min(other, distanceToOutline(atoms, i, box));
    return other <= clearPx;
  });
  own = Math.max(0, own);
  return other >= Math.max(clearFactor * own, own + clearPx);
}

/** Most of a box with a leader that may lie on other atoms' outlines, CSS pixels deep. */
const deepestPx = 2.5;
/** A leader keeps this share of an outline away from every other atom's centre. */
const centreShare = 0.5;

/**
 * What stands in the way of a label with a leader: 0 nothing; Infinity where its box covers another atom or its line runs over
 * another one's middle; else the number of outlines it touches.
 */
export function obstacles(label: LedBox, ownId: number, { atoms, isSeen }: Clearness): number {
  const [right, bottom] = [label.leftPx + label.widthPx, label.topPx + label.heightPx];
  let count = 0;
  atoms.within(label.leftPx, label.topPx, right, bottom, (i) => {
    if (atoms.pickIds[i] === ownId || !isSeen(i)) return false;
    const distance = distanceToOutline(atoms, i, label);
    if (distance < 0) count += distance < -deepestPx ? Infinity : 1;
    return count === Infinity;
  });
  if (!label.leader || count === Infinity) return count;
  const [x1, y1, x2, y2] = label.leader;
  const [left, top, far, low] = [Math.min(x1, x2), Math.min(y1, y2), Math.max(x1, x2), Math.max(y1, y2)];
  atoms.within(left, top, far, low, (i) => {
    if (atoms.pickIds[i] === ownId || !isSeen(i)) return false;
    const share = leastShare(atoms, i, label.leader!);
    if (share < 1) count += share < centreShare ? Infinity : 1;
    return count === Infinity;
  });
  return count;
}

/** How near a line comes to a centre, in shares of the outline: the least of √(xᵀ Σ⁻¹ x) along it. */
function leastShare(atoms: ScreenAtoms, i: number, [x1, y1, x2, y2]: readonly number[]): number {
  const [xx, yy, xy] = [atoms.halfWidthPx[i]! ** 2, atoms.halfHeightPx[i]! ** 2, atoms.tiltPx2[i]!];
  const [x, y, dx, dy] = [atoms.xPx[i]! - x1!, atoms.yPx[i]! - y1!, x2! - x1!, y2! - y1!];
  const along = yy * dx * dx - 2 * xy * dx * dy + xx * dy * dy;
  const mixed = yy * x * dx - xy * (x * dy + y * dx) + xx * y * dy;
  const t = along > 0 ? Math.min(1, Math.max(0, mixed / along)) : 0;
  return outlineShare(atoms, i, x1! + t * dx, y1! + t * dy);
}
