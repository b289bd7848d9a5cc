// An ellipsoid whose ink may be lighter than its colour, in two colours, or with a pattern.
precision highp float;
precision highp int;

#include <_view>
#include <_colour>
#include <_quadric>
#include <_quadric-image>

in vec3 aColour;
in vec3 aRestColour;
in float aShare; // 1 whole
in float aPattern; // 0 plain, 1 striped, 2 dotted

flat out vec3 vColour; // linear light
flat out vec3 vRestColour;
flat out vec2 vMarks; // share, pattern

void main() {
  placeQuadric();
  vColour = linearFromSrgb(aColour);
  vRestColour = linearFromSrgb(aRestColour);
  vMarks = vec2(aShare, aPattern);
}
