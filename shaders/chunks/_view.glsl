// Crystal axes (Å) to view axes in device pixels: x right, y up, z towards the viewer, origin at the camera's target.
uniform vec3 uTarget;
uniform vec4 uOrientation;
uniform float uPixelsPerAngstrom;
uniform vec2 uHalfViewportPx;
uniform float uDepthRangePx;
// Device pixels of one CSS pixel.
uniform float uPixelScale;

vec3 rotateBy(vec4 q, vec3 v) {
  return v + 2.0 * cross(q.xyz, cross(q.xyz, v) + q.w * v);
}

vec3 viewDirection(vec3 v) {
  return uPixelsPerAngstrom * rotateBy(uOrientation, v);
}

vec3 viewPoint(vec3 p) {
  return viewDirection(p - uTarget);
}

// Orthographic: depth is linear in z, and gl_FragDepth agrees with it.
vec4 clipPoint(vec3 v) {
  return vec4(v.xy / uHalfViewportPx, -v.z / uDepthRangePx, 1.0);
}

float fragmentDepth(float zPx) {
  return 0.5 - 0.5 * zPx / uDepthRangePx;
}
