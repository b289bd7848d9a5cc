// CPU twin: src/scene/polar-mesh.ts. The signed polar surface r(n) = |n·T·n| about its centre.
const float polarBands = 10.0;

struct PolarPoint {
  bool negative;
  vec3 normal; // outward, not normalised
};

mat3 symmetric(vec3 diagonal, vec3 mixed) {
  return mat3(
    diagonal.x, mixed.x, mixed.y,
    mixed.x, diagonal.y, mixed.z,
    mixed.y, mixed.z, diagonal.z
  );
}

// n·T·n
float polarRadius(mat3 t, vec3 n) {
  return dot(n, t * n);
}

// Which corner of a mesh triangle moves to the centre, by the radii at its corners; -1 for none.
int cornerAtCentre(vec3 r) {
  bvec3 negative = lessThan(r, vec3(0.0));
  if (negative.x == negative.y) return negative.y == negative.z ? -1 : 2;
  return negative.x == negative.z ? 1 : 0;
}

PolarPoint polarPoint(mat3 t, vec3 p) {
  vec3 tp = t * p;
  bool negative = dot(p, tp) < 0.0;
  return PolarPoint(negative, 3.0 * length(p) * p + (negative ? 2.0 : -2.0) * tp);
}

// Whether a point is on a dark band of a negative lobe; norm is the Frobenius norm of T.
bool polarBand(float norm, vec3 p, bool negative) {
  return negative && fract(polarBands * length(p) / norm) < 0.4;
}

// Distance on screen from the silhouette, before perspective enlarges it, for a viewer along v.
float polarRimDistance(mat3 t, vec3 p, PolarPoint point, vec3 v) {
  float size = max(length(p), 1e-6);
  vec3 g = point.normal;
  vec3 h = 3.0 * size * v + (3.0 * dot(p, v) / size) * p + (point.negative ? 2.0 : -2.0) * (t * v);
  float facing = dot(g, v);
  vec3 q = facing * h - dot(h, v) * g;
  float along = dot(q, v);
  return facing * facing / max(2.0 * sqrt(max(dot(q, q) - along * along, 0.0)), 1e-9);
}
