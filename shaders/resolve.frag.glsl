// Mean of the n × n samples of a pixel, taken in linear light.
precision highp float;
precision highp int;

#include <_colour>

uniform sampler2D uSamples;
uniform int uSamplesAcross;

out vec4 fragColour;

void main() {
  ivec2 origin = ivec2(gl_FragCoord.xy) * uSamplesAcross;
  vec3 sum = vec3(0.0);
  for (int y = 0; y < uSamplesAcross; y++) {
    for (int x = 0; x < uSamplesAcross; x++) {
      sum += linearFromSrgb(texelFetch(uSamples, origin + ivec2(x, y), 0).rgb);
    }
  }
  float count = float(uSamplesAcross * uSamplesAcross);
  fragColour = vec4(srgbFromLinear(sum / count), 1.0);
}
