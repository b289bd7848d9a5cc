// Four vertices a cylinder: the rectangle round the images of balls about both ends, between which it lies, grown by a pixel.
precision highp float;
precision highp int;

#include <_view>
#include <_colour>
#include <_quadric>

in vec3 aStart;
in vec3 aEnd;
in float aRadius;
in vec3 aStartColour;
in vec3 aEndColour;

flat out vec3 vStart; // view axes, pixels
flat out vec3 vAxis; // unit length
flat out vec2 vSize; // length, radius
flat out vec3 vStartColour;
flat out vec3 vEndColour;

void main() {
  vec3 start = viewPoint(aStart);
  vec3 end = viewPoint(aEnd);
  float radius = aRadius * uPixelsPerAngstrom;
  ImageQuadric atStart = imageQuadric(start, mat3(radius), uPerEyePx);
  ImageQuadric atEnd = imageQuadric(end, mat3(radius), uPerEyePx);
  vec2 run = atEnd.centre.xy - atStart.centre.xy;
  float onScreen = length(run);
  vec2 along = onScreen > 1e-3 ? run / onScreen : vec2(1.0, 0.0);
  vec2 aside = vec2(-along.y, along.x);
  mat2 first = mat2(atStart.sigma);
  mat2 second = mat2(atEnd.sigma);
  float low = -sqrt(dot(along, first * along)) - 1.0;
  float high = onScreen + sqrt(dot(along, second * along)) + 1.0;
  float halfWidth = sqrt(max(dot(aside, first * aside), dot(aside, second * aside))) + 1.0;
  float a = (gl_VertexID & 1) == 0 ? low : high;
  float c = (gl_VertexID & 2) == 0 ? -halfWidth : halfWidth;
  vec3 axis = end - start;
  vStart = start;
  vAxis = normalize(axis);
  vSize = vec2(length(axis), radius);
  vStartColour = linearFromSrgb(aStartColour);
  vEndColour = linearFromSrgb(aEndColour);
  bool seen = atStart.seen && atEnd.seen;
  gl_Position = seen ? clipPoint(vec3(atStart.centre.xy + a * along + c * aside, 0.0)) : nowhere;
}
