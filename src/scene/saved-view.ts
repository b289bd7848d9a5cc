import type { Camera } from './camera.ts';
import type { Look } from './look.ts';
import type { SceneOptions } from './scene-options.ts';

/** A picture by name: from where, of what, and how. */
export interface SavedView {
  /** Unique in the case. */
  readonly name: string;
  /** null is the first view of the crystal: all of it. */
  readonly camera: Camera | null;
  readonly picture: SceneOptions;
  readonly look: Look;
}
