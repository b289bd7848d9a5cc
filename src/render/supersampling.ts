import type { RawShaderMaterial } from 'three';
import {
  BufferAttribute,
  BufferGeometry,
  Camera,
  Mesh,
  NearestFilter,
  Scene,
  WebGLRenderTarget,
  type WebGLRenderer,
} from 'three';
import { programMaterial } from './materials.ts';

/** Draws into a target n times as large each way and averages to the canvas: ray-cast rims come from `discard`, which multisampling does not smooth. */
export interface Supersampling {
  /** Null where n × the size does not fit into a texture. */
  target(widthPx: number, heightPx: number, samplesAcross: number): WebGLRenderTarget | null;
  /** Averages the target to the canvas. */
  resolve(renderer: WebGLRenderer, target: WebGLRenderTarget, samplesAcross: number): void;
  dispose(): void;
}

export function createSupersampling(largestTexturePx: number): Supersampling {
  let target: WebGLRenderTarget | null = null;
  const uniforms = {
    uSamples: { value: null as WebGLRenderTarget['texture'] | null },
    uSamplesAcross: { value: 1 },
  };
  const material: RawShaderMaterial = programMaterial('resolve', uniforms);
  const triangle = new BufferGeometry();
  triangle.setAttribute('position', new BufferAttribute(new Float32Array(9), 3));
  const mesh = new Mesh(triangle, material);
  mesh.frustumCulled = false;
  const screen = new Scene();
  screen.add(mesh);
  const still = new Camera();
  return {
    target(widthPx, heightPx, samplesAcross) {
      const [width, height] = [widthPx * samplesAcross, heightPx * samplesAcross];
      if (Math.max(width, height) > largestTexturePx) return null;
      target ??= new WebGLRenderTarget(width, height, {
        minFilter: NearestFilter,
        magFilter: NearestFilter,
        generateMipmaps: false,
      });
      if (target.width !== width || target.height !== height) target.setSize(width, height);
      return target;
    },
    resolve(renderer, from, samplesAcross) {
      uniforms.uSamples.value = from.texture;
      uniforms.uSamplesAcross.value = samplesAcross;
      renderer.setRenderTarget(null);
      renderer.render(screen, still);
    },
    dispose() {
      target?.dispose();
      material.dispose();
      triangle.dispose();
    },
  };
}
