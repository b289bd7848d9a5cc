import { html } from 'lit';
import type { TemplateResult } from 'lit';
import { efgUnitLabel } from '#src/store/efg-units.ts';
import type {
  FoundCandidate,
  FoundGroupView,
  FoundQuestion,
  FoundValue,
  TextChoice,
} from '#src/store/found-protocol.ts';
import { formatNumber, formatSmall, isotopeSymbol } from '#src/table/number-format.ts';

type Quantity = FoundGroupView['quantity'];
type Unit = FoundGroupView['unit'];

export const quantityNames: Readonly<Record<Quantity, string>> = {
  shielding: 'shielding',
  shift: 'shift',
  efg: 'EFG',
  unknown: 'quantity open',
};

export const shapeNames: Readonly<Record<FoundGroupView['shape'], string>> = {
  block: '3 × 3 block',
  row: 'nine on a row',
  six: 'six components',
  principal: 'values and axes',
};

const roleNames: Readonly<Record<FoundGroupView['role'], string>> = {
  total: 'left aside',
  contribution: 'contribution',
  symmetrised: 'symmetrised',
  raw: 'not symmetrised',
  earlier: 'earlier',
  repeated: 'printed again',
  decoy: 'something else',
  unknown: 'not settled',
};

export function unitName(unit: Unit): string {
  if (unit === 'ppm') return 'ppm';
  return unit === 'unknown' ? 'unit open' : efgUnitLabel[unit];
}

/** What became of a group, for its chip. */
export function fateOf({ proposed, quantity, unit, role, questions }: FoundGroupView): string {
  const isOpen = questions.some(({ kind }) => kind !== 'order');
  if (isOpen || (proposed && (quantity === 'unknown' || unit === 'unknown'))) return 'asks';
  return proposed ? 'taken' : roleNames[role];
}

/** The numbers that tell readings apart: isotropic value and span, or C_Q and η. */
export function valueText(value: FoundValue): string {
  const { isotropicPpm, spanPpm, vzz, asymmetry, couplingMHz } = value;
  if (isotropicPpm !== null) {
    const span = spanPpm === null ? '' : `, Ω ${formatNumber(spanPpm, 2)}`;
    return `${formatNumber(isotropicPpm, 2)} ppm${span}`;
  }
  if (vzz === null) return asymmetry === null ? '–' : `η ${formatNumber(asymmetry, 3)}`;
  const eta = asymmetry === null ? '' : `, η ${formatNumber(asymmetry, 3)}`;
  return couplingMHz === null
    ? `Vzz ${formatSmall(vzz, 6)} a.u.${eta}`
    : `${formatNumber(couplingMHz, 3)} MHz${eta}`;
}

/** What `valueText` shows, for the head of a column. */
export function valueHeading(
  { quantity, unit }: Pick<FoundGroupView, 'quantity' | 'unit'>,
  values: readonly FoundValue[],
): TemplateResult {
  if (quantity === 'shielding') return html`σ<sub>iso</sub>, span`;
  if (quantity === 'shift') return html`δ<sub>iso</sub>, span`;
  if (quantity === 'unknown' || unit === 'unknown') return html`value`;
  const isotopes = new Set(values.flatMap(({ isotope }) => (isotope === null ? [] : [isotope])));
  const [only] = isotopes.size === 1 ? isotopes : [null];
  return html`C<sub>Q</sub>${only ? ` of ${isotopeSymbol(only)}` : ''}, η`;
}

export const questionSentences: Readonly<Record<FoundQuestion['kind'], string>> = {
  quantity: 'The text does not settle what these are. They are not used until you say so.',
  unit: 'The text names no unit for these. They are not used until you choose one.',
  order:
    'Nothing in the text proves the order of the six components. The first is in use until you say otherwise.',
};

/** A way to answer in words: `EFG in a.u.`. */
export function candidateName({ quantity, unit, order, taken }: FoundCandidate['change']): string {
  if (taken === false) return 'none of these';
  if (order) return order;
  const named = quantity ? quantityNames[quantity] : '';
  const inUnit = unit && unit !== 'ppm' ? unitName(unit) : '';
  return [named, inUnit].filter((part) => part !== '').join(' in ');
}

/** Behind “Undo”: `read line 12 as EFG in a.u.`. */
export function choiceName(line: number, change: Partial<TextChoice>): string {
  if (change.taken !== undefined) {
    if (change.taken === null) return `read line ${line} as found`;
    return change.taken ? `take the tensors of line ${line}` : `leave line ${line} aside`;
  }
  if (change.sign !== undefined) return `${change.sign === 1 ? 'keep' : 'turn'} the sign of line ${line}`;
  if (change.order === 'exchanged') return `exchange rows and columns of line ${line}`;
  const words = candidateName(change);
  return `read line ${line} as ${words === '' ? 'found' : words}`;
}
