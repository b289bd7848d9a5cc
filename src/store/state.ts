import type { Problem } from '#src/base/problem.ts';
import type { AcceptedColumns } from '#src/readers/xyz/column-plan.ts';
import type { DossierSettings } from '#src/dossier/dossier.ts';
import type { TextChoice } from '#src/tensor/text-choice.ts';
import type { Camera } from '#src/scene/camera.ts';
import { defaultLook } from '#src/scene/look.ts';
import type { Look } from '#src/scene/look.ts';
import type { MeasuredAtom, Measurement } from '#src/scene/measurement.ts';
import type { SavedView } from '#src/scene/saved-view.ts';
import { defaultSceneOptions } from '#src/scene/scene-options.ts';
import type { SceneOptions } from '#src/scene/scene-options.ts';
import type { Scene, SceneQuantity } from '#src/scene/scene.ts';
import { defaultTable } from '#src/table/table-settings.ts';
import type { TableSettings } from '#src/table/table-settings.ts';
import type { DerivedCase, SourceFile, StructureChoice } from './engine-protocol.ts';

/** Everything the user decided about a case; undo steps through a list of these. */
export interface Decisions {
  readonly title: string;
  readonly sources: readonly SourceFile[];
  readonly structure: StructureChoice | null;
  readonly settings: DossierSettings;
  /** Proposed columns that were taken, by source id. */
  readonly accepted: Readonly<Record<string, AcceptedColumns>>;
  /** How tensors found in texts are read, the newest last. */
  readonly textChoices?: readonly TextChoice[];
  /** What was found amiss when the case file was opened; it stays with the case. */
  readonly openingProblems?: readonly Problem[];
}

/** Everything the user decided about pictures and tables; nothing here changes a number. */
export interface Views {
  readonly picture: SceneOptions;
  /** null is the first view of the crystal: all of it, from where the picture thinks best. */
  readonly camera: Camera | null;
  readonly look: Look;
  /** In the order in which they were saved. */
  readonly savedViews: readonly SavedView[];
  readonly measurements: readonly Measurement[];
  /** Columns, order and filter of the site table. */
  readonly table: TableSettings;
}

/** A decision that can be undone, with its name: "undo *open quartz.cif*". */
export interface Step extends Partial<Marks> {
  /** A few words that go behind "Undo": `colour by span`. */
  readonly name: string;
  /** What held before the step (in the past) or after it (in the future); null on an empty page. */
  readonly decisions: Decisions | null;
  readonly views: Views;
  /** Nothing but the selection changed: further selections are part of this step until something else is done. */
  readonly isSelection?: true;
}

/** Whether the work is kept in the browser's database, so that it comes back after a reload. */
export interface Keeping {
  /** `off` before the first change that is worth keeping. */
  readonly status: 'off' | 'kept' | 'failed';
  /** Why it isn't, in one sentence. */
  readonly reason: string | null;
}

/** A site, or one atom of it. */
export interface Selection {
  readonly siteIndex: number;
  /** null selects the site with all its atoms. */
  readonly atomId: string | null;
}

/** An atom that was picked in the picture: one copy of it. */
export interface PickedAtom extends MeasuredAtom {
  readonly siteIndex: number;
}

/** What is selected. */
export interface Marks {
  readonly selection: Selection | null;
  /** Atoms picked in the picture one after another; the selection is the last of them. Empty where it came from elsewhere. */
  readonly picked: readonly PickedAtom[];
}

/** Files that could not be opened; the case on screen stayed. */
export interface Refusal {
  readonly what: string;
  /** Kept so that the problems can lead to their lines. */
  readonly sources: readonly SourceFile[];
  readonly problems: readonly Problem[];
}

export interface Progress {
  readonly what: string;
  /** 0 to 1. */
  readonly share: number;
  readonly stage: string;
}

export type ThemeChoice = 'auto' | 'light' | 'dark';

/** A place in a source text that is shown in the text view. */
export interface ShownPlace {
  readonly file: string;
  readonly line: number;
  /** The file is one of those refused last; else it belongs to the case. */
  readonly isRefused?: boolean;
}

/** Everything on screen. Immutable: a change makes a new state that shares what stayed. */
export interface WorkbenchState extends Views, Marks {
  readonly decisions: Decisions | null;
  readonly derived: DerivedCase | null;
  readonly refused: Refusal | null;
  readonly hover: Selection | null;
  readonly theme: ThemeChoice;
  /** The picture of the crystal on screen, as the engine described it last; null before the first. */
  readonly scene: Scene | null;
  /** Why there is no picture, or none of the present options; null when there is. */
  readonly sceneFault: string | null;
  /** A new picture has been waited for longer than half a second. */
  readonly isDrawing: boolean;
  /** Grows whenever sites that were asked for by `Store.site` have come. */
  readonly sitesRead: number;
  readonly shownPlace: ShownPlace | null;
  readonly progress: Progress | null;
  readonly keeping: Keeping;
  readonly past: readonly Step[];
  readonly future: readonly Step[];
}

export const defaultViews: Views = {
  picture: defaultSceneOptions,
  camera: null,
  look: defaultLook,
  savedViews: [],
  measurements: [],
  table: defaultTable,
};

export const noMarks: Marks = { selection: null, picked: [] };

export const emptyState: WorkbenchState = {
  ...defaultViews,
  ...noMarks,
  decisions: null,
  derived: null,
  refused: null,
  hover: null,
  theme: 'auto',
  scene: null,
  sceneFault: null,
  isDrawing: false,
  sitesRead: 0,
  shownPlace: null,
  progress: null,
  keeping: { status: 'off', reason: null },
  past: [],
  future: [],
};

/** Problems on screen: those of the case and those of files that could not be opened. */
export function countProblems(state: WorkbenchState): Record<Problem['severity'], number> {
  const all = [...(state.derived?.problems ?? []), ...(state.refused?.problems ?? [])];
  const count = (severity: Problem['severity']): number =>
    all.filter((problem) => problem.severity === severity).length;
  return { error: count('error'), warning: count('warning'), note: count('note') };
}

/** The quantity to show: the wanted one where the case has it, else the first it has; null without tensors. */
export function quantityToShow(
  wanted: SceneOptions['quantity'],
  derived: DerivedCase | null,
): SceneQuantity | null {
  const available = availableQuantities(derived);
  return available.find((quantity) => quantity === wanted) ?? available[0] ?? null;
}

/** Quantities at least one site of the case has. */
export function availableQuantities(derived: DerivedCase | null): readonly SceneQuantity[] {
  return derived?.crystal?.quantities ?? [];
}
