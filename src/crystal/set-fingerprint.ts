import { operationSetKey } from './group.ts';
import type { SymmetryOperation } from './symmetry-operation.ts';

/**
 * Short text for a set of operations, independent of order: 32 bits by the FNV-1a rule over the sorted keys, in base
 * 36. Equal sets have equal fingerprints; the reverse must be checked on the operations.
 */
export function operationSetFingerprint(operations: readonly SymmetryOperation[]): string {
  const text = operationSetKey(operations);
  let hash = 0x811c9dc5;
  for (let index = 0; index < text.length; index += 1) {
    hash = Math.imul(hash ^ text.charCodeAt(index), 0x01000193);
  }
  return (hash >>> 0).toString(36);
}
