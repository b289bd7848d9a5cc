/**
 * A key that sorts as people count: `Si2` before `Si10`, `O1a` before `O1B`. Runs of digits are led by their length, so
 * that plain comparison of keys, which is fast, compares them as numbers; case counts only where nothing else differs.
 */
export function naturalKey(text: string): string {
  const folded = text
    .toLowerCase()
    .replaceAll(/0*(\d+)/g, (_, digits: string) => String.fromCharCode(48 + digits.length) + digits);
  return `${folded}\u0000${text}`;
}
