import type { RawShaderMaterial } from 'three';
import {
  BufferAttribute,
  InstancedBufferAttribute,
  InstancedBufferGeometry,
  Mesh,
  type Object3D,
} from 'three';
import { nearness } from '#src/scene/perspective.ts';
import { polarFrequencies, polarLevel, polarMesh } from '#src/scene/polar-mesh.ts';
import type { Projection } from '#src/scene/project.ts';
import { viewPoint } from '#src/scene/project.ts';
import type { PolarBatch } from '#src/scene/scene.ts';

/**
 * Signed polar surfaces, one instanced mesh for each level of fineness that is in use. The levels follow the sizes on screen;
 * moving a surface to another level rebuilds the instances of both.
 */
export class PolarMeshes {
  readonly #group: Object3D;
  readonly #material: RawShaderMaterial;
  readonly #renderOrder: number;
  #batch: PolarBatch | null = null;
  #levels: Uint8Array = new Uint8Array();
  #meshes: Mesh<InstancedBufferGeometry, RawShaderMaterial>[] = [];

  constructor(group: Object3D, material: RawShaderMaterial, renderOrder: number) {
    this.#group = group;
    this.#material = material;
    this.#renderOrder = renderOrder;
  }

  get drawCalls(): number {
    return this.#meshes.length;
  }

  setBatch(batch: PolarBatch | null): void {
    this.#batch = batch && batch.count > 0 ? batch : null;
    this.#levels = new Uint8Array(this.#batch?.count ?? 0).fill(255);
    if (!this.#batch) this.#clear();
  }

  /** Chooses the levels for a view; `samples`: device pixels, samples included, of one CSS pixel. */
  fit(p: Projection, samples: number): void {
    const batch = this.#batch;
    if (!batch) return;
    const levels = Uint8Array.from({ length: batch.count }, (_none, i) => levelOf(batch, i, p, samples));
    if (levels.every((level, i) => level === this.#levels[i])) return;
    this.#levels = levels;
    this.#clear();
    for (let level = 0; level < polarFrequencies.length; level++) {
      const members = [...levels.keys()].filter((i) => levels[i] === level);
      if (members.length > 0) this.#add(instancesOf(batch, members, level));
    }
  }

  dispose(): void {
    this.#clear();
    this.#material.dispose();
  }

  #add(geometry: InstancedBufferGeometry): void {
    const mesh = new Mesh(geometry, this.#material);
    mesh.frustumCulled = false;
    mesh.renderOrder = this.#renderOrder;
    this.#group.add(mesh);
    this.#meshes.push(mesh);
  }

  #clear(): void {
    for (const mesh of this.#meshes) {
      this.#group.remove(mesh);
      mesh.geometry.dispose();
    }
    this.#meshes = [];
  }
}

function levelOf({ centres, tensors }: PolarBatch, i: number, p: Projection, samples: number): number {
  const [xx, yy, zz, xy, xz, yz] = tensors.subarray(6 * i, 6 * i + 6) as unknown as number[];
  const largest = Math.hypot(xx!, yy!, zz!, Math.SQRT2 * xy!, Math.SQRT2 * xz!, Math.SQRT2 * yz!);
  const z = viewPoint(p, [centres[3 * i]!, centres[3 * i + 1]!, centres[3 * i + 2]!])[2];
  return polarLevel((largest * p.scale * samples) / Math.max(nearness(z, p.eyePx), 0.05));
}

function instancesOf(batch: PolarBatch, members: readonly number[], level: number): InstancedBufferGeometry {
  const geometry = new InstancedBufferGeometry();
  const { directions, triangles } = polarMesh(level);
  for (let corner = 0; corner < 3; corner++) {
    // each vertex of a triangle knows the directions of all three
    const values = new Float32Array(3 * triangles.length);
    for (let v = 0; v < triangles.length; v++) {
      const from = triangles[v - (v % 3) + corner]!;
      values.set(directions.subarray(3 * from, 3 * from + 3), 3 * v);
    }
    geometry.setAttribute(`aDirection${corner + 1}`, new BufferAttribute(values, 3));
  }
  const put = (name: string, from: Float32Array | Uint8Array, stride: number, first: number): void => {
    const isBytes = from instanceof Uint8Array;
    const values = isBytes ? new Uint8Array(3 * members.length) : new Float32Array(3 * members.length);
    members.forEach((i, at) => values.set(from.subarray(stride * i + first, stride * i + first + 3), 3 * at));
    geometry.setAttribute(name, new InstancedBufferAttribute(values, 3, isBytes));
  };
  put('aCentre', batch.centres, 3, 0);
  put('aDiagonal', batch.tensors, 6, 0);
  put('aMixed', batch.tensors, 6, 3);
  put('aPositive', batch.positiveColours, 3, 0);
  put('aNegative', batch.negativeColours, 3, 0);
  geometry.instanceCount = members.length;
  // three counts vertices by an attribute `position`, which there is none of
  geometry.setDrawRange(0, triangles.length);
  return geometry;
}
