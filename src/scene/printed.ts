/** A number for people: − as minus sign, no trailing zeros, at most four significant digits. */
export function printed(value: number): string {
  return String(Number(value.toPrecision(4))).replace('-', '−');
}
