import type { Camera } from '#src/scene/camera.ts';
import type { PickHit } from '#src/scene/pick.ts';
import type { Scene } from '#src/scene/scene.ts';
import type { RenderTheme } from '#src/scene/theme.ts';

/** What draws the picture, in words for people. */
export type DrawnBy = 'WebGL 2' | 'the CPU';

export interface RendererOptions {
  readonly theme?: RenderTheme;
  /**
   * Samples across a pixel at rest, 1 to turn smoothing off; 1 is always used while the picture changes. Usual: 2 without a
   * graphics chip or on dense screens, else 3.
   */
  readonly samplesAcross?: number;
  /** Called when the context was lost, and when the picture is back. Nothing needs to be set again. */
  readonly onContextLost?: () => void;
  readonly onContextRestored?: () => void;
  /** Called when a frame is on the canvas, with the scene it shows. */
  readonly onFrame?: (scene: Scene) => void;
  /** Called when the CPU renderer has stepped in for a lost context. */
  readonly onStandIn?: () => void;
}

export interface RenderCounters {
  /** Frames drawn so far, fast ones and smoothed ones. */
  readonly frames: number;
  readonly smoothFrames: number;
  readonly quadrics: number;
  readonly cylinders: number;
  readonly lines: number;
  readonly drawCalls: number;
  /** How often the context was lost. */
  readonly contextLosses: number;
  /** What changed last, as a sentence. */
  readonly lastReason: string;
  readonly drawnBy: DrawnBy;
}

/**
 * Draws a scene on demand: each `set…` marks the picture as stale, the next animation frame draws it, and when nothing has
 * changed for a moment it is drawn once more with smoothed edges.
 */
export interface CrystalRenderer {
  setScene(scene: Scene): void;
  setCamera(camera: Camera): void;
  setTheme(theme: RenderTheme): void;
  /** Atom ids (EquivalentAtom.id); every drawn copy gets its ring. */
  setSelection(atomIds: readonly string[]): void;
  setHover(atomId: string | null): void;
  /** CSS pixels, and device pixels for one of them. The canvas' own style is left alone. */
  resize(widthPx: number, heightPx: number, devicePixelRatio?: number): void;
  /** Draws now, smoothed, so that the canvas can be read in the same task. */
  render(): void;
  pick(xPx: number, yPx: number): PickHit | null;
  counters(): RenderCounters;
  dispose(): void;
}

/** ms without a change before the picture is smoothed. */
export const restMs = 140;

/** Rings, one a quadric: 0 plain, 1 hovered, 2 selected, 3 both. */
export function ringStates(scene: Scene, selected: ReadonlySet<string>, hovered: string | null): Uint8Array {
  const states = new Uint8Array(scene.quadrics.count);
  for (let i = 0; i < states.length; i++) {
    const entry = scene.picks[scene.quadrics.pickIds[i]! - 1];
    if (scene.quadrics.ringRadii?.[i] === 0 || entry?.kind !== 'atom' || entry.context) continue;
    states[i] = (entry.atomId === hovered ? 1 : 0) + (selected.has(entry.atomId) ? 2 : 0);
  }
  return states;
}
