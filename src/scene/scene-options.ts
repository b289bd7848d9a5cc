import type { Vec3 } from '#src/base/matrix3.ts';
import type { ColourMapName, GlyphKind, SceneExtent, SceneQuantity } from './scene.ts';

/** What the colour of a tensor says. `difference` needs a second set of the same quantity. */
export type ColourMeaning =
  | 'isotropic'
  | 'span'
  | 'anisotropy'
  | 'asymmetry'
  | 'vzz'
  | 'coupling'
  | 'residual'
  | 'difference'
  | 'element'
  | 'site';

/** Every choice about what is drawn; `auto` and `null` leave it to the scene, which states in its caption what it took. */
export interface SceneOptions {
  /** A quantity the crystal has no tensors of falls back to one it has. */
  readonly quantity: SceneQuantity | 'auto';
  readonly showTensors: boolean;
  /**
   * Elements whose tensors are drawn; null for all. The other atoms stay small spheres. `auto` is all, but where one scale
   * would drown small field gradients beside large ones, those of quadrupolar nuclei other than hydrogen and oxygen; and where
   * ellipsoids of deviations are drawn, without elements that would look like spheres beside the largest deviation.
   */
  readonly tensorElements: readonly string[] | 'auto' | null;
  /** `cell`: atoms of one unit cell, those on its faces and edges repeated; `molecules`: each molecule whole. */
  readonly extent: 'auto' | SceneExtent;
  /** With extent `range`: lower and upper corner in cells, fractions allowed; atoms on either border are in. */
  readonly range: readonly [Vec3, Vec3];
  /** With extent `shell`: indices of the sites in the middle, and the distance round each of their atoms, Å. */
  readonly shell: { readonly siteIndices: readonly number[]; readonly radiusAngstrom: number } | null;
  /** `auto`: polar surfaces for field gradients, ellipsoids else. */
  readonly glyph: 'auto' | GlyphKind;
  /** `antisymmetric`: the axial vector of (T − Tᵀ)/2 as an arrow, right-handed. */
  readonly part: 'symmetric' | 'antisymmetric';
  /** Indices of the only sites whose tensors are drawn; null for all. */
  readonly tensorSites: readonly number[] | null;
  /** Tensors on all atoms of a site, on its first only, or on one for each orientation. */
  readonly tensorCopies: 'all' | 'first' | 'orientations';
  readonly colourBy: ColourMeaning;
  /** null takes the one that suits the quantity. */
  readonly colourMap: ColourMapName | null;
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
  readonly labelContent: 'site' | 'element' | 'value';
  /** Elements in the middle of coordination polyhedra; `auto` none, so far as nothing else is asked for. */
  readonly polyhedra: readonly string[];
  /** Displacement ellipsoids: not drawn, on atoms without a tensor, or instead of tensors. */
  readonly displacement: 'none' | 'beside' | 'instead';
  /** Probability that the atom is inside its displacement ellipsoid, 0 to 1. */
  readonly displacementProbability: number;
  /** Part of a sphere left pale where a site is partly occupied, or coloured by each element of a mixed site. */
  readonly occupancy: boolean;
  /** Disorder: all alternatives with a pattern each, all alike, or one group only by its name. */
  readonly disorder: 'patterns' | 'alike' | { readonly only: string };
}

export const defaultSceneOptions: SceneOptions = {
  quantity: 'auto',
  showTensors: true,
  tensorElements: 'auto',
  extent: 'auto',
  range: [
    [0, 0, 0],
    [1, 1, 1],
  ],
  shell: null,
  glyph: 'auto',
  part: 'symmetric',
  tensorSites: null,
  tensorCopies: 'all',
  colourBy: 'isotropic',
  colourMap: null,
  ellipsoid: 'auto',
  unitsPerAngstrom: null,
  colourLimits: null,
  bonds: true,
  bondedNeighbours: true,
  hydrogenBonds: true,
  cellEdges: true,
  labels: false,
  labelContent: 'site',
  polyhedra: [],
  displacement: 'none',
  displacementProbability: 0.5,
  occupancy: true,
  disorder: 'patterns',
};
