import { BufferAttribute, BufferGeometry } from 'three';
import type { FacetView } from '#src/scene/facet-view.ts';
import { linearLight } from '#src/scene/light.ts';
import type { CylinderBatch, LineBatch, QuadricBatch } from '#src/scene/scene.ts';

/**
 * One merged geometry a kind, four vertices an object and no instancing: software WebGL runs each instance as a draw of its
 * own. The corner of a vertex is the two low bits of gl_VertexID.
 */
const corners = 4;

/** Which quadrics the plain program draws: of one colour, light enough for dark ink. The others take the `quadric-marked` one. */
export interface QuadricSplit {
  readonly plain: readonly number[];
  readonly marked: readonly number[];
}

/** Relative luminance (Rec. 709 primaries) up to which ink on a colour is light; as `inkOn` of shaders/chunks/_pattern.glsl. */
const lightInkLuminance = 0.14;

export function splitQuadrics({ count, colours, shares, patterns }: QuadricBatch): QuadricSplit {
  const [plain, marked]: [number[], number[]] = [[], []];
  for (let i = 0; i < count; i++) {
    const [red, green, blue] = [0, 1, 2].map((k) => linearLight(colours[3 * i + k]!));
    // a little more, so that rounding doesn't decide differently here and there
    const isDark = 0.2126 * red! + 0.7152 * green! + 0.0722 * blue! < 1.01 * lightInkLuminance;
    const isMarked = isDark || (shares?.[i] ?? 255) < 255 || (patterns?.[i] ?? 0) > 0;
    (isMarked ? marked : plain).push(i);
  }
  return { plain, marked };
}

export function quadricGeometry(batch: QuadricBatch, chosen: readonly number[]): BufferGeometry {
  const geometry = shapeGeometry(batch, chosen);
  put(geometry, 'aColour', rows(batch.colours, 3, chosen), 3, true);
  put(geometry, 'aCircles', rows(batch.circles, 1, chosen), 1);
  return geometry;
}

export function markedQuadricGeometry(batch: QuadricBatch, chosen: readonly number[]): BufferGeometry {
  const geometry = quadricGeometry(batch, chosen);
  const { shares, patterns } = batch;
  const count = chosen.length;
  put(geometry, 'aShare', shares ? rows(shares, 1, chosen) : new Uint8Array(count).fill(255), 1, true);
  put(geometry, 'aRestColour', rows(batch.restColours ?? batch.colours, 3, chosen), 3, true);
  put(geometry, 'aPattern', patterns ? rows(patterns, 1, chosen) : new Uint8Array(count), 1);
  return geometry;
}

/** Rings round those quadrics whose state is not 0: 1 hovered, 2 selected, 3 both. */
export function ringGeometry(batch: QuadricBatch, states: Uint8Array): BufferGeometry {
  const chosen = Array.from(states.keys()).filter((i) => states[i]! > 0);
  const geometry = shapeGeometry(batch, chosen);
  const radii = batch.ringRadii ? rows(batch.ringRadii, 1, chosen) : new Float32Array(chosen.length).fill(-1);
  put(geometry, 'aState', rows(states, 1, chosen), 1);
  put(geometry, 'aRingRadius', radii, 1);
  return geometry;
}

function shapeGeometry(batch: QuadricBatch, chosen: readonly number[]): BufferGeometry {
  const geometry = quadGeometry(chosen.length);
  const column = (k: number) => {
    const axis = new Float32Array(3 * chosen.length);
    for (let j = 0; j < chosen.length; j++) {
      for (let row = 0; row < 3; row++) axis[3 * j + row] = batch.shapes[9 * chosen[j]! + 3 * row + k]!;
    }
    return axis;
  };
  put(geometry, 'aCentre', rows(batch.centres, 3, chosen), 3);
  put(geometry, 'aAxis1', column(0), 3);
  put(geometry, 'aAxis2', column(1), 3);
  put(geometry, 'aAxis3', column(2), 3);
  return geometry;
}

/** The values of some objects, `size` each. */
function rows<Values extends Float32Array | Uint8Array>(
  values: Values,
  size: number,
  chosen: readonly number[],
): Values {
  const found = values.slice(0, size * chosen.length) as Values;
  for (let j = 0; j < chosen.length; j++) {
    for (let k = 0; k < size; k++) found[size * j + k] = values[size * chosen[j]! + k]!;
  }
  return found;
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
