import type { Mat3 } from '#src/base/matrix3.ts';
import type { SymmetryOperation } from './symmetry-operation.ts';
import {
  composeOperations,
  identityOperation,
  invertOperation,
  normalizeOperation,
  operationKey,
  rotationKey,
} from './symmetry-operation.ts';

/** Largest number of operations a closure may reach: 192 (the largest conventional cell) in a cell enlarged eightfold. */
export const groupLimit = 1536;

/** The operations normalised and without repetitions, identity first (put in where it was missing), else in the order given. */
export function uniqueOperations(operations: readonly SymmetryOperation[]): SymmetryOperation[] {
  const found = new Map([[operationKey(identityOperation), identityOperation]]);
  for (const operation of operations) {
    const normal = normalizeOperation(operation);
    const key = operationKey(normal);
    if (!found.has(key)) found.set(key, normal);
  }
  return [...found.values()];
}

/** A growing group: members by key, in order. */
interface Closure {
  readonly members: SymmetryOperation[];
  readonly keys: Set<string>;
}

function include(closure: Closure, operation: SymmetryOperation): boolean {
  const key = operationKey(operation);
  if (closure.keys.has(key)) return false;
  closure.keys.add(key);
  closure.members.push(operation);
  return true;
}

/**
 * Adds one generator to a closed set: the products of all members with words in the generators, coset by coset
 * (Dimino's scheme), so that every member is made once per generator instead of once per pair.
 */
function extend(closure: Closure, generators: readonly SymmetryOperation[], limit: number): boolean {
  const subgroup = [...closure.members];
  const representatives = [generators.at(-1)!];
  for (let next = 0; next < representatives.length; next += 1) {
    const representative = representatives[next]!;
    if (closure.keys.has(operationKey(representative))) continue;
    for (const member of subgroup) include(closure, composeOperations(member, representative));
    if (closure.members.length > limit) return false;
    for (const generator of generators) representatives.push(composeOperations(representative, generator));
  }
  return true;
}

/**
 * The group that the operations generate modulo lattice translations, identity first and the given ones before the
 * added ones; null where it would pass `limit` members (default 1536), as happens with translations that are no
 * fractions of the cell.
 */
export function closeGroup(
  operations: readonly SymmetryOperation[],
  limit: number = groupLimit,
): SymmetryOperation[] | null {
  const given = uniqueOperations(operations);
  if (given.length > limit) return null;
  const closure: Closure = { members: [], keys: new Set() };
  include(closure, identityOperation);
  const generators: SymmetryOperation[] = [];
  for (const operation of given) {
    if (closure.keys.has(operationKey(operation))) continue;
    generators.push(operation);
    if (!extend(closure, generators, limit)) return null;
  }
  const listed = new Set(given.map(operationKey));
  return [...given, ...closure.members.filter((member) => !listed.has(operationKey(member)))];
}

/** What is wrong with a list of operations, if anything. */
export interface GroupCheck {
  /** True when products of any two, and inverses, are in the list (modulo lattice translations). */
  readonly closed: boolean;
  /** What the list lacks; empty when closed, and when the closure passes `groupLimit`. */
  readonly missing: readonly SymmetryOperation[];
  readonly hasIdentity: boolean;
  /** Indices of entries that repeat an earlier one. */
  readonly duplicates: readonly number[];
  /** Indices of entries whose inverse is not in the list. */
  readonly withoutInverse: readonly number[];
  /** True when the operations generate more than `groupLimit` members. */
  readonly unbounded: boolean;
}

/** Checks a list as it stands in a file: identity, repetitions, inverses, closure. Cheap for 192 operations. */
export function isClosed(operations: readonly SymmetryOperation[]): GroupCheck {
  const keys = operations.map(operationKey);
  const present = new Set(keys);
  const hasIdentity = present.has(operationKey(identityOperation));
  const group = closeGroup(operations);
  const missing = (group ?? []).filter((operation) => !present.has(operationKey(operation)));
  const first = new Map<string, number>();
  for (const [index, key] of keys.entries()) if (!first.has(key)) first.set(key, index);
  return {
    closed: group !== null && missing.length === 0,
    missing,
    hasIdentity,
    duplicates: keys.flatMap((key, index) => (first.get(key) === index ? [] : [index])),
    withoutInverse: operations.flatMap((operation, index) =>
      present.has(operationKey(invertOperation(operation))) ? [] : [index],
    ),
    unbounded: group === null,
  };
}

/** One text for a whole set, independent of order and repetition: equal just when two sets are alike modulo lattice translations. */
export function operationSetKey(operations: readonly SymmetryOperation[]): string {
  return [...new Set(operations.map(operationKey))].sort().join(';');
}

/** The different rotation parts of the operations, in order of appearance. */
export function distinctRotations(operations: readonly SymmetryOperation[]): Mat3[] {
  const found = new Map<number, Mat3>();
  for (const { rotation } of operations) {
    const key = rotationKey(rotation);
    if (!found.has(key)) found.set(key, rotation);
  }
  return [...found.values()];
}
