/** Word of the parameter block. */
export function whole(slot: i32): i32 {
  return load<i32>(slot << 2);
}

export function real(slot: i32): f32 {
  return load<f32>(slot << 2);
}

/** Number k of a record. */
export function part(record: i32, k: i32): f32 {
  return load<f32>(record + (k << 2));
}

export function setPart(record: i32, k: i32, value: f32): void {
  store<f32>(record + (k << 2), value);
}

/** Number k of a record in all four lanes. */
export function lanes(record: i32, k: i32): v128 {
  return v128.load_splat<f32>(record + (k << 2));
}

/** 3x² − 2x³ between two edges; `per` is 1 / (high − low). */
export function smooth(value: f32, low: f32, per: f32): f32 {
  const x = min<f32>(1, max<f32>(0, (value - low) * per));
  return x * x * (3 - 2 * x);
}
