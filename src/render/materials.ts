import type { IUniform } from 'three';
import { GLSL3, NoBlending, NormalBlending, RawShaderMaterial, Vector2, Vector3, Vector4 } from 'three';
import type { ProgramName } from '#shaders/registry.ts';
import { shaderSource } from '#shaders/registry.ts';
import type { Scene } from '#src/scene/scene.ts';
import type { Camera, Viewport } from '#src/scene/camera.ts';
import { pixelsPerAngstrom } from '#src/scene/camera.ts';
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
    uDepthRangePx: { value: 1 },
    uPixelScale: { value: 1 },
    uPaper: { value: new Vector3() },
    uDepthCue: { value: 0 },
    uSceneDepthPx: { value: new Vector2() },
    uAccent: { value: new Vector3() },
    uHoverColour: { value: new Vector3() },
    uLineColour: { value: new Vector3() },
    uLineWidthPx: { value: 1 },
    uCircleWidthPx: { value: 1 },
    uRimWidthPx: { value: 1 },
    uRingPx: { value: new Vector2(...ringPx) },
    uRingReachPx: { value: ringPx[1] + 1.5 },
  } satisfies Record<string, IUniform>;
}

/** Opaque raw shader of the registry; lines blend over what is behind them. */
export function programMaterial(name: ProgramName, uniforms: Record<string, IUniform>): RawShaderMaterial {
  const { vertex, fragment } = shaderSource(name);
  const soft = name === 'line';
  const covers = name === 'resolve';
  return new RawShaderMaterial({
    name,
    glslVersion: GLSL3,
    vertexShader: vertex,
    fragmentShader: fragment,
    uniforms,
    depthTest: !covers,
    depthWrite: !soft && !covers,
    transparent: soft,
    blending: soft ? NormalBlending : NoBlending,
  });
}

/** sRGB bytes as linear light (IEC 61966-2-1), for uniforms. */
export function linearLight(rgb: Rgb): [number, number, number] {
  const channel = (byte: number) => {
    const c = byte / 255;
    return c <= 0.04045 ? c / 12.92 : ((c + 0.055) / 1.055) ** 2.4;
  };
  return [channel(rgb[0]), channel(rgb[1]), channel(rgb[2])];
}

export function applyTheme(uniforms: SharedUniforms, theme: RenderTheme): void {
  uniforms.uPaper.value.set(...linearLight(theme.paper));
  uniforms.uLineColour.value.set(...linearLight(theme.line));
  uniforms.uAccent.value.set(...linearLight(theme.selected));
  uniforms.uHoverColour.value.set(...linearLight(theme.hovered));
  uniforms.uDepthCue.value = theme.depthCue;
  uniforms.uCircleWidthPx.value = theme.circleWidthPx;
  uniforms.uRimWidthPx.value = theme.rimWidthPx;
}

/** `pixelScale`: device pixels, samples included, of one CSS pixel. */
export function applyView(
  uniforms: SharedUniforms,
  scene: Scene,
  camera: Camera,
  viewport: Viewport,
  pixelScale: number,
): void {
  const scale = pixelsPerAngstrom(camera, viewport) * pixelScale;
  const middle = projectPoint(projection(camera, viewport), scene.bounds.centre).depthPx * pixelScale;
  const reach = scene.bounds.radiusAngstrom * scale;
  uniforms.uTarget.value.set(...camera.target);
  uniforms.uOrientation.value.set(...camera.orientation);
  uniforms.uPixelsPerAngstrom.value = scale;
  uniforms.uHalfViewportPx.value.set(
    (viewport.widthPx * pixelScale) / 2,
    (viewport.heightPx * pixelScale) / 2,
  );
  uniforms.uDepthRangePx.value = 1.05 * (Math.abs(middle) + reach) + 1;
  uniforms.uSceneDepthPx.value.set(middle + reach, middle - reach);
  uniforms.uPixelScale.value = pixelScale;
  uniforms.uLineWidthPx.value = scene.lines.widthPx;
}
