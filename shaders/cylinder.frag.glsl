// A lit cylinder, each half in its own colour, with exact depth.
precision highp float;
precision highp int;

#include <_view>
#include <_pixel>
#include <_colour>
#include <_cylinder>
#include <_light>
#include <_depth-cue>

flat in vec3 vStart;
flat in vec3 vAxis;
flat in vec2 vSize;
flat in vec3 vStartColour;
flat in vec3 vEndColour;

uniform vec4 uCylinderRim; // width, ink, and the radii between which it comes in, CSS pixels

out vec4 fragColour;

void main() {
  // the line of sight through this pixel: (x, y, 0) + z (-x/E, -y/E, 1)
  vec2 pixel = viewPixel();
  vec3 sight = vec3(-uPerEyePx * pixel, 1.0);
  CylinderHit hit = cylinderSurface(vAxis, vSize.x, vSize.y, vec3(pixel, 0.0) - vStart, sight);
  if (!hit.found) discard;
  float near = nearness(hit.z);
  vec3 colour = lit(hit.t < 0.5 * vSize.x ? vStartColour : vEndColour, hit.normal);
  // a thin dark edge, as on the ellipsoids
  float edge = (vSize.y - hit.miss) / near / uPixelScale;
  float radius = vSize.y / nearness(vStart.z + 0.5 * vSize.x * vAxis.z) / uPixelScale;
  float rimInk = 1.0 - smoothstep(uCylinderRim.x - 0.4, uCylinderRim.x + 0.4, edge);
  colour *= 1.0 - uCylinderRim.y * rimInk * smoothstep(uCylinderRim.z, uCylinderRim.w, radius);
  fragColour = vec4(withDepthCue(srgbFromLinear(colour), hit.z), 1.0);
  gl_FragDepth = fragmentDepth(hit.z / near);
}
