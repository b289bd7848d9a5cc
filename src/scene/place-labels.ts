import type { Vec3 } from '#src/base/matrix3.ts';
import { apply, multiply, transpose } from '#src/base/matrix3.ts';
import { dot } from '#src/base/vector3.ts';
import type { Camera, Viewport } from './camera.ts';
import type { Clearness } from './label-clearness.ts';
import { clearness, isPlain, obstacles, seenPoints } from './label-clearness.ts';
import type { LabelRoom, LedBox, ScreenBox, ScreenLine } from './label-room.ts';
import { labelRoom } from './label-room.ts';
import type { Projection } from './project.ts';
import { enlargement, projection, projectPoint, viewShape } from './project.ts';
import type { LabelAnchor, Scene } from './scene.ts';
import type { ScreenAtoms } from './screen-atoms.ts';
import { outlineShare, polarTensor, screenAtoms } from './screen-atoms.ts';

/** An atom's label on screen before it is placed; CSS pixels from the upper left corner. */
export interface ProjectedAnchor {
  readonly text: string;
  readonly pickId: number;
  /** Index of the atom's ellipsoid. */
  readonly quadric: number;
  readonly xPx: number;
  readonly yPx: number;
  readonly depthPx: number;
  /** Distance from the centre to the atom's outline in a direction on screen (unit vector, y downwards). */
  readonly outlinePx: (dx: number, dy: number) => number;
  /** Points of the atom that nothing covers: its centre alone where that is seen, else some of those round it. */
  readonly seen: () => readonly { readonly xPx: number; readonly yPx: number }[];
  /** Whether other atoms cover this one. */
  readonly isHidden: () => boolean;
}

/** A label that found room. */
export interface PlacedLabel extends LedBox {
  readonly text: string;
  readonly pickId: number;
  /** Line from a seen point of the atom, the centre if it can be, to the box, where the label stands away or could be another atom's. */
  readonly leader: ScreenLine | null;
  /** Which of the possible spots about its atom it took. */
  readonly spot: number;
}

/** Width and height of a text as it will be set, CSS pixels. */
export type MeasureText = (text: string) => { readonly widthPx: number; readonly heightPx: number };

/** Labels looked at, most; beyond that no picture has room. */
const mostLabels = 1200;

/** Anchors of all labels in the viewport, front first. */
export function projectAnchors(scene: Scene, camera: Camera, viewport: Viewport): ProjectedAnchor[] {
  const p = projection(camera, viewport);
  return scene.labels.length === 0 ? [] : anchorsOf(scene, p, viewport, screenAtoms(scene, p, viewport));
}

function anchorsOf(scene: Scene, p: Projection, viewport: Viewport, atoms: ScreenAtoms): ProjectedAnchor[] {
  const polarOf = new Map<number, number>();
  scene.polars?.pickIds.forEach((pickId, k) => polarOf.set(pickId, k));
  const anchors: ProjectedAnchor[] = [];
  for (const label of scene.labels) {
    const at = projectPoint(p, label.position);
    const isInside = at.xPx >= 0 && at.yPx >= 0 && at.xPx <= viewport.widthPx && at.yPx <= viewport.heightPx;
    if (!isInside) continue;
    let known: ReturnType<typeof seenPoints> | null = null;
    const seen = () => (known ??= seenPoints(atoms, label.quadric));
    anchors.push({
      text: label.text,
      pickId: label.pickId,
      quadric: label.quadric,
      ...at,
      outlinePx: outlineOf(scene, p, label, enlargement(p, at.depthPx), polarOf.get(label.pickId)),
      seen,
      isHidden: () => seen().length === 0,
    });
  }
  return anchors.sort((one, other) => other.depthPx - one.depthPx || one.pickId - other.pickId);
}

/** Outline of the atom's ellipsoid: d / √(dᵀ Σ⁻¹ d), Σ = M Mᵀ on screen; or of its polar surface where that is farther. */
function outlineOf(
  scene: Scene,
  p: Projection,
  label: LabelAnchor,
  grown: number,
  polar: number | undefined,
): (dx: number, dy: number) => number {
  let known: ((dx: number, dy: number) => number) | null = null;
  // most anchors are never placed: their shape is turned only when asked for
  return (dx, dy) => (known ??= turnedOutline(scene, p, label, grown, polar))(dx, dy);
}

