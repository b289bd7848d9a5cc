// Crystal axes (Å) to view axes in device pixels: x right, y up, z towards the viewer, origin at the camera's target; and
// those to image axes, in which a true perspective is orthographic. CPU twin: src/scene/perspective.ts.
uniform vec3 uTarget;
uniform vec4 uOrientation;
uniform float uPixelsPerAngstrom;
uniform vec2 uHalfViewportPx;
uniform float uHalfPerDepthPx; // half of 1 / the largest height, device pixels
// Device pixels of one CSS pixel.
uniform float uPixelScale;
// 1 / distance of the eye before the target, per device pixel; 0 without perspective.
uniform float uPerEyePx;

// What reaches nearer to the eye is left out.
const float leastNearness = 0.05;
// Outside of every picture: a vertex of what is left out.
const vec4 nowhere = vec4(2.0, 2.0, 2.0, 1.0);

vec3 rotateBy(vec4 q, vec3 v) {
  return v + 2.0 * cross(q.xyz, cross(q.xyz, v) + q.w * v);
}

vec3 viewDirection(vec3 v) {
  return uPixelsPerAngstrom * rotateBy(uOrientation, v);
}

vec3 viewPoint(vec3 p) {
  return viewDirection(p - uTarget);
}

// 1 in the plane of the target, 0 at the eye.
float nearness(float z) {
  return 1.0 - z * uPerEyePx;
}

vec3 imagePoint(vec3 v) {
  return v / nearness(v.z);
}

vec3 pointOfImage(vec3 image) {
  return image / (1.0 + image.z * uPerEyePx);
}

// Of an image point. Depth is linear in its height, and gl_FragDepth agrees with it.
vec4 clipPoint(vec3 image) {
  return vec4(image.xy / uHalfViewportPx, -2.0 * image.z * uHalfPerDepthPx, 1.0);
}

float fragmentDepth(float imageZ) {
  return 0.5 - imageZ * uHalfPerDepthPx;
}
