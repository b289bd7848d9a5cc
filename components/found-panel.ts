import { html, nothing } from 'lit';
import type { TemplateResult } from 'lit';
import { noChoice } from '#src/store/found-protocol.ts';
import type { FoundEntryView, FoundFileView, FoundGroupView, TextChoice } from '#src/store/found-protocol.ts';
import type { WorkbenchState } from '#src/store/state.ts';
import { counted } from '#src/table/number-format.ts';
import { drawerStyles } from './drawer-styles.ts';
import { foundGroup } from './found-group.ts';
import { foundStyles } from './found-styles.ts';
import { choiceName } from './found-words.ts';
import { askForPanel } from './panel.ts';
import { StoreElement } from './store-element.ts';
import { shared } from './styles.ts';

/** Entries fetched in one go when more of a group are asked for. */
const entriesAtOnce = 200;

/** Width from which the text stands beside the panel instead of over it. */
const besideWidth = '(min-width: 900px)';

/** Tensors found in the texts of the case: what they are taken for and why, what is open, and how they are read. */
export class FoundPanel extends StoreElement {
  static override properties = { files: { state: true }, fault: { state: true }, entries: { state: true } };

  static override styles = [shared, drawerStyles, foundStyles];

  /** null while they are asked for. */
  declare files: readonly FoundFileView[] | null;
  declare fault: string | null;
  /** Entries beyond a group's sample, by text and group. */
  declare entries: ReadonlyMap<string, readonly FoundEntryView[]>;

  protected override readonly watches = ['derived', 'decisions', 'selection'] as const;
  /** The selection came from this panel, which shows its own line. */
  #isOwnSelection = false;
  #hasShownText = false;

  constructor() {
    super();
    this.files = null;
    this.fault = null;
    this.entries = new Map();
  }

  protected override stateChanged(state: WorkbenchState, before: WorkbenchState | null): void {
    if (state.derived !== before?.derived) void this.#load();
    else if (state.selection !== before?.selection && state.selection && !this.#isOwnSelection)
      void this.#showSite(state.selection.siteIndex);
  }

  override render(): TemplateResult {
    const { store, files, fault } = this;
    if (!store) return html``;
    const searched = store.state.derived?.found ?? [];
    return html`
      <header>
        <h2>Found</h2>
        <button @click=${() => askForPanel(this, null)} aria-label="Close what was found">Close</button>
      </header>
      ${
        searched.length === 0
          ? html`<p class="soft">
              No text of this case was searched. Add the output of a calculation, a table of a paper or a
              spreadsheet: tensors are found by their shape.
            </p>`
          : html`<p class="soft">
              Tensors by their shape. A choice holds for all of that shape, in this text and in those added
              later; it is saved with the case.
            </p>`
      }
      ${fault === null ? nothing : html`<p class="fault" role="alert">${fault}</p>`}
      ${searched.length > 0 && files === null && fault === null ? html`<p class="soft">reading …</p>` : nothing}
      ${files?.map((file) => this.#file(file))}
    `;
  }

  #file(file: FoundFileView): TemplateResult {
    const { groups } = file;
    const ours = groups.filter((group) => !isOther(group));
    const others = groups.filter(isOther);
    return html`<h3>
        <button
          class="link"
          @click=${() => this.store?.showPlace({ file: file.file, line: groups[0]?.line ?? 1 })}
        >
          ${file.file}
        </button>
        <span class="soft"
          >${counted(groups.length, 'group')}, ${counted(file.structureCount, 'structure')}</span
        >
      </h3>
      ${ours.length === 0 ? html`<p class="soft">No tensor of shielding, shift or EFG was found in it.</p>` : nothing}
      ${ours.map((group) => this.#group(file, group))}
      ${
        others.length === 0
          ? nothing
          : html`<details class="group aside">
              <summary>
                ${others.length === 1 ? 'One place' : `${others.length} places`} of a tensor's shape that
                ${others.length === 1 ? 'is' : 'are'} something else
              </summary>
              <div class="body">${others.map((group) => this.#group(file, group))}</div>
            </details>`
      }`;
  }

  #group(file: FoundFileView, group: FoundGroupView): TemplateResult {
    const key = keyOf(file, group);
    return foundGroup(
      group,
      this.entries.get(key) ?? group.sample,
      this.store?.state.selection?.siteIndex ?? null,
      {
        choose: (change) => this.#choose(file, group, change),
        go: ({ line, siteIndex }) => this.#go(file, line, siteIndex),
        more: () => void this.#more(file, group),
      },
    );
  }

  #choose({ file }: FoundFileView, group: FoundGroupView, change: Partial<TextChoice>): void {
    const { signature, choice, line } = group;
    const next: TextChoice = { ...noChoice, ...choice, ...change, signature, file };
    const isBack = Object.keys(change).length > 3;
    const name = isBack ? `read line ${line} as found` : choiceName(line, change);
    void this.store?.chooseText(next, name);
  }

