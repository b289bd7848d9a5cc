import type { Vec3 } from '#src/base/matrix3.ts';
import type { RenderTheme, Rgb } from './theme.ts';

/** sRGB byte as linear light (IEC 61966-2-1). */
export function linearLight(byte: number): number {
  const c = byte / 255;
  return c <= 0.04045 ? c / 12.92 : ((c + 0.055) / 1.055) ** 2.4;
}

/** Linear light as sRGB, 0 to 1. */
export function srgb(light: number): number {
  const x = Math.min(1, Math.max(0, light));
  return x <= 0.0031308 ? 12.92 * x : 1.055 * x ** (1 / 2.4) - 0.055;
}

/** Light over that of a surface that faces the viewer; a unit normal in view axes. As shaders/chunks/_light.glsl. */
export function softLight([x, y, z]: Vec3): number {
  const wrapped = 0.5 + 0.5 * (-0.42 * x + 0.6 * y + 0.68 * z);
  const away = 1 - z;
  return ((0.16 + 0.84 * wrapped * wrapped) / 0.752704) * (1 - 0.25 * away * away);
}

/** A colour in sRGB bytes under soft light, in sRGB bytes, not rounded. As `lit` of the shader chunk. */
export function litColour(colour: Rgb, normal: Vec3): Rgb {
  const light = softLight(normal);
  const channel = (byte: number): number => {
    const own = linearLight(byte);
    return 255 * srgb(light <= 1 ? own * light : 1 - (1 - Math.min(own, 0.999)) ** light);
  };
  return [channel(colour[0]), channel(colour[1]), channel(colour[2])];
}

/** The thin dark line within the outline of each object; with outlines turned on a broader and darker one. */
export interface RimLine {
  /** CSS pixels from the outline inwards; it fades over ±0.4 about this. */
  readonly widthPx: number;
  /** Share of the light that it takes away: from ellipsoids and polar surfaces, and from cylinders. */
  readonly ink: number;
  readonly cylinderInk: number;
  /** CSS pixels: the line comes in between these two least half widths of an outline. */
  readonly from: number;
  readonly full: number;
  /** The same for the radius of a cylinder. */
  readonly cylinderFrom: number;
  readonly cylinderFull: number;
  readonly cylinderWidthPx: number;
}

export function rimLine({ outlineWidthPx = 0, rimWidthPx }: RenderTheme): RimLine {
  if (outlineWidthPx > 0) {
    const widthPx = Math.max(outlineWidthPx, rimWidthPx);
    const thin = { from: 1, full: 3, cylinderFrom: 0.75, cylinderFull: 2 };
    return { ...thin, widthPx, ink: 0.9, cylinderInk: 0.9, cylinderWidthPx: widthPx };
  }
  const thin = { from: 2, full: 6, cylinderFrom: 1.5, cylinderFull: 4 };
  return { ...thin, widthPx: rimWidthPx, ink: 0.52, cylinderInk: 0.36, cylinderWidthPx: 0.7 };
}
