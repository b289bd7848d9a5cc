// A signed polar surface: light, sign and bands follow from the place of each fragment; see polarPoint and polarRimDistance in
// src/scene/polar-mesh.ts.
precision highp float;
precision highp int;

#include <_view>
#include <_pixel>
#include <_colour>
#include <_pattern>
#include <_polar>
#include <_light>
#include <_depth-cue>

in float vImageZ;
flat in vec3 vCentre;
flat in vec3 vDiagonal;
flat in vec3 vMixed;
flat in vec3 vPositive;
flat in vec3 vNegative;
flat in vec2 vSize;

uniform vec4 uRim; // width, ink, and the half widths between which it comes in, CSS pixels

out vec4 fragColour;

const float bandInk = 0.45;

void main() {
  vec3 image = vec3(viewPixel(), vImageZ);
  vec3 place = pointOfImage(image);
  vec3 p = place - vCentre;
  mat3 t = symmetric(vDiagonal, vMixed);
  PolarPoint point = polarPoint(t, p);
  vec3 own = point.negative ? vNegative : vPositive;
  vec3 colour = lit(own, normalize(point.normal));
  if (polarBand(vSize.x, p, point.negative)) {
    float ink = bandInk * smoothstep(1.5, 3.0, vSize.y / polarBands);
    colour = mix(colour, inkOn(own, colour), ink);
  }
  float rim = polarRimDistance(t, p, point, normalize(vec3(-uPerEyePx * image.xy, 1.0)));
  float rimInk = 1.0 - smoothstep(uRim.x - 0.4, uRim.x + 0.4, rim / nearness(place.z) / uPixelScale);
  colour *= 1.0 - uRim.y * rimInk * smoothstep(2.0 * uRim.z, 2.0 * uRim.w, vSize.y);
  fragColour = vec4(withDepthCue(srgbFromLinear(colour), place.z), 1.0);
  gl_FragDepth = fragmentDepth(vImageZ);
}
