import type { IUniform } from 'three';
import {
  DoubleSide,
  FrontSide,
  GLSL3,
  NoBlending,
  NormalBlending,
  RawShaderMaterial,
  Vector2,
  Vector3,
  Vector4,
} from 'three';
import type { ProgramName } from '#shaders/registry.ts';
import { shaderSource } from '#shaders/registry.ts';
import type { Scene } from '#src/scene/scene.ts';
import type { Camera, Viewport } from '#src/scene/camera.ts';
import { linearLight, rimLine } from '#src/scene/light.ts';
import { leastNearness, nearness } from '#src/scene/perspective.ts';
import { projection, projectPoint } from '#src/scene/project.ts';
import { ringPx } from '#src/scene/theme.ts';
import type { RenderTheme, Rgb } from './theme.ts';

/** Uniforms that all programs share: one object each, so that a change reaches every material. */
export type SharedUniforms = ReturnType<typeof sharedUniforms>;

export function sharedUniforms() {
  return {
    uTarget: { value: new Vector3() },
    uOrientation: { value: new Vector4(0, 0, 0, 1) },
    uPixelsPerAngstrom: { value: 1 },
    uHalfViewportPx: { value: new Vector2(1, 1) },
    uHalfPerDepthPx: { value: 1 },
    uPixelScale: { value: 1 },
    uPerEyePx: { value: 0 },
    uPaper: { value: new Vector3() },
    uFade: { value: new Vector3() },
    uAccent: { value: new Vector3() },
    uHoverColour: { value: new Vector3() },
    uLineColour: { value: new Vector3() },
    uLineWidthPx: { value: 1 },
    uCircleWidthPx: { value: 1 },
    uRim: { value: new Vector4() },
    uCylinderRim: { value: new Vector4() },
    uRingPx: { value: new Vector2(...ringPx) },
    uRingReachPx: { value: ringPx[1] + 1.5 },
  } satisfies Record<string, IUniform>;
}

/** Opaque raw shader of the registry; lines and facets blend over what is behind them. */
export function programMaterial(name: ProgramName, uniforms: Record<string, IUniform>): RawShaderMaterial {
  const { vertex, fragment } = shaderSource(name);
  const soft = name === 'line' || name === 'facet';
  const covers = name === 'resolve';
  return new RawShaderMaterial({
    name,
    glslVersion: GLSL3,
    vertexShader: vertex,
    fragmentShader: fragment,
    uniforms,
    side: name === 'facet' ? DoubleSide : FrontSide,
    depthTest: !covers,
    depthWrite: !soft && !covers,
    transparent: soft,
    blending: soft ? NormalBlending : NoBlending,
  });
}

const inLinearLight = ([red, green, blue]: Rgb): [number, number, number] => [
  linearLight(red),
  linearLight(green),
  linearLight(blue),
];

export function applyTheme(uniforms: SharedUniforms, theme: RenderTheme): void {
  const [red, green, blue] = theme.paper;
  uniforms.uPaper.value.set(red / 255, green / 255, blue / 255);
  uniforms.uLineColour.value.set(...inLinearLight(theme.line));
  uniforms.uAccent.value.set(...inLinearLight(theme.selected));
  uniforms.uHoverColour.value.set(...inLinearLight(theme.hovered));
  uniforms.uFade.value.z = theme.depthCue;
  uniforms.uCircleWidthPx.value = theme.circleWidthPx;
  const rim = rimLine(theme);
  uniforms.uRim.value.set(rim.widthPx, rim.ink, rim.from, rim.full);
  uniforms.uCylinderRim.value.set(rim.cylinderWidthPx, rim.cylinderInk, rim.cylinderFrom, rim.cylinderFull);
}

/** `pixelScale`: device pixels, samples included, of one CSS pixel. */
export function applyView(
  uniforms: SharedUniforms,
  scene: Scene,
  camera: Camera,
  viewport: Viewport,
  pixelScale: number,
): void {
  const p = projection(camera, viewport);
  const scale = p.scale * pixelScale;
  const middle = projectPoint(p, scene.bounds.centre).depthPx * pixelScale;
  const eye = p.eyePx * pixelScale;
  const reach = scene.bounds.radiusAngstrom * scale;
  uniforms.uTarget.value.set(...camera.target);
  uniforms.uOrientation.value.set(...camera.orientation);
  uniforms.uPixelsPerAngstrom.value = scale;
  uniforms.uHalfViewportPx.value.set(
    (viewport.widthPx * pixelScale) / 2,
    (viewport.heightPx * pixelScale) / 2,
  );
  uniforms.uHalfPerDepthPx.value = 0.5 / (1.05 * farthestImage(middle, reach, eye) + 1);
  uniforms.uPerEyePx.value = 1 / eye;
  const fade = uniforms.uFade.value;
  fade.set(middle + reach, fade.z / Math.max(2 * reach, 1), fade.z);
  uniforms.uPixelScale.value = pixelScale;
  uniforms.uLineWidthPx.value = scene.lines.widthPx;
}

/** Largest height of the scene's image, either way; see src/scene/perspective.ts. */
function farthestImage(middle: number, reach: number, eye: number): number {
  const near = Math.min(middle + reach, (1 - leastNearness) * eye);
  const heights = [near, middle - reach].map((z) => z / nearness(z, eye));
  return Math.max(...heights.map(Math.abs));
}
