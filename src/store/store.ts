import type { Problem } from '#src/base/problem.ts';
import type { Camera } from '#src/scene/camera.ts';
import type { Look } from '#src/scene/look.ts';
import type { Measurement } from '#src/scene/measurement.ts';
import type { SceneOptions } from '#src/scene/scene-options.ts';
import { isNoChoice } from '#src/tensor/text-choice.ts';
import type { TextChoice } from '#src/tensor/text-choice.ts';
import type { Quantity } from '#src/tensor/tensor-set.ts';
import { defaultSettings } from '#src/dossier/default-settings.ts';
import type { DossierSettings } from '#src/dossier/dossier.ts';
import type { TableSettings } from '#src/table/table-settings.ts';
import { CaseClient } from './case-client.ts';
import type { OpenedCase } from './case-exchange.ts';
import { Cancelled } from './engine-client.ts';
import type { EngineClient } from './engine-client.ts';
import type { LinePage, SourceFile, StructureChoice } from './engine-protocol.ts';
import type { KnownSite, Queries, QueryKind } from './engine-queries.ts';
import type { FileInput } from './file-input.ts';
import type { Work } from './kept-work.ts';
import { filesOf } from './kept-work.ts';
import { viewsForNewCase, viewsForNewCrystal, viewsOf } from './moment.ts';
import { PictureMaker } from './picture-maker.ts';
import { SiteCache } from './site-cache.ts';
import type { Listener } from './state-holder.ts';
import { StateHolder } from './state-holder.ts';
import type { Keeping, PickedAtom, Selection, ShownPlace, ThemeChoice, WorkbenchState } from './state.ts';
import { emptyState } from './state.ts';
import type { ViewStepOptions } from './timeline.ts';
import { Timeline } from './timeline.ts';

export type { FileInput } from './file-input.ts';

/**
 * Holder of everything on screen. Decisions that change numbers go through the engine and become state only once the
 * engine has answered: what was on screen stays until then, and for good when the answer holds no crystal.
 */
export class Store {
  readonly #engine: EngineClient;
  readonly #holder: StateHolder;
  readonly #timeline: Timeline;
  readonly #sites: SiteCache;
  readonly #cases = new CaseClient();
  #nextSource = 1;

