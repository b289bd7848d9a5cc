// A light ellipsoid of one colour. Its colour in sRGB, and how it rises where the light is more than that of a surface that faces
// the viewer: a parabola through the least and the most such light and the middle, exact to half a step of a byte.
precision highp float;
precision highp int;

#include <_view>
#include <_colour>
#include <_light>
#include <_quadric>
#include <_quadric-image>

in vec3 aColour;

flat out vec3 vShade; // sRGB + 0.055: what light scales by its root
flat out vec3 vRise1;
flat out vec3 vRise2;

void main() {
  placeQuadric();
  vec3 darkness = darknessOf(linearFromSrgb(aColour));
  float most = mostLight - 1.0;
  vec3 halfway = srgbFromLinear(1.0 - exp2((1.0 + 0.5 * most) * darkness)) - aColour;
  vec3 whole = srgbFromLinear(1.0 - exp2(mostLight * darkness)) - aColour;
  vShade = aColour + 0.055;
  vRise1 = (4.0 * halfway - whole) / most;
  vRise2 = (2.0 * whole - 4.0 * halfway) / (most * most);
}
