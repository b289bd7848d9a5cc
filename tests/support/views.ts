import type { Camera } from '#src/scene/camera.ts';

/** A camera for tests that only need to tell one from another. */
export function cameraTurnedBy(angle: number): Camera {
  const half = angle / 2;
  return { target: [0, 0, 0], orientation: [0, 0, Math.sin(half), Math.cos(half)], zoom: 0.1 };
}
