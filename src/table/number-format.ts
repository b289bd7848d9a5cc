import { wordFor } from '#src/base/count-of.ts';

/** A number with a fixed count of decimals and a true minus; −0.00 reads 0.00; null and non-finite numbers read "undefined". */
export function formatNumber(value: number | null | undefined, decimals: number): string {
  if (value === null || value === undefined || !Number.isFinite(value)) return 'undefined';
  const text = value.toFixed(decimals);
  const isZero = Number(text) === 0;
  return isZero ? text.replace('-', '') : text.replace('-', '−');
}

/** A figure of noise: three significant digits, in powers of ten when small; less than half of its last decimal is numerical dust, 0. */
export function formatSmall(value: number | null, decimals: number): string {
  if (value === null || !Number.isFinite(value)) return 'undefined';
  if (Math.abs(value) < 0.5 * 10 ** -decimals) return '0';
  if (Math.abs(value) >= 0.001) return formatNumber(value, Math.abs(value) >= 10 ? 1 : 3);
  const [mantissa = '', exponent = ''] = value.toExponential(1).split('e');
  return `${mantissa.replace('-', '−')} × 10${superscript(exponent.replace('+', ''))}`;
}

const superscripts: Readonly<Record<string, string>> = {
  '-': '⁻',
  '0': '⁰',
  '1': '¹',
  '2': '²',
  '3': '³',
  '4': '⁴',
  '5': '⁵',
  '6': '⁶',
  '7': '⁷',
  '8': '⁸',
  '9': '⁹',
};

/** Digits and signs raised: `27` → `²⁷`. */
export function superscript(text: string): string {
  return [...text].map((character) => superscripts[character] ?? character).join('');
}

/** `27Al` → `²⁷Al`. */
export function isotopeSymbol(isotope: string): string {
  const match = /^(\d+)(.*)$/.exec(isotope);
  return match ? superscript(match[1] ?? '') + (match[2] ?? '') : isotope;
}

/** Isotopes within a sentence raised: `1H has spin ½` → `¹H has spin ½`. Names of files and columns stay. */
export function raiseIsotopes(sentence: string): string {
  return sentence.replaceAll(/(?<![\w.])(\d{1,3})([A-Z][a-z]?)(?!\w|[-.]\w)/g, (isotope) =>
    isotopeSymbol(isotope),
  );
}

/** A direction or position: three numbers with true minus signs. */
export function formatTriple(values: readonly number[], decimals: number): string {
  return values.map((value) => formatNumber(value, decimals)).join(', ');
}

/** A position: at most `decimals` decimals, none that say nothing: 0.25 stays 0.25. */
export function formatPosition(values: readonly number[], decimals: number): string {
  return values.map((value) => formatNumber(value, decimals).replace(/\.?0+$/, '')).join(', ');
}

/** `1 atom`, `2 atoms`. */
export function counted(count: number, word: string): string {
  return `${formatCount(count)} ${wordFor(count, word)}`;
}

/** A symmetry operation with true minus signs. */
export function formatOperation(operation: string): string {
  return operation.replaceAll('-', '−').replaceAll(',', ', ').replaceAll(/, +/g, ', ');
}

/** 1,234,567 with thin spaces: 1 234 567. */
export function formatCount(count: number): string {
  return String(count).replace(/\B(?=(\d{3})+$)/g, '\u202f');
}

/** `-3m` → `3̄m`: a bar over the digit, as the symbols are printed. */
export function symmetrySymbol(symbol: string | null): string {
  return (symbol ?? '').replaceAll(/-(\d)/g, '$1\u0305');
}