  #go({ file }: FoundFileView, line: number, siteIndex: number | null): void {
    const { store } = this;
    if (!store) return;
    this.#isOwnSelection = true;
    if (siteIndex !== null) store.select({ siteIndex, atomId: null });
    this.#isOwnSelection = false;
    store.showPlace({ file, line });
  }

  /** The line of a selected site, while a searched text is shown. */
  async #showSite(siteIndex: number): Promise<void> {
    const { store } = this;
    const place = store?.state.shownPlace;
    if (!store || !place || !this.#isSearched(place.file)) return;
    const [site] = await store.readSites([siteIndex]);
    const sources = [site?.shielding?.source, site?.efg?.source].filter((one) => one !== undefined);
    const source = sources.find(({ file }) => file === place.file) ?? sources[0];
    if (!source || !this.#isSearched(source.file)) return;
    if (store.state.selection?.siteIndex === siteIndex && store.state.shownPlace === place)
      store.showPlace({ file: source.file, line: source.line });
  }

  #isSearched(file: string): boolean {
    return (this.store?.state.derived?.found ?? []).some((one) => one.file === file);
  }

  async #load(): Promise<void> {
    const { store } = this;
    const derived = store?.state.derived;
    if (!store || !derived?.found) {
      this.files = null;
      return;
    }
    try {
      const files = await store.ask('found', null);
      if (store.state.derived !== derived) return;
      this.files = files;
      this.fault = null;
      const wanted = [...this.entries.keys()];
      this.entries = new Map();
      for (const file of files)
        for (const group of file.groups)
          if (wanted.includes(keyOf(file, group))) void this.#more(file, group);
      this.#showText(files);
    } catch (error) {
      if (store.state.derived !== derived) return;
      const why = error instanceof Error ? error.message : String(error);
      this.fault = `What was found could not be read: ${why}`;
    }
  }

  /** The first place that asks, or else the first that is taken, once, where there is room beside the panel. */
  #showText(files: readonly FoundFileView[]): void {
    const { store } = this;
    if (this.#hasShownText || !store || store.state.shownPlace) return;
    this.#hasShownText = true;
    if (!matchMedia(besideWidth).matches) return;
    const all = files.flatMap(({ file, groups }) => groups.map((group) => ({ file, group })));
    const first =
      all.find(({ group }) => group.questions.length > 0) ??
      all.find(({ group }) => group.proposed) ??
      all[0];
    if (first) store.showPlace({ file: first.file, line: first.group.line });
  }

  async #more(file: FoundFileView, group: FoundGroupView): Promise<void> {
    const key = keyOf(file, group);
    const known = this.entries.get(key) ?? [];
    const derived = this.store?.state.derived;
    const ask = { sourceId: file.sourceId, group: group.group, first: known.length, count: entriesAtOnce };
    const more = await this.store?.ask('foundEntries', ask).catch(() => []);
    if (!more || more.length === 0 || this.store?.state.derived !== derived) return;
    this.entries = new Map(this.entries).set(key, [...known, ...more]);
  }
}

/** Something of a tensor's shape that is none of ours, unless the user took it. */
function isOther({ role, proposed, choice }: FoundGroupView): boolean {
  return role === 'decoy' && !proposed && choice === null;
}

const keyOf = ({ sourceId }: FoundFileView, { group }: FoundGroupView): string => `${sourceId} ${group}`;

customElements.define('ellipsite-found-panel', FoundPanel);
