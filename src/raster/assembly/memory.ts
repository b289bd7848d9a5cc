// Twins of ../scalar/memory.ts.

export function whole(slot: i32): i32 {
  return load<i32>(slot << 2);
}

export function setWhole(slot: i32, value: i32): void {
  store<i32>(slot << 2, value);
}

export function real(slot: i32): f32 {
  return load<f32>(slot << 2);
}

export function part(record: i32, k: i32): f32 {
  return load<f32>(record + (k << 2));
}

export function setPart(record: i32, k: i32, value: f32): void {
  store<f32>(record + (k << 2), value);
}

export function wordPart(record: i32, k: i32): i32 {
  return load<i32>(record + (k << 2));
}

export function setWordPart(record: i32, k: i32, value: i32): void {
  store<i32>(record + (k << 2), value);
}

export function byteAt(address: i32): i32 {
  return load<u8>(address);
}

export function setByteAt(address: i32, value: i32): void {
  store<u8>(address, value);
}

export function copyBytes(to: i32, from: i32, size: i32): void {
  memory.copy(to, from, size);
}

export function clearBytes(at: i32, size: i32): void {
  memory.fill(at, 0, size);
}

export function asReal(value: i32): f32 {
  return <f32>value;
}

export function down(value: f32): i32 {
  return <i32>floor<f32>(value);
}

export function up(value: f32): i32 {
  return <i32>ceil<f32>(value);
}

export function divided(value: i32, by: i32): i32 {
  return value / by;
}

export function least(a: f32, b: f32): f32 {
  return min<f32>(a, b);
}

export function most(a: f32, b: f32): f32 {
  return max<f32>(a, b);
}

export function leastWhole(a: i32, b: i32): i32 {
  return min<i32>(a, b);
}

export function mostWhole(a: i32, b: i32): i32 {
  return max<i32>(a, b);
}

export function root(value: f32): f32 {
  return sqrt<f32>(value);
}

export function size(value: f32): f32 {
  return abs<f32>(value);
}

export function held(value: f32): f32 {
  return min<f32>(1, max<f32>(0, value));
}

export function smooth(value: f32, low: f32, per: f32): f32 {
  const x = held((value - low) * per);
  return x * x * (3 - x * 2);
}

// And for the parts that take four samples a step.

/** Number k of a record in all four lanes. */
export function lanes(record: i32, k: i32): v128 {
  return v128.load_splat<f32>(record + (k << 2));
}
