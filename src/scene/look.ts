/** Choices about light and lines that change no shape and no number. */
export interface Look {
  /** Farther things fade into the paper. */
  readonly depthCue: boolean;
  /** Dark rims round every shape. */
  readonly outlines: boolean;
  /** The principal great circles on ellipsoids. */
  readonly circles: boolean;
  /** Full angle of true perspective, degrees; 0 for none (see `Camera.perspectiveDegrees`). */
  readonly perspectiveDegrees: number;
}

export const defaultLook: Look = { depthCue: true, outlines: false, circles: true, perspectiveDegrees: 0 };
