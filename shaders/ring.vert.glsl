// The square round the ring of a hovered or selected ellipsoid: round its outline, or round a circle of its own.
precision highp float;
precision highp int;

#include <_view>
#include <_quadric>

in vec3 aCentre;
in vec3 aAxis1;
in vec3 aAxis2;
in vec3 aAxis3;
in float aState; // 1 hovered, 2 selected, 3 both
in float aRingRadius; // Å, of the circle; below 0 the outline

uniform float uRingReachPx; // CSS pixels

flat out vec3 vCentre; // x, y on the canvas, pixels, and the circle's radius or 0
flat out vec3 vToDisc;
flat out float vState;

void main() {
  vec3 centre = viewPoint(aCentre);
  mat3 m = mat3(viewDirection(aAxis1), viewDirection(aAxis2), viewDirection(aAxis3));
  ImageQuadric image = imageQuadric(centre, m, uPerEyePx);
  ViewQuadric q = quadricOfSigma(image.sigma);
  float margin = 1.0 + uRingReachPx * uPixelScale;
  vec2 sides = vec2(q.outline.x, q.outline.x * q.outline.z / length(q.outline.xy));
  float radius = aRingRadius > 0.0 ? uPixelsPerAngstrom * aRingRadius / nearness(centre.z) : 0.0;
  vec2 middle = radius > 0.0 ? imagePoint(centre).xy : image.centre.xy;
  vec2 corner = vec2((gl_VertexID & 1) == 0 ? -1.0 : 1.0, (gl_VertexID & 2) == 0 ? -1.0 : 1.0);
  vec2 off = radius > 0.0 ? (radius + margin) * corner : outlinePoint(q, (1.0 + margin / sides) * corner);
  vCentre = vec3(uHalfViewportPx + middle, radius);
  vToDisc = faceOf(q, image.centre, uPerEyePx).toDisc;
  vState = aState;
  gl_Position = image.seen ? clipPoint(vec3(middle + off, image.centre.z)) : nowhere;
}
