import { countOf } from '#src/base/count-of.ts';
import { asMat3, scaleMatrix, transpose } from '#src/base/matrix3.ts';
import type { Mat3 } from '#src/base/matrix3.ts';
import type { Problem } from '#src/base/problem.ts';
import { problem } from '#src/base/problem.ts';
import type { EfgUnit } from '#src/tensor/units.ts';
import { efgUnitLabel } from '#src/tensor/units.ts';
import type { FoundEntry, FoundGroup, FoundText } from './found-text.ts';
import { fromSix } from './row-finder.ts';
import { sixOrders } from './six-order.ts';
import type { ComponentOrder, TextChoice } from '#src/tensor/text-choice.ts';

/** What a text leaves open about a group that would be used. */
export type GroupQuestion = 'quantity' | 'unit' | 'order';

/** What has to be asked about a group before it can be used, or should be because it was assumed. */
export function questionsOf(group: FoundGroup): GroupQuestion[] {
  const { role, quantity, proposed, unit, isOrderProved, choice } = group;
  if (choice?.taken === false) return [];
  if (quantity === 'unknown') return role === 'unknown' || proposed ? ['quantity'] : [];
  if (!proposed) return [];
  const isOrderOpen = isOrderProved === false && !choice?.order;
  return [...(unit === 'unknown' ? ['unit' as const] : []), ...(isOrderOpen ? ['order' as const] : [])];
}

/** Row-major tensor of an entry as an order and sign make it of what was found. */
export function reordered(
  tensor: Mat3,
  found: Pick<FoundGroup, 'sixOrder'>,
  order: ComponentOrder | null,
  sign: 1 | -1,
): Mat3 {
  const placed = inOrder(tensor, found.sixOrder ?? null, order);
  return sign === 1 ? placed : scaleMatrix(-1, placed);
}

function inOrder(tensor: Mat3, from: readonly number[] | null, order: ComponentOrder | null): Mat3 {
  if (order === null) return tensor;
  if (order === 'exchanged') return transpose(tensor);
  const to = sixOrders.find(([name]) => name === order)?.[1];
  if (!to || from === null) return tensor;
  return asMat3(
    fromSix(
      from.map((place) => tensor[place]!),
      to,
    ),
  );
}

/** Quantity and unit of a group under a choice: a quantity that was changed takes no unit of another one along. */
export function quantityAndUnit(
  group: Pick<FoundGroup, 'quantity' | 'unit'>,
  choice: Pick<TextChoice, 'quantity' | 'unit'>,
): Pick<FoundGroup, 'quantity' | 'unit'> {
  const quantity = choice.quantity ?? group.quantity;
  if (quantity === 'shielding' || quantity === 'shift') return { quantity, unit: 'ppm' };
  const unit = choice.unit ?? group.unit;
  return { quantity, unit: quantity === 'efg' && unit === 'ppm' ? 'unknown' : unit };
}

/**
 * A text as its user wants it read: choices apply to every group with their signature. A group taken by hand takes the place of
 * others of its quantity that hold the same atoms; of several taken by hand the one chosen last stays. Raises `find-choice-used` for
 * choices made in another text; takes back what was asked and is answered.
 */
export function withChoices(found: FoundText, choices: readonly TextChoice[]): FoundText {
  const ranks = new Map(choices.map((choice, rank) => [choice.signature, { choice, rank }]));
  const ranked = found.groups.map((group) => ranks.get(group.signature ?? '') ?? null);
  if (ranked.every((one) => one === null)) return found;
  const chosen = found.groups.map((group, at) => {
    const { choice } = ranked[at] ?? {};
    return choice ? chosenGroup(group, choice) : group;
  });
  const standing = withoutRivals(
    chosen,
    ranked.map((one) => one?.rank ?? -1),
  );
  return { ...found, groups: standing, problems: problemsOf(found, standing) };
}

function chosenGroup(group: FoundGroup, choice: TextChoice): FoundGroup {
  const { order, sign, taken } = choice;
  const { quantity, unit } = quantityAndUnit(group, choice);
  const isAnswer = group.role === 'unknown' && quantity !== 'unknown';
  const isChanged = order !== null || sign === -1;
  return {
    ...group,
    choice,
    quantity,
    unit,
    role: isAnswer || (taken === true && group.role === 'decoy') ? 'total' : group.role,
    roleWord: isAnswer ? null : group.roleWord,
    proposed: taken ?? (group.proposed || isAnswer),
    reason: `${choiceInWords(choice)}; ${group.reason}`,
    evidence: [choiceInWords(choice), ...group.evidence],
    entries: isChanged
      ? group.entries.map((entry) => ({
          ...entry,
          tensor: reordered(entry.tensor, group, order, sign),
          // printed values proved another reading
          matched: [],
        }))
      : group.entries,
  };
}

