// Fragment shaders of quadrics: the surface under this pixel, of what _quadric-image worked out. No branches: software WebGL runs both
// sides of each. After _view, _quadric and _light.
flat in vec2 vOrigin;
flat in vec4 vDepth;
flat in vec3 vToDisc;
flat in vec2 vSlope;
flat in vec3 vFacing;
flat in vec3 vBody1;
flat in vec3 vBody2;
flat in vec3 vBody3;
flat in vec3 vBodyShift;
flat in vec3 vUndrawn;
flat in vec4 vEdges;
flat in vec2 vInk;

struct SurfacePoint {
  vec3 unit; // (e, s)
  float z; // image axes
  float light;
  vec3 u; // on the quadric's own axes, up to a positive factor
  float circleInk;
  float rimInk;
};

// 1 - smoothstep(0.0, 1.0, x)
float fallingEdge(float x) {
  float t = clamp(x, 0.0, 1.0);
  return 1.0 + t * t * (2.0 * t - 3.0);
}

SurfacePoint surfaceHere() {
  vec2 e = discPoint(vToDisc, gl_FragCoord.xy - vOrigin);
  float square = dot(e, e);
  if (square >= 1.0) discard;
  SurfacePoint here;
  here.unit = vec3(e, sqrt(1.0 - square));
  here.z = vDepth.w + dot(vDepth.xyz, here.unit);
  vec2 across = pixelGradient(vToDisc, e);
  vec3 normal = surfaceNormal(QuadricFace(vToDisc, vSlope, vFacing), across, here.unit, uPerEyePx);
  here.light = softLight(normal * inversesqrt(dot(normal, normal)));
  mat3 body = mat3(vBody1, vBody2, vBody3);
  here.u = body * here.unit + vBodyShift;
  float circle = nearestCircle(vToDisc, body, here.u, here.unit, vUndrawn);
  here.circleInk = vInk.x * fallingEdge((circle - vEdges.x) * vEdges.y);
  here.rimInk = vInk.y * fallingEdge((rimDistance(sqrt(square), across) - vEdges.z) * vEdges.w);
  return here;
}
