// A facet seen through, blended over what lies behind it.
precision highp float;
precision highp int;

#include <_view>
#include <_colour>
#include <_depth-cue>

in float vImageZ;
flat in vec4 vTint;

out vec4 fragColour;

void main() {
  float z = pointOfImage(vec3(0.0, 0.0, vImageZ)).z;
  fragColour = vec4(withDepthCue(vTint.rgb, z), vTint.a);
}
