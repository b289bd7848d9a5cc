/** Columns padded to their widest cell; the first column left-aligned, the others right. */
export function textTable(header: readonly string[], rows: readonly (readonly string[])[]): string {
  const all = [header, ...rows];
  const widths = header.map((_, column) =>
    all.reduce((width, row) => Math.max(width, [...(row[column] ?? '')].length), 0),
  );
  const line = (row: readonly string[]) =>
    widths
      .map((width, column) => {
        const cell = row[column] ?? '';
        const pad = ' '.repeat(width - [...cell].length);
        return column === 0 ? cell + pad : pad + cell;
      })
      .join('  ')
      .trimEnd();
  return all.map(line).join('\n');
}

/** A number with fixed digits and a true minus; an undefined one as a dash. */
export function fixed(value: number | null, digits: number): string {
  if (value === null) return '–';
  const text = value.toFixed(digits);
  return (Number(text) === 0 ? (0).toFixed(digits) : text).replace('-', '−');
}
