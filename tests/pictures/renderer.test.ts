import { describe, expect, it } from 'vitest';
import { buildScene } from '#src/scene/build-scene.ts';
import { turn } from '#src/scene/camera.ts';
import { firstCamera } from '#src/scene/framing.ts';
import type { Vec3 } from '#src/base/matrix3.ts';
import { projectAtoms, projection, projectPoint } from '#src/scene/project.ts';
import { darkTheme, lightTheme } from '#src/render/create-renderer.ts';
import { isSoftwareRenderer, probeWebGL } from '#src/render/probe-webgl.ts';
import { madeQuartz } from '#tests/support/made-quartz.ts';
import { madeUrea } from '#tests/support/made-urea.ts';
import type { Picture } from './picture-harness.ts';
import { readBack, stage } from './picture-harness.ts';

const frame = () => new Promise((resolve) => requestAnimationFrame(() => setTimeout(resolve, 0)));

function shareDiffering(one: Picture, other: Picture, by = 24): number {
  let differing = 0;
  for (let i = 0; i < one.data.length; i += 4) {
    const apart = [0, 1, 2].some((k) => Math.abs(one.data[i + k]! - other.data[i + k]!) > by);
    if (apart) differing += 1;
  }
  return differing / (one.data.length / 4);
}

describe('renderer', () => {
  it('draws a scene in a call for each kind, light and dark ellipsoids apart, on demand, and only when something changed', async () => {
    const s = stage(300, 200);
    const scene = buildScene(madeQuartz());
    s.renderer.setScene(scene);
    s.renderer.setCamera(firstCamera(scene, s.viewport));
    s.renderer.setTheme(darkTheme);
    await frame();
    await frame();
    const { frames, drawCalls, quadrics } = s.renderer.counters();
    expect({ frames, drawCalls, quadrics }).toEqual({
      frames: 1,
      drawCalls: 4,
      quadrics: scene.quadrics.count,
    });
    await frame();
    expect(s.renderer.counters().frames).toBe(1);
    s.renderer.setHover(null);
    await frame();
    expect(s.renderer.counters().frames).toBe(1);
    s.renderer.setHover('0:0');
    await frame();
    expect(s.renderer.counters()).toMatchObject({ frames: 2, lastReason: 'another atom is hovered' });
    s.end();
  });

  it.each([
    ['light', lightTheme],
    ['dark', darkTheme],
  ])('%s paper is the theme to the byte, smoothed or not', (_name, theme) => {
    for (const samplesAcross of [1, 2]) {
      const s = stage(120, 80, { theme, samplesAcross });
      const scene = buildScene(madeQuartz());
      const picture = s.draw(scene, firstCamera(scene, s.viewport));
      expect(picture.at(1, 1)).toEqual(theme.paper);
      s.end();
    }
  });

  it('smoothing changes rims only', () => {
    const scene = buildScene(madeUrea());
    const pictures = [1, 3].map((samplesAcross) => {
      const s = stage(400, 300, { samplesAcross });
      const picture = s.draw(scene, firstCamera(scene, s.viewport));
      expect(s.renderer.counters().smoothFrames).toBe(samplesAcross > 1 ? 1 : 0);
      s.end();
      return picture;
    });
    const share = shareDiffering(pictures[0]!, pictures[1]!);
    expect(share).toBeGreaterThan(0.002);
    expect(share).toBeLessThan(0.06);
  });

  it('a second sample a pixel brings shades between object and paper', () => {
    const scene = buildScene(madeQuartz(), { bonds: false, cellEdges: false });
    const shades = [1, 2].map((samplesAcross) => {
      const s = stage(200, 200, { samplesAcross });
      const { data } = s.draw(scene, firstCamera(scene, s.viewport));
      s.end();
      const colours = new Set<number>();
      for (let i = 0; i < data.length; i += 4)
        colours.add((data[i]! << 16) | (data[i + 1]! << 8) | data[i + 2]!);
      return colours.size;
    });
    expect(shades[1]).toBeGreaterThan(shades[0]!);
  });

  it('rings every copy of a selected atom and leaves the rest alone', () => {
    const s = stage(400, 300);
    const scene = buildScene(madeUrea());
    const camera = firstCamera(scene, s.viewport);
    const plain = s.draw(scene, camera);
    const id = '1:0';
    s.renderer.setSelection([id]);
    s.renderer.render();
    const ringed = readBack(s.canvas);
    const [atom] = projectAtoms(scene, camera, s.viewport, new Set([id]));
    let accent = 0;
    for (let y = 0; y < 300; y++) {
      for (let x = 0; x < 400; x++) {
        const changed = plain.at(x, y).some((byte, k) => byte !== ringed.at(x, y)[k]);
        if (!changed) continue;
        expect(Math.abs(x - atom!.xPx)).toBeLessThan(atom!.halfWidthPx + 7);
        expect(Math.abs(y - atom!.yPx)).toBeLessThan(atom!.halfHeightPx + 7);
        const dx = (x + 0.5 - atom!.xPx) / atom!.halfWidthPx;
        const dy = (y + 0.5 - atom!.yPx) / atom!.halfHeightPx;
        if (ringed.at(x, y).every((byte, k) => byte === lightTheme.selected[k])) {
          accent += 1;
          expect(dx * dx + dy * dy).toBeGreaterThan(0.3);
        }
      }
    }
    const circumference = Math.PI * (atom!.halfWidthPx + atom!.halfHeightPx);
    expect(accent).toBeGreaterThan(1.2 * circumference);
    s.end();
  });

  it('draws atoms, bonds and dashes exactly where they are picked', () => {
    const s = stage(400, 300);
    const scene = buildScene(madeUrea(), { cellEdges: false });
    const camera = turn(firstCamera(scene, s.viewport), 200, 90, s.viewport);
    const picture = s.draw(scene, camera);
    let [wrong, bonds] = [0, 0];
    for (let y = 0; y < 300; y++) {
      for (let x = 0; x < 400; x++) {
        const hit = s.renderer.pick(x + 0.5, y + 0.5);
        const paper = picture.at(x, y).every((byte, k) => byte === lightTheme.paper[k]);
        if (paper === (hit !== null)) wrong += 1;
        if (hit?.entry.kind === 'bond') bonds += 1;
      }
    }
    expect(bonds).toBeGreaterThan(300);
    expect(wrong).toBeLessThanOrEqual(8);
    s.end();
  });

  it('draws each cell edge as a fine line', () => {
    const s = stage(400, 300, { theme: { ...lightTheme, depthCue: 0 } });
    const scene = buildScene(madeQuartz(), { bonds: false, showTensors: false });
    const camera = firstCamera(scene, s.viewport);
    const picture = s.draw({ ...scene, quadrics: { ...scene.quadrics, count: 0 } }, camera);
    const p = projection(camera, s.viewport);
    const { starts, ends, count } = scene.lines;
    for (let i = 0; i < count; i++) {
      const middle = [0, 1, 2].map((k) => (starts[3 * i + k]! + ends[3 * i + k]!) / 2) as unknown as Vec3;
      const { xPx, yPx } = projectPoint(p, middle);
      const around = [-1, 0, 1].flatMap((dx) => [-1, 0, 1].map((dy) => picture.at(xPx + dx, yPx + dy)[0]));
      expect(Math.min(...around)).toBeLessThan(lightTheme.paper[0] - 60);
      expect(Math.min(...around)).toBeGreaterThanOrEqual(lightTheme.line[0] - 2);
    }
    s.end();
  });

  it('the depth cue fades what is far towards the paper, and can be turned off', () => {
    const scene = buildScene(madeQuartz(), { bonds: false, cellEdges: false, bondedNeighbours: false });
    const contrast = [0, 0.6].map((depthCue) => {
      const s = stage(200, 200, { theme: { ...lightTheme, depthCue } });
      const { data } = s.draw(scene, firstCamera(scene, s.viewport));
      s.end();
      return data.reduce((sum, byte) => sum + byte, 0) / data.length;
    });
    expect(contrast[1]).toBeGreaterThan(contrast[0]!);
  });

  it('after the context was lost and restored the same picture is back by itself', async () => {
    const events: string[] = [];
    const s = stage(300, 220, {
      onContextLost: () => events.push('lost'),
      onContextRestored: () => events.push('restored'),
    });
    const scene = buildScene(madeUrea());
    const camera = turn(firstCamera(scene, s.viewport), 30, 40, s.viewport);
    s.renderer.setSelection(['0:0']);
    const before = s.draw(scene, camera);
    const gl = s.canvas.getContext('webgl2')!;
    const breaker = gl.getExtension('WEBGL_lose_context')!;
    breaker.loseContext();
    await new Promise((resolve) => s.canvas.addEventListener('webglcontextlost', resolve, { once: true }));
    // what is set meanwhile is not lost either
    s.renderer.setTheme(darkTheme);
    s.renderer.setTheme(lightTheme);
    s.renderer.render();
    await new Promise((resolve) => setTimeout(resolve, 20));
    breaker.restoreContext();
    await new Promise((resolve) =>
      s.canvas.addEventListener('webglcontextrestored', resolve, { once: true }),
    );
    s.renderer.render();
    expect(shareDiffering(before, readBack(s.canvas), 2)).toBe(0);
    expect(events).toEqual(['lost', 'restored']);
    expect(s.renderer.counters().contextLosses).toBe(1);
    s.end();
  });

  it('resizing keeps the framing and follows the device ratio', () => {
    const s = stage(300, 200);
    const scene = buildScene(madeQuartz());
    const camera = firstCamera(scene, s.viewport);
    s.draw(scene, camera);
    s.renderer.resize(300, 200, 2);
    s.renderer.render();
    const large = readBack(s.canvas);
    expect([large.widthPx, large.heightPx]).toEqual([600, 400]);
    const hit = projectAtoms(scene, camera, s.viewport, new Set(['0:0']))[0]!;
    expect(large.at(2 * hit.xPx, 2 * hit.yPx)).not.toEqual(lightTheme.paper);
    s.end();
  });

  it('refuses a canvas without WebGL 2 in a sentence', async () => {
    const canvas = document.createElement('canvas');
    canvas.getContext('2d');
    const { createCrystalRenderer } = await import('#src/render/create-renderer.ts');
    expect(() => createCrystalRenderer(canvas)).toThrow('WebGL 2');
  });
});

