// A lit cylinder, each half in its own colour, with exact depth.
precision highp float;
precision highp int;

#include <_view>
#include <_pixel>
#include <_colour>
#include <_cylinder>
#include <_light>
#include <_depth-cue>

flat in vec4 vShape;
flat in vec2 vAlong;
flat in vec3 vStart;
flat in vec3 vStartColour;
flat in vec3 vEndColour;

out vec4 fragColour;

void main() {
  ViewCylinder c = ViewCylinder(vShape.x, vShape.y, vShape.z, vShape.w);
  vec2 aside = vec2(-vAlong.y, vAlong.x);
  vec2 d = viewPixel() - vStart.xy;
  float across = dot(d, aside);
  CylinderHit hit = cylinderSurface(c, dot(d, vAlong), across);
  if (!hit.found) discard;
  vec3 normal = vec3(hit.normal.x * vAlong + hit.normal.y * aside, hit.normal.z);
  float z = vStart.z + hit.z;
  vec3 colour = lit(hit.t < 0.5 * c.size ? vStartColour : vEndColour, normal);
  // a thin dark edge, as on the ellipsoids
  float edge = (c.radius - abs(across)) / uPixelScale;
  float rimInk = (1.0 - smoothstep(0.3, 1.1, edge)) * smoothstep(1.5, 4.0, c.radius / uPixelScale);
  colour = mix(colour, colour * 0.4, 0.6 * rimInk);
  fragColour = vec4(srgbWithDepthCue(colour, z), 1.0);
  gl_FragDepth = fragmentDepth(z);
}
