// Four vertices a cylinder: the rectangle round its projection, its caps' ellipses included, grown by a pixel.
precision highp float;
precision highp int;

#include <_view>
#include <_colour>

in vec3 aStart;
in vec3 aEnd;
in float aRadius;
in vec3 aStartColour;
in vec3 aEndColour;

flat out vec4 vShape; // length, lie, rise, radius
flat out vec2 vAlong; // direction of the projected axis
flat out vec3 vStart; // view axes, pixels
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
  float a = first ? -cap - 1.0 : onScreen + cap + 1.0;
  float c = (gl_VertexID & 2) == 0 ? -radius - 1.0 : radius + 1.0;
  vShape = vec4(size, onScreen / size, axis.z / size, radius);
  vAlong = along;
  vStart = start;
  vStartColour = linearFromSrgb(aStartColour);
  vEndColour = linearFromSrgb(aEndColour);
  gl_Position = clipPoint(vec3(start.xy + a * along + c * vec2(-along.y, along.x), start.z));
}
