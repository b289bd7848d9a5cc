import type { Measurement } from '#src/scene/measurement.ts';
import type { PickEntry } from '#src/scene/scene.ts';
import type { Store } from '#src/store/store.ts';
import { atomsNeeded } from './measure-words.ts';
import type { PickedKind } from './measure-words.ts';
import { freeMeasurementId } from './measurement-board.ts';
import type { PickedAtom } from './picture-marks.ts';
import { isSameAtom, pickedAtom, toggled } from './picture-marks.ts';

/**
 * Picks atoms in the picture, one after another, and knows what they are picked for. The store holds which they are, so that
 * picking can be undone; its selection is the last of them.
 */
export class PictureMarker {
  readonly #host: { readonly store: Store | null };
  readonly #changed: () => void;
  #kind: PickedKind | null = null;

  constructor(host: { readonly store: Store | null }, changed: () => void) {
    this.#host = host;
    this.#changed = changed;
  }

  get marks(): readonly PickedAtom[] {
    return this.#host.store?.state.picked ?? [];
  }

  /** What is being measured; null while picking only selects. */
  get kind(): PickedKind | null {
    return this.#kind;
  }

  /** Numbers stand at the atoms where their order means something. */
  get isNumbered(): boolean {
    return this.#kind !== null || this.marks.length > 1;
  }

  /** A press on an atom, or beside all of them. */
  press(entry: PickEntry | null, adds: boolean, store: Store): void {
    const atom = pickedAtom(entry);
    if (this.#kind !== null) {
      if (atom) this.#take(atom, this.#kind, store);
      return;
    }
    if (!atom) this.#pick([], store);
    else this.#pick(adds ? toggled(this.#seeded(store), atom) : [atom], store);
  }

  /** Begins measuring, or ends it; atoms picked already are taken where they are as many as it takes. */
  measure(kind: PickedKind | null, store: Store): void {
    this.#kind = kind;
    if (kind && this.marks.length === atomsNeeded[kind]) this.#finish(kind, this.marks, store);
    else if (kind && this.marks.length > atomsNeeded[kind]) this.#forget(store);
    this.#changed();
  }

  measureAxes(axes: NonNullable<Measurement['axes']>, store: Store): void {
    this.#keep({ kind: 'axes', axes, atoms: this.marks }, store);
    this.#changed();
  }

  /** Another crystal: nothing is picked any more, and nothing measured. */
  end(): void {
    this.#kind = null;
  }

  /** Ends what is under way: measuring first, with what was picked for it, then the selection. False where nothing is. */
  clear(): boolean {
    const { store } = this.#host;
    if (!store || (this.#kind === null && this.marks.length === 0 && !store.state.selection)) return false;
    if (this.#kind === null) store.select(null);
    else this.#forget(store);
    this.#kind = null;
    this.#changed();
    return true;
  }

  /** The last atom picked for what is being measured, no longer. False where there is none. */
  takeBack(): boolean {
    const { store } = this.#host;
    if (!store || this.#kind === null || this.marks.length === 0) return false;
    this.#pick(this.marks.slice(0, -1), store);
    return true;
  }

  /** The picked atoms, or the one atom that is selected elsewhere, at its own place. */
  #seeded(store: Store): readonly PickedAtom[] {
    const { selection } = store.state;
    if (this.marks.length > 0 || !selection || selection.atomId === null) return this.marks;
    return [{ siteIndex: selection.siteIndex, atomId: selection.atomId, cellShift: [0, 0, 0] }];
  }

  #take(atom: PickedAtom, kind: PickedKind, store: Store): void {
    const { marks } = this;
    const last = marks.at(-1);
    const next = last && isSameAtom(last, atom) ? marks.slice(0, -1) : [...marks, atom];
    if (next.length === atomsNeeded[kind]) this.#finish(kind, next, store);
    else this.#pick(next, store);
  }

  /** Keeps what was measured; measuring goes on with the next atoms. What was picked goes first: undo takes back the measurement. */
  #finish(kind: PickedKind, atoms: readonly PickedAtom[], store: Store): void {
    this.#forget(store);
    this.#keep({ kind, atoms }, store);
  }

  #keep(measured: Omit<Measurement, 'id'>, store: Store): void {
    const atoms = measured.atoms.map(({ atomId, cellShift }) => ({ atomId, cellShift }));
    store.addMeasurement({ ...measured, atoms, id: freeMeasurementId(store.state.measurements) });
  }

  #pick(atoms: readonly PickedAtom[], store: Store): void {
    const last = atoms.at(-1);
    store.select(last ? { siteIndex: last.siteIndex, atomId: last.atomId } : null, atoms);
    this.#changed();
  }

  /** No atom is picked any more; what is selected stays. */
  #forget(store: Store): void {
    store.select(store.state.selection, []);
    this.#changed();
  }
}
