import type { Camera } from '#src/scene/camera.ts';
import { cameraBetween, eased } from '#src/scene/camera-path.ts';

/** Milliseconds a smooth move takes. */
const moveMs = 300;

/** A camera that can travel: sets it at once, or takes it there in 300 ms, unless the user wants less motion. */
export class PictureMotion {
  readonly #set: (camera: Camera) => void;
  #frame = 0;
  #goal: Camera | null = null;

  constructor(set: (camera: Camera) => void) {
    this.#set = set;
  }

  /** Where a move under way ends; null at rest. */
  get goal(): Camera | null {
    return this.#goal;
  }

  jump(camera: Camera): void {
    this.stop();
    this.#set(camera);
  }

  glide(from: Camera, to: Camera): void {
    this.stop();
    if (matchMedia('(prefers-reduced-motion: reduce)').matches) {
      this.#set(to);
      return;
    }
    const start = performance.now();
    this.#goal = to;
    const step = (now: number): void => {
      const share = Math.min(1, Math.max(0, (now - start) / moveMs));
      if (share === 1) this.#goal = null;
      else this.#frame = requestAnimationFrame(step);
      this.#set(cameraBetween(from, to, eased(share)));
    };
    this.#frame = requestAnimationFrame(step);
  }

  stop(): void {
    cancelAnimationFrame(this.#frame);
    this.#goal = null;
  }
}
