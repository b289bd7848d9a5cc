// Distance fades towards the paper; uDepthCue is the share at the far end, 0 turns it off. Mixed in sRGB, where equal
// shares look equal on dark and on light colours: takes linear light, gives sRGB.
uniform vec3 uPaper; // sRGB
uniform float uDepthCue;
uniform vec2 uSceneDepthPx; // nearest and farthest z of the scene

vec3 srgbWithDepthCue(vec3 colour, float zPx) {
  float far = clamp((uSceneDepthPx.x - zPx) / max(uSceneDepthPx.x - uSceneDepthPx.y, 1.0), 0.0, 1.0);
  return mix(srgbFromLinear(colour), uPaper, uDepthCue * far);
}