/** What was chosen, for reasons and notes: `chosen: EFG in a.u., with the other sign`. */
export function choiceInWords({ quantity, unit, sign, order, taken }: TextChoice): string {
  const parts = [
    quantity === null ? null : quantity === 'efg' ? 'EFG' : quantity,
    unit === null ? null : `in ${unit === 'ppm' ? unit : efgUnitLabel[unit as EfgUnit]}`,
    order === null ? null : order === 'exchanged' ? 'rows and columns exchanged' : `order ${order}`,
    sign === -1 ? 'with the other sign' : null,
    taken === null ? null : taken ? 'taken' : 'not taken',
  ].filter((part) => part !== null);
  return `chosen: ${parts.join(', ')}`;
}

/** Atoms by the name under which groups of one text share them. */
const atomOf = ({ element, index, label }: FoundEntry): string =>
  index === null ? `label ${label ?? ''}` : `${element ?? ''} ${index}`;

const familyOf = ({ quantity }: FoundGroup): string => (quantity === 'shift' ? 'shielding' : quantity);

/** A group taken by hand stands for its atoms: others of the quantity with one of them are not taken any more. */
function withoutRivals(groups: readonly FoundGroup[], ranks: readonly number[]): FoundGroup[] {
  const byHand = groups
    .map((group, at) => ({ group, rank: ranks[at]! }))
    .filter(({ group }) => group.choice?.taken === true)
    .sort((one, other) => other.rank - one.rank);
  const holders = new Map<string, FoundGroup>();
  for (const { group } of byHand)
    for (const entry of group.entries) {
      const atom = `${familyOf(group)} ${atomOf(entry)}`;
      if (!holders.has(atom)) holders.set(atom, group);
    }
  if (holders.size === 0) return [...groups];
  return groups.map((group) => {
    if (!group.proposed) return group;
    const family = familyOf(group);
    const holder = group.entries
      .map((entry) => holders.get(`${family} ${atomOf(entry)}`))
      .find((one) => one !== undefined && one !== group);
    if (!holder) return group;
    const why = `line ${holder.line} was taken in its place`;
    return {
      ...group,
      proposed: false,
      evidence: [...group.evidence, why],
      reason: `${group.reason}; ${why}`,
    };
  });
}

/** Problems that ask what may have been answered since. */
const asking: Readonly<Record<string, GroupQuestion>> = {
  'find-quantity-open': 'quantity',
  'find-unit-open': 'unit',
  'find-order-assumed': 'order',
};

function problemsOf({ file, problems }: FoundText, groups: readonly FoundGroup[]): Problem[] {
  const chosen = groups.filter(({ choice }) => choice !== undefined);
  const still = problems.filter(({ code, line }) => {
    const question = asking[code];
    const group = chosen.find((one) => one.line === line);
    return !question || !group || questionsOf(group).includes(question);
  });
  const isAsked = (line: number): boolean =>
    still.some((one) => one.code === 'find-unit-open' && one.line === line);
  const added = chosen.flatMap((group): Problem[] => {
    const { choice, line, entries } = group;
    const place = { file, line };
    const found: Problem[] = [];
    if (questionsOf(group).includes('unit') && !isAsked(line)) {
      const hint = 'Choose the unit; they are not used until then.';
      const message = 'The unit of these field gradients is not known.';
      found.push(
        problem('warning', 'find-unit-open', message, { place, hint, allowed: 'au, 1e21V/m2, V/A2' }),
      );
    }
    if (choice && choice.file !== file) {
      const from = choice.file === null ? 'An earlier choice' : `The choice made in ${choice.file}`;
      const message = `${from} was used for ${countOf(entries.length, 'tensor')}: ${choiceInWords(choice).replace('chosen: ', '')}.`;
      const hint = 'Under Found it can be changed or taken back.';
      found.push(problem('note', 'find-choice-used', message, { place, hint }));
    }
    return found;
  });
  return [...still, ...added];
}
