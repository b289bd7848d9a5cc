// Four vertices a quadric: the parallelogram L·[±1]² round its outline, grown by a pixel, and for a ring where one is
// drawn. The fragment finds its own place from its pixel, so that rounding of the corners does not reach the picture.
precision highp float;
precision highp int;

#include <_view>
#include <_colour>
#include <_quadric>

in vec3 aCentre;
in vec3 aAxis1;
in vec3 aAxis2;
in vec3 aAxis3;
in vec3 aColour;
in float aCircles;
in float aState; // 0 plain, 1 hovered, 2 selected, 3 both
in float aShare; // 1 whole
in vec3 aRestColour;
in float aPattern; // 0 plain, 1 striped, 2 dotted
in float aRingRadius; // Å, of the circle that the ring goes round; below 0 the outline

uniform float uRingReachPx; // CSS pixels

flat out vec3 vOutline;
flat out vec3 vDepth;
flat out vec3 vBody1;
flat out vec3 vBody2;
flat out vec3 vBody3;
flat out vec3 vBodyShift;
flat out vec3 vColour;
flat out vec3 vRestColour;
flat out vec3 vCentre; // image axes, pixels
flat out vec4 vMarks; // circle bits, state, share, pattern
flat out vec3 vRing; // middle and radius of the circle that the ring goes round, pixels; radius 0: the outline

void main() {
  vec3 centre = viewPoint(aCentre);
  mat3 m = mat3(viewDirection(aAxis1), viewDirection(aAxis2), viewDirection(aAxis3));
  ImageQuadric image = imageQuadric(centre, m, uPerEyePx);
  ViewQuadric q = quadricOfSigma(image.sigma);
  mat3 inverseShape = inverse(m);
  mat3 body = bodyOfImage(inverseShape, q, centre, uPerEyePx);
  // how far its sides lie from the centre: l11, and l11 l22 / |(l11, l21)|
  vec2 sides = vec2(q.outline.x, q.outline.x * q.outline.z / length(q.outline.xy));
  float margin = 1.0 + (aState > 0.5 ? uRingReachPx * uPixelScale : 0.0);
  vec2 reach = 1.0 + margin / sides;
  bool hasCircle = aState > 0.5 && aRingRadius > 0.0;
  vRing = hasCircle ? vec3(imagePoint(centre).xy, uPixelsPerAngstrom * aRingRadius / nearness(centre.z)) : vec3(0.0);
  vec2 corner = vec2((gl_VertexID & 1) == 0 ? -1.0 : 1.0, (gl_VertexID & 2) == 0 ? -1.0 : 1.0);
  vOutline = q.outline;
  vDepth = q.depth;
  vBody1 = body[0];
  vBody2 = body[1];
  vBody3 = body[2];
  vBodyShift = inverseShape * image.shift;
  vColour = linearFromSrgb(aColour);
  vRestColour = linearFromSrgb(aRestColour);
  vCentre = image.centre;
  vMarks = vec4(aCircles, aState, aShare, aPattern);
  vec2 place = hasCircle ? vRing.xy + (vRing.z + margin) * corner : image.centre.xy + outlinePoint(q, reach * corner);
  gl_Position = image.seen ? clipPoint(vec3(place, image.centre.z)) : nowhere;
}
