import { describe, expect, it } from 'vitest';
import type { Mat3 } from '#src/base/matrix3.ts';
import { multiply, transpose } from '#src/base/matrix3.ts';
import type { FigureDrawing } from '#src/figure/draw-figure.ts';
import { figurePng } from '#src/figure/figure-png.ts';
import type { FigureRequest } from '#src/figure/figure-request.ts';
import { defaultContents } from '#src/figure/figure-request.ts';
import { figureThemes } from '#src/figure/figure-theme.ts';
import { layoutFigure } from '#src/figure/layout.ts';
import { previewOf } from '#src/figure/preview.ts';
import { createRasterizer } from '#src/raster/rasterizer.ts';
import { bestKernel } from '#src/raster/wasm-kernel.ts';
import { buildScene } from '#src/scene/build-scene.ts';
import { pixelsPerAngstrom, viewRotation } from '#src/scene/camera.ts';
import { defaultLook } from '#src/scene/look.ts';
import type { Scene } from '#src/scene/scene.ts';
import { decodePng, textChunk } from '#tests/support/decode-png.ts';
import { madeQuartz } from '#tests/support/made-quartz.ts';
import { randomScene } from '#tests/support/raster-scene.ts';

const bare = {
  axes: false,
  legend: false,
  scale: false,
  elementKey: false,
  viewDirection: false,
  caption: false,
};

const request: FigureRequest = {
  widthPt: 100,
  heightPt: 80,
  textPt: 7,
  theme: 'light',
  transparent: false,
  view: { kind: 'direction', towards: [0.3, -0.5, 0.8], words: null },
  contents: bare,
  look: { ...defaultLook, depthCue: false },
  title: '',
};

const rasterizer = createRasterizer(bestKernel());

function drawing(scene: Scene, asked: FigureRequest, pxPerPt = 4): FigureDrawing {
  return { scene, request: asked, sheet: layoutFigure(scene, asked), pxPerPt };
}

/** One skew ellipsoid, no lines. */
function single(): Scene {
  const scene = randomScene(1, 3, 0);
  const empty = { count: 0, starts: new Float32Array(), ends: new Float32Array(), widthPx: 1 };
  return { ...scene, lines: empty };
}

