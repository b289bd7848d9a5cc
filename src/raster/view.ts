import type { Camera, Viewport } from '#src/scene/camera.ts';
import { pixelsPerAngstrom, viewRotation } from '#src/scene/camera.ts';
import { projection, projectPoint } from '#src/scene/project.ts';
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

/** The view's part of the parameter block; the same numbers as the uniforms of src/render. */
export function fillView(
  f: Float32Array,
  i: Int32Array,
  view: RasterView,
  scene: Pick<Scene, 'bounds' | 'lines'>,
): void {
  const { camera, viewport, theme, samplesAcross } = view;
  const { width, height } = pictureSize(view);
  const ratio = view.pixelRatio * samplesAcross;
  const scale = pixelsPerAngstrom(camera, viewport) * ratio;
  const middle = projectPoint(projection(camera, viewport), scene.bounds.centre).depthPx * ratio;
  const reach = scene.bounds.radiusAngstrom * scale;
  i[S.columns] = width * samplesAcross;
  i[S.rows] = height * samplesAcross;
  i[S.samplesAcross] = samplesAcross;
  i[S.paperPixel] = pixelOf(theme.paper);
  i[S.selectedPixel] = pixelOf(theme.selected);
  i[S.hoveredPixel] = pixelOf(theme.hovered);
  f.set(
    viewRotation(camera.orientation).map((value) => value * scale),
    S.turn,
  );
  f.set(camera.target, S.target);
  f[S.middleColumn] = (viewport.widthPx * ratio) / 2 - 0.5;
  f[S.middleRow] = height * samplesAcross - 0.5 - (viewport.heightPx * ratio) / 2;
  f[S.samplesPerAngstrom] = scale;
  f[S.pixelScale] = ratio;
  f[S.nearest] = middle + reach;
  f[S.perDepth] = 1 / Math.max(2 * reach, 1);
  f[S.depthCue] = theme.depthCue;
  f.set(theme.paper, S.paper);
  f.set(theme.line, S.lineColour);
  f[S.lineWidth] = scene.lines.widthPx;
  f[S.circleWidth] = theme.circleWidthPx;
  f[S.rimWidth] = theme.rimWidthPx;
  f[S.ringInner] = ringPx[0];
  f[S.ringOuter] = ringPx[1];
}
