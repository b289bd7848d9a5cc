import type { Camera } from '#src/scene/camera.ts';
import type { PickEntry, Scene } from '#src/scene/scene.ts';
import type { PicturePoint } from './picture-controls.ts';

/** What the picture tells its element. */
export interface PictureEvents {
  /** A frame of a scene is on the canvas. */
  readonly drawn: (scene: Scene) => void;
  /** Something over the canvas moved or changed. */
  readonly moved: () => void;
  /** The user moved the camera; the words name what was done, for the list of steps. */
  readonly steered: (camera: Camera, words: string) => void;
  /** The picture itself took another camera: a fit to another extent. */
  readonly fitted: (camera: Camera | null) => void;
  readonly clicked: (entry: PickEntry | null, adds: boolean) => void;
  /** A double click on an atom, which the first of the two clicks selected. */
  readonly activated: () => void;
  readonly pointed: (entry: PickEntry | null, at: PicturePoint | null) => void;
  /** The graphics context was lost (true) or came back (false). */
  readonly lost: (isLost: boolean) => void;
}
