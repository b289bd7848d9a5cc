// sRGB (IEC 61966-2-1) to linear light and back, each channel in [0, 1].
vec3 linearFromSrgb(vec3 c) {
  return mix(c / 12.92, pow((c + 0.055) / 1.055, vec3(2.4)), step(0.04045, c));
}

// x^(1/2.4) by roots instead of a power, which software WebGL computes slowly: within 0.00005 of it between 0.0031308 and 1,
// by a minimax fit.
float root24(float x) {
  float root2 = sqrt(x);
  float root4 = sqrt(root2);
  return 0.0521327 + 0.60887719 * root2 + 0.67498642 * root4 - 0.31930808 * sqrt(root4) - 0.0166474 * x;
}

vec3 srgbFromLinear(vec3 c) {
  vec3 x = clamp(c, 0.0, 1.0);
  vec3 curve = 1.055 * vec3(root24(x.r), root24(x.g), root24(x.b)) - 0.055;
  return mix(x * 12.92, curve, step(0.0031308, x));
}

// Relative luminance of linear light (Rec. 709 primaries).
float luminance(vec3 c) {
  return dot(c, vec3(0.2126, 0.7152, 0.0722));
}
