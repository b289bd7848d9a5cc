import { html, nothing } from 'lit';
import type { PropertyValues, TemplateResult } from 'lit';
import type { WebGLProbe } from '#src/render/probe-webgl.ts';
import type { Keeper } from '#src/store/keeper.ts';
import type { Selection, WorkbenchState } from '#src/store/state.ts';
import { announcement, selectionSentence } from './announcement.ts';
import { caseKey } from './case-keys.ts';
import './crystal-view.ts';
import type { CrystalView } from './crystal-view.ts';
import './drop-zone.ts';
import './page-header.ts';
import type { Panel } from './panel.ts';
import './progress-bar.ts';
import './site-card.ts';
import './site-table.ts';
import type { SiteTable } from './site-table.ts';
import { StoreElement } from './store-element.ts';
import { shared, themes } from './styles.ts';
import { effectiveTheme, keepTheme, watchTheme } from './theme.ts';
import { workbenchStyles } from './workbench-styles.ts';

/** The whole page: header, crystal, sites, site card, drawers; owns the theme, the shortcuts and the live region. */
export class Workbench extends StoreElement {
  static override properties = {
    panel: { state: true },
    probe: { attribute: false },
    keeper: { attribute: false },
  };

  static override styles = [themes, shared, workbenchStyles];

  declare panel: Panel;
  /** How the browser can draw; null lets the crystal view find out. */
  declare probe: WebGLProbe | null;
  /** What keeps the work in this browser; null where nothing does. */
  declare keeper: Keeper | null;

  protected override readonly watches = [
    'theme',
    'shownPlace',
    'selection',
    'derived',
    'refused',
    'sitesRead',
    'decisions',
  ] as const;
  #unwatchTheme: (() => void) | null = null;
  #spoken = '';
  /** A selection that is spoken once its site has come. */
  #unspoken: Selection | null = null;
  /** A new crystal is announced once table and picture show it. */
  #awaited: string | null = null;
  /** What had the focus before the button that cancels. */
  #beforeBar: HTMLElement | null = null;
  /** The problems were opened by a refused file, not by the user: they go when the refusal goes. */
  #isOwnOpening = false;
  /** What had the focus when a drawer was opened; it gets it back. */
  #opener: HTMLElement | null = null;

  constructor() {
    super();
    this.panel = null;
    this.probe = null;
    this.keeper = null;
  }

