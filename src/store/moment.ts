import type { Decisions, Step, Views, WorkbenchState } from './state.ts';
import { defaultViews } from './state.ts';

/** Steps kept for undo; they are small, for they share what didn't change. */
export const keptSteps = 200;

/** A point in the history of the work: what is decided, and what lies before and after it. */
export interface Moment {
  readonly decisions: Decisions | null;
  readonly views: Views;
  readonly past: readonly Step[];
  readonly future: readonly Step[];
}

export function viewsOf({ picture, camera, look, savedViews, measurements, table }: WorkbenchState): Views {
  return { picture, camera, look, savedViews, measurements, table };
}

export function momentOf(state: WorkbenchState): Moment {
  const { decisions, past, future } = state;
  return { decisions, views: viewsOf(state), past, future };
}

/** The moment after a named step. From an empty page without a past there is nothing to go back to. */
export function afterStep(
  moment: Moment,
  name: string,
  next: Partial<Pick<Moment, 'decisions' | 'views'>>,
): Moment {
  const { decisions, views, past } = moment;
  const isBlank = decisions === null && past.length === 0;
  return {
    decisions,
    views,
    ...next,
    past: isBlank ? [] : [...past, { name, decisions, views }].slice(-keptSteps),
    future: [],
  };
}

/** The same moment with other views: no step of its own. */
export function withViews(moment: Moment, change: Partial<Views>): Moment {
  return { ...moment, views: { ...moment.views, ...change } };
}

/** One step back; null where there is none. */
export function undone({ decisions, views, past, future }: Moment): Moment | null {
  const step = past.at(-1);
  if (!step) return null;
  return {
    decisions: step.decisions,
    views: step.views,
    past: past.slice(0, -1),
    future: [...future, { name: step.name, decisions, views }],
  };
}

/** One step forth again; null where there is none. */
export function redone({ decisions, views, past, future }: Moment): Moment | null {
  const step = future.at(-1);
  if (!step) return null;
  return {
    decisions: step.decisions,
    views: step.views,
    past: [...past, { name: step.name, decisions, views }],
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
