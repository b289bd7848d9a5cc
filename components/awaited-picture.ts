import type { WorkbenchState } from '#src/store/state.ts';

/** The crystal on screen: the same one with other numbers or another picture has the same key. */
function crystalKey({ derived, decisions }: WorkbenchState): string {
  return `${derived?.chosen?.sourceId} ${derived?.chosen?.index} ${decisions?.settings.symmetry}`;
}

/** Knows whether the canvas shows the crystal on screen: its first frame comes a while after its numbers. */
export class AwaitedPicture {
  #key: string | null = null;
  #drawnKey: string | null = null;

  /** Told every state; true where it is of another crystal than the state before. */
  turnTo(state: WorkbenchState): boolean {
    const key = crystalKey(state);
    const isOther = key !== this.#key;
    this.#key = key;
    return isOther;
  }

  /** A frame of the present scene is on the canvas; true for the first one of its crystal. */
  came(): boolean {
    const isFirst = this.#drawnKey !== this.#key;
    this.#drawnKey = this.#key;
    return isFirst;
  }

  shows(state: WorkbenchState): boolean {
    return this.#drawnKey === crystalKey(state);
  }
}
