import type { Problem } from '#src/base/problem.ts';
import { problem } from '#src/base/problem.ts';
import type { SceneOptions } from '#src/scene/scene-options.ts';
import type { Quantity } from '#src/tensor/tensor-set.ts';
import { defaultSettings } from '#src/dossier/default-settings.ts';
import type { DossierSettings } from '#src/dossier/dossier.ts';
import type { Scene } from '#src/scene/scene.ts';
import type { TableSettings } from '#src/table/table-settings.ts';
import type { EngineClient } from './engine-client.ts';
import { Cancelled } from './engine-client.ts';
import type { DerivedCase, LinePage, SourceFile, StructureChoice } from './engine-protocol.ts';
import type { KnownSite, Queries, QueryKind } from './engine-queries.ts';
import { NewestOnly } from './newest-only.ts';
import { SiteCache } from './site-cache.ts';
import type { Decisions, Selection, ShownPlace, Step, ThemeChoice, WorkbenchState } from './state.ts';
import { emptyState } from './state.ts';

/** A file before it has an id. */
export interface FileInput {
  readonly name: string;
  readonly blob: Blob;
}

/** Told after every change, with a sentence that says what changed and why. */
export type Listener = (state: WorkbenchState, reason: string) => void;

/** A picture and how it went. */
type Drawn = Pick<WorkbenchState, 'scene' | 'sceneFault'>;

/** Milliseconds after which it is said that a picture is being made. */
const drawingIsLong = 500;

/** Steps kept for undo; decisions are small, their files are shared. */
const keptSteps = 200;

/**
 * Holder of everything on screen. Decisions that change numbers go through the engine and become state only once the
 * engine has answered: what was on screen stays until then, and for good when the answer holds no crystal.
 */
export class Store {
  readonly #engine: EngineClient;
  readonly #listeners = new Set<Listener>();
  #state: WorkbenchState;
  /** Decisions on their way through the engine; later ones build on them. */
  #underway: Decisions | null = null;
  #nextSource = 1;
  readonly #sites: SiteCache;
  readonly #scenes: NewestOnly<
    { readonly derived: DerivedCase; readonly options: Partial<SceneOptions> },
    Scene
  >;

