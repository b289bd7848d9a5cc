/** A number for people: − as minus sign, no trailing zeros, at most so many significant digits. */
export function printed(value: number, digits = 4): string {
  return String(Number(value.toPrecision(digits))).replace('-', '−');
}
