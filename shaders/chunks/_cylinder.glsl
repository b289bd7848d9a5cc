// CPU twin: cylinderSurface in src/scene/pick.ts. A flat-ended cylinder met by a line of sight q + z k, z its height in view axes,
// from the cylinder's start on, pixels: k = (0, 0, 1) without perspective.
struct CylinderHit {
  bool found;
  float z;
  float t; // along the axis
  float miss; // how far the line of sight passes from the axis, pixels
  vec3 normal; // view axes
};

CylinderHit cylinderSurface(vec3 axis, float size, float radius, vec3 q, vec3 k) {
  float qAlong = dot(q, axis);
  float kAlong = dot(k, axis);
  vec3 qAcross = q - qAlong * axis;
  vec3 kAcross = k - kAlong * axis;
  float square = dot(kAcross, kAcross);
  // |q × k| without the part along the axis: no difference of large squares
  float moment = dot(axis, cross(q, k));
  float bulge = square * radius * radius - moment * moment;
  CylinderHit hit = CylinderHit(false, 0.0, 0.0, abs(moment) * inversesqrt(max(square, 1e-12)), vec3(0.0, 0.0, 1.0));
  bool endOn = square < 1e-12 * dot(k, k);
  if (endOn ? dot(qAcross, qAcross) > radius * radius : bulge < 0.0) return hit;
  if (!endOn) {
    float z = (sqrt(bulge) - dot(qAcross, kAcross)) / square;
    float t = qAlong + z * kAlong;
    if (t >= 0.0 && t <= size) return CylinderHit(true, z, t, hit.miss, (qAcross + z * kAcross) / radius);
  }
  if (abs(kAlong) < 1e-6) return hit;
  float capAt = kAlong > 0.0 ? size : 0.0;
  float z = (capAt - qAlong) / kAlong;
  vec3 off = qAcross + z * kAcross;
  if (dot(off, off) > radius * radius) return hit;
  return CylinderHit(true, z, capAt, hit.miss, sign(kAlong) * axis);
}
