/** The kernel's memory seen three ways; slot numbers of slots.ts index `f` and `i`. */
export interface KernelViews {
  readonly f: Float32Array;
  readonly i: Int32Array;
  readonly b: Uint8Array;
}

export function viewsOf(buffer: ArrayBuffer): KernelViews {
  return { f: new Float32Array(buffer), i: new Int32Array(buffer), b: new Uint8Array(buffer) };
}

/** Where a four-byte array starts, as an index into `f` and `i`. */
export function wordAt({ i }: KernelViews, slot: number): number {
  return i[slot]! >> 2;
}

let { f, i, b } = viewsOf(new ArrayBuffer(0));

/** The memory that all functions of this folder work on from here on. */
export function useMemory(views: KernelViews): void {
  ({ f, i, b } = views);
}

// What follows is there in ../assembly/memory.ts under the same names. Addresses are in bytes.

export function whole(slot: i32): i32 {
  return i[slot]!;
}

export function setWhole(slot: i32, value: i32): void {
  i[slot] = value;
}

export function real(slot: i32): f32 {
  return f[slot]!;
}

/** Number k of a record. */
export function part(record: i32, k: i32): f32 {
  return f[(record >> 2) + k]!;
}

export function setPart(record: i32, k: i32, value: f32): void {
  f[(record >> 2) + k] = value;
}

export function wordPart(record: i32, k: i32): i32 {
  return i[(record >> 2) + k]!;
}

export function setWordPart(record: i32, k: i32, value: i32): void {
  i[(record >> 2) + k] = value;
}

export function byteAt(address: i32): i32 {
  return b[address]!;
}

export function setByteAt(address: i32, value: i32): void {
  b[address] = value;
}

export function copyBytes(to: i32, from: i32, size: i32): void {
  b.copyWithin(to, from, from + size);
}

export function clearBytes(at: i32, size: i32): void {
  b.fill(0, at, at + size);
}

export function asReal(value: i32): f32 {
  return value;
}

/** Towards −∞, as a whole number. */
export function down(value: f32): i32 {
  return Math.floor(value);
}

export function up(value: f32): i32 {
  return Math.ceil(value);
}

export function divided(value: i32, by: i32): i32 {
  return Math.trunc(value / by);
}

export function least(a: f32, b: f32): f32 {
  return Math.min(a, b);
}

export function most(a: f32, b: f32): f32 {
  return Math.max(a, b);
}

export function leastWhole(a: i32, b: i32): i32 {
  return a < b ? a : b;
}

export function mostWhole(a: i32, b: i32): i32 {
  return a > b ? a : b;
}

export function root(value: f32): f32 {
  return Math.sqrt(value);
}

export function size(value: f32): f32 {
  return Math.abs(value);
}

export function held(value: f32): f32 {
  return Math.min(1, Math.max(0, value));
}

/** 3x² − 2x³ between two edges; `per` is 1 / (high − low). */
export function smooth(value: f32, low: f32, per: f32): f32 {
  const x = held((value - low) * per);
  return x * x * (3 - x * 2);
}
