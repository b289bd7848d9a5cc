import type { Measurement } from '#src/scene/measurement.ts';
import type { PickEntry } from '#src/scene/scene.ts';
import type { Selection } from '#src/store/state.ts';
import type { Store } from '#src/store/store.ts';
import { atomsNeeded } from './measure-words.ts';
import type { PickedKind } from './measure-words.ts';
import { freeMeasurementId } from './measurement-board.ts';
import type { PickedAtom } from './picture-marks.ts';
import { isSameAtom, pickedAtom, toggled } from './picture-marks.ts';

/** Atoms picked in the picture, one after another, and what they are picked for. The store's selection follows the last one. */
export class PictureMarker {
  readonly #changed: () => void;
  #marks: readonly PickedAtom[] = [];
  #kind: PickedKind | null = null;

  constructor(changed: () => void) {
    this.#changed = changed;
  }

  get marks(): readonly PickedAtom[] {
    return this.#marks;
  }

  /** What is being measured; null while picking only selects. */
  get kind(): PickedKind | null {
    return this.#kind;
  }

  /** Numbers stand at the atoms where their order means something. */
  get isNumbered(): boolean {
    return this.#kind !== null || this.#marks.length > 1;
  }

  /** A press on an atom, or beside all of them. */
  press(entry: PickEntry | null, adds: boolean, store: Store): void {
    const atom = pickedAtom(entry);
    if (this.#kind !== null) {
      if (atom) this.#take(atom, this.#kind, store);
      return;
    }
    if (!atom) this.#marks = [];
    else this.#marks = adds ? toggled(this.#seeded(store), atom) : [atom];
    this.#follow(store);
  }

  /** Begins measuring, or ends it; atoms picked already are taken where they are as many as it takes. */
  measure(kind: PickedKind | null, store: Store): void {
    this.#kind = kind;
    if (kind && this.#marks.length === atomsNeeded[kind]) this.#finish(kind, store);
    else if (kind && this.#marks.length > atomsNeeded[kind]) this.#marks = [];
    this.#changed();
  }

  measureAxes(axes: NonNullable<Measurement['axes']>, store: Store): void {
    this.#keep({ kind: 'axes', axes, atoms: this.#marks }, store);
    this.#changed();
  }

  /** The selection came from elsewhere: marks that don't belong to it go. */
  forgetUnless(selection: Selection | null): void {
    const last = this.#marks.at(-1);
    if (this.#kind !== null || !last) return;
    const isSame =
      selection?.siteIndex === last.siteIndex && (selection.atomId ?? last.atomId) === last.atomId;
    if (!isSame) this.#marks = [];
  }

  clear(): void {
    this.#marks = [];
    this.#kind = null;
    this.#changed();
  }

  /** The picked atoms, or the one atom that is selected elsewhere, at its own place. */
  #seeded(store: Store): readonly PickedAtom[] {
    const { selection } = store.state;
    if (this.#marks.length > 0 || !selection || selection.atomId === null) return this.#marks;
    return [{ siteIndex: selection.siteIndex, atomId: selection.atomId, cellShift: [0, 0, 0] }];
  }

  #take(atom: PickedAtom, kind: PickedKind, store: Store): void {
    const last = this.#marks.at(-1);
    this.#marks = last && isSameAtom(last, atom) ? this.#marks.slice(0, -1) : [...this.#marks, atom];
    if (this.#marks.length === atomsNeeded[kind]) this.#finish(kind, store);
    this.#follow(store);
  }

  /** Keeps what was measured; measuring goes on with the next atoms. */
  #finish(kind: PickedKind, store: Store): void {
    this.#keep({ kind, atoms: this.#marks }, store);
    this.#marks = [];
  }

  #keep(measured: Omit<Measurement, 'id'>, store: Store): void {
    const atoms = measured.atoms.map(({ atomId, cellShift }) => ({ atomId, cellShift }));
    store.addMeasurement({ ...measured, atoms, id: freeMeasurementId(store.state.measurements) });
  }

  #follow(store: Store): void {
    const last = this.#marks.at(-1);
    if (this.#kind === null || last)
      store.select(last ? { siteIndex: last.siteIndex, atomId: last.atomId } : null);
    this.#changed();
  }
}
