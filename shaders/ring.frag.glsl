// The ring of a hovered or selected ellipsoid, in front of everything, with paper between it and the outline.
precision highp float;
precision highp int;

#include <_view>
#include <_colour>
#include <_quadric>

flat in vec3 vCentre;
flat in vec3 vToDisc;
flat in float vState;

uniform vec3 uPaper; // sRGB
uniform vec3 uAccent;
uniform vec3 uHoverColour;
uniform vec2 uRingPx; // inner and outer distance of the ring from the outline, CSS pixels

out vec4 fragColour;

void main() {
  vec2 off = gl_FragCoord.xy - vCentre.xy;
  vec2 e = discPoint(vToDisc, off);
  float outside = vCentre.z > 0.0 ? length(off) - vCentre.z : -rimDistance(length(e), pixelGradient(vToDisc, e));
  float d = outside / uPixelScale;
  if (d < 0.0 || d > uRingPx.y + 1.0) discard;
  bool onRing = d >= uRingPx.x && d <= uRingPx.y;
  vec3 colour = vState > 1.5 ? uAccent : uHoverColour;
  fragColour = vec4(onRing ? srgbFromLinear(colour) : uPaper, 1.0);
  gl_FragDepth = 0.0;
}
