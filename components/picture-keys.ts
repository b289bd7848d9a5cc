import type { Camera, Viewport } from '#src/scene/camera.ts';
import { pan, turnAbout, zoom } from '#src/scene/camera.ts';
import { firstCamera, lookAlong } from '#src/scene/framing.ts';
import type { Scene } from '#src/scene/scene.ts';

const stepRad = (5 * Math.PI) / 180;
const stepPx = 24;
const zoomStep = 1.2;

/** The camera after a key; null for keys that do nothing here. */
export function cameraAfterKey(
  { key, shiftKey, ctrlKey, metaKey, altKey }: KeyboardEvent,
  camera: Camera,
  scene: Scene,
  viewport: Viewport,
): Camera | null {
  if (ctrlKey || metaKey || altKey) return null;
  if (shiftKey && key.startsWith('Arrow')) return moved(key, camera, viewport);
  switch (key) {
    case 'ArrowLeft':
      return turnAbout(camera, [0, 1, 0], -stepRad);
    case 'ArrowRight':
      return turnAbout(camera, [0, 1, 0], stepRad);
    case 'ArrowUp':
      return turnAbout(camera, [1, 0, 0], -stepRad);
    case 'ArrowDown':
      return turnAbout(camera, [1, 0, 0], stepRad);
    case ',':
      return turnAbout(camera, [0, 0, 1], stepRad);
    case '.':
      return turnAbout(camera, [0, 0, 1], -stepRad);
    case '+':
    case '=':
      return zoom(camera, zoomStep, viewport);
    case '-':
    case '−':
      return zoom(camera, 1 / zoomStep, viewport);
    case 'a':
    case 'b':
    case 'c':
      return scene.axes.length === 3 ? lookAlong(camera, scene, key) : null;
    case '0':
    case 'Home':
      return firstCamera(scene, viewport);
    default:
      return null;
  }
}

function moved(key: string, camera: Camera, viewport: Viewport): Camera | null {
  const steps: Readonly<Record<string, readonly [number, number]>> = {
    ArrowLeft: [-stepPx, 0],
    ArrowRight: [stepPx, 0],
    ArrowUp: [0, -stepPx],
    ArrowDown: [0, stepPx],
  };
  const step = steps[key];
  return step ? pan(camera, step[0], step[1], viewport) : null;
}
