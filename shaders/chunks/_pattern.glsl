// CPU twin: src/scene/wedge-and-pattern.ts. Parts and patterns of a quadric, by the point u of its own unit sphere, which may be
// given up to a positive factor; and the ink that marks a surface. After _colour.
const float stripesPerUnit = 3.5;
const float dotsPerHalfSide = 2.0;
const float dotRadius = 0.3;
const float patternInk = 0.5;
const float darkInk = 0.88; // what dark ink takes of the light

// Ink that stands out from a colour in grey, too: darker on light colours, lighter on dark ones.
vec3 inkOn(vec3 own, vec3 shaded) {
  return luminance(own) > 0.14 ? shaded * (1.0 - darkInk) : mix(shaded, vec3(1.0), 0.55);
}

// Whether the azimuth from axis 0 towards axis 1 lies below 2π·share.
bool hasOwnColour(vec2 u, float share) {
  if (share >= 1.0) return true;
  float angle = 6.283185307179586 * share;
  float beyond = cos(angle) * u.y - sin(angle) * u.x;
  return share < 0.5 ? u.y >= 0.0 && beyond < 0.0 : u.y >= 0.0 || beyond < 0.0;
}

bool isOnPattern(vec3 u, int pattern) {
  if (pattern == 1) return fract(stripesPerUnit * (u.x + u.y + u.z) * inversesqrt(3.0 * dot(u, u))) < 0.5;
  if (pattern != 2) return false;
  vec3 a = abs(u);
  float most = max(a.x, max(a.y, a.z));
  float first = a.x == most ? u.y : u.x;
  float second = a.z == most && a.x != most && a.y != most ? u.y : u.z;
  vec2 off = fract(dotsPerHalfSide * vec2(first, second) / most) - 0.5;
  return dot(off, off) < dotRadius * dotRadius;
}
