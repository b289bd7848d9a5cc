import {
  Camera as StillCamera,
  InstancedBufferAttribute,
  InstancedBufferGeometry,
  LinearSRGBColorSpace,
  Mesh,
  Scene as Group,
  WebGLRenderer,
  BufferAttribute,
} from 'three';
import { quadricGeometry, splitQuadrics } from '#src/render/batch-geometry.ts';
import { applyTheme, applyView, programMaterial, sharedUniforms } from '#src/render/materials.ts';
import type { Camera } from '#src/scene/camera.ts';
import type { Scene } from '#src/scene/scene.ts';
import { lightTheme } from '#src/scene/theme.ts';

/** Our own ellipsoids, by the same program, with each an instance of one quad instead of four vertices of a merged geometry. */
export function instancedQuadrics(canvas: HTMLCanvasElement, scene: Scene): (camera: Camera) => void {
  const renderer = new WebGLRenderer({ canvas, antialias: false });
  renderer.outputColorSpace = LinearSRGBColorSpace;
  renderer.setSize(canvas.width, canvas.height, false);
  renderer.setClearColor(0xfaf8f3);
  const uniforms = sharedUniforms();
  applyTheme(uniforms, lightTheme);
  const merged = quadricGeometry(scene.quadrics, splitQuadrics(scene.quadrics).plain);
  const geometry = new InstancedBufferGeometry();
  geometry.setIndex(new BufferAttribute(new Uint16Array([0, 1, 2, 2, 1, 3]), 1));
  for (const [name, attribute] of Object.entries(merged.attributes)) {
    const { array, itemSize, normalized } = attribute as BufferAttribute;
    const one = array.slice(0, array.length / 4);
    for (let k = 0; k < one.length; k++) {
      one[k] = array[4 * itemSize * Math.floor(k / itemSize) + (k % itemSize)]!;
    }
    geometry.setAttribute(name, new InstancedBufferAttribute(one, itemSize, normalized));
  }
  geometry.instanceCount = merged.index!.count / 6;
  const mesh = new Mesh(geometry, programMaterial('quadric', uniforms));
  mesh.frustumCulled = false;
  const group = new Group();
  group.add(mesh);
  return (camera) => {
    applyView(uniforms, scene, camera, { widthPx: canvas.width, heightPx: canvas.height }, 1);
    renderer.render(group, new StillCamera());
  };
}
