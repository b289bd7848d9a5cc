// Vertex shaders of quadrics: four vertices each, the parallelogram L·[±1]² round its outline, grown by a pixel. What is the same all
// over a quadric is worked out here, and the fragment finds its own place from its pixel, so that rounding of the corners does not
// reach the picture. After _view and _quadric.
in vec3 aCentre;
in vec3 aAxis1;
in vec3 aAxis2;
in vec3 aAxis3;
in float aCircles;

uniform float uCircleWidthPx;
uniform vec4 uRim; // width, ink, and the half widths between which it comes in, CSS pixels

flat out vec2 vOrigin; // centre on the canvas, pixels
flat out vec4 vDepth; // height by (e, s), and that of the centre, image axes
flat out vec3 vToDisc;
flat out vec2 vSlope;
flat out vec3 vFacing;
flat out vec3 vBody1;
flat out vec3 vBody2;
flat out vec3 vBody3;
flat out vec3 vBodyShift;
flat out vec3 vUndrawn;
flat out vec4 vEdges; // of circles and of the rim's line: where they begin to fade, pixels, and 1 / over how many
flat out vec2 vInk; // of circles and of the rim's line

const float circleInk = 0.92;

vec2 quadCorner() {
  return vec2((gl_VertexID & 1) == 0 ? -1.0 : 1.0, (gl_VertexID & 2) == 0 ? -1.0 : 1.0);
}

void setInk(float narrowest) {
  // finer lines on small ellipsoids, which they would cover
  float halfWidth = 0.5 * min(uCircleWidthPx, 0.5 + 0.055 * narrowest);
  vEdges = vec4((halfWidth - 0.35) * uPixelScale, 1.0 / (0.7 * uPixelScale), (uRim.x - 0.4) * uPixelScale, 1.0 / (0.8 * uPixelScale));
  vInk = vec2(circleInk * smoothstep(4.0, 10.0, narrowest), uRim.y * smoothstep(uRim.z, uRim.w, narrowest));
  int bits = int(aCircles + 0.5);
  vUndrawn = 1e12 * (1.0 - vec3(bits & 1, (bits >> 1) & 1, (bits >> 2) & 1));
}

void placeQuadric() {
  vec3 centre = viewPoint(aCentre);
  mat3 m = mat3(viewDirection(aAxis1), viewDirection(aAxis2), viewDirection(aAxis3));
  ImageQuadric image = imageQuadric(centre, m, uPerEyePx);
  ViewQuadric q = quadricOfSigma(image.sigma);
  QuadricFace face = faceOf(q, image.centre, uPerEyePx);
  mat3 inverseShape = inverse(m);
  mat3 body = bodyOfImage(inverseShape, q, centre, uPerEyePx);
  vOrigin = uHalfViewportPx + image.centre.xy;
  vDepth = vec4(q.depth, image.centre.z);
  vToDisc = face.toDisc;
  vSlope = face.slope;
  vFacing = face.facing;
  vBody1 = body[0];
  vBody2 = body[1];
  vBody3 = body[2];
  vBodyShift = inverseShape * image.shift;
  setInk(q.outline.x * q.outline.z / length(q.outline) / uPixelScale);
  // how far its sides lie from the centre: l11, and l11 l22 / |(l11, l21)|
  vec2 sides = vec2(q.outline.x, q.outline.x * q.outline.z / length(q.outline.xy));
  vec2 place = image.centre.xy + outlinePoint(q, (1.0 + 1.0 / sides) * quadCorner());
  gl_Position = image.seen ? clipPoint(vec3(place, image.centre.z)) : nowhere;
}
