// CPU twin: src/scene/view-quadric.ts and perspective.ts. A quadric's image, seen along -z: T = lower triangle with T Tᵀ = Σ,
// surface centre + T (e, s).
struct ViewQuadric {
  vec3 outline; // l11, l21, l22
  vec3 depth; // g1, g2, w
};

struct ImageQuadric {
  bool seen; // false where it reaches too near to the eye
  vec3 centre;
  mat3 sigma;
  vec3 shift;
};

// Image of { centre + M u : |u| = 1 }, see imageQuadric of perspective.ts.
ImageQuadric imageQuadric(vec3 centre, mat3 m, float perEye) {
  mat3 sigma = m * transpose(m);
  vec3 s = sigma[2] * perEye;
  float inner = s.z * perEye;
  float w = 1.0 - centre.z * perEye;
  bool seen = w - sqrt(inner) >= 0.05;
  float d = w * w - inner;
  mat3 image = (d * sigma + inner * outerProduct(centre, centre) +
    w * (outerProduct(centre, s) + outerProduct(s, centre)) + outerProduct(s, s)) / (d * d);
  return ImageQuadric(seen, (w * centre + s) / d, image, s / d);
}

ViewQuadric quadricOfSigma(mat3 sigma) {
  float l11 = sqrt(sigma[0][0]);
  float l21 = sigma[0][1] / l11;
  float l22 = sqrt(max(sigma[1][1] - l21 * l21, 1e-20));
  float g1 = sigma[0][2] / l11;
  float g2 = (sigma[1][2] - l21 * g1) / l22;
  float w = sqrt(max(sigma[2][2] - g1 * g1 - g2 * g2, 1e-20));
  return ViewQuadric(vec3(l11, l21, l22), vec3(g1, g2, w));
}

// Columns of m are the semi-axes in view axes, pixels; without perspective.
ViewQuadric viewQuadric(mat3 m) {
  return quadricOfSigma(m * transpose(m));
}

// Offset on screen of a point of the unit disc.
vec2 outlinePoint(ViewQuadric q, vec2 e) {
  return vec2(q.outline.x * e.x, q.outline.y * e.x + q.outline.z * e.y);
}

// And back: the point of the disc's plane under an offset on screen.
vec2 discPoint(ViewQuadric q, vec2 d) {
  float x = d.x / q.outline.x;
  return vec2(x, (d.y - q.outline.y * x) / q.outline.z);
}

mat3 triangleOf(ViewQuadric q) {
  return mat3(
    q.outline.x, q.outline.y, q.depth.x,
    0.0, q.outline.z, q.depth.y,
    0.0, 0.0, q.depth.z
  );
}

// (e, s) to coordinates along the quadric's own axes, on the unit sphere. Orthogonal.
mat3 bodyRotation(mat3 m, ViewQuadric q) {
  return inverse(m) * triangleOf(q);
}

// The same in perspective, up to a positive factor and a shift, inverse(m) * image.shift: bodyPointInImage of perspective.ts.
mat3 bodyOfImage(mat3 inverseShape, ViewQuadric q, vec3 centre, float perEye) {
  mat3 back = mat3(1.0);
  back[2] -= centre * perEye;
  return inverseShape * back * triangleOf(q);
}

float surfaceDepth(ViewQuadric q, vec3 unit) {
  return dot(q.depth, unit);
}

vec3 surfaceNormal(ViewQuadric q, vec3 unit) {
  float z = unit.z / q.depth.z;
  float y = (unit.y - q.depth.y * z) / q.outline.z;
  float x = (unit.x - q.outline.y * y - q.depth.x * z) / q.outline.x;
  return vec3(x, y, z);
}

// A gradient in e as a gradient in pixels.
vec2 pixelGradient(ViewQuadric q, vec2 g) {
  float y = g.y / q.outline.z;
  return vec2((g.x - q.outline.y * y) / q.outline.x, y);
}

const float rimFloor = 0.02;

// First-order distances on screen, pixels, to the three great circles u_k = 0; u = body (e, s) + shift at this point. All three at
// once: indexing by a variable is slow where the processor stands in for a graphics chip.
vec3 circleDistances(ViewQuadric q, mat3 body, vec3 u, vec3 unit) {
  vec3 steep = body[2] / max(unit.z, rimFloor);
  vec3 gy = (body[1] - steep * unit.y) / q.outline.z;
  vec3 gx = (body[0] - steep * unit.x - q.outline.y * gy) / q.outline.x;
  return abs(u) * inversesqrt(gx * gx + gy * gy);
}

// First-order distance from the outline, pixels; positive outside.
float outlineDistance(ViewQuadric q, vec2 e) {
  float radius = length(e);
  return (radius - 1.0) / length(pixelGradient(q, e / radius));
}
