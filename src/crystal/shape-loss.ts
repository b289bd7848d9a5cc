import { distinctRotations } from './group.ts';
import type { SpaceGroupSetting } from './space-group-settings.ts';
import { operationsOfSetting } from './space-group-settings.ts';
import type { SymmetryOperation } from './symmetry-operation.ts';

/**
 * What a cell cannot hold by its shape: a crystal repeated 2 × 1 × 1 still has its threefold axis, but the doubled
 * lattice has not, and no operation with whole-numbered rotation part can express it in that cell.
 */
export interface ShapeLoss {
  /** International Tables number of the crystal's group. */
  readonly number: number;
  /** Short symbol of that group's type. */
  readonly hermannMauguin: string;
  /** How many primitive cells of the crystal the given cell holds. */
  readonly primitiveCells: number;
  /** Operations that the crystal's group has modulo translations of the given cell. */
  readonly operations: number;
  /** How many of them the given cell cannot hold; at least 1. */
  readonly lostOperations: number;
  /** Into how many orbits the crystal's group sorts the atoms. */
  readonly orbits: number;
}

/** Compares the operations that a cell holds with the group of the crystal in it; null where its shape keeps all of it. */
export function shapeLoss(
  setting: SpaceGroupSetting,
  operations: readonly SymmetryOperation[],
  crystalOrbits: readonly number[],
): ShapeLoss | null {
  const kept = distinctRotations(operations).length;
  const all = distinctRotations(operationsOfSetting(setting)).length;
  if (kept >= all) return null;
  const primitiveCells = operations.length / kept;
  return {
    number: setting.number,
    hermannMauguin: setting.hermannMauguinShort,
    primitiveCells,
    operations: all * primitiveCells,
    lostOperations: (all - kept) * primitiveCells,
    orbits: new Set(crystalOrbits).size,
  };
}