  constructor(engine: EngineClient, initial: Partial<WorkbenchState>) {
    this.#engine = engine;
    this.#state = { ...emptyState, ...initial };
    this.#sites = new SiteCache(
      (derived, indices) => engine.ask(derived, 'sites', indices),
      () => this.#change({ sitesRead: this.#state.sitesRead + 1 }, 'sites that were asked for have come'),
    );
    this.#scenes = new NewestOnly(({ derived, options }) => engine.ask(derived, 'scene', options));
  }

  get state(): WorkbenchState {
    return this.#state;
  }

  /** Calls the listener after every change until the returned function is called. */
  subscribe(listener: Listener): () => void {
    this.#listeners.add(listener);
    return () => this.#listeners.delete(listener);
  }

  /** Opens files as a new case; settings and references stay, but for the frame, which belongs to one file. */
  open(files: readonly FileInput[], title = titleOf(files)): Promise<boolean> {
    const settings = { ...(this.#base()?.settings ?? defaultSettings), frame: null };
    return this.#decide(`open ${title}`, {
      title,
      sources: this.#identified(files, []),
      structure: null,
      settings,
      accepted: {},
    });
  }

  /** Adds files (tensors, as a rule) to the case on screen. */
  add(files: readonly FileInput[]): Promise<boolean> {
    const base = this.#base();
    if (!base) return this.open(files);
    const sources = [...base.sources, ...this.#identified(files, base.sources)];
    return this.#decide(`add ${titleOf(files)}`, { ...base, sources });
  }

  /** Takes one file out of the case. */
  remove(sourceId: string): Promise<boolean> {
    const base = this.#base();
    const gone = base?.sources.find(({ id }) => id === sourceId);
    if (!base || !gone) return Promise.resolve(false);
    return this.#decide(`take out ${gone.name}`, {
      ...base,
      sources: base.sources.filter(({ id }) => id !== sourceId),
      structure: base.structure?.sourceId === sourceId ? null : base.structure,
    });
  }

  chooseStructure(structure: StructureChoice, name: string): Promise<boolean> {
    const base = this.#base();
    return base ? this.#decide(`choose ${name}`, { ...base, structure }) : Promise.resolve(false);
  }

  /** Takes a proposed column of one file as a quantity, in its usual unit or the one the file names. */
  acceptColumn(sourceId: string, name: string, quantity: Quantity): Promise<boolean> {
    const base = this.#base();
    if (!base) return Promise.resolve(false);
    const columns = { ...base.accepted[sourceId], [name]: { quantity } };
    return this.#decide(`take ${name} as ${quantity}`, {
      ...base,
      accepted: { ...base.accepted, [sourceId]: columns },
    });
  }

  changeSettings(change: Partial<DossierSettings>, name: string): Promise<boolean> {
    const base = this.#base();
    if (!base) return Promise.resolve(false);
    return this.#decide(name, { ...base, settings: { ...base.settings, ...change } });
  }

  undo(): Promise<boolean> {
    const { past, decisions } = this.#state;
    const step = past.at(-1);
    if (!step || !decisions) return Promise.resolve(false);
    return this.#derive(step.decisions, `undo ${step.name}`, (state) => ({
      past: state.past.slice(0, -1),
      future: [...state.future, { name: step.name, decisions }],
    }));
  }

  redo(): Promise<boolean> {
    const { future, decisions } = this.#state;
    const step = future.at(-1);
    if (!step || !decisions) return Promise.resolve(false);
    return this.#derive(step.decisions, `redo ${step.name}`, (state) => ({
      past: [...state.past, { name: step.name, decisions }],
      future: state.future.slice(0, -1),
    }));
  }

  /** Gives up what the engine is doing; the screen stays as it is. */
  cancel(): void {
    const what = this.#state.progress?.what;
    this.#engine.cancel();
    if (!this.#underway) return;
    this.#underway = null;
    this.#change({ progress: null }, `${what ?? 'what was begun'} was cancelled`);
  }

  /** A whole site of the crystal on screen, where it is here; else null, and `sitesRead` grows once it is. */
  site(index: number): KnownSite | null {
    const { derived } = this.#state;
    return derived?.crystal ? this.#sites.get(derived, index) : null;
  }

  /** Asks about the crystal on screen; rejects without one, and where the engine could not answer. */
  ask<Kind extends QueryKind>(kind: Kind, ask: Queries[Kind]['ask']): Promise<Queries[Kind]['answer']> {
    const { derived } = this.#state;
    if (!derived?.crystal) return Promise.reject(new Cancelled('there is no crystal to ask about'));
    return this.#engine.ask(derived, kind, ask);
  }

  select(selection: Selection | null): void {
    if (same(selection, this.#state.selection)) return;
    this.#change({ selection }, selection ? 'a site was selected' : 'the selection was cleared');
  }

  hover(hover: Selection | null): void {
    if (!same(hover, this.#state.hover)) this.#change({ hover }, 'the pointer moved to another site');
  }

  setTheme(theme: ThemeChoice): void {
    this.#change({ theme }, `the theme was set to ${theme}`);
  }

  setPicture(change: Partial<SceneOptions>, reason: string): void {
    this.#change({ picture: { ...this.#state.picture, ...change } }, reason);
    void this.#redraw();
  }

  /** Changes columns, order or filter of the site table. */
  setTable(change: Partial<TableSettings>, reason: string): void {
    this.#change({ table: { ...this.#state.table, ...change } }, reason);
  }

  /** Opens the text view at a line, or closes it. */
  showPlace(shownPlace: ShownPlace | null): void {
    this.#change({ shownPlace }, shownPlace ? 'a line of a file was asked for' : 'the text view was closed');
  }

  dismissRefusal(): void {
    this.#change({ refused: null }, 'the refused file was dismissed');
  }

  /** The file of that name, of the case or of what was refused last; two files of one case never share a name. */
  sourceOf({ file, isRefused = false }: Omit<ShownPlace, 'line'>): SourceFile | null {
    const { decisions, refused } = this.#state;
    const sources = (isRefused ? refused : decisions)?.sources ?? [];
    return sources.find(({ name }) => name === file) ?? null;
  }

  /** Up to `count` lines from the place on. */
  lines(place: ShownPlace, count: number): Promise<LinePage | null> {
    const source = this.sourceOf(place);
    return source ? this.#engine.lines(source, place.line, count) : Promise.resolve(null);
  }

  /** Files with an id, and a name that is theirs alone: places in a file are told by its name. */
  #identified(files: readonly FileInput[], beside: readonly SourceFile[]): SourceFile[] {
    const taken = new Set(beside.map(({ name }) => name));
    return files.map(({ name, blob }) => {
      let unique = name;
      for (let copy = 2; taken.has(unique); copy++) unique = `${name} (${copy})`;
      taken.add(unique);
      return { id: `source-${this.#nextSource++}`, name: unique, blob };
    });
  }

  #base(): Decisions | null {
    return this.#underway ?? this.#state.decisions;
  }

  /** A new decision: derives it and, when it holds, remembers the state before as a step. */
  #decide(name: string, decisions: Decisions): Promise<boolean> {
    const before = this.#state.decisions;
    return this.#derive(decisions, name, (state) => ({
      past: before
        ? [...state.past, { name, decisions: before } satisfies Step].slice(-keptSteps)
        : state.past,
      future: [],
    }));
  }

  async #derive(
    decisions: Decisions,
    reason: string,
    history: (state: WorkbenchState) => Pick<WorkbenchState, 'past' | 'future'>,
  ): Promise<boolean> {
    const isLatest = (): boolean => this.#underway === decisions;
    this.#underway = decisions;
    this.#change({ progress: { what: reason, share: 0, stage: 'starting' } }, `${reason} began`);
    try {
      const derived = await this.#engine.derive(decisions, (share, stage) => {
        if (isLatest()) this.#change({ progress: { what: reason, share, stage } }, `${stage} went on`);
      });
      if (!isLatest()) return false;
      if (!derived.crystal) return this.#refuse(reason, decisions.sources, derived.problems);
      const { picture } = this.#state;
      const drawn = await this.#firstPicture(derived, picture, reason);
      if (!isLatest()) return false;
      this.#underway = null;
      this.#accept(decisions, derived, { ...history(this.#state), ...drawn }, reason);
      if (this.#state.picture !== picture) void this.#redraw();
      return true;
    } catch (error) {
      if (!isLatest()) return false;
      if (!(error instanceof Cancelled)) return this.#refuse(reason, decisions.sources, [engineFault(error)]);
      this.#underway = null;
      this.#change({ progress: null }, `${reason} was cancelled`);
      return false;
    }
  }

  /** Picture and selected site of a crystal that is about to come on screen, so that all of it comes at once. */
  async #firstPicture(derived: DerivedCase, picture: SceneOptions, reason: string): Promise<Drawn> {
    const { selection } = this.#state;
    this.#change(
      { progress: { what: reason, share: 1, stage: 'making the picture' } },
      'the picture is made',
    );
    if (selection) await this.#sites.read(derived, [selection.siteIndex]).catch(() => []);
    const drawn = await this.#draw(derived, picture).catch(drawingFault);
    return { scene: drawn?.scene ?? null, sceneFault: drawn?.sceneFault ?? null };
  }

  /** Asks for the picture of the present options; until it comes the one before stays. */
  async #redraw(): Promise<void> {
    const { derived, picture } = this.#state;
    if (!derived?.crystal) return;
    const late = setTimeout(
      () => this.#change({ isDrawing: true }, 'the picture is waited for'),
      drawingIsLong,
    );
    const drawn = await this.#draw(derived, picture).catch(drawingFault);
    clearTimeout(late);
    if (drawn && this.#state.derived === derived)
      this.#change({ ...drawn, isDrawing: false }, 'a new picture came');
  }

  async #draw(derived: DerivedCase, options: Partial<SceneOptions>): Promise<Drawn> {
    return { scene: await this.#scenes.ask({ derived, options }), sceneFault: null };
  }

  #accept(
    decisions: Decisions,
    derived: DerivedCase,
    also: Pick<WorkbenchState, 'past' | 'future'> & Drawn,
    reason: string,
  ): void {
    const sameCrystal = decisions.sources[0]?.id === this.#state.decisions?.sources[0]?.id;
    const { selection } = this.#state;
    const siteCount = derived.crystal?.siteCount ?? 0;
    const keeps = sameCrystal && selection !== null && selection.siteIndex < siteCount;
    const change = {
      decisions,
      derived,
      ...also,
      isDrawing: false,
      refused: null,
      progress: null,
      hover: null,
      selection: keeps ? selection : null,
      shownPlace: sameCrystal ? this.#state.shownPlace : null,
    };
    this.#change(change, `${reason} is on screen`);
  }

  #refuse(what: string, sources: readonly SourceFile[], problems: readonly Problem[]): false {
    this.#underway = null;
    this.#change({ refused: { what, sources, problems }, progress: null }, `${what} failed`);
    return false;
  }

  #change(change: Partial<WorkbenchState>, reason: string): void {
    this.#state = { ...this.#state, ...change };
    for (const listener of [...this.#listeners]) listener(this.#state, reason);
  }
}

function titleOf(files: readonly FileInput[]): string {
  const [first, ...rest] = files;
  if (!first) return 'nothing';
  return rest.length === 0 ? first.name : `${first.name} and ${rest.length} more`;
}

function same(a: Selection | null, b: Selection | null): boolean {
  return a === b || (a?.siteIndex === b?.siteIndex && a?.atomId === b?.atomId && a !== null && b !== null);
}

/** What to show instead of a picture that could not be made; nothing where a newer one is on its way. */
function drawingFault(error: unknown): Partial<Drawn> | null {
  if (error instanceof Cancelled) return null;
  return { sceneFault: error instanceof Error ? error.message : String(error) };
}

function engineFault(error: unknown): Problem {
  const message = error instanceof Error ? error.message : String(error);
  return problem('error', 'engine-fault', `The engine stopped: ${message}`, {
    hint: 'What was on screen is still there. Try the file again; if it happens again, it is our fault.',
  });
}

export function createStore(engine: EngineClient, initial: Partial<WorkbenchState> = {}): Store {
  return new Store(engine, initial);
}