  override connectedCallback(): void {
    super.connectedCallback();
    this.#unwatchTheme = watchTheme(() => this.requestUpdate());
    document.addEventListener('keydown', this.#shortcuts);
  }

  override disconnectedCallback(): void {
    super.disconnectedCallback();
    this.#unwatchTheme?.();
    document.removeEventListener('keydown', this.#shortcuts);
  }

  protected override stateChanged(state: WorkbenchState, before: WorkbenchState | null): void {
    if (before && state.theme !== before.theme) keepTheme(state.theme);
    if (state.refused && state.refused !== before?.refused) {
      this.#isOwnOpening = this.panel === null;
      this.#show('problems');
    }
    if (!state.refused && before?.refused && this.#isOwnOpening && this.panel === 'problems')
      this.panel = null;
    if (before && asksAnew(state, before) && this.panel === null) this.#show('found');
    if (state.shownPlace) void import('./source-view.ts');
    this.#speak(state, before);
  }

  #speak(state: WorkbenchState, before: WorkbenchState | null): void {
    const { selection } = state;
    const isNew = selection !== before?.selection && state.derived === before?.derived;
    if (isNew || !selection) this.#unspoken = selection;
    const words = announcement(state, before);
    if (words !== null) this.#awaited = null;
    if (words !== null && state.derived !== before?.derived && before && state.derived?.crystal) {
      this.#awaited = words;
      void this.updateComplete.then(this.#sayAwaited);
    } else this.#spoken = words ?? this.#spoken;
    const site = this.#unspoken && this.store?.site(this.#unspoken.siteIndex);
    if (!this.#unspoken || !site) return;
    this.#spoken = selectionSentence(this.#unspoken, site);
    this.#unspoken = null;
  }

  readonly #enterBar = (event: FocusEvent): void => {
    this.#beforeBar = (event.relatedTarget as HTMLElement | null) ?? null;
  };

  /** What was cancelled is spoken of; the focus goes back to where it was, else to the first button of the page. */
  readonly #cancelled = ({ detail }: CustomEvent<string>): void => {
    const name = this.store?.state.derived?.crystal?.name;
    const rest = name ? `${name} stays on screen.` : 'Nothing is on screen.';
    this.#spoken = `Cancelled: ${detail}. ${rest}`;
    this.requestUpdate();
    const header = this.renderRoot.querySelector('ellipsite-page-header')?.shadowRoot;
    const before = this.#beforeBar?.isConnected ? this.#beforeBar : null;
    const inside = before?.shadowRoot?.querySelector<HTMLElement>('[tabindex="0"], button');
    (inside ?? before ?? header?.querySelector<HTMLElement>('button'))?.focus();
    this.#beforeBar = null;
  };

  readonly #sayAwaited = (): void => {
    const parts = this.renderRoot.querySelectorAll<SiteTable | CrystalView>(
      'ellipsite-site-table, ellipsite-crystal-view',
    );
    if (this.#awaited === null || [...parts].some(({ isCurrent }) => !isCurrent)) return;
    this.#spoken = this.#awaited;
    this.#awaited = null;
    this.requestUpdate();
  };

  override render(): TemplateResult {
    const { store, panel } = this;
    if (!store) return html``;
    const theme = effectiveTheme(store.state.theme);
    this.setAttribute('theme', theme);
    const isCleared = store.state.decisions === null && store.state.past.length > 0;
    return html`
      <ellipsite-page-header
        .store=${store}
        .panel=${panel}
        role="banner"
        @ask-panel=${this.#askPanel}
      ></ellipsite-page-header>
      <ellipsite-progress-bar
        .store=${store}
        @focusin=${this.#enterBar}
        @was-cancelled=${this.#cancelled}
      ></ellipsite-progress-bar>
      <div class="body ${panel ? 'with-drawer' : ''}" @ask-panel=${this.#askPanel}>
        <main class=${isCleared ? 'cleared' : ''} @part-shown=${this.#sayAwaited}>
          ${isCleared ? html`<p class="start">${emptyWords}</p>` : nothing}
          <ellipsite-crystal-view
            .store=${store}
            .theme=${theme}
            .probe=${this.probe}
          ></ellipsite-crystal-view>
          <div class="numbers">
            <ellipsite-site-table .store=${store}></ellipsite-site-table>
            <ellipsite-site-card .store=${store}></ellipsite-site-card>
          </div>
        </main>
        ${
          store.state.shownPlace
            ? html`<ellipsite-source-view .store=${store}></ellipsite-source-view>`
            : nothing
        }
        ${panel ? this.#drawer(panel) : nothing}
      </div>
      <ellipsite-drop-zone .store=${store}></ellipsite-drop-zone>
      <div class="hidden-but-spoken" role="status" aria-live="polite">${this.#spoken}</div>
    `;
  }

  protected override updated(changed: PropertyValues): void {
    if (changed.has('panel') && this.panel) this.renderRoot.querySelector<HTMLElement>('.drawer')?.focus();
  }

  #drawer(panel: NonNullable<Panel>): TemplateResult {
    const { store } = this;
    const names = {
      problems: 'Problems',
      settings: 'Settings',
      case: 'Case',
      found: 'Found',
      check: 'Check',
    } as const;
    return html`<aside class="drawer" tabindex="-1" role="dialog" aria-label=${names[panel]}>
      ${panel === 'problems' ? html`<ellipsite-problems-drawer .store=${store}></ellipsite-problems-drawer>` : nothing}
      ${panel === 'found' ? html`<ellipsite-found-panel .store=${store}></ellipsite-found-panel>` : nothing}
      ${panel === 'check' ? html`<ellipsite-check-panel .store=${store}></ellipsite-check-panel>` : nothing}
      ${panel === 'settings' ? html`<ellipsite-settings-panel .store=${store}></ellipsite-settings-panel>` : nothing}
      ${panel === 'case' ? html`<ellipsite-case-panel .store=${store} .keeper=${this.keeper}></ellipsite-case-panel>` : nothing}
    </aside>`;
  }

  readonly #askPanel = ({ detail }: CustomEvent<Panel>): void => {
    this.#isOwnOpening = false;
    if (detail) this.#show(detail);
    else this.#close();
  };

  #show(panel: NonNullable<Panel>): void {
    if (this.panel === null) this.#opener = deepestFocus();
    if (panel === 'problems') void import('./problems-drawer.ts');
    if (panel === 'settings') void import('./settings-panel.ts');
    if (panel === 'case') void import('./case-panel.ts');
    if (panel === 'found') void import('./found-panel.ts');
    if (panel === 'check') void import('./check-panel.ts');
    this.panel = panel;
  }

  #close(): void {
    this.panel = null;
    this.#opener?.focus();
    this.#opener = null;
  }

  readonly #shortcuts = (event: KeyboardEvent): void => {
    if (caseKey(event, this.store)) return;
    if (event.key !== 'Escape' || event.defaultPrevented) return;
    if (this.store?.state.shownPlace) this.store.showPlace(null);
    else if (this.panel) this.#close();
  };
}

/** A text has come that leaves something open. */
function asksAnew({ derived }: WorkbenchState, before: WorkbenchState): boolean {
  if (!derived?.found || derived === before.derived) return false;
  const known = new Set(before.derived?.found?.map(({ sourceId }) => sourceId));
  return derived.found.some(({ sourceId, questionCount }) => questionCount > 0 && !known.has(sourceId));
}

/** All there is on a page that was cleared. */
const emptyWords =
  'Nothing is open. Open or drop a structure or a case file; Case holds the samples, Undo brings the last case back.';

/** The focused element, through shadow roots. */
function deepestFocus(): HTMLElement | null {
  let focused = document.activeElement;
  while (focused?.shadowRoot?.activeElement) focused = focused.shadowRoot.activeElement;
  return focused instanceof HTMLElement ? focused : null;
}

customElements.define('ellipsite-workbench', Workbench);
