// A light ellipsoid of one colour, with exact depth, its principal circles and the line at its rim. All ink darkens, so that light and
// ink are one factor, and sRGB = 1.055 light^(1/2.4) - 0.055 takes it as one root of a number; see quadric-marked for any others.
precision highp float;
precision highp int;

#include <_view>
#include <_colour>
#include <_quadric>
#include <_light>
#include <_quadric-face>
#include <_depth-cue>
#include <_pattern>

flat in vec3 vShade;
flat in vec3 vRise1;
flat in vec3 vRise2;

out vec4 fragColour;

void main() {
  SurfacePoint here = surfaceHere();
  float more = max(here.light - 1.0, 0.0);
  float kept = (1.0 - darkInk * here.circleInk) * (1.0 - here.rimInk);
  vec3 colour = (vShade + more * (vRise1 + more * vRise2)) * root24(min(here.light, 1.0) * kept) - 0.055;
  fragColour = vec4(withDepthCue(max(colour, 0.0), here.z / (1.0 + here.z * uPerEyePx)), 1.0);
  gl_FragDepth = fragmentDepth(here.z);
}
