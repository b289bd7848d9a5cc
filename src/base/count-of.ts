/**
 * A count with the words that agree with it, for messages. Without `many` the plural is made with -s.
 *
 * `countOf(1, 'atom')` → `1 atom`; `countOf(0, 'atom')` → `0 atoms`; `countOf(2, 'atom has', 'atoms have')` → `2 atoms have`
 */
export function countOf(count: number, one: string, many = `${one}s`): string {
  return `${count} ${wordFor(count, one, many)}`;
}

/** The words that agree with a count, without the count. */
export function wordFor(count: number, one: string, many = `${one}s`): string {
  return count === 1 ? one : many;
}
