const radPerDeg = Math.PI / 180;

/** Cosines that must come out without rounding noise, by angle in degrees. */
const exactCosines: ReadonlyMap<number, number> = new Map([
  [0, 1],
  [60, 0.5],
  [90, 0],
  [120, -0.5],
  [180, -1],
]);

/** Angles nearer than this to an exact one (degrees) are that one: it covers rounding only, not a measured 90.001°. */
const snapDeg = 1e-11;

/**
 * Cosine of an angle in degrees; 60°, 90° and 120° give exactly ½, 0 and −½.
 *
 * `cosDegrees(90)` → 0, where `Math.cos(Math.PI / 2)` is 6e-17.
 */
export function cosDegrees(angleDeg: number): number {
  return exactCosines.get(angleDeg) ?? Math.cos(angleDeg * radPerDeg);
}

/** Sine of an angle between 0° and 180°; 90° gives exactly 1, 60° and 120° the same √3⁄2. */
export function sinDegrees(angleDeg: number): number {
  if (angleDeg === 0 || angleDeg === 180) return 0;
  if (angleDeg === 90) return 1;
  return angleDeg === 60 || angleDeg === 120 ? Math.sqrt(3) / 2 : Math.sin(angleDeg * radPerDeg);
}

/**
 * Angle in degrees, 0 to 180, of a cosine that may have left [−1, 1] by rounding. An angle that differs from 60°, 90°
 * or 120° by rounding only (1e-11°) is returned as that number.
 */
export function degreesFromCosine(cosine: number): number {
  const angle = Math.acos(Math.min(1, Math.max(-1, cosine))) / radPerDeg;
  for (const exact of exactCosines.keys()) {
    if (Math.abs(angle - exact) < snapDeg) return exact;
  }
  return angle;
}
