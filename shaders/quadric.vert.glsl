// Four vertices a quadric: the parallelogram L·[±1]² round its outline, grown for a ring where one is drawn.
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

uniform float uRingReachPx; // CSS pixels

out vec2 vUnit;
flat out vec3 vOutline;
flat out vec3 vDepth;
flat out vec3 vBody1;
flat out vec3 vBody2;
flat out vec3 vBody3;
flat out vec3 vColour;
flat out vec3 vMarks; // centre z, circle bits, state

void main() {
  vec3 centre = viewPoint(aCentre);
  mat3 m = mat3(viewDirection(aAxis1), viewDirection(aAxis2), viewDirection(aAxis3));
  ViewQuadric q = viewQuadric(m);
  mat3 body = bodyRotation(m, q);
  float narrowest = q.outline.x * q.outline.z / length(q.outline);
  float reach = aState > 0.5 ? 1.0 + uRingReachPx * uPixelScale / narrowest : 1.0;
  vec2 corner = vec2((gl_VertexID & 1) == 0 ? -1.0 : 1.0, (gl_VertexID & 2) == 0 ? -1.0 : 1.0);
  vUnit = reach * corner;
  vOutline = q.outline;
  vDepth = q.depth;
  vBody1 = body[0];
  vBody2 = body[1];
  vBody3 = body[2];
  vColour = linearFromSrgb(aColour);
  vMarks = vec3(centre.z, aCircles, aState);
  gl_Position = clipPoint(centre + vec3(outlinePoint(q, vUnit), 0.0));
}
