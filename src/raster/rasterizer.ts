import type { Scene } from '#src/scene/scene.ts';
import type { RasterKernel } from './kernel.ts';
import * as S from './slots.ts';
import { byteSteps, fillTables, fillTints } from './tints.ts';
import type { RasterView } from './view.ts';
import { fillView, pictureSize } from './view.ts';

/** The part of a scene that is drawn. */
export type RasterScene = Pick<Scene, 'quadrics' | 'cylinders' | 'lines' | 'bounds'>;

/** Rows of a picture, top to bottom. */
export interface RasterBand {
  readonly firstRow: number;
  readonly rowCount: number;
  readonly width: number;
  /** RGBA, sRGB, opaque. */
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
  #scene: RasterScene = nothing;
  #states: Uint8Array = new Uint8Array();
  /** Bytes from the start that hold the scene; what a picture needs comes after. */
  #sceneEnd = 0;
  #isLoaded = false;

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
    const buffer = this.#run({ ...view, samplesAcross: 1 }, 0, height, true);
    const i = new Int32Array(buffer);
    const size = 4 * width * height;
    const ids = new Uint32Array(buffer.slice(i[S.outIdsAt]!, i[S.outIdsAt]! + size));
    const depths = new Float32Array(buffer.slice(i[S.outDepthAt]!, i[S.outDepthAt]! + size));
    const { quadrics, cylinders } = this.#scene;
    for (let k = 0; k < ids.length; k++) {
      const object = ids[k]! - 1;
      if (object < 0) depths[k] = -Infinity;
      else
        ids[k] =
          object < quadrics.count ? quadrics.pickIds[object]! : cylinders.pickIds[object - quadrics.count]!;
      if (object >= 0) depths[k] = depths[k]! / view.pixelRatio;
    }
    return { ids, depths };
  }

  #run(view: RasterView, firstRow: number, rowCount: number, wantsIds: boolean): ArrayBuffer {
    if (!this.#isLoaded) this.#load();
    const across = view.samplesAcross;
    const { width, height } = pictureSize(view);
    if (Math.max(width, height) * across > largestSide) {
      throw new Error(
        `A picture of ${width} × ${height} pixels with ${across} × ${across} samples is too large: at most ${largestSide} samples a side.`,
      );
    }
    const buffer = this.#plan(width * across, width, rowCount, across, wantsIds);
    const i = new Int32Array(buffer);
    fillView(new Float32Array(buffer), i, view, this.#scene);
    const first = firstRow * across;
    const end = (firstRow + rowCount) * across;
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
    const { quadrics, cylinders, lines } = this.#scene;
    const objects = quadrics.count + cylinders.count;
    const places = new Places(S.blockBytes);
    const arrays: readonly (readonly [slot: number, array: Float32Array | Uint8Array])[] = [
      [S.centresAt, quadrics.centres],
      [S.shapesAt, quadrics.shapes],
      [S.circlesAt, quadrics.circles],
      [S.quadricTintsAt, tintsOf(quadrics.colours)],
      [S.startsAt, cylinders.starts],
      [S.endsAt, cylinders.ends],
      [S.radiiAt, cylinders.radii],
      [S.startTintsAt, tintsOf(cylinders.startColours)],
      [S.endTintsAt, tintsOf(cylinders.endColours)],
      [S.lineStartsAt, lines.starts],
      [S.lineEndsAt, lines.ends],
    ];
    const placed = arrays.map(([slot, array]) => ({ slot, array, at: places.take(array.byteLength) }));
    const linear = new Float32Array(256);
    const bytes = new Uint8Array(byteSteps + 1);
    fillTables(linear, bytes);
    placed.push({ slot: S.linearTableAt, array: linear, at: places.take(linear.byteLength) });
    placed.push({ slot: S.bytesTableAt, array: bytes, at: places.take(bytes.byteLength) });
    const empty: readonly (readonly [slot: number, bytes: number])[] = [
      [S.statesAt, quadrics.count],
      [S.markedAt, 4 * quadrics.count],
      [S.recordsAt, 4 * S.recordSize * objects],
      [S.candidatesAt, 4 * S.entrySize * objects],
      [S.sortedAt, 4 * S.entrySize * objects],
      [S.binsAt, 4 * (S.binCount + 2)],
    ];
    const reserved = empty.map(([slot, size]) => ({ slot, at: places.take(size) }));
    this.#sceneEnd = places.end;
    const buffer = this.#kernel.reserve(places.end);
    const i = new Int32Array(buffer);
    for (const { slot, at } of [...placed, ...reserved]) i[slot] = at;
    for (const { array, at } of placed) {
      new Uint8Array(buffer).set(new Uint8Array(array.buffer, array.byteOffset, array.byteLength), at);
    }
    i[S.quadricCount] = quadrics.count;
    i[S.cylinderCount] = cylinders.count;
    i[S.lineCount] = lines.count;
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

  /** Room for the buffers of a strip and the band's pixels. */
  #plan(columns: number, width: number, rowCount: number, across: number, wantsIds: boolean): ArrayBuffer {
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
    ];
    const buffer = this.#kernel.reserve(places.end);
    const i = new Int32Array(buffer);
    for (const [slot, address] of at) i[slot] = address;
    i[S.stride] = stride;
    i[S.colourStride] = across > 1 ? stride : columns;
    return buffer;
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

function tintsOf(colours: Uint8Array): Float32Array {
  const tints = new Float32Array((colours.length / 3) * S.tintSize);
  fillTints(colours, tints);
  return tints;
}

const nothing: RasterScene = {
  quadrics: {
    count: 0,
    centres: new Float32Array(),
    shapes: new Float32Array(),
    colours: new Uint8Array(),
    circles: new Uint8Array(),
    pickIds: new Uint32Array(),
  },
  cylinders: {
    count: 0,
    starts: new Float32Array(),
    ends: new Float32Array(),
    radii: new Float32Array(),
    startColours: new Uint8Array(),
    endColours: new Uint8Array(),
    pickIds: new Uint32Array(),
  },
  lines: { count: 0, starts: new Float32Array(), ends: new Float32Array(), widthPx: 1 },
  bounds: { centre: [0, 0, 0], radiusAngstrom: 1 },
};
