import type { WorkbenchState } from './state.ts';

/** Told after every change, with a sentence that says what changed and why. */
export type Listener = (state: WorkbenchState, reason: string) => void;

/** The state of the page and who is told of its changes. */
export class StateHolder {
  readonly #listeners = new Set<Listener>();
  #state: WorkbenchState;

  constructor(initial: WorkbenchState) {
    this.#state = initial;
  }

  get state(): WorkbenchState {
    return this.#state;
  }

  /** Calls the listener after every change until the returned function is called. */
  subscribe(listener: Listener): () => void {
    this.#listeners.add(listener);
    return () => this.#listeners.delete(listener);
  }

  change(change: Partial<WorkbenchState>, reason: string): void {
    this.#state = { ...this.#state, ...change };
    for (const listener of [...this.#listeners]) listener(this.#state, reason);
  }
}
