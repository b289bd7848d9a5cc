import type { Mat3 } from '#src/base/matrix3.ts';
import type { Problem } from '#src/base/problem.ts';
import type { EfgUnit } from '#src/tensor/units.ts';
import type { FoundStructure } from './found-structure.ts';
import type { PrintedValue, TensorShape } from './raw-tensor.ts';
import type { TextChoice } from '#src/tensor/text-choice.ts';

/** A value printed with a tensor, beside what its numbers give. */
export interface MatchedValue {
  readonly kind: PrintedValue['kind'];
  readonly printed: readonly number[];
  readonly line: number;
}

/** One tensor of a group. */
export interface FoundEntry {
  /** First line of its numbers. */
  readonly line: number;
  readonly lastLine: number;
  /** As the text names the atom, else element and number. */
  readonly label: string | null;
  readonly element: string | null;
  /** From 1: within the element where the text counts so, else over all atoms. */
  readonly index: number | null;
  /** Row of the text's own structure, from 0; null without one or where it holds no such atom. */
  readonly atomIndex: number | null;
  /** Row-major as printed or named; NaN for components that were not computed or did not fit their field. */
  readonly tensor: Mat3;
  readonly isComplete: boolean;
  /** Printed values that agree with the tensor: they prove how it was read. */
  readonly matched: readonly MatchedValue[];
}

/** What a group is among others of its kind. */
export type GroupRole =
  'total' | 'contribution' | 'symmetrised' | 'raw' | 'earlier' | 'repeated' | 'decoy' | 'unknown';

/** Tensors of one shape under one heading. */
export interface FoundGroup {
  /** Of the first tensor. */
  readonly line: number;
  readonly shape: TensorShape;
  readonly quantity: 'shielding' | 'shift' | 'efg' | 'unknown';
  readonly unit: 'ppm' | EfgUnit | 'unknown';
  /** What led to quantity and unit, and to the role where it is none of the totals. */
  readonly reason: string;
  /** The same in pieces, strongest first. */
  readonly evidence: readonly string[];
  readonly role: GroupRole;
  /** A word that tells it from others: `dia`, `susceptibility`. */
  readonly roleWord: string | null;
  /** True for what is to be taken unless the user says otherwise. */
  readonly proposed: boolean;
  /** Index into the structures of the text of the one its atoms belong to. */
  readonly structureIndex: number | null;
  readonly entries: readonly FoundEntry[];
  /** Shape and words, by which a choice of the user finds groups of the same kind in other texts. */
  readonly signature?: string;
  /** Places (0 to 8, row-major) in which six printed components were put; null where nine stand there. */
  readonly sixOrder?: readonly number[] | null;
  /** False where that order was assumed. */
  readonly isOrderProved?: boolean;
  /** What the user chose; `quantity`, `unit`, `proposed` and the tensors are as it says. */
  readonly choice?: TextChoice;
}

/** Tensors and structures of any text. Plain data. */
export interface FoundText {
  readonly file: string;
  readonly groups: readonly FoundGroup[];
  readonly structures: readonly FoundStructure[];
  readonly problems: readonly Problem[];
}
