import { LitElement } from 'lit';
import type { PropertyDeclarations, PropertyValues } from 'lit';
import type { Store } from '#src/store/store.ts';
import type { WorkbenchState } from '#src/store/state.ts';

/** An element that draws a part of the store's state and is drawn again only when one of its fields changed. */
export abstract class StoreElement extends LitElement {
  static override properties: PropertyDeclarations = { store: { attribute: false } };

  declare store: Store | null;

  /** Fields of the state this element draws. */
  protected abstract readonly watches: readonly (keyof WorkbenchState)[];
  #unsubscribe: (() => void) | null = null;
  #drawn: WorkbenchState | null = null;

  constructor() {
    super();
    this.store = null;
  }

  override connectedCallback(): void {
    super.connectedCallback();
    this.#subscribe();
  }

  override disconnectedCallback(): void {
    super.disconnectedCallback();
    this.#unsubscribe?.();
    this.#unsubscribe = null;
  }

  protected override willUpdate(changed: PropertyValues): void {
    if (changed.has('store')) this.#subscribe();
  }

  /** Called when watched fields changed, before the element is drawn again. */
  protected stateChanged(_state: WorkbenchState, _before: WorkbenchState | null): void {
    // Elements that keep something of their own between states override this.
  }

  #subscribe(): void {
    this.#unsubscribe?.();
    this.#unsubscribe = null;
    if (!this.store) return;
    this.#receive(this.store.state);
    this.#unsubscribe = this.store.subscribe((state) => this.#receive(state));
  }

  #receive(state: WorkbenchState): void {
    const before = this.#drawn;
    if (before && this.watches.every((field) => before[field] === state[field])) return;
    this.#drawn = state;
    this.stateChanged(state, before);
    this.requestUpdate();
  }
}
