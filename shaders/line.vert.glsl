// Four vertices a line: a band of constant width on screen, one pixel wider for its soft edges.
precision highp float;
precision highp int;

#include <_view>

in vec3 aStart;
in vec3 aEnd;

uniform float uLineWidthPx; // CSS pixels

out float vAcross; // device pixels from the middle of the line
out float vImageZ;

// The segment up to where it comes too near to the eye.
vec3 cutTowards(vec3 from, vec3 to) {
  float a = nearness(from.z);
  float b = nearness(to.z);
  return b >= leastNearness ? to : mix(from, to, (a - leastNearness) / (a - b));
}

void main() {
  vec3 first = viewPoint(aStart);
  vec3 last = viewPoint(aEnd);
  bool seen = max(nearness(first.z), nearness(last.z)) > leastNearness;
  vec3 start = imagePoint(cutTowards(last, first));
  vec3 end = imagePoint(cutTowards(first, last));
  vec2 run = end.xy - start.xy;
  float size = length(run);
  vec2 along = size > 1e-4 ? run / size : vec2(1.0, 0.0);
  vec3 point = (gl_VertexID & 1) == 0 ? start : end;
  float side = (gl_VertexID & 2) == 0 ? -1.0 : 1.0;
  vAcross = side * (0.5 * uLineWidthPx * uPixelScale + 1.0);
  vImageZ = point.z;
  gl_Position = seen ? clipPoint(point + vec3(vAcross * vec2(-along.y, along.x), 0.0)) : nowhere;
}
