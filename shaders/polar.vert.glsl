// A corner of a signed polar surface's mesh. Each vertex knows all three directions of its triangle: where they differ in sign the
// triangle crosses a nodal cone, and one corner moves to the centre (cornerAtCentre in src/scene/polar-mesh.ts).
precision highp float;
precision highp int;

#include <_view>
#include <_colour>
#include <_polar>

in vec3 aDirection1; // of the triangle's corners, unit length
in vec3 aDirection2;
in vec3 aDirection3;
in vec3 aCentre;
in vec3 aDiagonal; // T: xx, yy, zz
in vec3 aMixed; // xy, xz, yz
in vec3 aPositive;
in vec3 aNegative;

out float vImageZ;
flat out vec3 vCentre; // view axes, pixels
flat out vec3 vDiagonal; // T in view axes, pixels
flat out vec3 vMixed;
flat out vec3 vPositive;
flat out vec3 vNegative;
flat out vec2 vSize; // Frobenius norm of T, pixels, and the same as enlarged by perspective, CSS pixels

void main() {
  mat3 tensor = symmetric(aDiagonal, aMixed);
  vec3 r = vec3(polarRadius(tensor, aDirection1), polarRadius(tensor, aDirection2), polarRadius(tensor, aDirection3));
  int corner = gl_VertexID % 3;
  vec3 direction = corner == 0 ? aDirection1 : corner == 1 ? aDirection2 : aDirection3;
  float size = corner == cornerAtCentre(r) ? 0.0 : abs(r[corner]);
  vec3 centre = viewPoint(aCentre);
  mat3 turn = mat3(rotateBy(uOrientation, vec3(1.0, 0.0, 0.0)), rotateBy(uOrientation, vec3(0.0, 1.0, 0.0)), rotateBy(uOrientation, vec3(0.0, 0.0, 1.0)));
  mat3 t = uPixelsPerAngstrom * turn * tensor * transpose(turn);
  float norm = max(sqrt(dot(t[0], t[0]) + dot(t[1], t[1]) + dot(t[2], t[2])), 1e-6);
  vec3 image = imagePoint(centre + uPixelsPerAngstrom * size * (turn * direction));
  vImageZ = image.z;
  vCentre = centre;
  vDiagonal = vec3(t[0][0], t[1][1], t[2][2]);
  vMixed = vec3(t[0][1], t[0][2], t[1][2]);
  vPositive = linearFromSrgb(aPositive);
  vNegative = linearFromSrgb(aNegative);
  vSize = vec2(norm, norm / max(nearness(centre.z), leastNearness) / uPixelScale);
  gl_Position = nearness(centre.z + norm) >= leastNearness ? clipPoint(image) : nowhere;
}
