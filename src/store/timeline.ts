import type { Problem } from '#src/base/problem.ts';
import { problem } from '#src/base/problem.ts';
import { Cancelled } from './engine-client.ts';
import type { EngineClient } from './engine-client.ts';
import type { DerivedCase, SourceFile } from './engine-protocol.ts';
import { fittingViews } from './fitting-views.ts';
import type { Moment } from './moment.ts';
import { afterSelection, afterStep, isSameMarks, momentOf, redone, undone, withViews } from './moment.ts';
import type { Drawn, PictureMaker } from './picture-maker.ts';
import type { SceneOptions } from '#src/scene/scene-options.ts';
import type { SiteCache } from './site-cache.ts';
import type { StateHolder } from './state-holder.ts';
import type { Decisions, Marks, Step, Views } from './state.ts';
import { noMarks } from './state.ts';

/** How a change of the picture or the table becomes a step. */
export interface ViewStepOptions {
  /** Goes on with the step of the same name that last changed at most a second ago: a drag or a burst of keys is one step. */
  readonly coalesce?: boolean;
}

/** Milliseconds of rest after which a new drag or key begins a step of its own. */
const burstMs = 1000;

/** Sites that are read without being asked for; the cache holds more. */
const sitesAhead = 200;

/** One step forth from any moment. */
type Recipe = (moment: Moment) => Moment;

/**
 * The work as a line of moments with a name between each two. A step that changes numbers goes through the engine and holds
 * once it has answered; one that changes views holds at once. Views are of the crystal on screen: one changed while a
 * decision is underway comes before that decision, and after an undo that is underway.
 */
export class Timeline {
  readonly #holder: StateHolder;
  readonly #engine: EngineClient;
  readonly #pictures: PictureMaker;
  readonly #sites: SiteCache;
  /** What will hold when the engine has answered; later decisions build on it. */
  #underway: Moment | null = null;
  /** How the screen's moment becomes the one underway; null where it is gone back to. */
  #recipes: readonly Recipe[] | null = null;
  /** Another structure is underway: of the views stays what fits it. */
  #isOtherStructure = false;
  /** Counts derivations: only the latest may come on screen. */
  #run = 0;
  /** The view step that may still grow. */
  #growing: Step | null = null;
  /** When it changed last, milliseconds. */
  #grownAt = 0;

  constructor(holder: StateHolder, engine: EngineClient, pictures: PictureMaker, sites: SiteCache) {
    this.#holder = holder;
    this.#engine = engine;
    this.#pictures = pictures;
    this.#sites = sites;
  }

  /** The newest moment: the one underway, else the one on screen. */
  get newest(): Moment {
    return this.#underway ?? momentOf(this.#holder.state);
  }

  /** A new decision: derives it and, when it holds, remembers the moment before as a step. */
  decide(
    name: string,
    decisions: Decisions | null,
    viewsAfter: (views: Views) => Views = (views) => views,
  ): Promise<boolean> {
    const recipe: Recipe = (moment) =>
      afterStep(moment, name, { decisions, views: viewsAfter(moment.views) });
    const before = this.#underway ? this.#recipes : [];
    return this.go(recipe(this.newest), name, before && [...before, recipe]);
  }

  /** A step that changes no number. */
  step(
    name: string,
    change: (views: Views) => Partial<Views>,
    { coalesce = false }: ViewStepOptions = {},
  ): void {
    const { state } = this.#holder;
    const present = momentOf(state);
    const isBurst = coalesce && Date.now() - this.#grownAt <= burstMs;
    const grows = isBurst && this.#growing?.name === name && present.past.at(-1) === this.#growing;
    const after: Recipe = (moment) => {
      const changed = withViews(moment, change(moment.views));
      return grows && moment.past.at(-1)?.name === name
        ? changed
        : afterStep(moment, name, { views: changed.views });
    };
    const { views, past, future } = this.#before(after);
    this.#growing = past.at(-1) ?? null;
    this.#grownAt = Date.now();
    this.#holder.change({ ...views, past, future }, name);
    if (views.picture !== state.picture) void this.#pictures.redraw();
  }

  /** Selects something else: a step of its own kind, see `afterSelection`. */
  select(name: string, marks: Marks, reason: string): void {
    const { state } = this.#holder;
    if (isSameMarks(state, marks)) return;
    const { past, future } = this.#before((moment) => afterSelection(moment, name, marks));
    this.#holder.change({ ...marks, past, future }, reason);
  }

  /** Gives the last step its name where it wasn't known yet. */
  nameSelection(before: string, name: string): void {
    const { past } = this.#holder.state;
    const last = past.at(-1);
    if (last?.isSelection !== true || last.name !== before) return;
    this.#holder.change({ past: [...past.slice(0, -1), { ...last, name }] }, `the step is to ${name}`);
  }

