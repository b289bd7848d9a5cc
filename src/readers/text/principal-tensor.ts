/** True where nine numbers are three unit vectors at right angles, to the two or three digits that texts print. */
export function areOrthonormal(numbers: readonly number[]): boolean {
  const rows = [0, 3, 6].map((at) => numbers.slice(at, at + 3));
  for (let i = 0; i < 3; i++) {
    for (let j = i; j < 3; j++) {
      const product = rows[i]!.reduce((sum, value, at) => sum + value * rows[j]![at]!, 0);
      if (!(Math.abs(product - (i === j ? 1 : 0)) < 0.02)) return false;
    }
  }
  return true;
}

/** Row-major V diag(values) Vᵀ from principal values and their unit vectors. */
export function fromPrincipal(values: readonly number[], vectors: readonly (readonly number[])[]): number[] {
  return Array.from({ length: 9 }, (_, at) => {
    const [row, column] = [Math.floor(at / 3), at % 3];
    return values.reduce((sum, value, k) => {
      const vector = vectors[k]!;
      const size = vector.reduce((all, x) => all + x * x, 0);
      return sum + (value * vector[row]! * vector[column]!) / size;
    }, 0);
  });
}
