import type { Camera, Viewport } from '#src/scene/camera.ts';
import type { Scene } from '#src/scene/scene.ts';
import { viewWords } from '#src/scene/view-words.ts';
import type { FigureView } from './figure-request.ts';

/** All of the crystal from where a case has it seen; null is its first view. The same for the page and the command line. */
export function keptView(camera: Camera | null, scene: Scene): FigureView {
  if (!camera) return { kind: 'direction', towards: null, words: null };
  return cameraView(camera, { widthPx: 1, heightPx: 1 }, true, scene);
}

/** What a viewport shows of the crystal. */
export function shownView(camera: Camera, viewport: Viewport, scene: Scene): FigureView {
  return cameraView(camera, viewport, false, scene);
}

function cameraView(camera: Camera, viewport: Viewport, wholeCrystal: boolean, scene: Scene): FigureView {
  const words = viewWords(camera, scene.axes);
  return { kind: 'camera', camera, viewport, wholeCrystal, words: words && `viewed along ${words}` };
}
