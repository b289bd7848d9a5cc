import { closeGroup, uniqueOperations } from './group.ts';
import type { SymmetryOperation } from './symmetry-operation.ts';
import { composeOperations, operationKey } from './symmetry-operation.ts';

/** A set of operation indices taken as a subgroup, with one operation of each left coset. */
export interface SubgroupCosets {
  /** The smallest index of each left coset g·S, ascending: one operation for each image of a site with stabiliser S. */
  readonly representatives: readonly number[];
  /** False where the set is no group (its products leave it): the representatives are then those of no partition. */
  readonly isSubgroup: boolean;
}

/** What is worked out once for a list of operations. */
export interface GroupTable {
  /** True when the list is a group without repetitions, modulo lattice translations. */
  readonly isGroup: boolean;
  /** Index of the product "first b, then a"; null where the list lacks it. */
  readonly product: (a: number, b: number) => number | null;
  readonly cosets: (subgroup: readonly number[]) => SubgroupCosets;
}

const tables = new WeakMap<readonly SymmetryOperation[], GroupTable>();

function isGroupList(operations: readonly SymmetryOperation[]): boolean {
  if (uniqueOperations(operations).length !== operations.length) return false;
  return closeGroup(operations, operations.length)?.length === operations.length;
}

function cosetsOf(subgroup: readonly number[], size: number, product: GroupTable['product']): SubgroupCosets {
  const members = new Set(subgroup);
  const isSubgroup = subgroup.every((a) => subgroup.every((b) => members.has(product(a, b) ?? -1)));
  const taken = new Uint8Array(size);
  const representatives: number[] = [];
  for (let index = 0; index < size; index += 1) {
    if (taken[index]) continue;
    representatives.push(index);
    for (const member of subgroup) taken[product(index, member) ?? index] = 1;
  }
  return { representatives, isSubgroup };
}

function makeTable(operations: readonly SymmetryOperation[]): GroupTable {
  const indexOf = new Map(operations.map((operation, index) => [operationKey(operation), index]));
  const product = (a: number, b: number): number | null =>
    indexOf.get(operationKey(composeOperations(operations[a]!, operations[b]!))) ?? null;
  const known = new Map<string, SubgroupCosets>();
  const cosets = (subgroup: readonly number[]): SubgroupCosets => {
    const key = subgroup.join();
    const made = known.get(key) ?? cosetsOf(subgroup, operations.length, product);
    known.set(key, made);
    return made;
  };
  return { isGroup: isGroupList(operations), product, cosets };
}

/** The table of a list of operations, made on first use and kept as long as the very same array lives. */
export function groupTable(operations: readonly SymmetryOperation[]): GroupTable {
  const known = tables.get(operations);
  if (known) return known;
  const made = makeTable(operations);
  tables.set(operations, made);
  return made;
}
