// One triangle that covers the picture.
precision highp float;

void main() {
  vec2 corner = vec2((gl_VertexID & 1) == 0 ? -1.0 : 3.0, (gl_VertexID & 2) == 0 ? -1.0 : 3.0);
  gl_Position = vec4(corner, 0.0, 1.0);
}