describe('probe', () => {
  it('finds software WebGL 2 in this browser and says so', () => {
    const found = probeWebGL();
    expect(found.available).toBe(true);
    expect(found.software).toBe(isSoftwareRenderer(found.renderer));
    expect(found.sentence).toContain(found.software ? 'on the processor' : 'WebGL 2');
  });

  it('says in one sentence that there is none', () => {
    const without = probeWebGL(() => {
      const canvas = document.createElement('canvas');
      canvas.getContext('2d');
      return canvas;
    });
    expect(without).toMatchObject({ available: false, software: false, renderer: null, canPaint: true });
    expect(without.sentence).toMatch(/no WebGL 2.*drawn by the CPU\.$/);
  });

  it('says in one sentence that nothing can be drawn', () => {
    const nothing = probeWebGL(() => ({ getContext: () => null }) as unknown as HTMLCanvasElement);
    expect(nothing).toMatchObject({ available: false, canPaint: false });
    expect(nothing.sentence).toMatch(/neither.*everything else works\.$/);
  });

  it.each([
    ['ANGLE (Google, Vulkan 1.3.0 (SwiftShader Device (Subzero)), SwiftShader driver)', true],
    ['llvmpipe (LLVM 15.0.6, 256 bits)', true],
    ['ANGLE (Microsoft, Microsoft Basic Render Driver Direct3D11)', true],
    ['ANGLE (Intel, Mesa Intel(R) Iris(R) Xe Graphics, OpenGL 4.6)', false],
    [null, false],
  ])('%s', (name, software) => expect(isSoftwareRenderer(name)).toBe(software));
});
