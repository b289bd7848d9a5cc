// A lit ellipsoid with its principal circles, exact depth, and a ring round it when hovered or selected.
precision highp float;
precision highp int;

#include <_view>
#include <_pixel>
#include <_colour>
#include <_quadric>
#include <_light>
#include <_depth-cue>

flat in vec3 vOutline;
flat in vec3 vDepth;
flat in vec3 vBody1;
flat in vec3 vBody2;
flat in vec3 vBody3;
flat in vec3 vColour;
flat in vec3 vCentre;
flat in vec2 vMarks;

uniform vec3 uAccent;
uniform vec3 uHoverColour;
uniform float uCircleWidthPx;
uniform float uRimWidthPx;
uniform vec2 uRingPx; // inner and outer distance of the ring from the outline, CSS pixels

out vec4 fragColour;

// Ink that stands out from a colour in grey, too: darker on light colours, lighter on dark ones.
vec3 inkOn(vec3 own, vec3 shaded) {
  return luminance(own) > 0.14 ? shaded * 0.12 : mix(shaded, vec3(1.0), 0.55);
}

void ring(ViewQuadric q, vec2 e) {
  float d = outlineDistance(q, e) / uPixelScale;
  if (vMarks.y < 0.5 || d > uRingPx.y + 1.0) discard;
  bool onRing = d >= uRingPx.x && d <= uRingPx.y;
  vec3 colour = vMarks.y > 1.5 ? uAccent : uHoverColour;
  fragColour = vec4(srgbFromLinear(onRing ? colour : uPaper), 1.0);
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
  float z = vCentre.z + surfaceDepth(q, unit);
  vec3 colour = lit(vColour, normalize(surfaceNormal(q, unit)));
  float narrowest = vOutline.x * vOutline.z / length(vOutline) / uPixelScale;
  int bits = int(vMarks.x + 0.5);
  if (bits != 0) {
    vec3 d = circleDistances(q, mat3(vBody1, vBody2, vBody3), unit) / uPixelScale;
    vec3 drawn = vec3(bits & 1, (bits >> 1) & 1, (bits >> 2) & 1);
    // finer lines on small ellipsoids, which they would cover
    float halfWidth = 0.5 * min(uCircleWidthPx, 0.5 + 0.055 * narrowest);
    vec3 line = drawn * (1.0 - smoothstep(halfWidth - 0.35, halfWidth + 0.35, d));
    float strongest = max(line.x, max(line.y, line.z)) * smoothstep(4.0, 10.0, narrowest);
    colour = mix(colour, inkOn(vColour, colour), 0.92 * strongest);
  }
  float rim = -outlineDistance(q, e) / uPixelScale;
  float rimInk = (1.0 - smoothstep(uRimWidthPx - 0.4, uRimWidthPx + 0.4, rim)) * smoothstep(2.0, 6.0, narrowest);
  colour = mix(colour, colour * 0.35, 0.8 * rimInk);
  fragColour = vec4(srgbWithDepthCue(colour, z), 1.0);
  gl_FragDepth = fragmentDepth(z);
}
