// sRGB (IEC 61966-2-1) to linear light and back, each channel in [0, 1].
vec3 linearFromSrgb(vec3 c) {
  return mix(c / 12.92, pow((c + 0.055) / 1.055, vec3(2.4)), step(0.04045, c));
}

vec3 srgbFromLinear(vec3 c) {
  vec3 x = clamp(c, 0.0, 1.0);
  return mix(x * 12.92, 1.055 * pow(x, vec3(1.0 / 2.4)) - 0.055, step(0.0031308, x));
}

// Relative luminance of linear light (Rec. 709 primaries).
float luminance(vec3 c) {
  return dot(c, vec3(0.2126, 0.7152, 0.0722));
}
