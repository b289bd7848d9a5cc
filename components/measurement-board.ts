import { measureDrawing } from '#src/scene/measure-drawing.ts';
import type { MeasureDrawing } from '#src/scene/measure-drawing.ts';
import type { MeasuredCrystal, MeasuredValue } from '#src/scene/measure.ts';
import { measure } from '#src/scene/measure.ts';
import type { Measurement } from '#src/scene/measurement.ts';
import type { WorkbenchState } from '#src/store/state.ts';
import type { Store } from '#src/store/store.ts';
import { kindWords, measuredName, valueText } from './measure-words.ts';

/** A measurement with its value for the crystal on screen; null where that lacks an atom, or it is on its way. */
export interface BoardEntry {
  readonly measurement: Measurement;
  readonly measured: MeasuredValue | null;
  readonly drawing: MeasureDrawing | null;
}

/** What measuring needs of the crystal on screen; sites are asked for where they aren't here. */
export function measuredCrystal(store: Store): MeasuredCrystal | null {
  const crystal = store.state.derived?.crystal;
  return crystal
    ? {
        lattice: crystal.lattice,
        periodic: crystal.periodic,
        symmetry: crystal.symmetry,
        site: (i) => store.site(i),
      }
    : null;
}

/** Values of the kept measurements, computed once a crystal: they are drawn on every frame. */
export class MeasurementBoard {
  #derived: WorkbenchState['derived'] = null;
  readonly #known = new Map<Measurement, BoardEntry>();

  entries(store: Store): BoardEntry[] {
    const { derived, measurements } = store.state;
    const crystal = measuredCrystal(store);
    if (derived !== this.#derived) this.#known.clear();
    this.#derived = derived;
    if (!crystal) return [];
    return measurements.map((measurement) => {
      const known = this.#known.get(measurement);
      if (known) return known;
      const measured = measure(measurement, crystal);
      const drawing = measured && measureDrawing(measurement.kind, measured);
      const entry = { measurement, measured, drawing };
      if (measured) this.#known.set(measurement, entry);
      return entry;
    });
  }
}

/** An id no kept measurement has. */
export function freeMeasurementId(measurements: readonly Measurement[]): string {
  const taken = new Set(measurements.map(({ id }) => id));
  let number = measurements.length + 1;
  while (taken.has(`m${number}`)) number += 1;
  return `m${number}`;
}

/** The newest measurement in words: `distance Si1–O1: 1.609 Å`; empty where its value isn't known. */
export function newestWords(board: MeasurementBoard, store: Store | null): string {
  const newest = store && board.entries(store).at(-1);
  const crystal = store && measuredCrystal(store);
  if (!newest?.measured || !crystal) return '';
  const { measurement, measured } = newest;
  return `${kindWords[measurement.kind]} ${measuredName(measurement, crystal)}: ${valueText(measured)}`;
}
