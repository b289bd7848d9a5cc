// A lit ellipsoid with its principal circles, exact depth, and a ring round it when hovered or selected.
precision highp float;
precision highp int;

#include <_view>
#include <_pixel>
#include <_colour>
#include <_quadric>
#include <_pattern>
#include <_light>
#include <_depth-cue>

flat in vec3 vOutline;
flat in vec3 vDepth;
flat in vec3 vBody1;
flat in vec3 vBody2;
flat in vec3 vBody3;
flat in vec3 vBodyShift;
flat in vec3 vColour;
flat in vec3 vRestColour;
flat in vec3 vCentre;
flat in vec4 vMarks;
flat in vec3 vRing;

uniform vec3 uAccent;
uniform vec3 uHoverColour;
uniform float uCircleWidthPx;
uniform vec4 uRim; // width, ink, and the half widths between which it comes in, CSS pixels
uniform vec2 uRingPx; // inner and outer distance of the ring from the outline, CSS pixels

out vec4 fragColour;

void ring(ViewQuadric q, vec2 e) {
  float outside = vRing.z > 0.0 ? length(viewPixel() - vRing.xy) - vRing.z : outlineDistance(q, e);
  float d = outside / uPixelScale;
  if (vMarks.y < 0.5 || d < 0.0 || d > uRingPx.y + 1.0) discard;
  bool onRing = d >= uRingPx.x && d <= uRingPx.y;
  vec3 colour = vMarks.y > 1.5 ? uAccent : uHoverColour;
  fragColour = vec4(onRing ? srgbFromLinear(colour) : uPaper, 1.0);
  gl_FragDepth = 0.0;
}

void main() {
  ViewQuadric q = ViewQuadric(vOutline, vDepth);
  vec2 e = discPoint(q, viewPixel() - vCentre.xy);
  float inside = 1.0 - dot(e, e);
  if (inside <= 0.0) {
    ring(q, e);
    return;
  }
  vec3 unit = vec3(e, sqrt(inside));
  vec3 place = vCentre + vec3(viewPixel() - vCentre.xy, surfaceDepth(q, unit));
  vec3 normal = surfaceNormal(q, unit);
  normal.z += uPerEyePx * dot(normal, place);
  mat3 body = mat3(vBody1, vBody2, vBody3);
  vec3 u = body * unit + vBodyShift;
  vec3 own = hasOwnColour(u.xy, vMarks.z) ? vColour : vRestColour;
  vec3 colour = lit(own, normalize(normal));
  float narrowest = vOutline.x * vOutline.z / length(vOutline) / uPixelScale;
  if (isOnPattern(u, int(vMarks.w + 0.5))) colour = mix(colour, inkOn(own, colour), patternInk);
  int bits = int(vMarks.x + 0.5);
  if (bits != 0) {
    // finer lines on small ellipsoids, which they would cover
    float halfWidth = 0.5 * min(uCircleWidthPx, 0.5 + 0.055 * narrowest);
    vec3 drawn = vec3(bits & 1, (bits >> 1) & 1, (bits >> 2) & 1);
    vec3 d = circleDistances(q, body, u, unit) / uPixelScale;
    vec3 line = drawn * (1.0 - smoothstep(halfWidth - 0.35, halfWidth + 0.35, d));
    float strongest = max(line.x, max(line.y, line.z)) * smoothstep(4.0, 10.0, narrowest);
    colour = mix(colour, inkOn(own, colour), 0.92 * strongest);
  }
  float rim = -outlineDistance(q, e) / uPixelScale;
  float rimInk = (1.0 - smoothstep(uRim.x - 0.4, uRim.x + 0.4, rim)) * smoothstep(uRim.z, uRim.w, narrowest);
  colour *= 1.0 - uRim.y * rimInk;
  fragColour = vec4(srgbWithDepthCue(colour, pointOfImage(place).z), 1.0);
  gl_FragDepth = fragmentDepth(place.z);
}
