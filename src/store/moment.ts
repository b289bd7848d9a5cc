import type { Decisions, Marks, Step, Views, WorkbenchState } from './state.ts';
import { defaultViews, noMarks } from './state.ts';

/** Steps kept for undo; they are small, for they share what didn't change. */
export const keptSteps = 200;

/** A point in the history of the work: what is decided and selected, and what lies before and after it. */
export interface Moment extends Marks {
  readonly decisions: Decisions | null;
  readonly views: Views;
  readonly past: readonly Step[];
  readonly future: readonly Step[];
}

export function viewsOf({ picture, camera, look, savedViews, measurements, table }: WorkbenchState): Views {
  return { picture, camera, look, savedViews, measurements, table };
}

/** Steps of an older page know nothing of what was selected. */
function marksOf({ selection, picked }: Partial<Marks>): Marks {
  return { selection: selection ?? null, picked: picked ?? [] };
}

export function momentOf(state: WorkbenchState): Moment {
  const { decisions, past, future } = state;
  return { decisions, views: viewsOf(state), ...marksOf(state), past, future };
}

/** The moment after a named step. From an empty page without a past there is nothing to go back to. */
export function afterStep(
  moment: Moment,
  name: string,
  next: Partial<Pick<Moment, 'decisions' | 'views'>>,
): Moment {
  const { decisions, views, past } = moment;
  const isBlank = decisions === null && past.length === 0;
  const marks = marksOf(moment);
  const after = next.decisions === undefined ? decisions : next.decisions;
  return {
    decisions,
    views,
    ...(after === decisions ? marks : marksThatStay(marks, decisions, after)),
    ...next,
    past: isBlank ? [] : [...past, { name, decisions, views, ...marks }].slice(-keptSteps),
    future: [],
  };
}

/** The selected site stays with its file; picked atoms only while the atoms are the same ones. */
function marksThatStay(
  { selection, picked }: Marks,
  before: Decisions | null,
  after: Decisions | null,
): Marks {
  if (!before || after?.sources[0]?.id !== before.sources[0]?.id) return noMarks;
  const [old, next] = [before.settings, after!.settings];
  const isSame =
    before.structure === after!.structure &&
    old.symmetry === next.symmetry &&
    old.symmetryToleranceAngstrom === next.symmetryToleranceAngstrom;
  return { selection, picked: isSame ? picked : [] };
}

/**
 * The moment after something else was selected. Successive selections are one step, named after the last of them, so that
 * looking from atom to atom does not push decisions out of the history; back at what was selected before, the step is gone.
 * Selecting decides nothing, so what was undone can still be redone, but for selections.
 */
export function afterSelection(moment: Moment, name: string, marks: Marks): Moment {
  const { decisions, views, past, future } = moment;
  const last = past.at(-1);
  const goesOn = last?.isSelection === true;
  const before = goesOn ? marksOf(last) : marksOf(moment);
  const step: Step = { name, decisions, views, ...before, isSelection: true };
  const earlier = goesOn ? past.slice(0, -1) : past;
  const decided = future.findLastIndex(({ isSelection }) => !isSelection);
  return {
    ...moment,
    ...marks,
    past: isSameMarks(before, marks) ? earlier : [...earlier, step].slice(-keptSteps),
    future: future.slice(0, decided + 1),
  };
}

export function isSameMarks(one: Marks, other: Marks): boolean {
  return JSON.stringify([one.selection, one.picked]) === JSON.stringify([other.selection, other.picked]);
}

/** The same moment with other views: no step of its own. */
export function withViews(moment: Moment, change: Partial<Views>): Moment {
  return { ...moment, views: { ...moment.views, ...change } };
}

/** One step back; null where there is none. */
export function undone({ past, future, ...present }: Moment): Moment | null {
  const step = past.at(-1);
  if (!step) return null;
  const { name, decisions, views, isSelection } = step;
  return {
    decisions,
    views,
    ...marksOf(step),
    past: past.slice(0, -1),
    future: [...future, { ...present, name, ...(isSelection && { isSelection }) }],
  };
}

/** One step forth again; null where there is none. */
export function redone({ past, future, ...present }: Moment): Moment | null {
  const step = future.at(-1);
  if (!step) return null;
  const { name, decisions, views, isSelection } = step;
  return {
    decisions,
    views,
    ...marksOf(step),
    past: [...past, { ...present, name, ...(isSelection && { isSelection }) }],
    future: future.slice(0, -1),
  };
}

/** Views for another crystal: choices that name its sites, elements or places go, matters of taste stay. */
export function viewsForNewCrystal(views: Views): Views {
  const { picture, table } = views;
  const disorder = typeof picture.disorder === 'object' ? 'patterns' : picture.disorder;
  return {
    ...views,
    camera: null,
    measurements: [],
    picture: {
      ...picture,
      tensorElements: 'auto',
      tensorSites: null,
      shell: null,
      extent: picture.extent === 'shell' ? 'auto' : picture.extent,
      polyhedra: [],
      colourLimits: null,
      unitsPerAngstrom: null,
      disorder,
    },
    table: { ...table, filter: { elements: null, text: '', ranges: [] } },
  };
}

/** Views for another case: it starts with what suits it; of the case before only the look and labels stay. */
export function viewsForNewCase({ look, picture: { labels, labelContent } }: Views): Views {
  return { ...defaultViews, look, picture: { ...defaultViews.picture, labels, labelContent } };
}