  constructor(engine: EngineClient, initial: Partial<WorkbenchState>) {
    this.#engine = engine;
    const holder = new StateHolder({ ...emptyState, ...initial });
    this.#holder = holder;
    this.#sites = new SiteCache(
      (derived, indices) => engine.ask(derived, 'sites', indices),
      () => holder.change({ sitesRead: this.state.sitesRead + 1 }, 'sites that were asked for have come'),
    );
    this.#timeline = new Timeline(holder, engine, new PictureMaker(holder, engine), this.#sites);
  }

  get state(): WorkbenchState {
    return this.#holder.state;
  }

  /** Calls the listener after every change until the returned function is called. */
  subscribe(listener: Listener): () => void {
    return this.#holder.subscribe(listener);
  }

  /** Opens files as a new case; settings, references and ways to read texts stay, but for the frame, which belongs to one file. */
  open(files: readonly FileInput[], title = titleOf(files)): Promise<boolean> {
    const before = this.#timeline.newest.decisions;
    const settings = { ...(before?.settings ?? defaultSettings), frame: null };
    const textChoices = (before?.textChoices ?? []).map((choice) => ({ ...choice, file: null }));
    const sources = this.#identified(files, []);
    const decisions = { title, sources, structure: null, settings, accepted: {}, textChoices };
    return this.#timeline.decide(`open ${title}`, decisions, viewsForNewCase);
  }

  /** Opens what a case file says, with its settings and views. */
  openCase({ decisions, views }: OpenedCase): Promise<boolean> {
    const decided = decisions((files) => this.#identified(files, []));
    return this.#timeline.decide(`open ${decided.title}`, decided, () => views);
  }

  /** Says why files could not be opened; the case on screen stays. */
  refuse(what: string, files: readonly FileInput[], problems: readonly Problem[]): void {
    const sources = this.#identified(files, []);
    this.#holder.change({ refused: { what, sources, problems } }, `${what} failed`);
  }

  /** Clears the page; undo brings the case back. */
  clear(): Promise<boolean> {
    if (!this.#timeline.newest.decisions) return Promise.resolve(false);
    return this.#timeline.decide('clear the page', null, viewsForNewCase);
  }

  /** Adds files (tensors, as a rule) to the case on screen. */
  add(files: readonly FileInput[]): Promise<boolean> {
    const base = this.#timeline.newest.decisions;
    if (!base) return this.open(files);
    const sources = [...base.sources, ...this.#identified(files, base.sources)];
    return this.#timeline.decide(`add ${titleOf(files)}`, { ...base, sources });
  }

  /** Takes one file out of the case. */
  remove(sourceId: string): Promise<boolean> {
    const base = this.#timeline.newest.decisions;
    const gone = base?.sources.find(({ id }) => id === sourceId);
    if (!base || !gone) return Promise.resolve(false);
    const isCrystal = this.state.derived?.chosen?.sourceId === sourceId;
    return this.#timeline.decide(
      `take out ${gone.name}`,
      {
        ...base,
        sources: base.sources.filter(({ id }) => id !== sourceId),
        structure: base.structure?.sourceId === sourceId ? null : base.structure,
      },
      isCrystal ? viewsForNewCrystal : undefined,
    );
  }

  chooseStructure(structure: StructureChoice, name: string): Promise<boolean> {
    const base = this.#timeline.newest.decisions;
    if (!base) return Promise.resolve(false);
    return this.#timeline.decide(`choose ${name}`, { ...base, structure }, viewsForNewCrystal);
  }

  /** Takes a proposed column of one file as a quantity, in its usual unit or the one the file names. */
  acceptColumn(sourceId: string, name: string, quantity: Quantity): Promise<boolean> {
    const base = this.#timeline.newest.decisions;
    if (!base) return Promise.resolve(false);
    const columns = { ...base.accepted[sourceId], [name]: { quantity } };
    return this.#timeline.decide(`take ${name} as ${quantity}`, {
      ...base,
      accepted: { ...base.accepted, [sourceId]: columns },
    });
  }

  /** Says how tensors of one shape are read, here and in the next text of that kind; one that says nothing is forgotten. */
  chooseText(choice: TextChoice, name: string): Promise<boolean> {
    const base = this.#timeline.newest.decisions;
    if (!base) return Promise.resolve(false);
    const others = (base.textChoices ?? []).filter(({ signature }) => signature !== choice.signature);
    const textChoices = isNoChoice(choice) ? others : [...others, choice];
    return this.#timeline.decide(name, { ...base, textChoices });
  }

  changeSettings(change: Partial<DossierSettings>, name: string): Promise<boolean> {
    const base = this.#timeline.newest.decisions;
    if (!base) return Promise.resolve(false);
    return this.#timeline.decide(name, { ...base, settings: { ...base.settings, ...change } });
  }

  undo(): Promise<boolean> {
    return this.#timeline.undo();
  }

  redo(): Promise<boolean> {
    return this.#timeline.redo();
  }

  /** Brings back work that was kept, with its history. */
  async restore({ moment }: Work): Promise<boolean> {
    const numbers = filesOf(moment).map(({ id }) => Number(/\d+$/.exec(id)?.[0] ?? 0));
    this.#nextSource = Math.max(this.#nextSource, ...numbers.map((number) => number + 1));
    return this.#timeline.go(moment, `bring back ${moment.decisions?.title ?? 'the empty page'}`);
  }

  /** The case on screen as a case file. Rejects with a sentence where there is none, or a file is gone. */
  async caseBlob(): Promise<Blob> {
    const { decisions } = this.state;
    if (!decisions) throw new Error('There is nothing on screen to save.');
    const written = this.#cases.write(decisions, viewsOf(this.state));
    return this.#shown(`save ${decisions.title}`, 'writing the case', written);
  }

  /** The same as text. */
  async caseText(): Promise<string> {
    return (await this.caseBlob()).text();
  }

  /** Reads a case file, to be opened then; `opened` is null where it can't be, and the problems say why. */
  async readCase(
    file: FileInput,
  ): Promise<{ readonly opened: OpenedCase | null; readonly problems: readonly Problem[] }> {
    const { openedCase } = await import('./case-exchange.ts');
    const kept = await this.#shown(`open ${file.name}`, 'reading the case', this.#cases.read(file));
    return { opened: openedCase(kept), problems: kept.problems };
  }

  /** Says what is waited for, unless the engine has something to say. */
  async #shown<Result>(what: string, stage: string, work: Promise<Result>): Promise<Result> {
    const progress = { what, share: 0, stage };
    if (!this.state.progress) this.#holder.change({ progress }, `${what} began`);
    try {
      return await work;
    } finally {
      if (this.state.progress === progress) this.#holder.change({ progress: null }, `${stage} ended`);
    }
  }

  /** Gives up what the engine is doing; the screen stays as it is. */
  cancel(): void {
    this.#cases.cancel();
    this.#timeline.cancel();
  }

  /** A whole site of the crystal on screen, where it is here; else null, and `sitesRead` grows once it is. */
  site(index: number): KnownSite | null {
    const { derived } = this.state;
    return derived?.crystal ? this.#sites.get(derived, index) : null;
  }

  /** Whole sites of the crystal on screen, waited for; those that could not be read are left out. */
  readSites(indices: readonly number[]): Promise<readonly KnownSite[]> {
    const { derived } = this.state;
    return derived?.crystal ? this.#sites.read(derived, indices).catch(() => []) : Promise.resolve([]);
  }

  /** Sites whose label stands in a text, whether they were read before or not. */
  sitesNamed(text: string): Promise<readonly KnownSite[]> {
    return this.ask('sitesNamed', text).catch(() => []);
  }

  /** Asks about the crystal on screen; rejects without one, and where the engine could not answer. */
  ask<Kind extends QueryKind>(kind: Kind, ask: Queries[Kind]['ask']): Promise<Queries[Kind]['answer']> {
    const { derived } = this.state;
    if (!derived?.crystal) return Promise.reject(new Cancelled('there is no crystal to ask about'));
    return this.#engine.ask(derived, kind, ask);
  }

  /** Selects a site or atom; `given`: the atoms picked in the picture one after another, it is the last of them. */
  select(selection: Selection | null, given: readonly PickedAtom[] | null = null): void {
    if (given === null && same(selection, this.state.selection)) return;
    const picked = given ?? [];
    const reason = selection ? 'a site was selected' : 'the selection was cleared';
    const label = selection && (this.site(selection.siteIndex)?.label ?? null);
    const name = selectionName(selection, picked, label);
    this.#timeline.select(name, { selection, picked }, reason);
    if (!selection || label !== null) return;
    void this.readSites([selection.siteIndex]).then(([site]) => {
      if (site) this.#timeline.nameSelection(name, selectionName(selection, picked, site.label));
    });
  }

  hover(hover: Selection | null): void {
    if (!same(hover, this.state.hover)) this.#holder.change({ hover }, 'the pointer moved to another site');
  }

  setTheme(theme: ThemeChoice): void {
    this.#holder.change({ theme }, `the theme was set to ${theme}`);
  }

  /** Changes what is drawn. The name goes behind "Undo": `colour by span`. */
  setPicture(change: Partial<SceneOptions>, name: string, options: ViewStepOptions = {}): void {
    this.#timeline.step(name, ({ picture }) => ({ picture: { ...picture, ...change } }), options);
  }

  /** Changes from where the crystal is seen; null is the first view of it. */
  setCamera(camera: Camera | null, name: string, options: ViewStepOptions = {}): void {
    this.#timeline.step(name, () => ({ camera }), options);
  }

  /** A camera that the picture chose itself, such as a fit to a new extent: no step of its own, part of the last one. */
  adjustCamera(camera: Camera | null): void {
    this.#timeline.amend({ camera }, 'the picture was fitted');
  }

  setLook(change: Partial<Look>, name: string, options: ViewStepOptions = {}): void {
    this.#timeline.step(name, ({ look }) => ({ look: { ...look, ...change } }), options);
  }

  /** Changes columns, order or filter of the site table. */
  setTable(change: Partial<TableSettings>, name: string, options: ViewStepOptions = {}): void {
    this.#timeline.step(name, ({ table }) => ({ table: { ...table, ...change } }), options);
  }

  /** Keeps the picture as it is under a name; one that is taken is kept anew. */
  saveView(name: string): void {
    this.#timeline.step(`save view ${name}`, ({ camera, picture, look, savedViews }) => {
      const saved = { name, camera, picture, look };
      const isKnown = savedViews.some((view) => view.name === name);
      const views = savedViews.map((view) => (view.name === name ? saved : view));
      return { savedViews: isKnown ? views : [...views, saved] };
    });
  }

  applyView(name: string): void {
    const view = this.state.savedViews.find((one) => one.name === name);
    if (!view) return;
    const { camera, picture, look } = view;
    this.#timeline.step(`show view ${name}`, () => ({ camera, picture, look }));
  }

  removeView(name: string): void {
    if (!this.state.savedViews.some((view) => view.name === name)) return;
    this.#timeline.step(`remove view ${name}`, ({ savedViews }) => ({
      savedViews: savedViews.filter((view) => view.name !== name),
    }));
  }

  /** Gives a saved view another name; false where that name is taken or empty. */
  renameView(name: string, next: string): boolean {
    if (next === '' || this.state.savedViews.some((view) => view.name === next)) return next === name;
    this.#timeline.step(`rename view ${name}`, ({ savedViews }) => ({
      savedViews: savedViews.map((view) => (view.name === name ? { ...view, name: next } : view)),
    }));
    return true;
  }

  addMeasurement(measurement: Measurement): void {
    this.#timeline.step(`measure ${measurement.kind}`, ({ measurements }) => ({
      measurements: [...measurements, measurement],
    }));
  }

  removeMeasurement(id: string): void {
    const gone = this.state.measurements.find((one) => one.id === id);
    if (!gone) return;
    this.#timeline.step(`remove ${gone.kind}`, ({ measurements }) => ({
      measurements: measurements.filter((one) => one.id !== id),
    }));
  }

  /** Told by whoever keeps the work in the browser. */
  setKeeping(keeping: Keeping): void {
    const { status, reason } = this.state.keeping;
    if (status !== keeping.status || reason !== keeping.reason)
      this.#holder.change({ keeping }, `the work is ${keeping.status}`);
  }

  /** Opens the text view at a line, or closes it. */
  showPlace(shownPlace: ShownPlace | null): void {
    this.#holder.change(
      { shownPlace },
      shownPlace ? 'a line of a file was asked for' : 'the text view was closed',
    );
  }

  dismissRefusal(): void {
    this.#holder.change({ refused: null }, 'the refused file was dismissed');
  }

  /** The file of that name, of the case or of what was refused last; two files of one case never share a name. */
  sourceOf({ file, isRefused = false }: Omit<ShownPlace, 'line'>): SourceFile | null {
    const { decisions, refused } = this.state;
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
}

function titleOf(files: readonly FileInput[]): string {
  const [first, ...rest] = files;
  if (!first) return 'nothing';
  return rest.length === 0 ? first.name : `${first.name} and ${rest.length} more`;
}

/** Behind "Undo": `select Al2`. */
function selectionName(
  selection: Selection | null,
  picked: readonly PickedAtom[],
  label: string | null,
): string {
  if (!selection) return 'clear the selection';
  return picked.length > 1 ? `select ${picked.length} atoms` : `select ${label ?? 'a site'}`;
}

function same(a: Selection | null, b: Selection | null): boolean {
  return a === b || (a?.siteIndex === b?.siteIndex && a?.atomId === b?.atomId && a !== null && b !== null);
}

export function createStore(engine: EngineClient, initial: Partial<WorkbenchState> = {}): Store {
  return new Store(engine, initial);
}
