import type { RawShaderMaterial } from 'three';
import {
  BufferGeometry,
  Camera as StillCamera,
  Color,
  LinearSRGBColorSpace,
  Mesh,
  Scene as Group,
  WebGLRenderer,
} from 'three';
import type { ProgramName } from '#shaders/registry.ts';
import type { Camera, Viewport } from '#src/scene/camera.ts';
import { facetView } from '#src/scene/facet-view.ts';
import type { PickHit } from '#src/scene/pick.ts';
import { pick as pickInScene } from '#src/scene/pick.ts';
import { projection } from '#src/scene/project.ts';
import type { Scene } from '#src/scene/scene.ts';
import {
  cylinderGeometry,
  facetGeometry,
  lineGeometry,
  markedQuadricGeometry,
  quadricGeometry,
  ringGeometry,
  splitQuadrics,
} from './batch-geometry.ts';
import { applyTheme, applyView, programMaterial, sharedUniforms } from './materials.ts';
import { PolarMeshes } from './polar-meshes.ts';
import { isSoftwareRenderer, rendererName } from './probe-webgl.ts';
import type { CrystalRenderer, RenderCounters, RendererOptions } from './renderer.ts';
import { restMs, ringStates } from './renderer.ts';
import type { Supersampling } from './supersampling.ts';
import { createSupersampling } from './supersampling.ts';
import type { RenderTheme } from './theme.ts';
import { lightTheme } from './theme.ts';

export { darkTheme, lightTheme } from './theme.ts';
export type { RenderTheme } from './theme.ts';
export type { CrystalRenderer, RenderCounters, RendererOptions } from './renderer.ts';

/** Throws with a plain sentence where the canvas gives no WebGL2 context: ask `probeWebGL` first. */
export function createCrystalRenderer(
  canvas: HTMLCanvasElement,
  options: RendererOptions = {},
): CrystalRenderer {
  return new Renderer(canvas, options);
}

type QuadMesh = Mesh<BufferGeometry, RawShaderMaterial>;

class Renderer implements CrystalRenderer {
  readonly #canvas: HTMLCanvasElement;
  readonly #options: RendererOptions;
  readonly #gl: WebGLRenderer;
  readonly #software: boolean;
  readonly #uniforms = sharedUniforms();
  readonly #group = new Group();
  readonly #still = new StillCamera();
  readonly #smoothing: Supersampling;
  readonly #quadrics: QuadMesh;
  readonly #marked: QuadMesh;
  readonly #rings: QuadMesh;
  readonly #cylinders: QuadMesh;
  readonly #polars: PolarMeshes;
  readonly #lines: QuadMesh;
  readonly #facets: QuadMesh;
  #scene: Scene | null = null;
  #camera: Camera | null = null;
  #theme: RenderTheme;
  #viewport: Viewport = { widthPx: 1, heightPx: 1 };
  #deviceRatio = 1;
  #selected: ReadonlySet<string> = new Set();
  #hovered: string | null = null;
  #frame: number | null = null;
  #rest: ReturnType<typeof setTimeout> | null = null;
  #lost = false;
  #frames = 0;
  #smoothFrames = 0;
  #losses = 0;
  #shaderFault = false;
  #lastReason = 'made';

