import type { SceneQuantity } from './scene.ts';

/** Every choice about what is drawn; `auto` and `null` leave it to the scene, which states in its caption what it took. */
export interface SceneOptions {
  /** A quantity the crystal has no tensors of falls back to one it has. */
  readonly quantity: SceneQuantity | 'auto';
  readonly showTensors: boolean;
  /**
   * Elements whose tensors are drawn; null for all. The other atoms stay small spheres. `auto` is all, but where one scale
   * would drown small field gradients beside large ones, those of quadrupolar nuclei other than hydrogen and oxygen.
   */
  readonly tensorElements: readonly string[] | 'auto' | null;
  /** `cell`: atoms of one unit cell, those on its faces and edges repeated; `molecules`: each molecule whole. */
  readonly extent: 'auto' | 'cell' | 'molecules';
  readonly ellipsoid: 'auto' | 'total' | 'deviation';
  /** ppm or a.u. that make one Å. */
  readonly unitsPerAngstrom: number | null;
  /** Ends of the colour bar, ppm or a.u. */
  readonly colourLimits: readonly [number, number] | null;
  readonly bonds: boolean;
  /** With `cell`: atoms outside that are bonded to atoms inside, as small spheres, so that no bond ends in nothing. */
  readonly bondedNeighbours: boolean;
  readonly hydrogenBonds: boolean;
  readonly cellEdges: boolean;
  readonly labels: boolean;
}

export const defaultSceneOptions: SceneOptions = {
  quantity: 'auto',
  showTensors: true,
  tensorElements: 'auto',
  extent: 'auto',
  ellipsoid: 'auto',
  unitsPerAngstrom: null,
  colourLimits: null,
  bonds: true,
  bondedNeighbours: true,
  hydrogenBonds: true,
  cellEdges: true,
  labels: false,
};
