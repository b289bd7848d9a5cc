import type { OpenedCase } from './case-exchange.ts';
import type { Moment } from './moment.ts';
import type { SourceFile } from './engine-protocol.ts';
import type { Decisions, Selection, Step, Views } from './state.ts';
import { defaultViews } from './state.ts';

/** Everything that comes back after a reload. */
export interface Work {
  readonly moment: Moment;
}

/** A file whose bytes are kept apart under a key, so that they are written once. */
export interface StoredSource {
  readonly id: string;
  readonly name: string;
  readonly key: string;
}

type Stored<Held extends { readonly decisions: Decisions | null }> = Omit<Held, 'decisions'> & {
  readonly decisions: StoredDecisions | null;
};
export type StoredDecisions = Omit<Decisions, 'sources'> & { readonly sources: readonly StoredSource[] };
export type StoredMoment = Stored<Omit<Moment, 'past' | 'future'>> & {
  readonly past: readonly Stored<Step>[];
  readonly future: readonly Stored<Step>[];
};

/** One tab's work as the database holds it. */
export interface StoredWork {
  readonly format: 1;
  /** Milliseconds since 1970. */
  readonly savedAt: number;
  /** Times it was begun to bring back without success: work that ends the tab must not do so for ever. */
  readonly attempts: number;
  readonly moment: StoredMoment;
  /** Atoms in the cell, for the list of earlier work; absent from works of older pages. */
  readonly atomCount?: number | null;
  /** Written by older pages, whose moments held no selection. */
  readonly selection?: Selection | null;
}

/** All files of a moment and its history, each once. */
export function filesOf({ decisions, past, future }: Moment): SourceFile[] {
  const all = [decisions, ...past.map((step) => step.decisions), ...future.map((step) => step.decisions)];
  return [...new Set(all.flatMap((one) => one?.sources ?? []))];
}

/** Work with keys instead of bytes. Parts that were shared stay shared, so the history costs what changed in it. */
export function storedWork(
  work: Work,
  keyOf: (file: SourceFile) => string,
  savedAt: number,
  atomCount: number | null = null,
): StoredWork {
  const { decisions, past, future } = work.moment;
  const files = new Map<SourceFile, StoredSource>();
  const known = new Map<Decisions, StoredDecisions>();
  const source = (file: SourceFile): StoredSource =>
    kept(files, file, () => ({ id: file.id, name: file.name, key: keyOf(file) }));
  const decided = (one: Decisions | null): StoredDecisions | null =>
    one && kept(known, one, () => ({ ...one, sources: one.sources.map(source) }));
  const step = (one: Step): Stored<Step> => ({ ...one, decisions: decided(one.decisions) });
  return {
    format: 1,
    savedAt,
    attempts: 0,
    atomCount,
    moment: {
      ...work.moment,
      decisions: decided(decisions),
      past: past.map(step),
      future: future.map(step),
    },
  };
}

/** The way back. Steps whose files are gone are left out; null where those of the present are. */
export function restoredWork(
  { moment, selection: older }: StoredWork,
  blobOf: (key: string) => Blob | undefined,
): Work | null {
  const files = new Map<string, SourceFile | null>();
  const known = new Map<StoredDecisions, Decisions | null>();
  const file = ({ id, name, key }: StoredSource): SourceFile | null => {
    const blob = blobOf(key);
    return kept(files, `${id} ${name} ${key}`, () => (blob ? { id, name, blob } : null));
  };
  const decided = (one: StoredDecisions): Decisions | null =>
    kept(known, one, () => {
      const sources = one.sources.flatMap((stored) => file(stored) ?? []);
      return sources.length === one.sources.length ? { ...one, sources } : null;
    });
  const completed = new Map<Views, Views>();
  const whole = (views: Views): Views => kept(completed, views, () => withDefaults(views));
  const step = (one: Stored<Step>): Step[] => {
    const decisions = one.decisions && decided(one.decisions);
    return one.decisions && !decisions ? [] : [{ ...one, decisions, views: whole(one.views) }];
  };
  const decisions = moment.decisions && decided(moment.decisions);
  if (moment.decisions && !decisions) return null;
  const past = moment.past.flatMap(step);
  const future = moment.future.flatMap(step);
  const { selection = older ?? null, picked = [] } = moment as Partial<StoredMoment>;
  return { moment: { decisions, views: whole(moment.views), selection, picked, past, future } };
}

/** What a work holds now, without its history, ready to be opened as a case. */
export function openedWork({ moment: { decisions, views } }: Work): OpenedCase | null {
  if (!decisions) return null;
  return {
    decisions: (identify) => {
      const sources = identify(decisions.sources);
      const idOf = (id: string): string =>
        sources[decisions.sources.findIndex((source) => source.id === id)]?.id ?? id;
      const { structure, accepted } = decisions;
      return {
        ...decisions,
        sources,
        structure: structure && { ...structure, sourceId: idOf(structure.sourceId) },
        accepted: Object.fromEntries(Object.entries(accepted).map(([id, columns]) => [idOf(id), columns])),
      };
    },
    views,
  };
}

/** Views kept by an older page may lack what came later. */
function withDefaults(views: Views): Views {
  return {
    ...defaultViews,
    ...views,
    picture: { ...defaultViews.picture, ...views.picture },
    look: { ...defaultViews.look, ...views.look },
    table: { ...defaultViews.table, ...views.table },
  };
}

function kept<Key, Value>(map: Map<Key, Value>, key: Key, make: () => Value): Value {
  const held = map.get(key);
  if (held !== undefined) return held;
  const made = make();
  map.set(key, made);
  return made;
}
