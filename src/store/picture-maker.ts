import type { SceneOptions } from '#src/scene/scene-options.ts';
import type { Scene } from '#src/scene/scene.ts';
import { Cancelled } from './engine-client.ts';
import type { EngineClient } from './engine-client.ts';
import type { DerivedCase } from './engine-protocol.ts';
import { NewestOnly } from './newest-only.ts';
import type { StateHolder } from './state-holder.ts';
import type { WorkbenchState } from './state.ts';

/** A picture and how it went. */
export type Drawn = Pick<WorkbenchState, 'scene' | 'sceneFault'>;

/** Milliseconds after which it is said that a picture is being made. */
const drawingIsLong = 500;

/** Has the engine describe pictures; of several asked for at a time only the newest is made. */
export class PictureMaker {
  readonly #holder: StateHolder;
  readonly #scenes: NewestOnly<
    { readonly derived: DerivedCase; readonly options: Partial<SceneOptions> },
    Scene
  >;

  constructor(holder: StateHolder, engine: EngineClient) {
    this.#holder = holder;
    this.#scenes = new NewestOnly(({ derived, options }) => engine.ask(derived, 'scene', options));
  }

  /** The picture of a crystal that is about to come on screen. */
  async first(derived: DerivedCase, picture: SceneOptions): Promise<Drawn> {
    const drawn = await this.#draw(derived, picture).catch(drawingFault);
    return { scene: drawn?.scene ?? null, sceneFault: drawn?.sceneFault ?? null };
  }

  /** Asks for the picture of the present options; until it comes the one before stays. */
  async redraw(): Promise<void> {
    const { derived, picture } = this.#holder.state;
    if (!derived?.crystal) return;
    const late = setTimeout(
      () => this.#holder.change({ isDrawing: true }, 'the picture is waited for'),
      drawingIsLong,
    );
    const drawn = await this.#draw(derived, picture).catch(drawingFault);
    clearTimeout(late);
    if (drawn && this.#holder.state.derived === derived)
      this.#holder.change({ ...drawn, isDrawing: false }, 'a new picture came');
  }

  async #draw(derived: DerivedCase, options: Partial<SceneOptions>): Promise<Drawn> {
    return { scene: await this.#scenes.ask({ derived, options }), sceneFault: null };
  }
}

/** What to show instead of a picture that could not be made; nothing where a newer one is on its way. */
function drawingFault(error: unknown): Partial<Drawn> | null {
  if (error instanceof Cancelled) return null;
  return { sceneFault: error instanceof Error ? error.message : String(error) };
}