describe('a figure in pixels', () => {
  it('shows an ellipsoid with the outline of the analytic ellipse', () => {
    const scene = single();
    const made = drawing(scene, request);
    const { widthPx, heightPx, pixels } = previewOf(made, rasterizer);
    const { crystal } = made.sheet;
    const scale = pixelsPerAngstrom(crystal.camera, crystal.viewport) * crystal.pointsPerCssPx * 4;
    const r = viewRotation(crystal.camera.orientation);
    const a = [...scene.quadrics.shapes] as unknown as Mat3;
    const m = multiply(r, a);
    // Σ = M Mᵀ; the outline's area is π √det Σxy, its half widths are √Σxx and √Σyy
    const s = multiply(m, transpose(m)).map((value) => value * scale * scale);
    const expected = Math.PI * Math.sqrt(s[0]! * s[4]! - s[1]! * s[1]!);
    const covered: [number, number][] = [];
    const paper = figureThemes.light.render.paper;
    for (let y = 0; y < heightPx; y++) {
      for (let x = 0; x < widthPx; x++) {
        if (paper.some((byte, k) => pixels[4 * (y * widthPx + x) + k] !== byte)) covered.push([x, y]);
      }
    }
    const width = Math.max(...covered.map(([x]) => x)) - Math.min(...covered.map(([x]) => x)) + 1;
    const height = Math.max(...covered.map(([, y]) => y)) - Math.min(...covered.map(([, y]) => y)) + 1;
    expect(Math.abs(width - 2 * Math.sqrt(s[0]!))).toBeLessThan(2.5);
    expect(Math.abs(height - 2 * Math.sqrt(s[4]!))).toBeLessThan(2.5);
    // pixels touched at the rim count in full: half a pixel along the outline
    const rim = Math.PI * (Math.sqrt(s[0]!) + Math.sqrt(s[4]!));
    expect(covered.length).toBeGreaterThan(expected - 1);
    expect(covered.length).toBeLessThan(expected + 0.8 * rim);
  });

  it('is the same in one band as in many, and the same bytes each time', async () => {
    const scene = buildScene(madeQuartz(), { labels: true });
    const made = drawing(scene, { ...request, contents: defaultContents, widthPt: 235, heightPt: 280 }, 6);
    const facts = { dpi: 432, title: 'Quartz', caseText: null };
    const [one, other] = [await figurePng(made, facts, rasterizer), await figurePng(made, facts, rasterizer)];
    expect(Buffer.compare(Buffer.from(one), Buffer.from(other))).toBe(0);
    const decoded = decodePng(one);
    expect(decoded.width * decoded.height).toBeGreaterThan(2_000_000);
    const whole = previewOf(made, rasterizer);
    expect(Buffer.compare(Buffer.from(decoded.pixels), Buffer.from(whole.pixels))).toBe(0);
  });

  it('carries the case, its caption and title', async () => {
    const scene = buildScene(madeQuartz());
    const caseText = '{"schema": "ellipsite/case", "text": "σ – ²⁹Si"}\n'.repeat(300);
    const bytes = await figurePng(drawing(scene, request, 1), { dpi: 72, title: 'α', caseText }, rasterizer);
    const decoded = decodePng(bytes);
    expect(textChunk(decoded, 'ellipsite-case')).toBe(caseText);
    expect(textChunk(decoded, 'Description')).toBe(scene.caption);
    expect(textChunk(decoded, 'Title')).toBe('α');
    expect(
      decoded.chunks.find(({ data }) => Buffer.from(data).includes('ellipsite-case'))!.data.length,
    ).toBeLessThan(caseText.length / 5);
  });

  it('has ink where its texts stand and paper round them', () => {
    const scene = buildScene(madeQuartz());
    const asked = { ...request, widthPt: 235, heightPt: null, contents: defaultContents };
    const made = drawing(scene, asked);
    const { pixels, widthPx } = previewOf(made, rasterizer);
    const dark = (x: number, y: number): boolean =>
      pixels[4 * (Math.round(y) * widthPx + Math.round(x))]! < 120;
    const texts = made.sheet.items.filter((item) => item.kind === 'text');
    expect(texts.length).toBeGreaterThan(5);
    for (const { xPt, yPt, sizePt } of texts) {
      let inked = 0;
      for (let y = -0.8 * sizePt; y < 0; y += 0.25)
        for (let x = 0; x < sizePt; x += 0.25) if (dark(4 * (xPt + x), 4 * (yPt + y))) inked++;
      const share = inked / ((0.8 * sizePt) / 0.25) / (sizePt / 0.25);
      expect(share).toBeGreaterThan(0.03);
      expect(share).toBeLessThan(0.6);
    }
  });

  it('is transparent where nothing is, with the colours of the things alone at their rims', () => {
    const scene = single();
    const { pixels, widthPx, heightPx } = previewOf(
      drawing(scene, { ...request, transparent: true }),
      rasterizer,
    );
    const opaque = previewOf(drawing(scene, request), rasterizer).pixels;
    expect([...pixels.subarray(0, 4)]).toEqual([0, 0, 0, 0]);
    let [partly, fully] = [0, 0];
    for (let at = 0; at < 4 * widthPx * heightPx; at += 4) {
      const alpha = pixels[at + 3]!;
      if (alpha === 255) fully++;
      if (alpha === 0 || alpha === 255) continue;
      partly++;
      // straight alpha: laid on white in linear light it is the picture on white paper
      for (let k = 0; k < 3; k++) {
        const linear = (byte: number): number =>
          byte / 255 <= 0.04045 ? byte / 255 / 12.92 : ((byte / 255 + 0.055) / 1.055) ** 2.4;
        const laid = (alpha / 255) * linear(pixels[at + k]!) + 1 - alpha / 255;
        expect(Math.abs(laid - linear(opaque[at + k]!))).toBeLessThan(0.03);
      }
    }
    expect(fully).toBeGreaterThan(1000);
    expect(partly).toBeGreaterThan(50);
  });
});
