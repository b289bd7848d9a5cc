// An ellipsoid whose ink may be lighter than its colour, in two colours, or with a pattern: as quadric, in linear light throughout.
precision highp float;
precision highp int;

#include <_view>
#include <_colour>
#include <_quadric>
#include <_light>
#include <_quadric-face>
#include <_depth-cue>
#include <_pattern>

flat in vec3 vColour;
flat in vec3 vRestColour;
flat in vec2 vMarks;

out vec4 fragColour;

void main() {
  SurfacePoint here = surfaceHere();
  vec3 own = hasOwnColour(here.u.xy, vMarks.x) ? vColour : vRestColour;
  vec3 colour = litBy(here.light, own, darknessOf(own));
  if (isOnPattern(here.u, int(vMarks.y + 0.5))) colour = mix(colour, inkOn(own, colour), patternInk);
  colour = mix(colour, inkOn(own, colour), here.circleInk) * (1.0 - here.rimInk);
  fragColour = vec4(withDepthCue(srgbFromLinear(colour), here.z / (1.0 + here.z * uPerEyePx)), 1.0);
  gl_FragDepth = fragmentDepth(here.z);
}
