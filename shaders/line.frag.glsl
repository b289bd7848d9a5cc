// A cell edge: flat ink whose coverage falls off over one device pixel.
precision highp float;
precision highp int;

#include <_view>
#include <_colour>
#include <_depth-cue>

in float vAcross;
in float vImageZ;

uniform vec3 uLineColour;
uniform float uLineWidthPx;

out vec4 fragColour;

void main() {
  float halfWidth = 0.5 * uLineWidthPx * uPixelScale;
  float cover = clamp(halfWidth + 0.5 - abs(vAcross), 0.0, 1.0) * min(1.0, 2.0 * halfWidth);
  if (cover <= 0.0) discard;
  fragColour = vec4(withDepthCue(srgbFromLinear(uLineColour), pointOfImage(vec3(0.0, 0.0, vImageZ)).z), cover);
}