  /** A step on what is on screen: it comes before the decisions underway, and after an undo that is. */
  #before(after: Recipe): Moment {
    const next = after(momentOf(this.#holder.state));
    if (this.#underway)
      this.#underway = this.#recipes
        ? this.#recipes.reduce((moment, recipe) => recipe(moment), next)
        : after(this.#underway);
    return next;
  }

  /** Changes views as a part of the last step. */
  amend(change: Partial<Views>, reason: string): void {
    this.#holder.change(change, reason);
    if (this.#underway && this.#recipes)
      this.#underway = this.#recipes.reduce((moment, recipe) => recipe(moment), momentOf(this.#holder.state));
  }

  undo(): Promise<boolean> {
    const { newest } = this;
    const before = undone(newest);
    return before ? this.go(before, `undo ${newest.past.at(-1)?.name}`) : Promise.resolve(false);
  }

  redo(): Promise<boolean> {
    const { newest } = this;
    const after = redone(newest);
    return after ? this.go(after, `redo ${newest.future.at(-1)?.name}`) : Promise.resolve(false);
  }

  /** Gives up what the engine is doing; the screen stays as it is. */
  cancel(): void {
    const what = this.#holder.state.progress?.what;
    this.#engine.cancel();
    if (!this.#underway) return;
    this.#underway = null;
    this.#holder.change({ progress: null }, `${what ?? 'what was begun'} was cancelled`);
  }

  /** Makes a moment the present one: at once where its numbers are on screen, else when the engine has answered. */
  async go(next: Moment, reason: string, recipes: readonly Recipe[] | null = null): Promise<boolean> {
    const run = ++this.#run;
    const isLatest = (): boolean => this.#run === run && this.#underway !== null;
    this.#growing = null;
    const { decisions } = next;
    if (!decisions || decisions === this.#holder.state.decisions) return this.#goAtOnce(next, reason);
    const goesOn = this.#underway !== null && this.#recipes !== null;
    this.#isOtherStructure =
      recipes !== null && (this.#choosesStructure(next) || (goesOn && this.#isOtherStructure));
    this.#underway = next;
    this.#recipes = recipes;
    this.#holder.change({ progress: { what: reason, share: 0, stage: 'starting' } }, `${reason} began`);
    try {
      const derived = await this.#engine.derive(decisions, (share, stage) => {
        if (isLatest()) this.#holder.change({ progress: { what: reason, share, stage } }, `${stage} went on`);
      });
      if (!isLatest()) return false;
      if (!derived.crystal) return this.#refuse(reason, decisions.sources, derived.problems);
      const { picture } = this.#fitting(derived).views;
      const drawn = await this.#firstPicture(derived, picture, reason);
      if (!isLatest()) return false;
      this.#accept(this.#fitting(derived), derived, drawn, reason);
      if (this.#holder.state.picture !== picture) void this.#pictures.redraw();
      return true;
    } catch (error) {
      if (!isLatest()) return false;
      if (!(error instanceof Cancelled)) return this.#refuse(reason, decisions.sources, [engineFault(error)]);
      this.#underway = null;
      this.#holder.change({ progress: null }, `${reason} was cancelled`);
      return false;
    }
  }

  /** The way of every step that needs no engine. */
  #goAtOnce({ decisions, views, selection, picked, past, future }: Moment, reason: string): boolean {
    if (this.#underway) this.#engine.cancel();
    this.#underway = null;
    const { state } = this.#holder;
    const empty = { derived: null, scene: null, sceneFault: null, ...noMarks, hover: null };
    const cleared = decisions ? { selection, picked } : { ...empty, shownPlace: null, refused: null };
    this.#holder.change({ ...views, ...cleared, decisions, past, future, progress: null }, reason);
    if (views.picture !== state.picture) void this.#pictures.redraw();
    return true;
  }

  /** Picture and selected site of a crystal that is about to come on screen, so that all of it comes at once. */
  async #firstPicture(derived: DerivedCase, picture: SceneOptions, reason: string): Promise<Drawn> {
    const { selection } = this.newest;
    this.#holder.change(
      { progress: { what: reason, share: 1, stage: 'making the picture' } },
      'the picture is made',
    );
    if (selection) await this.#sites.read(derived, [selection.siteIndex]).catch(() => []);
    return this.#pictures.first(derived, picture);
  }

  /** Another structure of the files on screen, as against other files, whose views come with them. */
  #choosesStructure({ decisions }: Moment): boolean {
    const before = this.#holder.state.decisions;
    return (
      before !== null &&
      decisions?.sources[0]?.id === before.sources[0]?.id &&
      decisions?.structure !== before.structure
    );
  }

  /** The moment underway with what is known of its crystal now. */
  #fitting({ crystal }: DerivedCase): Moment {
    const { newest } = this;
    return this.#isOtherStructure && crystal
      ? { ...newest, views: fittingViews(newest.views, crystal) }
      : newest;
  }

  #accept(
    { decisions, views, selection, picked, past, future }: Moment,
    derived: DerivedCase,
    drawn: Drawn,
    reason: string,
  ): void {
    this.#underway = null;
    const { state } = this.#holder;
    const sameCrystal = decisions?.sources[0]?.id === state.decisions?.sources[0]?.id;
    const siteCount = derived.crystal?.siteCount ?? 0;
    const isThere = selection !== null && selection.siteIndex < siteCount;
    const change = {
      ...views,
      ...drawn,
      decisions,
      derived,
      past,
      future,
      isDrawing: false,
      refused: null,
      progress: null,
      hover: null,
      ...(isThere ? { selection, picked } : noMarks),
      shownPlace: sameCrystal ? state.shownPlace : null,
    };
    this.#holder.change(change, `${reason} is on screen`);
    this.#readAhead(derived);
  }

  /** The first sites, so that they can be shown at once also while the engine is busy with another file. */
  #readAhead(derived: DerivedCase): void {
    const count = Math.min(sitesAhead, derived.crystal?.siteCount ?? 0);
    const indices = Array.from({ length: count }, (_none, index) => index);
    if (count > 0) void this.#sites.read(derived, indices).catch(() => []);
  }

  #refuse(what: string, sources: readonly SourceFile[], problems: readonly Problem[]): false {
    this.#underway = null;
    this.#holder.change({ refused: { what, sources, problems }, progress: null }, `${what} failed`);
    return false;
  }
}

function engineFault(error: unknown): Problem {
  const message = error instanceof Error ? error.message : String(error);
  return problem('error', 'engine-fault', `The engine stopped: ${message}`, {
    hint: 'What was on screen is still there. Try the file again; if it happens again, it is our fault.',
  });
}
