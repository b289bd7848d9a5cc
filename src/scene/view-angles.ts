import type { Mat3 } from '#src/base/matrix3.ts';
import { multiply, transpose } from '#src/base/matrix3.ts';
import { cross } from '#src/base/vector3.ts';
import type { Camera, Quaternion } from './camera.ts';
import { turnAbout, viewRotation } from './camera.ts';
import { lookAlong } from './framing.ts';
import type { Scene } from './scene.ts';

/**
 * An orientation as three angles, degrees, from the view along a* with c upwards (along z with y upwards without a cell):
 * first `turn` about the upright axis of the picture, then `tilt` of the top towards the viewer, then `roll`
 * counter-clockwise. Each is right-handed about the fixed axes y, x, z of the view.
 */
export interface ViewAngles {
  /** −180 to 180. */
  readonly turn: number;
  /** −90 to 90. */
  readonly tilt: number;
  /** −180 to 180; 0 by choice where the tilt is ±90 and turn and roll are one motion. */
  readonly roll: number;
}

const degrees = 180 / Math.PI;

/** The angles of an orientation. */
export function viewAngles(orientation: Quaternion, scene: Pick<Scene, 'axes'>): ViewAngles {
  const m: Mat3 = multiply(viewRotation(orientation), transpose(viewRotation(base(scene).orientation)));
  // m = Rz(roll) · Rx(tilt) · Ry(turn)
  const sine = Math.min(1, Math.max(-1, m[7]));
  const tilt = Math.asin(sine) * degrees;
  if (Math.abs(sine) > 1 - 1e-9) return { turn: Math.atan2(m[2], m[0]) * degrees, tilt, roll: 0 };
  return {
    turn: Math.atan2(-m[6], m[8]) * degrees,
    tilt,
    roll: Math.atan2(-m[1], m[4]) * degrees,
  };
}

/** The camera turned to the angles, keeping all else. */
export function withViewAngles(camera: Camera, angles: ViewAngles, scene: Pick<Scene, 'axes'>): Camera {
  const turned = turnAbout(base(scene), [0, 1, 0], angles.turn / degrees);
  const tilted = turnAbout(turned, [1, 0, 0], angles.tilt / degrees);
  return { ...camera, orientation: turnAbout(tilted, [0, 0, 1], angles.roll / degrees).orientation };
}

function base(scene: Pick<Scene, 'axes'>): Camera {
  const flat: Camera = { target: [0, 0, 0], orientation: [0, 0, 0, 1], zoom: 1 };
  const [, b, c] = scene.axes;
  return b && c ? lookAlong(flat, scene, cross(b.vector, c.vector)) : flat;
}
