// Four vertices a cylinder: the rectangle round its projection, its caps' ellipses included.
precision highp float;
precision highp int;

#include <_view>
#include <_colour>

in vec3 aStart;
in vec3 aEnd;
in float aRadius;
in vec3 aStartColour;
in vec3 aEndColour;

out vec2 vPlace; // along and across the projected axis, pixels from the start
flat out vec4 vShape; // length, lie, rise, radius
flat out vec3 vFrame; // direction of the projected axis, z of the start
flat out vec3 vStartColour;
flat out vec3 vEndColour;

void main() {
  vec3 start = viewPoint(aStart);
  vec3 axis = viewPoint(aEnd) - start;
  float size = length(axis);
  float onScreen = length(axis.xy);
  vec2 along = onScreen > 1e-4 * size ? axis.xy / onScreen : vec2(1.0, 0.0);
  float radius = aRadius * uPixelsPerAngstrom;
  float cap = radius * abs(axis.z) / size;
  bool first = (gl_VertexID & 1) == 0;
  float a = first ? -cap : onScreen + cap;
  float c = (gl_VertexID & 2) == 0 ? -radius : radius;
  vPlace = vec2(a, c);
  vShape = vec4(size, onScreen / size, axis.z / size, radius);
  vFrame = vec3(along, start.z);
  vStartColour = linearFromSrgb(aStartColour);
  vEndColour = linearFromSrgb(aEndColour);
  gl_Position = clipPoint(vec3(start.xy + a * along + c * vec2(-along.y, along.x), start.z));
}
