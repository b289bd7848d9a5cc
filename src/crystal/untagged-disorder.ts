import type { BondAtom } from './bond-atom.ts';
import type { BondingElement } from './bonding-rules.ts';

/** Atoms whose shares add up to more than this cannot all be alternatives of each other. */
const wholeShare = 1.01;

/**
 * Bonds without those between alternatives that the file does not mark by groups: two atoms that are there only part of
 * the time, could exclude each other by their occupancies, and hang on one common neighbour that excludes neither, as
 * the six half methyls of a tert-butyl group about a twofold axis. A real three-membered ring of that kind is lost.
 */
export function withoutUntaggedAlternatives<Link extends { readonly from: number; readonly to: number }>(
  atoms: readonly BondAtom[],
  elements: readonly BondingElement[],
  links: readonly Link[],
): Link[] {
  const share = (atom: number): number => atoms[atom]!.occupancy ?? 1;
  const mayBeSplit = (atom: number): boolean =>
    share(atom) < 0.99 && !atoms[atom]!.disorder?.group && elements[atom]!.class === 'nonmetal';
  const partial = links.some(({ from, to }) => mayBeSplit(from) && mayBeSplit(to));
  if (!partial) return [...links];
  const holders = new Map<number, Set<number>>();
  for (const { from, to } of links) {
    for (const [atom, other] of [[from, to] as const, [to, from] as const]) {
      if (!mayBeSplit(atom) || share(atom) + share(other) <= wholeShare) continue;
      holders.set(atom, (holders.get(atom) ?? new Set()).add(other));
    }
  }
  return links.filter(({ from, to }) => {
    if (!mayBeSplit(from) || !mayBeSplit(to) || share(from) + share(to) > wholeShare) return true;
    const others = holders.get(to);
    return ![...(holders.get(from) ?? [])].some((holder) => others?.has(holder));
  });
}
