import type { Camera, Viewport } from '#src/scene/camera.ts';
import { viewRotation } from '#src/scene/camera.ts';
import { rimLine } from '#src/scene/light.ts';
import { leastNearness } from '#src/scene/perspective.ts';
import type { Projection } from '#src/scene/project.ts';
import { projection, viewPoint } from '#src/scene/project.ts';
import type { Scene } from '#src/scene/scene.ts';
import type { RenderTheme } from '#src/scene/theme.ts';
import { ringPx } from '#src/scene/theme.ts';
import * as S from './slots.ts';
import { pixelOf } from './tints.ts';

/** How a picture is looked at; plain data that crosses worker borders. */
export interface RasterView {
  readonly camera: Camera;
  /** CSS pixels. */
  readonly viewport: Viewport;
  readonly theme: RenderTheme;
  /** Picture pixels of one CSS pixel. */
  readonly pixelRatio: number;
  /** Samples across a pixel: 1 is fast, 2 or 3 smooth. */
  readonly samplesAcross: number;
  /** The picture is soon replaced: meshes of polar surfaces are half as fine. */
  readonly isMoving?: boolean;
}

/** Size of the picture, pixels. */
export function pictureSize({ viewport, pixelRatio }: Pick<RasterView, 'viewport' | 'pixelRatio'>): {
  readonly width: number;
  readonly height: number;
} {
  return {
    width: Math.max(1, Math.round(viewport.widthPx * pixelRatio)),
    height: Math.max(1, Math.round(viewport.heightPx * pixelRatio)),
  };
}

/** Projection into samples, x and y from the middle of the picture. */
export function sampleProjection({ camera, viewport, pixelRatio, samplesAcross }: RasterView): Projection {
  const ratio = pixelRatio * samplesAcross;
  const p = projection(camera, viewport);
  return { ...p, scale: p.scale * ratio, eyePx: p.eyePx * ratio, centreXPx: 0, centreYPx: 0 };
}

/** Column and row of the point that the camera looks at, 0.5 less than its place. */
export function middleOf(view: RasterView): readonly [column: number, row: number] {
  const { viewport, samplesAcross } = view;
  const ratio = view.pixelRatio * samplesAcross;
  const below = pictureSize(view).height * samplesAcross - (viewport.heightPx * ratio) / 2;
  return [(viewport.widthPx * ratio) / 2 - 0.5, below - 0.5];
}

/** The view's part of the parameter block; the same numbers as the uniforms of src/render. */
export function fillView(
  f: Float32Array,
  i: Int32Array,
  view: RasterView,
  scene: Pick<Scene, 'bounds' | 'lines'>,
): void {
  const { camera, theme, samplesAcross } = view;
  const { width, height } = pictureSize(view);
  const ratio = view.pixelRatio * samplesAcross;
  const p = sampleProjection(view);
  const { scale } = p;
  const middle = viewPoint(p, scene.bounds.centre)[2];
  const reach = scene.bounds.radiusAngstrom * scale;
  i[S.columns] = width * samplesAcross;
  i[S.rows] = height * samplesAcross;
  i[S.samplesAcross] = samplesAcross;
  i[S.paperPixel] = theme.transparent ? 0 : pixelOf(theme.paper);
  i[S.selectedPixel] = pixelOf(theme.selected);
  i[S.hoveredPixel] = pixelOf(theme.hovered);
  f.set(
    viewRotation(camera.orientation).map((value) => value * scale),
    S.turn,
  );
  f.set(camera.target, S.target);
  f.set(middleOf(view), S.middleColumn);
  f[S.samplesPerAngstrom] = scale;
  f[S.pixelScale] = ratio;
  f[S.nearest] = middle + reach;
  f[S.perDepth] = 1 / Math.max(2 * reach, 1);
  f[S.depthCue] = theme.depthCue;
  f.set(theme.paper, S.paper);
  f.set(theme.line, S.lineColour);
  f[S.lineWidth] = scene.lines.widthPx;
  f[S.circleWidth] = theme.circleWidthPx;
  f[S.perEye] = 1 / p.eyePx;
  f[S.leastNearness] = leastNearness;
  fillRim(f, theme);
  f[S.ringInner] = ringPx[0];
  f[S.ringOuter] = ringPx[1];
}

function fillRim(f: Float32Array, theme: RenderTheme): void {
  const rim = rimLine(theme);
  f[S.rimWidth] = rim.widthPx;
  f[S.rimInk] = rim.ink;
  f[S.rimFrom] = rim.from;
  f[S.rimPer] = 1 / (rim.full - rim.from);
  f[S.cylinderRimWidth] = rim.cylinderWidthPx;
  f[S.cylinderRimInk] = rim.cylinderInk;
  f[S.cylinderRimFrom] = rim.cylinderFrom;
  f[S.cylinderRimPer] = 1 / (rim.cylinderFull - rim.cylinderFrom);
}
