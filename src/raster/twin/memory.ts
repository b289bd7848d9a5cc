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

/** 3x² − 2x³ between two edges; `per` is 1 / (high − low). */
export function smooth(value: number, low: number, per: number): number {
  const x = Math.min(1, Math.max(0, (value - low) * per));
  return x * x * (3 - 2 * x);
}
