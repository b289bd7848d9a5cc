// Distance fades towards the paper. Mixed in sRGB, where equal shares look equal on dark and on light colours.
uniform vec3 uPaper; // sRGB
uniform vec3 uFade; // nearest z of the scene, share of paper a pixel behind it, largest share: 0 turns it off

vec3 withDepthCue(vec3 srgb, float zPx) {
  return mix(srgb, uPaper, clamp((uFade.x - zPx) * uFade.y, 0.0, uFade.z));
}