function turnedOutline(
  scene: Scene,
  p: Projection,
  label: LabelAnchor,
  grown: number,
  polar: number | undefined,
): (dx: number, dy: number) => number {
  const m = viewShape(p, scene.quadrics, label.quadric);
  const across: Vec3 = [m[0], m[1], m[2]];
  const upwards: Vec3 = [m[3], m[4], m[5]];
  const [xx, xy, yy] = [dot(across, across), dot(across, upwards), dot(upwards, upwards)];
  const size = grown * Math.sqrt(Math.max(0, xx * yy - xy * xy));
  const lobes =
    polar === undefined || !scene.polars
      ? null
      : multiply(multiply(p.rotation, polarTensor(scene.polars.tensors, polar)), transpose(p.rotation));
  return (dx, dy) => {
    const ellipse = size / Math.sqrt(yy * dx * dx + 2 * xy * dx * dy + xx * dy * dy);
    if (!lobes) return ellipse;
    const direction: Vec3 = [dx, -dy, 0];
    return Math.max(ellipse, grown * p.scale * Math.abs(dot(direction, apply(lobes, direction))));
  };
}

/** A place about an atom where its label may stand: a direction on screen (y downwards), and the gap to the outline. */
interface Spot {
  readonly dx: number;
  readonly dy: number;
  readonly gapPx: number;
  /** How much worse than the best spot, with nothing in the way. */
  readonly price: number;
}

/** CSS pixels between an atom's outline and its label beside it, and farther away, with a leader line. */
const nearPx = 3;
const farPx = [14, 26, 40, 58] as const;
/** Best direction first: upper right, right, lower right, upper left, left, lower left, above, below; then those between. */
const directions: readonly (readonly [number, number])[] = [
  ...[-45, 0, 45, -135, 180, 135, -90, 90],
  ...[-22.5, 22.5, -67.5, 67.5, -157.5, 157.5, -112.5, 112.5],
].map((degrees) => [Math.cos((degrees * Math.PI) / 180), Math.sin((degrees * Math.PI) / 180)] as const);

const nearSpots: readonly Spot[] = directions.map(([dx, dy], i) => ({
  ...{ dx, dy, gapPx: nearPx, price: 0.04 * i },
}));
/** On the atom itself, where it is large enough. */
const onAtom: Spot = { dx: 0, dy: 0, gapPx: 0, price: 1.3 };
const awaySpots: readonly Spot[] = [
  onAtom,
  ...farPx.flatMap((gapPx, ring) =>
    directions.map(([dx, dy], i) => ({ dx, dy, gapPx, price: 0.9 + 0.5 * ring + 0.03 * i })),
  ),
].sort((one, other) => one.price - other.price);
/** All spots; those beside the atom come first. */
const spots: readonly Spot[] = [...nearSpots, ...awaySpots];

/** Price of each outline that a label with a leader touches, and what the spot of the picture before is worth. */
const touchPrice = 0.4;
const loyalty = 0.45;

/**
 * Labels that have room, front atoms first. A label stands beside its atom where nobody can take it for another one's; then,
 * where no such place is left, farther away with a leader line that ends on its atom, off other atoms; or on the atom itself.
 * Without room, or on a covered atom, it is left out. Labels keep within the viewport, off each other and each other's leaders
 * and off the boxes `keptOff`. With the labels of the picture before, each prefers the spot it had, so that labels don't jump
 * while the crystal turns; the same input gives the same labels.
 */
export function placeLabels(
  scene: Scene,
  camera: Camera,
  viewport: Viewport,
  measure: MeasureText,
  before: readonly PlacedLabel[] = [],
  keptOff: readonly ScreenBox[] = [],
): PlacedLabel[] {
  if (scene.labels.length === 0) return [];
  const p = projection(camera, viewport);
  const atoms = screenAtoms(scene, p, viewport);
  const previous = new Map(before.map(({ pickId, spot }) => [pickId, spot]));
  const place: Place = { room: labelRoom(viewport, keptOff), clear: clearness(atoms) };
  const placed: PlacedLabel[] = [];
  const take = (label: PlacedLabel | null): boolean => {
    if (!label) return false;
    place.room.take(label);
    placed.push(label);
    return true;
  };
  const crowded: ProjectedAnchor[] = [];
  let looked = 0;
  for (const anchor of anchorsOf(scene, p, viewport, atoms)) {
    if (anchor.isHidden()) continue;
    if (looked++ >= mostLabels) break;
    if (!take(beside(anchor, measure(anchor.text), previous.get(anchor.pickId), place))) crowded.push(anchor);
  }
  for (const anchor of crowded) take(away(anchor, measure(anchor.text), previous.get(anchor.pickId), place));
  return placed;
}

