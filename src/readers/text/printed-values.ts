import type { PrintedValue } from './raw-tensor.ts';

const num = String.raw`([+-]?(?:\d+\.?\d*|\.\d+)(?:[eEdD][+-]?\d+)?)`;
const gap = String.raw`[^\d+\-\n]{0,28}?[\s:=(|>"']*`;

const singles: readonly (readonly [PrintedValue['kind'], RegExp])[] = [
  [
    'isotropic',
    new RegExp(
      String.raw`(?:(?<!an)\biso(?:trop(?:ic|y))?\b|[_σδ]_?iso\b|\bsigma(?=\s*[:=])|trace\s*/\s*3|\baverage\b)${gap}${num}`,
      'giu',
    ),
  ],
  ['anisotropy', new RegExp(String.raw`\baniso(?:trop(?:y|ic))?\b${gap}${num}`, 'giu')],
  ['asymmetry', new RegExp(String.raw`(?:\basymm?(?:etry)?\b|\beta\b|η)${gap}${num}`, 'giu')],
  ['span', new RegExp(String.raw`(?:\bspan\b|Ω)${gap}${num}`, 'giu')],
  ['skew', new RegExp(String.raw`(?:\bskew\b|κ)${gap}${num}`, 'giu')],
  [
    'coupling',
    new RegExp(
      String.raw`(?:\bc_?q\b|\be\*{0,2}2\s?q\s?q(?:/h)?|\be²qQ(?:/h)?|\bn?qcc\b|coupling(?: constant)?)${gap}${num}(?=\s*\(?\s*[kM]?Hz|\s*$)`,
      'giu',
    ),
  ],
  [
    'principal',
    new RegExp(
      String.raw`(?:eigenvalue|principal value)\w*\s+[\p{L}_]*\d*${gap}${num}(?:\s*\(?\p{L}+\)?)?\s*$`,
      'giu',
    ),
  ],
  ['principal', new RegExp(String.raw`(?:sigma|σ|v|delta|δ|s)_?(?:11|22|33)\b\s*[:=]\s*${num}`, 'giu')],
  ['moment', new RegExp(String.raw`\bq\s*=\s*${num}(?=\s*\(?(?:mb|barn|millibarn|b|fm))`, 'giu')],
];
const triple = new RegExp(
  String.raw`(?:eigen-?values?|principal (?:values?|components?)|diagonal(?:i[sz]ed)?(?: \w+)?)[^\d+\-]{0,30}?[\s:=([]*${num}[\s,;]+${num}[\s,;]+${num}(?![\s,]*[\d.])`,
  'iu',
);
const telling =
  /iso|sigma|trace|average|asym|eta|η|span|skew|Ω|κ|c_?q|qq|qcc|coupling|eigen|princip|diagonal|[σδvs]_?[123][123]|\bq\s*=/iu;

/** False where no line of these words can hold such a value. */
export function mayHoldPrinted(text: string): boolean {
  return telling.test(text);
}

/** Totals and principal values that a line prints beside a tensor: what its reading is proved by. */
export function printedIn(text: string, line: number): PrintedValue[] {
  if (text.length > 400 || !telling.test(text) || !/\d/.test(text)) return [];
  const found: PrintedValue[] = [];
  const three = triple.exec(text);
  if (three) found.push(printed('principal', three.slice(1, 4), line));
  for (const [kind, pattern] of singles) {
    if (kind === 'principal' && three) continue;
    for (const match of text.matchAll(pattern)) {
      const value = match[1] ?? '';
      const plain = kind === 'coupling' && /^\s*\(?\s*kHz/i.test(text.slice(match.index + match[0].length));
      found.push(printed(kind, [value], line, plain ? 1e-3 : 1));
    }
  }
  return found;
}

function printed(
  kind: PrintedValue['kind'],
  texts: readonly string[],
  line: number,
  factor = 1,
): PrintedValue {
  return {
    kind,
    values: texts.map((text) => Number(text.replace(/[dD]/, 'e')) * factor),
    line,
    digits: digitsOf(texts[0] ?? '') + (factor === 1 ? 0 : 3),
  };
}

/** Digits after the point, the exponent counted in. */
export function digitsOf(text: string): number {
  const [, fraction = '', exponent = '0'] = /^[^.]*\.?(\d*)(?:[eEdD]([+-]?\d+))?/.exec(text) ?? [];
  return Math.max(0, fraction.length - Number(exponent));
}
