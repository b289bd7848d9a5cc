import { facetPass } from './scalar/triangle.ts';
import { useMemory, viewsOf } from './scalar/memory.ts';
import { linePass, ringPass } from './scalar/overlay.ts';
import { prepareObjects } from './scalar/prepare.ts';
import { keepIds, resolve } from './scalar/resolve.ts';
import { samplesAcross, wantsIds } from './slots.ts';
import { depthPass } from './twin/depth.ts';
import { shadePass } from './twin/shade.ts';

/** What draws: works on a memory that starts with the parameter block of slots.ts. */
export interface RasterKernel {
  readonly name: 'WebAssembly' | 'JavaScript';
  /** The memory, made large enough; what it held stays. A buffer handed out before may be detached. */
  reserve(bytes: number): ArrayBuffer;
  /** Fills the records of all objects and sorts what is seen. Once a picture. */
  prepare(): void;
  /** Draws a strip of sample rows. */
  strip(first: number, count: number): void;
}

/** The kernel in plain JavaScript: for engines without WebAssembly SIMD. */
export function javaScriptKernel(): RasterKernel {
  let views = viewsOf(new ArrayBuffer(0));
  return {
    name: 'JavaScript',
    reserve(bytes) {
      const before = views.b;
      if (before.length < bytes) {
        views = viewsOf(new ArrayBuffer((bytes + 65_535) & ~65_535));
        views.b.set(before);
      }
      return views.b.buffer as ArrayBuffer;
    },
    prepare() {
      useMemory(views);
      prepareObjects();
    },
    strip(first, count) {
      useMemory(views);
      depthPass(views, first, count);
      shadePass(views, first, count);
      linePass(first, count);
      facetPass(first, count);
      ringPass(first, count);
      if (views.i[samplesAcross]! > 1) resolve(first, count);
      else if (views.i[wantsIds] === 1) keepIds(first, count);
    },
  };
}
