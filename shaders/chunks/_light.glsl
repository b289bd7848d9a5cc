// Soft light fixed to the viewer: a wide source from the upper left, paper light from below, no gloss. A surface that
// faces the viewer keeps its own colour exactly, so that colours can be read against the colour bar.
const vec3 keyDirection = vec3(-0.42, 0.60, 0.68);

float softLight(vec3 normal) {
  float key = dot(normal, keyDirection);
  float wrapped = 0.5 + 0.5 * key;
  float facing = 0.5 + 0.5 * keyDirection.z;
  float form = mix(0.16, 1.0, wrapped * wrapped) / mix(0.16, 1.0, facing * facing);
  float turnedAway = 1.0 - normal.z;
  return form * (1.0 - 0.25 * turnedAway * turnedAway);
}

// Brighter than its own colour a surface nears white without reaching it, and a dark colour stays saturated.
vec3 lit(vec3 colour, vec3 normal) {
  float light = softLight(normal);
  return light <= 1.0 ? colour * light : 1.0 - pow(1.0 - min(colour, 0.999), vec3(light));
}
