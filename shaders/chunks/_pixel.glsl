// Fragment shaders only; after _view. This pixel's centre in view axes, device pixels from the camera's target.
vec2 viewPixel() {
  return gl_FragCoord.xy - uHalfViewportPx;
}
