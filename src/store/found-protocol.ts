import type { FoundEntry, FoundGroup } from '#src/readers/text/found-text.ts';
import type { GroupQuestion } from '#src/readers/text/choose-groups.ts';
import type { ComponentOrder, TextChoice } from '#src/tensor/text-choice.ts';

export type { GroupQuestion } from '#src/readers/text/choose-groups.ts';
export type { ComponentOrder, TextChoice } from '#src/tensor/text-choice.ts';
export { noChoice } from '#src/tensor/text-choice.ts';

/** What was found in one text of no format of its own. */
export interface FoundSummary {
  readonly sourceId: string;
  readonly file: string;
  readonly groupCount: number;
  /** Of the groups that are taken. */
  readonly tensorCount: number;
  /** What the text leaves open and the user should answer. */
  readonly questionCount: number;
}

/** What one tensor gives under one reading; null where it gives none. */
export interface FoundValue {
  /** Shielding and shift, ppm. */
  readonly isotropicPpm: number | null;
  readonly spanPpm: number | null;
  /** EFG: Vzz in atomic units, asymmetry, and C_Q of the nuclide where it has a moment. */
  readonly vzz: number | null;
  readonly asymmetry: number | null;
  readonly couplingMHz: number | null;
  readonly isotope: string | null;
}

/** One tensor in the list of its group. */
export interface FoundEntryView extends Pick<
  FoundEntry,
  'line' | 'lastLine' | 'label' | 'element' | 'isComplete'
> {
  /** Place in its group, from 0. */
  readonly entry: number;
  /** Site of the crystal on screen that it stands on; null where it stands on none. */
  readonly siteIndex: number | null;
  readonly value: FoundValue;
  /** Kinds of printed values that agree with it. */
  readonly proofs: readonly string[];
}

/** A way to answer a question, with what the first tensors of the group would be. */
export interface FoundCandidate {
  readonly change: Partial<Pick<TextChoice, 'quantity' | 'unit' | 'order' | 'taken'>>;
  /** One for each entry of the group's `sample`; empty for “none of these”. */
  readonly values: readonly FoundValue[];
}

/** What the text leaves open, candidates side by side. */
export interface FoundQuestion {
  readonly kind: GroupQuestion;
  readonly candidates: readonly FoundCandidate[];
}

/** A group as the panel lists it. */
export interface FoundGroupView extends Pick<
  FoundGroup,
  'line' | 'shape' | 'quantity' | 'unit' | 'role' | 'roleWord' | 'evidence' | 'proposed'
> {
  /** Place among the groups of its text, from 0. */
  readonly group: number;
  readonly signature: string;
  readonly choice: TextChoice | null;
  /** What the text itself shows. */
  readonly asFound: Pick<FoundGroup, 'quantity' | 'unit' | 'proposed'>;
  readonly entryCount: number;
  /** The first few entries. */
  readonly sample: readonly FoundEntryView[];
  readonly questions: readonly FoundQuestion[];
  /** Orders that can be chosen. */
  readonly orders: readonly ComponentOrder[];
}

/** Everything that was found in one text. */
export interface FoundFileView {
  readonly sourceId: string;
  readonly file: string;
  readonly structureCount: number;
  readonly groups: readonly FoundGroupView[];
}

/** Some entries of one group. */
export interface FoundEntriesRequest {
  readonly sourceId: string;
  readonly group: number;
  readonly first: number;
  readonly count: number;
}

/** A stretch of lines that belongs to an entry. */
export interface FoundMark extends Pick<FoundEntry, 'line' | 'lastLine' | 'label'> {
  readonly group: number;
  readonly proposed: boolean;
  readonly siteIndex: number | null;
}

/** Lines of a file whose marks are asked for, first and last included. */
export interface FoundMarksRequest {
  readonly file: string;
  readonly first: number;
  readonly last: number;
}
