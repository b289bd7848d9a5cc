import { facetView } from '#src/scene/facet-view.ts';
import { heightOfImage } from '#src/scene/perspective.ts';
import type { RasterKernel } from './kernel.ts';
import type { PolarPlan } from './polar-plan.ts';
import { planPolars } from './polar-plan.ts';
import type { RasterScene } from './scene-arrays.ts';
import { emptyScene, meshArrays, sceneArrays } from './scene-arrays.ts';
import * as S from './slots.ts';
import type { RasterView } from './view.ts';
import { fillView, middleOf, pictureSize, sampleProjection } from './view.ts';

export type { RasterScene } from './scene-arrays.ts';

/** Rows of a picture, top to bottom. */
export interface RasterBand {
  readonly firstRow: number;
  readonly rowCount: number;
  readonly width: number;
  /** RGBA, sRGB; opaque, or with straight alpha where the theme is transparent. */
  readonly pixels: Uint8ClampedArray<ArrayBuffer>;
}

/** What is seen in each pixel; 0 and −Infinity where nothing is. */
export interface RasterHits {
  /** Pick ids. */
  readonly ids: Uint32Array;
  /** Pixels towards the viewer, 0 at the camera's target. */
  readonly depths: Float32Array;
}

/** Draws scenes by one kernel. Holds the scene in the kernel's memory between pictures. */
export interface Rasterizer {
  readonly kernel: RasterKernel['name'];
  setScene(scene: RasterScene): void;
  /** Ring states, one a quadric: 0 plain, 1 hovered, 2 selected, 3 both. */
  setStates(states: Uint8Array): void;
  /** Rows of the picture, all of them unless said otherwise. A copy of its own. */
  draw(view: RasterView, firstRow?: number, rowCount?: number): RasterBand;
  /** What is seen in each pixel of the picture, one sample in its middle. */
  hits(view: RasterView): RasterHits;
}

/** Largest picture side in samples: beyond it single precision misses rims. */
export const largestSide = 65_536;

export function createRasterizer(kernel: RasterKernel): Rasterizer {
  return new MemoryRasterizer(kernel);
}

class MemoryRasterizer implements Rasterizer {
  readonly #kernel: RasterKernel;
  #scene: RasterScene = emptyScene;
  #states: Uint8Array = new Uint8Array();
  /** Bytes from the start that hold the scene; what a picture needs comes after. */
  #sceneEnd = 0;
  #isLoaded = false;
  /** Of the meshes that memory holds; -1 for none. */
  #finestLevel = -1;

  constructor(kernel: RasterKernel) {
    this.#kernel = kernel;
  }

  get kernel(): RasterKernel['name'] {
    return this.#kernel.name;
  }

  setScene(scene: RasterScene): void {
    this.#scene = scene;
    this.#states = new Uint8Array(scene.quadrics.count);
    this.#isLoaded = false;
  }

