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

mat3 triangleOf(ViewQuadric q) {
  return mat3(
    q.outline.x, q.outline.y, q.depth.x,
    0.0, q.outline.z, q.depth.y,
    0.0, 0.0, q.depth.z
  );
}

// (e, s) to coordinates along the quadric's own axes, on the unit sphere; orthogonal. In perspective up to a positive factor and a
// shift, inverse(m) * image.shift: bodyPointInImage of perspective.ts.
mat3 bodyOfImage(mat3 inverseShape, ViewQuadric q, vec3 centre, float perEye) {
  mat3 back = mat3(1.0);
  back[2] -= centre * perEye;
  return inverseShape * back * triangleOf(q);
}

// What is the same all over a quadric and takes a pixel to the unit disc and to the surface's normal without a division.
struct QuadricFace {
  vec3 toDisc; // 1 / l11, 1 / l22, l21 / (l11 l22)
  vec2 slope; // of the normal, by s
  vec3 facing; // height of the normal, by (e, s)
};

// `centre` of the image. In perspective the normal gains perEye (normal · place) of height, and normal · (place - centre) is 1.
QuadricFace faceOf(ViewQuadric q, vec3 centre, float perEye) {
  float byWidth = 1.0 / q.outline.x;
  float byHeight = 1.0 / q.outline.z;
  float byDepth = 1.0 / q.depth.z;
  float skew = q.outline.y * byWidth * byHeight;
  vec2 slope = vec2((q.outline.y * q.depth.y * byHeight - q.depth.x) * byWidth, -q.depth.y * byHeight) * byDepth;
  vec3 c = perEye * centre;
  vec3 facing = vec3(c.x * byWidth, c.y * byHeight - c.x * skew, byDepth + dot(c, vec3(slope, byDepth)));
  return QuadricFace(vec3(byWidth, byHeight, skew), slope, facing);
}

// The point of the unit disc under an offset on screen.
vec2 discPoint(vec3 toDisc, vec2 off) {
  return vec2(off.x * toDisc.x, off.y * toDisc.y - off.x * toDisc.z);
}

// A gradient in e as a gradient in pixels.
vec2 pixelGradient(vec3 toDisc, vec2 g) {
  return vec2(g.x * toDisc.x - g.y * toDisc.z, g.y * toDisc.y);
}

// `across` is pixelGradient(toDisc, e).
vec3 surfaceNormal(QuadricFace face, vec2 across, vec3 unit, float perEye) {
  return vec3(across + unit.z * face.slope, perEye + dot(face.facing, unit));
}

const float rimFloor = 0.02;

// First-order distance on screen, pixels, to the nearest of the great circles u_k = 0; u = body (e, s) + shift at this point, `undrawn`
// a large number for each circle that is left out.
float nearestCircle(vec3 toDisc, mat3 body, vec3 u, vec3 unit, vec3 undrawn) {
  vec3 steep = body[2] * (1.0 / max(unit.z, rimFloor));
  vec3 byY = body[1] - steep * unit.y;
  vec3 gx = (body[0] - steep * unit.x) * toDisc.x - byY * toDisc.z;
  vec3 gy = byY * toDisc.y;
  vec3 squares = undrawn + u * u / (gx * gx + gy * gy);
  return sqrt(min(squares.x, min(squares.y, squares.z)));
}

// First-order distance from the outline inwards, pixels, where |e| is `radius`.
float rimDistance(float radius, vec2 across) {
  return (1.0 - radius) * radius * inversesqrt(max(dot(across, across), 1e-20));
}