interface Place {
  readonly room: LabelRoom;
  readonly clear: Clearness;
}

/** The first spot beside the atom that is free and clear; the one before if it is not much worse. */
function beside(
  anchor: ProjectedAnchor,
  size: ReturnType<MeasureText>,
  before: number | undefined,
  { room, clear }: Place,
): PlacedLabel | null {
  const fits = (index: number): PlacedLabel | null => {
    const label = labelAt(anchor, size, index, false);
    if (!room.isFree(label) || !isPlain(label, anchor.pickId, clear)) return null;
    return standsAtSeenPart(anchor, spots[index]!) ? label : null;
  };
  const known = before !== undefined && before < nearSpots.length ? fits(before) : null;
  const limit = before === undefined ? Infinity : spots[before]!.price - loyalty;
  for (const [index, { price }] of nearSpots.entries()) {
    if (known && price >= limit) break;
    // a label that stood away comes back only to a much better place
    if (!known && before !== undefined && before >= nearSpots.length && price >= limit) break;
    const label = fits(index);
    if (label) return label;
  }
  return known;
}

/** A partly covered atom has its label on the side that is seen. */
function standsAtSeenPart({ xPx, yPx, seen }: ProjectedAnchor, { dx, dy }: Spot): boolean {
  return seen().some((at) => {
    const [x, y] = [at.xPx - xPx, at.yPx - yPx];
    return x * dx + y * dy >= 0.7 * Math.hypot(x, y);
  });
}

/** The cheapest free spot away from the atom, or on it. */
function away(
  anchor: ProjectedAnchor,
  size: ReturnType<MeasureText>,
  before: number | undefined,
  { room, clear }: Place,
): PlacedLabel | null {
  let best: PlacedLabel | null = null;
  let bestPrice = Infinity;
  const look = (index: number, rebate: number): void => {
    const spot = spots[index]!;
    const price = spot.price - rebate;
    if (price >= bestPrice) return;
    const label = labelAt(anchor, size, index, spot !== onAtom);
    if (!room.isFree(label)) return;
    if (spot === onAtom && !(isInside(label, anchor, clear) && isPlain(label, anchor.pickId, clear))) return;
    const full = price + touchPrice * obstacles(label, anchor.pickId, clear);
    if (full >= bestPrice) return;
    best = label;
    bestPrice = full;
  };
  if (before !== undefined && before >= nearSpots.length) look(before, loyalty);
  for (let index = nearSpots.length; index < spots.length; index++) {
    if (spots[index]!.price >= bestPrice) break;
    look(index, 0);
  }
  return best;
}

/** Whether an atom's own outline holds all of a box. */
function isInside(
  { leftPx, topPx, widthPx, heightPx }: ScreenBox,
  { quadric }: ProjectedAnchor,
  { atoms }: Clearness,
) {
  return [leftPx, leftPx + widthPx].every((x) =>
    [topPx, topPx + heightPx].every((y) => outlineShare(atoms, quadric, x, y) < 1),
  );
}

function labelAt(
  { text, pickId, xPx, yPx, outlinePx, seen }: ProjectedAnchor,
  { widthPx, heightPx }: ReturnType<MeasureText>,
  spot: number,
  isLed: boolean,
): PlacedLabel {
  const { dx, dy, gapPx } = spots[spot]!;
  const outline = gapPx > 0 ? outlinePx(dx, dy) : 0;
  const x = xPx + dx * (outline + gapPx);
  const y = yPx + dy * (outline + gapPx);
  const across = Math.abs(dx) < 1e-9 ? 0.5 : dx > 0 ? 0 : 1;
  const leftPx = x - across * widthPx;
  const topPx = y - heightPx / 2 + (dy * heightPx) / 2;
  const leader = isLed ? leaderTo(x - dx, y - dy, seen()) : null;
  return { text, pickId, leftPx, topPx, widthPx, heightPx, leader, spot };
}

/** From the nearest point of the atom that is seen. */
function leaderTo(x: number, y: number, seen: ReturnType<ProjectedAnchor['seen']>): ScreenLine {
  const far = (at: { readonly xPx: number; readonly yPx: number }) => Math.hypot(at.xPx - x, at.yPx - y);
  const end = seen.reduce((best, at) => (far(at) < far(best) ? at : best));
  return [end.xPx, end.yPx, x, y];
}
