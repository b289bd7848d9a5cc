import { BufferAttribute, BufferGeometry } from 'three';
import type { FacetView } from '#src/scene/facet-view.ts';
import type { CylinderBatch, LineBatch, QuadricBatch } from '#src/scene/scene.ts';

/**
 * One merged geometry a kind, four vertices an object and no instancing: software WebGL runs each instance as a draw of its
 * own. The corner of a vertex is the two low bits of gl_VertexID.
 */
const corners = 4;

export function quadricGeometry(batch: QuadricBatch): BufferGeometry {
  const geometry = quadGeometry(batch.count);
  const column = (k: number) => {
    const axis = new Float32Array(3 * batch.count);
    for (let i = 0; i < batch.count; i++) {
      for (let row = 0; row < 3; row++) axis[3 * i + row] = batch.shapes[9 * i + 3 * row + k]!;
    }
    return axis;
  };
  put(geometry, 'aCentre', batch.centres, 3);
  put(geometry, 'aAxis1', column(0), 3);
  put(geometry, 'aAxis2', column(1), 3);
  put(geometry, 'aAxis3', column(2), 3);
  put(geometry, 'aColour', batch.colours, 3, true);
  put(geometry, 'aCircles', batch.circles, 1);
  put(geometry, 'aState', new Uint8Array(batch.count), 1);
  put(geometry, 'aShare', batch.shares ?? new Uint8Array(batch.count).fill(255), 1, true);
  put(geometry, 'aRestColour', batch.restColours ?? batch.colours, 3, true);
  put(geometry, 'aRingRadius', batch.ringRadii ?? new Float32Array(batch.count).fill(-1), 1);
  put(geometry, 'aPattern', batch.patterns ?? new Uint8Array(batch.count), 1);
  return geometry;
}

export function cylinderGeometry(batch: CylinderBatch): BufferGeometry {
  const geometry = quadGeometry(batch.count);
  put(geometry, 'aStart', batch.starts, 3);
  put(geometry, 'aEnd', batch.ends, 3);
  put(geometry, 'aRadius', batch.radii, 1);
  put(geometry, 'aStartColour', batch.startColours, 3, true);
  put(geometry, 'aEndColour', batch.endColours, 3, true);
  return geometry;
}

export function lineGeometry(batch: LineBatch): BufferGeometry {
  const geometry = quadGeometry(batch.count);
  put(geometry, 'aStart', batch.starts, 3);
  put(geometry, 'aEnd', batch.ends, 3);
  return geometry;
}

/** Facets as seen, three vertices each; already sorted and lit. */
export function facetGeometry({ count, corners: places, colours }: FacetView): BufferGeometry {
  const geometry = new BufferGeometry();
  const tints = new Float32Array(12 * count);
  for (let i = 0; i < count; i++) {
    const [red, green, blue, opacity] = colours.subarray(4 * i, 4 * i + 4);
    for (let k = 0; k < 3; k++) tints.set([red! / 255, green! / 255, blue! / 255, opacity!], 12 * i + 4 * k);
  }
  geometry.setAttribute('aCorner', new BufferAttribute(places, 3));
  geometry.setAttribute('aTint', new BufferAttribute(tints, 4));
  geometry.setDrawRange(0, 3 * count);
  return geometry;
}

/** Rings: 0 plain, 1 hovered, 2 selected, 3 both, one a quadric. */
export function setQuadricStates(geometry: BufferGeometry, states: Uint8Array): void {
  const attribute = geometry.getAttribute('aState') as BufferAttribute;
  const target = attribute.array as Uint8Array;
  for (let i = 0; i < states.length; i++) target.fill(states[i]!, corners * i, corners * (i + 1));
  attribute.needsUpdate = true;
}

function quadGeometry(count: number): BufferGeometry {
  const geometry = new BufferGeometry();
  const index = new Uint32Array(6 * count);
  for (let i = 0; i < count; i++) {
    const first = corners * i;
    index.set([first, first + 1, first + 2, first + 2, first + 1, first + 3], 6 * i);
  }
  geometry.setIndex(new BufferAttribute(index, 1));
  return geometry;
}

/** Repeats the values of each object for its four vertices. */
function put(
  geometry: BufferGeometry,
  name: string,
  values: Float32Array | Uint8Array,
  size: number,
  normalised = false,
): void {
  const count = values.length / size;
  const repeated =
    values instanceof Float32Array
      ? new Float32Array(corners * values.length)
      : new Uint8Array(corners * values.length);
  for (let i = 0; i < count; i++) {
    const one = values.subarray(size * i, size * (i + 1));
    for (let corner = 0; corner < corners; corner++) repeated.set(one, size * (corners * i + corner));
  }
  geometry.setAttribute(name, new BufferAttribute(repeated, size, normalised));
}
