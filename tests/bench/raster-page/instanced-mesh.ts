import {
  AmbientLight,
  Color,
  DirectionalLight,
  InstancedMesh,
  Matrix4,
  MeshLambertMaterial,
  OrthographicCamera,
  Scene as Group,
  SphereGeometry,
  WebGLRenderer,
} from 'three';
import type { Camera } from '#src/scene/camera.ts';
import { pixelsPerAngstrom, viewRotation } from '#src/scene/camera.ts';
import type { Scene } from '#src/scene/scene.ts';

/** The usual way, to compare with: one instanced mesh of spheres of 32 × 16 faces, lit, without circles. */
export function instancedMesh(canvas: HTMLCanvasElement, scene: Scene): (camera: Camera) => void {
  const renderer = new WebGLRenderer({ canvas });
  renderer.setSize(canvas.width, canvas.height, false);
  renderer.setClearColor(0xfaf8f3);
  const { count, centres, shapes, colours } = scene.quadrics;
  const mesh = new InstancedMesh(new SphereGeometry(1, 32, 16), new MeshLambertMaterial(), count);
  mesh.frustumCulled = false;
  const at = (k: number, row: number, column: number): number => shapes[9 * k + 3 * row + column]!;
  for (let k = 0; k < count; k++) {
    const rows = [0, 1, 2].map((row) => [at(k, row, 0), at(k, row, 1), at(k, row, 2), centres[3 * k + row]!]);
    mesh.setMatrixAt(k, new Matrix4().set(...([...rows.flat(), 0, 0, 0, 1] as Parameters<Matrix4['set']>)));
    const channel = (c: number): number => colours[3 * k + c]! / 255;
    mesh.setColorAt(k, new Color(channel(0), channel(1), channel(2)));
  }
  const group = new Group();
  const light = new DirectionalLight(0xffffff, 2);
  light.position.set(-1, 1, 1);
  group.add(mesh, new AmbientLight(0xffffff, 1), light);
  group.matrixAutoUpdate = false;
  return (camera) => {
    const viewport = { widthPx: canvas.width, heightPx: canvas.height };
    const scale = pixelsPerAngstrom(camera, viewport);
    const [x, y] = [canvas.width / 2 / scale, canvas.height / 2 / scale];
    const [a, b, c, d, e, f, g, h, i] = viewRotation(camera.orientation);
    group.matrix.set(a, b, c, 0, d, e, f, 0, g, h, i, 0, 0, 0, 0, 1);
    group.matrixWorldNeedsUpdate = true;
    renderer.render(group, new OrthographicCamera(-x, x, y, -y, -100, 100));
  };
}