  setStates(states: Uint8Array): void {
    this.#states = states;
    if (this.#isLoaded) this.#loadStates();
  }

  draw(view: RasterView, firstRow = 0, rowCount = pictureSize(view).height): RasterBand {
    const { width } = pictureSize(view);
    const buffer = this.#run(view, firstRow, rowCount, false);
    const at = new Int32Array(buffer)[S.pixelsAt]!;
    const pixels = new Uint8ClampedArray(buffer.slice(at, at + 4 * width * rowCount));
    return { firstRow, rowCount, width, pixels };
  }

  hits(view: RasterView): RasterHits {
    const { width, height } = pictureSize(view);
    const one = { ...view, samplesAcross: 1 };
    const buffer = this.#run(one, 0, height, true);
    const i = new Int32Array(buffer);
    const size = 4 * width * height;
    const ids = new Uint32Array(buffer.slice(i[S.outIdsAt]!, i[S.outIdsAt]! + size));
    const depths = new Float32Array(buffer.slice(i[S.outDepthAt]!, i[S.outDepthAt]! + size));
    const pickIds = [this.#scene.quadrics, this.#scene.cylinders, this.#scene.polars];
    const { eyePx } = sampleProjection(one);
    for (let k = 0; k < ids.length; k++) {
      let object = ids[k]! - 1;
      depths[k] = object < 0 ? -Infinity : heightOfImage(depths[k]!, eyePx) / view.pixelRatio;
      for (const batch of pickIds) {
        if (object >= 0 && batch && object < batch.count) ids[k] = batch.pickIds[object]!;
        object -= batch?.count ?? 0;
      }
    }
    return { ids, depths };
  }

  #run(view: RasterView, firstRow: number, rowCount: number, wantsIds: boolean): ArrayBuffer {
    const across = view.samplesAcross;
    const { width, height } = pictureSize(view);
    if (Math.max(width, height) * across > largestSide) {
      throw new Error(
        `A picture of ${width} × ${height} pixels with ${across} × ${across} samples is too large: at most ${largestSide} samples a side.`,
      );
    }
    const first = firstRow * across;
    const end = (firstRow + rowCount) * across;
    const polars = this.#planPolars(view, first, end);
    if (!this.#isLoaded) this.#load();
    const buffer = this.#plan(view, rowCount, wantsIds, polars);
    const i = new Int32Array(buffer);
    fillView(new Float32Array(buffer), i, view, this.#scene);
    i[S.firstRow] = first;
    i[S.endRow] = end;
    i[S.wantsIds] = wantsIds ? 1 : 0;
    const strip = i[S.coloursAt]!;
    this.#kernel.prepare();
    const step = Math.floor(S.stripRows / across) * across;
    for (let row = first; row < end; row += step) {
      if (across === 1) i[S.coloursAt] = i[S.pixelsAt]! + 4 * width * (row - first);
      this.#kernel.strip(row, Math.min(step, end - row));
    }
    i[S.coloursAt] = strip;
    return buffer;
  }

  /** Scene arrays, records and lists into memory. */
  #load(): void {
    const { quadrics, cylinders, lines, polars } = this.#scene;
    const objects = quadrics.count + cylinders.count + (polars?.count ?? 0);
    const places = new Places(S.blockBytes);
    const meshes = meshArrays(this.#finestLevel);
    const placed = [...sceneArrays(this.#scene), ...meshes.map((array) => [-1, array] as const)].map(
      ([slot, array]) => ({ slot, array, at: places.take(array.byteLength) }),
    );
    const empty: readonly (readonly [slot: number, bytes: number])[] = [
      [S.statesAt, quadrics.count],
      [S.markedAt, 4 * quadrics.count],
      [S.recordsAt, 4 * S.recordSize * objects],
      [S.candidatesAt, 4 * S.entrySize * objects],
      [S.sortedAt, 4 * S.entrySize * objects],
      [S.binsAt, 4 * (S.binCount + 2)],
      [S.meshTableAt, 8 * meshes.length],
      [S.polarMeshesAt, 4 * (polars?.count ?? 0)],
    ];
    const reserved = empty.map(([slot, size]) => ({ slot, at: places.take(size) }));
    this.#sceneEnd = places.end;
    const buffer = this.#kernel.reserve(places.end);
    const i = new Int32Array(buffer);
    i.fill(0, 0, S.blockBytes / 4);
    for (const { slot, at } of [...placed, ...reserved]) if (slot >= 0) i[slot] = at;
    for (const { array, at } of placed) {
      new Uint8Array(buffer).set(new Uint8Array(array.buffer, array.byteOffset, array.byteLength), at);
    }
    const table = placed.filter(({ slot }) => slot < 0).flatMap(({ array, at }) => [at, array.length / 3]);
    i.set(table, i[S.meshTableAt]! >> 2);
    i[S.quadricCount] = quadrics.count;
    i[S.cylinderCount] = cylinders.count;
    i[S.lineCount] = lines.count;
    i[S.polarCount] = polars?.count ?? 0;
    this.#isLoaded = true;
    this.#loadStates();
  }

  #loadStates(): void {
    const buffer = this.#kernel.reserve(this.#sceneEnd);
    const i = new Int32Array(buffer);
    const states = this.#states;
    new Uint8Array(buffer).set(states, i[S.statesAt]);
    let count = 0;
    for (let k = 0; k < states.length; k++) if (states[k]! > 0) i[(i[S.markedAt]! >> 2) + count++] = k;
    i[S.markedCount] = count;
  }

  /** How finely polar surfaces are drawn; memory is filled anew where it lacks so fine a mesh. */
  #planPolars(view: RasterView, firstRow: number, endRow: number): PolarPlan | null {
    const { polars } = this.#scene;
    if (!polars || polars.count === 0) return null;
    const { width, height } = pictureSize(view);
    const across = view.samplesAcross;
    const plan = planPolars(
      polars,
      sampleProjection(view),
      width * across,
      height * across,
      firstRow,
      endRow,
      view.isMoving,
    );
    if (plan.finestLevel > this.#finestLevel) {
      this.#finestLevel = plan.finestLevel;
      this.#isLoaded = false;
    }
    return plan;
  }

  /** Room for the buffers of a strip, the band's pixels and what else belongs to one picture; facets and meshes are filled in. */
  #plan(view: RasterView, rowCount: number, wantsIds: boolean, polars: PolarPlan | null): ArrayBuffer {
    const { width } = pictureSize(view);
    const across = view.samplesAcross;
    const columns = width * across;
    const facets = this.#facets(view);
    const stride = (columns + S.tileSide + 3) & ~(S.tileSide - 1);
    const places = new Places(this.#sceneEnd);
    const strip = 4 * stride * S.stripRows;
    const picture = 4 * width * rowCount + 16;
    const tiles = 4 * S.tileSize * (stride / S.tileSide) * (S.stripRows / S.tileSide);
    const at: readonly (readonly [slot: number, at: number])[] = [
      [S.depthAt, places.take(strip)],
      [S.idsAt, places.take(strip)],
      [S.coloursAt, across > 1 ? places.take(strip) : 0],
      [S.tilesAt, places.take(tiles)],
      [S.pixelsAt, places.take(picture)],
      [S.outIdsAt, places.take(wantsIds ? picture : 0)],
      [S.outDepthAt, places.take(wantsIds ? picture : 0)],
      [S.facetsAt, places.take(facets.byteLength)],
    ];
    const pool = places.take(polars?.poolBytes ?? 0);
    const vertices = places.take(polars?.vertexBytes ?? 0);
    const buffer = this.#kernel.reserve(places.end);
    const i = new Int32Array(buffer);
    for (const [slot, address] of at) i[slot] = address;
    i[S.stride] = stride;
    i[S.colourStride] = across > 1 ? stride : columns;
    i[S.facetCount] = facets.length / S.facetSize;
    i[S.polarPoolAt] = pool;
    i[S.polarFree] = pool;
    i[S.polarVerticesAt] = vertices;
    i[S.polarPoolEnd] = pool + (polars?.poolBytes ?? 0);
    i[S.polarEpoch] = 0;
    new Float32Array(buffer).set(facets, i[S.facetsAt]! >> 2);
    if (polars) i.set(polars.levels, i[S.polarMeshesAt]! >> 2);
    return buffer;
  }

  /** Corners in columns and rows, colour and opacity of each facet, the farther ones first. */
  #facets(view: RasterView): Float32Array {
    const batch = this.#scene.facets;
    if (!batch || batch.count === 0) return new Float32Array();
    const { count, corners, colours } = facetView(batch, sampleProjection(view));
    const facets = new Float32Array(S.facetSize * count);
    const [right, below] = middleOf(view);
    for (let k = 0; k < count; k++) {
      for (let corner = 0; corner < 3; corner++) {
        const from = 9 * k + 3 * corner;
        const to = S.facetSize * k + 3 * corner;
        facets[to] = right + corners[from]!;
        facets[to + 1] = below - corners[from + 1]!;
        facets[to + 2] = corners[from + 2]!;
      }
      facets.set(colours.subarray(4 * k, 4 * k + 4), S.facetSize * k + 9);
    }
    return facets;
  }
}

/** Hands out addresses one after the other, each a multiple of 16, with 16 bytes of room behind. */
class Places {
  end: number;

  constructor(start: number) {
    this.end = start;
  }

  take(bytes: number): number {
    const at = this.end;
    this.end = (at + bytes + 31) & ~15;
    return at;
  }
}
