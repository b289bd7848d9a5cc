// Soft light fixed to the viewer: a wide source from the upper left, paper light from below, no gloss. A surface that
// faces the viewer keeps its own colour exactly, so that colours can be read against the colour bar.
const vec3 keyDirection = vec3(-0.42, 0.60, 0.68);
const float mostLight = 1.3286; // of softLight: 1 / mix(0.16, 1.0, 0.84²)

float softLight(vec3 normal) {
  float key = dot(normal, keyDirection);
  float wrapped = 0.5 + 0.5 * key;
  float facing = 0.5 + 0.5 * keyDirection.z;
  float form = mix(0.16, 1.0, wrapped * wrapped) / mix(0.16, 1.0, facing * facing);
  float turnedAway = 1.0 - normal.z;
  return form * (1.0 - 0.25 * turnedAway * turnedAway);
}

// Brighter than its own colour a surface nears white without reaching it, and a dark colour stays saturated. `darkness` is
// darknessOf(colour), the same all over an object.
vec3 darknessOf(vec3 colour) {
  return log2(1.0 - min(colour, 0.999));
}

vec3 litBy(float light, vec3 colour, vec3 darkness) {
  return mix(colour * light, 1.0 - exp2(light * darkness), step(1.0, light));
}

vec3 lit(vec3 colour, vec3 normal) {
  return litBy(softLight(normal), colour, darknessOf(colour));
}
