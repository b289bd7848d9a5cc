import type { Problem } from '#src/base/problem.ts';
import type { PackedPicks } from '#src/scene/packed-picks.ts';
import type { Scene } from '#src/scene/scene.ts';
import type { AcceptedColumns } from '#src/readers/xyz/column-plan.ts';
import type { DossierSettings } from '#src/dossier/dossier.ts';
import type { TextChoice } from '#src/tensor/text-choice.ts';
import type { Quantity } from '#src/tensor/tensor-set.ts';
import type { CrystalSummary } from './crystal-summary.ts';
import type { FoundSummary } from './found-protocol.ts';
import type { Query, QueryAnswer } from './engine-queries.ts';

/** One file the user gave. The blob holds the bytes as they were; it crosses to the worker without a copy. */
export interface SourceFile {
  /** Unique in the session; two files may share a name. */
  readonly id: string;
  readonly name: string;
  readonly blob: Blob;
}

/** Which structure of which file is *the crystal*. */
export interface StructureChoice {
  readonly sourceId: string;
  readonly index: number;
}

/** Everything a derivation depends on: the same input gives the same case. */
export interface CaseInput {
  readonly sources: readonly SourceFile[];
  /** null takes the first structure of the first file that holds one. */
  readonly structure: StructureChoice | null;
  readonly settings: DossierSettings;
  /** Proposed columns the user took, by source id. */
  readonly accepted?: Readonly<Record<string, AcceptedColumns>>;
  /** How tensors found in texts are read. */
  readonly textChoices?: readonly TextChoice[];
  /** What was found amiss in the case file these come from; listed first. */
  readonly openingProblems?: readonly Problem[];
}

export interface SourceSummary {
  readonly id: string;
  readonly name: string;
  readonly format: 'cif' | 'xyz' | 'text' | 'unknown';
  readonly bytes: number;
  readonly lines: number;
}

/** One structure that can be chosen. */
export interface StructureSummary extends StructureChoice {
  readonly name: string;
  readonly file: string;
  readonly line: number;
  readonly siteCount: number;
  readonly formula: string | null;
  readonly periodic: boolean;
}

export interface TensorSummary {
  readonly sourceId: string;
  readonly name: string;
  readonly quantity: Quantity;
  readonly unitGiven: string;
  readonly entryCount: number;
  /** False when the set belongs to another structure than the chosen one. */
  readonly used: boolean;
}

/** A column of nine numbers an atom that is not one of ours: shown, never taken unasked. */
export interface ProposalSummary {
  readonly sourceId: string;
  readonly name: string;
  readonly line: number;
  readonly quantity: Quantity | 'unknown';
  readonly reason: string;
}

/** What the engine makes of a case. `crystal` is null when the files hold no structure. */
export interface DerivedCase {
  /** Under this number the crystal's sites, rows and pictures are asked for. */
  readonly derivation: number;
  readonly sources: readonly SourceSummary[];
  readonly structures: readonly StructureSummary[];
  readonly tensors: readonly TensorSummary[];
  readonly proposals: readonly ProposalSummary[];
  /** Absent where no text was searched. */
  readonly found?: readonly FoundSummary[];
  readonly chosen: StructureChoice | null;
  readonly crystal: CrystalSummary | null;
  readonly problems: readonly Problem[];
}

/** Lines of a source text, for the text view. */
export interface LinePage {
  /** Number of the first line, from 1. */
  readonly first: number;
  /** Lines without their ending; a line longer than 2,000 characters is cut and ends in `…`. */
  readonly lines: readonly string[];
  readonly total: number;
}

export type EngineRequest =
  | { readonly id: number; readonly kind: 'derive'; readonly input: CaseInput }
  | {
      readonly id: number;
      readonly kind: 'query';
      readonly derivation: number;
      /** What the derivation was made from, for an engine that was started afresh since. */
      readonly input: CaseInput;
      readonly query: Query;
    }
  | {
      readonly id: number;
      readonly kind: 'lines';
      readonly source: SourceFile;
      readonly first: number;
      readonly count: number;
    };

/** A picture on its way: typed arrays, which are given over, and little else. */
export type SentScene = Omit<Scene, 'picks'> & { readonly picks: PackedPicks };

export type EngineReply =
  | { readonly id: number; readonly kind: 'progress'; readonly share: number; readonly stage: string }
  | { readonly id: number; readonly kind: 'derived'; readonly result: DerivedCase }
  | { readonly id: number; readonly kind: 'answer'; readonly answer: QueryAnswer }
  | { readonly id: number; readonly kind: 'scene'; readonly scene: SentScene }
  | { readonly id: number; readonly kind: 'lines'; readonly page: LinePage }
  | { readonly id: number; readonly kind: 'failed'; readonly message: string };
