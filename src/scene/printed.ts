/** A number for people: − as minus sign, no trailing zeros, at most so many significant digits. */
export function printed(value: number, digits = 4): string {
  return String(Number(value.toPrecision(digits))).replace('-', '−');
}

/** A sentence whose numbers stay on one line with their units and with what they are equal to. */
export function unbroken(sentence: string): string {
  return sentence.replace(/(\d) (?=(?:Å|ppm|a\.u\.|MHz|%)(?!\p{L}))/gu, '$1\u00a0');
}
