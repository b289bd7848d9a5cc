// A corner of a facet, lit and sorted by src/scene/facet-view.ts; already in image axes.
precision highp float;
precision highp int;

#include <_view>

in vec3 aCorner;
in vec4 aTint;

out float vImageZ;
flat out vec4 vTint; // sRGB and opacity

void main() {
  vImageZ = aCorner.z * uPixelScale;
  vTint = aTint;
  gl_Position = clipPoint(aCorner * uPixelScale);
}
