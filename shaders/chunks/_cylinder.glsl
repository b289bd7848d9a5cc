// CPU twin: cylinderSurface in src/scene/pick.ts. A flat-ended cylinder seen along -z, in pixels, origin at its start.
struct ViewCylinder {
  float size; // length
  float lie; // sine of the angle between axis and line of sight
  float rise; // cosine of it: positive where the end is nearer
  float radius;
};

struct CylinderHit {
  bool found;
  float z; // above the start
  float t; // along the axis
  vec3 normal; // x along the projected axis, y across it, z to the viewer
};

CylinderHit cylinderSurface(ViewCylinder c, float along, float across) {
  CylinderHit hit = CylinderHit(false, 0.0, 0.0, vec3(0.0, 0.0, 1.0));
  float bulge = c.radius * c.radius - across * across;
  if (bulge < 0.0) return hit;
  float height = sqrt(bulge);
  float t = c.lie > 1e-6 ? (along + height * c.rise) / c.lie : -1.0;
  if (t >= 0.0 && t <= c.size) {
    float q = height / c.radius;
    vec3 normal = vec3(-c.rise * q, across / c.radius, c.lie * q);
    return CylinderHit(true, t * c.rise + height * c.lie, t, normal);
  }
  if (abs(c.rise) < 1e-6) return hit;
  float capAt = c.rise > 0.0 ? c.size : 0.0;
  float k = (capAt * c.lie - along) / c.rise;
  if (k * k > bulge) return hit;
  float facing = sign(c.rise);
  return CylinderHit(true, capAt * c.rise + k * c.lie, capAt, facing * vec3(c.lie, 0.0, c.rise));
}