  constructor(canvas: HTMLCanvasElement, options: RendererOptions) {
    const context = canvas.getContext('webgl2', {
      alpha: false,
      antialias: false,
      depth: true,
      stencil: false,
    });
    if (!context) throw new Error('This canvas gives no WebGL 2 context, which the crystal picture needs.');
    this.#canvas = canvas;
    this.#options = options;
    this.#gl = new WebGLRenderer({ canvas, context, antialias: false });
    this.#software = isSoftwareRenderer(rendererName(context));
    this.#gl.outputColorSpace = LinearSRGBColorSpace;
    this.#gl.setPixelRatio(1);
    this.#gl.debug.onShaderError = () => (this.#shaderFault = true);
    this.#smoothing = createSupersampling(this.#gl.capabilities.maxTextureSize);
    this.#quadrics = this.#mesh('quadric', 0);
    this.#marked = this.#mesh('quadric-marked', 0);
    this.#rings = this.#mesh('ring', 0);
    this.#cylinders = this.#mesh('cylinder', 1);
    this.#polars = new PolarMeshes(this.#group, programMaterial('polar', this.#uniforms), 2);
    this.#lines = this.#mesh('line', 3);
    this.#facets = this.#mesh('facet', 4);
    this.#theme = options.theme ?? lightTheme;
    this.setTheme(this.#theme);
    canvas.addEventListener('webglcontextlost', this.#onLost);
    canvas.addEventListener('webglcontextrestored', this.#onRestored);
  }

  setScene(scene: Scene): void {
    this.#scene = scene;
    const { plain, marked } = splitQuadrics(scene.quadrics);
    this.#replace(this.#quadrics, quadricGeometry(scene.quadrics, plain));
    this.#replace(this.#marked, markedQuadricGeometry(scene.quadrics, marked));
    this.#replace(this.#cylinders, cylinderGeometry(scene.cylinders));
    this.#replace(this.#lines, lineGeometry(scene.lines));
    this.#polars.setBatch(scene.polars ?? null);
    this.#markStates();
    this.#stale('another scene');
  }

  setCamera(camera: Camera): void {
    this.#camera = camera;
    this.#stale('the camera moved');
  }

  setTheme(theme: RenderTheme): void {
    this.#theme = theme;
    applyTheme(this.#uniforms, theme);
    const [red, green, blue] = theme.paper;
    // in the renderer's output space, so that the clear colour is the paper's sRGB bytes unchanged
    this.#gl.setClearColor(new Color().setRGB(red / 255, green / 255, blue / 255, LinearSRGBColorSpace), 1);
    this.#stale('another theme');
  }

  setSelection(atomIds: readonly string[]): void {
    this.#selected = new Set(atomIds);
    this.#markStates();
    this.#stale('another selection');
  }

  setHover(atomId: string | null): void {
    if (atomId === this.#hovered) return;
    this.#hovered = atomId;
    this.#markStates();
    this.#stale('another atom is hovered');
  }

  resize(widthPx: number, heightPx: number, devicePixelRatio = 1): void {
    this.#viewport = { widthPx: Math.max(1, widthPx), heightPx: Math.max(1, heightPx) };
    this.#deviceRatio = devicePixelRatio;
    const { width, height } = this.#deviceSize();
    this.#gl.setSize(width, height, false);
    this.#stale('another size');
  }

  render(): void {
    this.#cancel();
    this.#draw(true);
  }

  pick(xPx: number, yPx: number): PickHit | null {
    if (!this.#scene || !this.#camera) return null;
    return pickInScene(this.#scene, this.#camera, xPx, yPx, this.#viewport);
  }

  counters(): RenderCounters {
    return {
      frames: this.#frames,
      smoothFrames: this.#smoothFrames,
      quadrics: this.#scene?.quadrics.count ?? 0,
      cylinders: this.#scene?.cylinders.count ?? 0,
      lines: this.#scene?.lines.count ?? 0,
      drawCalls: this.#meshes().filter((mesh) => mesh.visible).length + this.#polars.drawCalls,
      contextLosses: this.#losses,
      lastReason: this.#lastReason,
      drawnBy: 'WebGL 2',
    };
  }

  dispose(): void {
    this.#cancel();
    this.#canvas.removeEventListener('webglcontextlost', this.#onLost);
    this.#canvas.removeEventListener('webglcontextrestored', this.#onRestored);
    for (const mesh of this.#meshes()) {
      mesh.geometry.dispose();
      mesh.material.dispose();
    }
    this.#polars.dispose();
    this.#smoothing.dispose();
    this.#gl.dispose();
    this.#gl.forceContextLoss();
    this.#lost = true;
  }

  #meshes(): readonly QuadMesh[] {
    return [this.#quadrics, this.#marked, this.#rings, this.#cylinders, this.#lines, this.#facets];
  }

  #mesh(name: Exclude<ProgramName, 'polar' | 'resolve'>, order: number): QuadMesh {
    const mesh = new Mesh(new BufferGeometry(), programMaterial(name, this.#uniforms));
    mesh.frustumCulled = false;
    mesh.visible = false;
    mesh.renderOrder = order;
    this.#group.add(mesh);
    return mesh;
  }

  #replace(mesh: QuadMesh, geometry: BufferGeometry): void {
    mesh.geometry.dispose();
    mesh.geometry = geometry;
    mesh.visible = (geometry.index?.count ?? geometry.drawRange.count) > 0;
  }

  #markStates(): void {
    const scene = this.#scene;
    if (!scene) return;
    const states = ringStates(scene, this.#selected, this.#hovered);
    this.#replace(this.#rings, ringGeometry(scene.quadrics, states));
  }

  #deviceSize(): { width: number; height: number } {
    const { widthPx, heightPx } = this.#viewport;
    return {
      width: Math.max(1, Math.round(widthPx * this.#deviceRatio)),
      height: Math.max(1, Math.round(heightPx * this.#deviceRatio)),
    };
  }

  #stale(reason: string): void {
    this.#lastReason = reason;
    if (this.#rest !== null) clearTimeout(this.#rest);
    this.#rest = null;
    this.#frame ??= requestAnimationFrame(() => {
      this.#frame = null;
      this.#draw(false);
      if (this.#samples() > 1) this.#rest = setTimeout(() => this.#draw(true), restMs);
    });
  }

  #cancel(): void {
    if (this.#frame !== null) cancelAnimationFrame(this.#frame);
    if (this.#rest !== null) clearTimeout(this.#rest);
    this.#frame = null;
    this.#rest = null;
  }

  #samples(): number {
    const usual = this.#software || this.#deviceRatio > 1.5 ? 2 : 3;
    return Math.max(1, Math.floor(this.#options.samplesAcross ?? usual));
  }

  /** A graphics driver that fails counts as a context that was lost for good: the CPU renderer steps in. */
  #draw(smooth: boolean): void {
    try {
      this.#paint(smooth);
      if (this.#shaderFault) throw new Error('a shader was refused');
    } catch (error) {
      this.#loseContext(`WebGL failed: ${error instanceof Error ? error.message : String(error)}`);
    }
  }

  #paint(smooth: boolean): void {
    if (this.#lost || !this.#scene || !this.#camera) return;
    const { width, height } = this.#deviceSize();
    const samples = smooth ? this.#samples() : 1;
    const target = samples > 1 ? this.#smoothing.target(width, height, samples) : null;
    const across = target ? samples : 1;
    applyView(this.#uniforms, this.#scene, this.#camera, this.#viewport, this.#deviceRatio * across);
    this.#fitToView(this.#deviceRatio * across);
    this.#gl.setRenderTarget(target);
    this.#gl.render(this.#group, this.#still);
    if (target) this.#smoothing.resolve(this.#gl, target, across);
    this.#frames += 1;
    if (target) this.#smoothFrames += 1;
    this.#options.onFrame?.(this.#scene);
  }

  /** What depends on the view itself: order and light of facets, fineness of polar surfaces. */
  #fitToView(samples: number): void {
    if (!this.#scene || !this.#camera) return;
    const p = projection(this.#camera, this.#viewport);
    this.#polars.fit(p, samples);
    const { facets } = this.#scene;
    if (facets && facets.count > 0) this.#replace(this.#facets, facetGeometry(facetView(facets, p)));
    else this.#facets.visible = false;
  }

  #loseContext(reason: string): void {
    this.#lost = true;
    this.#losses += 1;
    this.#lastReason = reason;
    this.#cancel();
    this.#options.onContextLost?.();
  }

  readonly #onLost = (event: Event): void => {
    event.preventDefault();
    this.#loseContext('the graphics context was lost');
  };

  readonly #onRestored = (): void => {
    this.#lost = false;
    // three starts afresh on a restored context: what is not kept in its objects is set again
    this.setTheme(this.#theme);
    this.resize(this.#viewport.widthPx, this.#viewport.heightPx, this.#deviceRatio);
    this.#stale('the graphics context came back');
    this.#options.onContextRestored?.();
  };
}
