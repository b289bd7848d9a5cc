import type { Camera, Viewport } from './camera.ts';
import type { ProjectedAtom } from './project.ts';
import { projectPoint, projection, projectQuadric, viewShape } from './project.ts';
import type { ViewQuadric } from './view-quadric.ts';
import { viewQuadric } from './view-quadric.ts';
import type { LabelAnchor, Scene } from './scene.ts';

/** An atom's label on screen before it is placed; CSS pixels from the upper left corner. */
export interface ProjectedAnchor {
  readonly text: string;
  readonly pickId: number;
  readonly xPx: number;
  readonly yPx: number;
  readonly depthPx: number;
  /** Distance from the centre to the atom's outline in a direction on screen (unit vector, y downwards). */
  readonly outlinePx: (dx: number, dy: number) => number;
  /** True where another atom covers this one's centre. */
  readonly hidden: boolean;
}

/** A label that found room: its box's left upper corner. */
export interface PlacedLabel {
  readonly text: string;
  readonly pickId: number;
  readonly leftPx: number;
  readonly topPx: number;
  readonly widthPx: number;
  readonly heightPx: number;
}

/** Width and height of a text as it will be set, CSS pixels. */
export type MeasureText = (text: string) => { readonly widthPx: number; readonly heightPx: number };

/** Side of a bucket of screen for finding what covers what. */
const bucketPx = 48;

/** Anchors of all labels on screen, front first. */
export function projectAnchors(scene: Scene, camera: Camera, viewport: Viewport): ProjectedAnchor[] {
  const p = projection(camera, viewport);
  const covers = coverBuckets(scene, camera, viewport);
  return scene.labels
    .map((label: LabelAnchor): ProjectedAnchor => {
      const at = projectPoint(p, label.position);
      const inFront = covers.get(bucketKey(at.xPx, at.yPx)) ?? [];
      return {
        text: label.text,
        pickId: label.pickId,
        ...at,
        outlinePx: outlineOf(viewQuadric(viewShape(p, scene.quadrics, label.quadric))),
        hidden: inFront.some((other) => isCovered(at, other, label.pickId)),
      };
    })
    .sort((one, other) => other.depthPx - one.depthPx);
}

function outlineOf(q: ViewQuadric): (dx: number, dy: number) => number {
  return (dx, dy) => {
    const e1 = dx / q.l11;
    return 1 / Math.hypot(e1, (-dy - q.l21 * e1) / q.l22);
  };
}

function isCovered(
  at: { readonly xPx: number; readonly yPx: number; readonly depthPx: number },
  other: ProjectedAtom,
  ownId: number,
): boolean {
  if (other.pickId === ownId || other.depthPx <= at.depthPx) return false;
  const x = (at.xPx - other.xPx) / other.halfWidthPx;
  const y = (at.yPx - other.yPx) / other.halfHeightPx;
  return x * x + y * y < 1;
}

function bucketKey(xPx: number, yPx: number): string {
  return `${Math.floor(xPx / bucketPx)},${Math.floor(yPx / bucketPx)}`;
}

/** Atoms by the buckets their boxes touch, within the viewport. */
function coverBuckets(scene: Scene, camera: Camera, viewport: Viewport): Map<string, ProjectedAtom[]> {
  const p = projection(camera, viewport);
  const buckets = new Map<string, ProjectedAtom[]>();
  if (scene.labels.length === 0) return buckets;
  const within = (value: number, limit: number) => Math.min(limit, Math.max(0, value));
  for (let i = 0; i < scene.quadrics.count; i++) {
    const atom = projectQuadric(p, scene.quadrics, i);
    const [left, right] = [atom.xPx - atom.halfWidthPx, atom.xPx + atom.halfWidthPx];
    const [top, bottom] = [atom.yPx - atom.halfHeightPx, atom.yPx + atom.halfHeightPx];
    if (right < 0 || bottom < 0 || left > viewport.widthPx || top > viewport.heightPx) continue;
    for (
      let x = within(left, viewport.widthPx);
      x < within(right, viewport.widthPx) + bucketPx;
      x += bucketPx
    ) {
      for (
        let y = within(top, viewport.heightPx);
        y < within(bottom, viewport.heightPx) + bucketPx;
        y += bucketPx
      ) {
        const key = bucketKey(x, y);
        const known = buckets.get(key);
        if (known) known.push(atom);
        else buckets.set(key, [atom]);
      }
    }
  }
  return buckets;
}

/** Directions in which a label may stand off its atom, best first: right, upper right, lower right, above, below, left … */
const directions: readonly (readonly [number, number])[] = [
  [0.71, -0.71],
  [1, 0],
  [0.71, 0.71],
  [-0.71, -0.71],
  [-1, 0],
  [-0.71, 0.71],
  [0, -1],
  [0, 1],
];

/** CSS pixels between an atom's outline and its label. */
const gapPx = 3;

/**
 * Labels that have room: front atoms first, each beside its atom in the first direction where its box neither leaves the
 * viewport nor meets a label placed before. A label without room, or of a covered atom, is left out.
 */
export function placeLabels(
  scene: Scene,
  camera: Camera,
  viewport: Viewport,
  measure: MeasureText,
): PlacedLabel[] {
  const placed: PlacedLabel[] = [];
  for (const anchor of projectAnchors(scene, camera, viewport)) {
    if (anchor.hidden) continue;
    const { widthPx, heightPx } = measure(anchor.text);
    for (const [dx, dy] of directions) {
      const reach = anchor.outlinePx(dx, dy) + gapPx;
      const leftPx = anchor.xPx + dx * reach + (dx > 0 ? 0 : dx < 0 ? -widthPx : -widthPx / 2);
      const topPx = anchor.yPx + dy * reach - heightPx / 2 + (dy * heightPx) / 2;
      const label = { text: anchor.text, pickId: anchor.pickId, leftPx, topPx, widthPx, heightPx };
      if (!insideOf(label, viewport) || placed.some((other) => overlaps(label, other))) continue;
      placed.push(label);
      break;
    }
  }
  return placed;
}

function insideOf(label: PlacedLabel, viewport: Viewport): boolean {
  return (
    label.leftPx >= 0 &&
    label.topPx >= 0 &&
    label.leftPx + label.widthPx <= viewport.widthPx &&
    label.topPx + label.heightPx <= viewport.heightPx
  );
}

function overlaps(one: PlacedLabel, other: PlacedLabel): boolean {
  return (
    one.leftPx < other.leftPx + other.widthPx &&
    other.leftPx < one.leftPx + one.widthPx &&
    one.topPx < other.topPx + other.heightPx &&
    other.topPx < one.topPx + one.heightPx
  );
}
