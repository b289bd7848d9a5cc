import type { Mat3 } from '#src/base/matrix3.ts';
import { frobeniusNorm, trace } from '#src/base/matrix3.ts';
import type { ColumnProposal } from '#src/readers/reading.ts';

interface NameRule {
  readonly pattern: RegExp;
  readonly quantity: ColumnProposal['quantity'];
  readonly because: string;
}

/** What a column's name tells. Decoys come first: many quantities have nine components. */
const nameRules: readonly NameRule[] = [
  {
    pattern: /stress|virial|strain|born|charge|polari[sz]|hyperfine|suscept|hess|dipol|deform|adp|disp|rot/,
    quantity: 'unknown',
    because: 'the name means something other than a shielding or a field gradient',
  },
  { pattern: /efg|gradient|grad|quadrup/, quantity: 'efg', because: 'the name means a field gradient' },
  { pattern: /shift|delta/, quantity: 'shift', because: 'the name means a shift' },
  { pattern: /shield|sigma|nmr|csa|mag/, quantity: 'shielding', because: 'the name means a shielding' },
];

/** A trace this small against the norm counts as zero: what printing with four digits leaves. */
const tracelessShare = 2e-3;

/**
 * What a nine-component column with a name of its own would be read as, judged by its name, its traces and its size.
 * The numbers may overrule the name: a field gradient has no trace.
 */
export function guessColumn(
  name: string,
  tensors: readonly Mat3[],
): Pick<ColumnProposal, 'quantity' | 'reason'> {
  const rule = nameRules.find(({ pattern }) => pattern.test(name.toLowerCase()));
  if (tensors.length === 0) {
    return { quantity: 'unknown', reason: 'no row of it could be read' };
  }
  const norms = tensors.map(frobeniusNorm);
  const largest = norms.reduce((most, norm) => Math.max(most, norm), 0);
  if (largest === 0) return { quantity: 'unknown', reason: 'all its numbers are zero' };
  const traceless = tensors.every((tensor) => Math.abs(trace(tensor)) <= tracelessShare * largest);
  const mean = tensors.reduce((sum, tensor) => sum + trace(tensor) / 3, 0) / tensors.length;
  const size = `the largest tensor has a norm of ${largest.toPrecision(3)}`;
  const seen = traceless
    ? `every trace is zero, as of a field gradient; ${size}`
    : `traces are not zero, the mean third of the trace is ${mean.toPrecision(4)}; ${size}`;
  if (rule === undefined) {
    return { quantity: traceless ? 'efg' : 'unknown', reason: `the name tells nothing; ${seen}` };
  }
  if (rule.quantity === 'unknown') return { quantity: 'unknown', reason: `${rule.because}; ${seen}` };
  const agrees = traceless === (rule.quantity === 'efg');
  return {
    quantity: agrees ? rule.quantity : 'unknown',
    reason: `${rule.because}${agrees ? ' and' : ', but'} ${seen}`,
  };
}
