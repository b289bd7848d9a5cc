import type { Vec3 } from '#src/base/matrix3.ts';
import { apply, multiply, transpose } from '#src/base/matrix3.ts';
import { dot } from '#src/base/vector3.ts';
import type { Camera, Viewport } from './camera.ts';
import type { Projection } from './project.ts';
import { enlargement, projection, projectPoint, viewShape } from './project.ts';
import type { LabelAnchor, Scene } from './scene.ts';
import type { ScreenAtoms } from './screen-atoms.ts';
import { isCovered, polarTensor, screenAtoms } from './screen-atoms.ts';

/** An atom's label on screen before it is placed; CSS pixels from the upper left corner. */
export interface ProjectedAnchor {
  readonly text: string;
  readonly pickId: number;
  readonly xPx: number;
  readonly yPx: number;
  readonly depthPx: number;
  /** Distance from the centre to the atom's outline in a direction on screen (unit vector, y downwards). */
  readonly outlinePx: (dx: number, dy: number) => number;
  /** Whether another atom covers this one's centre. */
  readonly isHidden: () => boolean;
}

/** A label that found room: its box's left upper corner. */
export interface PlacedLabel {
  readonly text: string;
  readonly pickId: number;
  readonly leftPx: number;
  readonly topPx: number;
  readonly widthPx: number;
  readonly heightPx: number;
  /** Line from the atom's outline to the box, where the label had to move away from its atom: x1, y1, x2, y2. */
  readonly leader: readonly [number, number, number, number] | null;
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
    anchors.push({
      text: label.text,
      pickId: label.pickId,
      ...at,
      outlinePx: outlineOf(scene, p, label, enlargement(p, at.depthPx), polarOf.get(label.pickId)),
      isHidden: () => isCovered(at, label.pickId, atoms),
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

/** CSS pixels between an atom's outline and its label, and farther away, with a leader line. */
const gapsPx = [3, 18, 36] as const;
const gapPrices = [0, 0.6, 1] as const;
/** Best direction first: upper right, right, lower right, upper left, left, lower left, above, below. */
const directions: readonly (readonly [number, number])[] = [
  [Math.SQRT1_2, -Math.SQRT1_2],
  [1, 0],
  [Math.SQRT1_2, Math.SQRT1_2],
  [-Math.SQRT1_2, -Math.SQRT1_2],
  [-1, 0],
  [-Math.SQRT1_2, Math.SQRT1_2],
  [0, -1],
  [0, 1],
];

/** All spots, cheapest first. */
const spots: readonly Spot[] = gapsPx.flatMap((gapPx, ring) =>
  directions.map(([dx, dy], i) => ({ dx, dy, gapPx, price: gapPrices[ring]! + 0.04 * i })),
);

/** Price of standing wholly on other atoms, and what the spot of the picture before is worth. */
const coverPrice = 1.2;
const loyalty = 0.45;

/**
 * Labels that have room, front atoms first: each takes the cheapest spot about its atom whose box neither leaves the
 * viewport nor meets a label placed before. Standing on other atoms costs, so does distance; a label that stands away gets a
 * leader line. A label without room, or of a covered atom, is left out. With the labels of the picture before, each
 * prefers the spot it had, so that labels don't jump while the crystal turns; the same input gives the same labels.
 */
export function placeLabels(
  scene: Scene,
  camera: Camera,
  viewport: Viewport,
  measure: MeasureText,
  before: readonly PlacedLabel[] = [],
): PlacedLabel[] {
  if (scene.labels.length === 0) return [];
  const p = projection(camera, viewport);
  const atoms = screenAtoms(scene, p, viewport);
  const previous = new Map(before.map(({ pickId, spot }) => [pickId, spot]));
  const room = freeRoom(viewport);
  let looked = 0;
  for (const anchor of anchorsOf(scene, p, viewport, atoms)) {
    if (anchor.isHidden()) continue;
    if (looked++ >= mostLabels) break;
    const best = cheapest(anchor, measure(anchor.text), previous.get(anchor.pickId), room, atoms);
    if (best) room.take(best);
  }
  return room.taken;
}

function cheapest(
  anchor: ProjectedAnchor,
  size: ReturnType<MeasureText>,
  before: number | undefined,
  room: FreeRoom,
  atoms: ScreenAtoms,
): PlacedLabel | null {
  let best: PlacedLabel | null = null;
  let bestPrice = Infinity;
  const look = (index: number, rebate: number): void => {
    const price = spots[index]!.price - rebate;
    if (price >= bestPrice) return;
    const label = labelAt(anchor, size, index);
    if (!room.isFree(label)) return;
    const full = price + coverPrice * coveredShare(label, atoms, (bestPrice - price) / coverPrice);
    if (full >= bestPrice) return;
    best = label;
    bestPrice = full;
  };
  if (before !== undefined) look(before, loyalty);
  for (let index = 0; index < spots.length; index++) look(index, 0);
  return best;
}

function labelAt(
  { text, pickId, xPx, yPx, outlinePx }: ProjectedAnchor,
  { widthPx, heightPx }: ReturnType<MeasureText>,
  spot: number,
): PlacedLabel {
  const { dx, dy, gapPx } = spots[spot]!;
  const outline = outlinePx(dx, dy);
  const x = xPx + dx * (outline + gapPx);
  const y = yPx + dy * (outline + gapPx);
  const leftPx = x + (dx > 0 ? 0 : dx < 0 ? -widthPx : -widthPx / 2);
  const topPx = y - heightPx / 2 + (dy * heightPx) / 2;
  const isAway = gapPx > gapsPx[0];
  const leader = isAway ? ([xPx + dx * outline, yPx + dy * outline, x - dx, y - dy] as const) : null;
  return { text, pickId, leftPx, topPx, widthPx, heightPx, leader, spot };
}

/** Share of a label's box that lies on other atoms' boxes, at most 1; not counted on where it reaches `enough`. */
function coveredShare(
  { leftPx, topPx, widthPx, heightPx, pickId }: PlacedLabel,
  atoms: ScreenAtoms,
  enough: number,
): number {
  const [right, bottom, whole] = [leftPx + widthPx, topPx + heightPx, widthPx * heightPx];
  let area = 0;
  atoms.within(leftPx, topPx, right, bottom, (i) => {
    if (atoms.pickIds[i] === pickId) return false;
    const [x, y] = [atoms.xPx[i]!, atoms.yPx[i]!];
    const [w, h] = [atoms.halfWidthPx[i]!, atoms.halfHeightPx[i]!];
    const wide = Math.min(right, x + w) - Math.max(leftPx, x - w);
    const high = Math.min(bottom, y + h) - Math.max(topPx, y - h);
    if (wide > 0 && high > 0) area += wide * high;
    return area >= Math.min(1, enough) * whole;
  });
  return Math.min(1, area / whole);
}

interface FreeRoom {
  readonly taken: PlacedLabel[];
  readonly isFree: (label: PlacedLabel) => boolean;
  readonly take: (label: PlacedLabel) => void;
}

/** Side of a cell of the grid that finds labels placed before, CSS pixels. */
const roomPx = 64;

function freeRoom({ widthPx, heightPx }: Viewport): FreeRoom {
  const taken: PlacedLabel[] = [];
  const columns = Math.ceil(widthPx / roomPx) + 1;
  const grid = new Map<number, PlacedLabel[]>();
  const some = (label: PlacedLabel, test: (cell: number) => boolean): boolean => {
    const [c0, c1] = [Math.floor(label.leftPx / roomPx), Math.floor((label.leftPx + label.widthPx) / roomPx)];
    const [r0, r1] = [Math.floor(label.topPx / roomPx), Math.floor((label.topPx + label.heightPx) / roomPx)];
    for (let r = r0; r <= r1; r++) for (let c = c0; c <= c1; c++) if (test(r * columns + c)) return true;
    return false;
  };
  const isInside = ({ leftPx, topPx, widthPx: w, heightPx: h }: PlacedLabel): boolean =>
    leftPx >= 0 && topPx >= 0 && leftPx + w <= widthPx && topPx + h <= heightPx;
  return {
    taken,
    isFree: (label) =>
      isInside(label) &&
      !some(label, (cell) => (grid.get(cell) ?? []).some((other) => overlaps(label, other))),
    take: (label) => {
      taken.push(label);
      some(label, (cell) => {
        const known = grid.get(cell);
        if (known) known.push(label);
        else grid.set(cell, [label]);
        return false;
      });
    },
  };
}

function overlaps(one: PlacedLabel, other: PlacedLabel): boolean {
  return (
    one.leftPx < other.leftPx + other.widthPx &&
    other.leftPx < one.leftPx + one.widthPx &&
    one.topPx < other.topPx + other.heightPx &&
    other.topPx < one.topPx + one.heightPx
  );
}
