import type { DossierSettings } from '#src/dossier/dossier.ts';
import type { Camera } from '#src/scene/camera.ts';
import type { Look } from '#src/scene/look.ts';
import type { Measurement } from '#src/scene/measurement.ts';
import type { SavedView } from '#src/scene/saved-view.ts';
import type { SceneOptions } from '#src/scene/scene-options.ts';
import type { TableSettings } from '#src/table/table-settings.ts';
import type { TextChoice } from '#src/tensor/text-choice.ts';
import type { Quantity } from '#src/tensor/tensor-set.ts';

/** What `schema` says in every case file, and by which one is known. */
export const caseSchema = 'ellipsite/case';

/** The version this program writes. Older ones are migrated, newer ones refused. */
export const caseVersion = 1;

/** One text that was read, as it was decoded. */
export interface CaseSource {
  readonly name: string;
  /** Of the text in UTF-8, lower-case hexadecimal (FIPS 180-4). */
  readonly sha256: string;
  readonly text: string;
}

/** Proposed columns of one source that were taken, by name. */
export interface CaseAccepted {
  /** Counted from 0 in `sources`. */
  readonly source: number;
  readonly columns: Readonly<Record<string, { readonly quantity: Quantity; readonly unit?: string | null }>>;
}

/** Every decision that changes numbers. */
export interface CaseDecisions {
  /** Which structure of which source is the crystal; null takes the first. Both count from 0. */
  readonly structure: { readonly source: number; readonly index: number } | null;
  readonly settings: DossierSettings;
  readonly accepted: readonly CaseAccepted[];
  /** How tensors found in texts are read, by their shape; they hold for texts added later, too. */
  readonly textChoices: readonly TextChoice[];
}

/** Every decision that changes pictures and tables only. */
export interface CaseViews {
  readonly picture: SceneOptions;
  readonly camera: Camera | null;
  readonly look: Look;
  readonly saved: readonly SavedView[];
  readonly measurements: readonly Measurement[];
  readonly table: TableSettings;
}

/** A case file as data: what was read and what was decided; nothing derived. */
export interface CaseDocument {
  readonly schema: typeof caseSchema;
  readonly version: typeof caseVersion;
  readonly title: string;
  readonly decisions: CaseDecisions;
  readonly views: CaseViews;
  readonly sources: readonly CaseSource[];
}

/** Whether the first characters of a text (a kilobyte is enough) are those of a case file; a broken one counts too. */
export function looksLikeCase(head: string): boolean {
  return /^\uFEFF?\s*\{/.test(head) && head.slice(0, 1000).includes(`"${caseSchema}"`);
}
