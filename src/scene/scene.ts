import type { Vec3 } from '#src/base/matrix3.ts';

/**
 * Ellipsoids and spheres. One quadric is { centre + A u : |u| = 1 }; the columns of A are its semi-axis vectors.
 * Colours are sRGB bytes, not premultiplied by any light.
 */
export interface QuadricBatch {
  readonly count: number;
  /** Three a quadric, Å, Cartesian frame of the lattice. */
  readonly centres: Float32Array;
  /** Nine a quadric: A row-major, Å. Never singular. */
  readonly shapes: Float32Array;
  /** Three a quadric. */
  readonly colours: Uint8Array;
  /** Bit k set: the great circle perpendicular to semi-axis k (column k of A) is drawn. */
  readonly circles: Uint8Array;
  /** Index into `picks`, plus 1. */
  readonly pickIds: Uint32Array;
  /**
   * One a quadric: how much of it has its own colour, 255 for all. The rest, from the azimuth 2π·share/255 about column 2 of A
   * (counted from column 0 towards column 1) to 2π, has its `restColours`: partial occupancy and mixed sites. Absent: all 255.
   */
  readonly shares?: Uint8Array;
  /** Three a quadric; read only where the share is below 255. */
  readonly restColours?: Uint8Array;
  /** One a quadric: 0 plain, 1 striped, 2 dotted (in the own frame of A): disorder alternatives. Absent: all plain. */
  readonly patterns?: Uint8Array;
  /**
   * One a quadric, Å: a ring goes round a circle of this radius about the centre, which holds what else is drawn of the atom (polar
   * surface, rods); -1: round the quadric's own outline; 0: no ring, as the atom has it elsewhere. Absent: all -1.
   */
  readonly ringRadii?: Float32Array;
}

/**
 * Signed polar surfaces of symmetric tensors: the points centre + |n·T·n| n for all unit vectors n. Drawn as meshes whose
 * fineness follows their size on screen; negative lobes have another colour or a darker one, and are striped too.
 */
export interface PolarBatch {
  readonly count: number;
  /** Three a surface, Å. */
  readonly centres: Float32Array;
  /** Six a surface: T as xx, yy, zz, xy, xz, yz in Å. */
  readonly tensors: Float32Array;
  /** Three a surface. */
  readonly positiveColours: Uint8Array;
  readonly negativeColours: Uint8Array;
  readonly pickIds: Uint32Array;
}

/** Flat triangles seen through: faces of coordination polyhedra. Drawn after all else, the farther ones first; never picked. */
export interface FacetBatch {
  readonly count: number;
  /** Nine a triangle, Å. */
  readonly corners: Float32Array;
  /** Four a triangle: sRGB and opacity. */
  readonly colours: Uint8Array;
}

/** Straight round cylinders with flat ends: bonds, and the dashes of hydrogen bonds. */
export interface CylinderBatch {
  readonly count: number;
  /** Three a cylinder, Å. */
  readonly starts: Float32Array;
  readonly ends: Float32Array;
  /** Å. */
  readonly radii: Float32Array;
  /** Three a cylinder: colour of the half at `start`, and of the half at `end`. */
  readonly startColours: Uint8Array;
  readonly endColours: Uint8Array;
  readonly pickIds: Uint32Array;
}

/** Straight lines of constant width on screen, in the theme's line colour: cell edges. */
export interface LineBatch {
  readonly count: number;
  /** Three a line, Å. */
  readonly starts: Float32Array;
  readonly ends: Float32Array;
  /** CSS pixels. */
  readonly widthPx: number;
}

/** What a pick id leads back to. */
export type PickEntry =
  | {
      readonly kind: 'atom';
      /** EquivalentAtom.id */
      readonly atomId: string;
      readonly siteIndex: number;
      /** Cell of this copy, against the atom's own position in the dossier. */
      readonly cellShift: Vec3;
      /** A bonded neighbour outside the picture's own atoms: a small sphere without tensor and rings. */
      readonly context: boolean;
    }
  | {
      readonly kind: 'bond';
      readonly bond: 'bond' | 'hydrogen';
      readonly fromAtomId: string;
      readonly toAtomId: string;
      readonly lengthAngstrom: number;
    };

/** A text to stand beside an atom. */
export interface LabelAnchor {
  readonly text: string;
  readonly position: Vec3;
  /** Pick id of the atom. */
  readonly pickId: number;
  /** Index of the atom's quadric. */
  readonly quadric: number;
}

/** Name of a colour map of src/data/colour-maps.data.ts. */
export type ColourMapName = 'batlow' | 'vik';

/** What stands for a tensor in the picture. */
export type GlyphKind = 'ellipsoid' | 'polar' | 'axes';

/** Colour bar: what the colour of a tensor says. */
export interface Legend {
  /** Such as "isotropic shielding". */
  readonly title: string;
  readonly unit: 'ppm' | 'a.u.' | 'MHz' | '';
  readonly low: number;
  readonly high: number;
  /** Fraction digits with which `low` and `high` are printed. */
  readonly digits: number;
  readonly map: ColourMapName;
  /** True where the middle of the bar is zero. */
  readonly diverging: boolean;
  /** Evenly spaced from low to high, sRGB bytes. */
  readonly stops: readonly (readonly [number, number, number])[];
}

/** One element that is drawn in its own colour, for a key beside the picture. */
export interface ElementKey {
  readonly element: string;
  readonly colour: readonly [number, number, number];
}

/** One site that is drawn in its own colour. */
export interface SiteKey {
  readonly label: string;
  readonly colour: readonly [number, number, number];
}

/** What a key beside the picture says besides colour bar, scale and elements: the same words on the page and in files. */
export interface PictureKey {
  /** What the glyphs are, such as "shielding tensors σ/ppm", where no colour bar of the same quantity says it. */
  readonly subject: string | null;
  /** How tensors became lengths, such as "radius = |n·σ·n − σ(iso)|"; null without tensors. */
  readonly lengths: string | null;
  /** Where negative lobes are drawn: they are striped, and darker where `positive` is null as colours say something else than the sign. */
  readonly lobes: {
    readonly positive: readonly [number, number, number] | null;
    readonly negative: readonly [number, number, number];
    /** Such as "negative (striped)". */
    readonly negativeWords: string;
  } | null;
  /** Sites in their own colours, the first dozen of them. */
  readonly sites: readonly SiteKey[];
  readonly moreSites: number;
  /** Why the key's elements have their own colours beside tensors that have others, such as "without a tensor"; null where all do. */
  readonly elementsWords: string | null;
  /** Such as "displacement ellipsoids at 50 %" or "pale part: unoccupied share". */
  readonly marks: readonly string[];
}

export interface CellAxis {
  readonly letter: 'a' | 'b' | 'c';
  /** The cell vector, Å. */
  readonly vector: Vec3;
}

/** Enclosing sphere of everything drawn. */
export interface SceneBounds {
  readonly centre: Vec3;
  readonly radiusAngstrom: number;
}

/** What stands for a tensor: its principal values as semi-axes, or a sphere bulged by the deviation. */
export type EllipsoidKind = 'total' | 'deviation';

export type SceneQuantity = 'shielding' | 'shift' | 'efg';

/** How tensors were turned into lengths; the statement in words is `Scene.scaleStatement`. */
export interface TensorScale {
  readonly quantity: SceneQuantity;
  readonly kind: EllipsoidKind;
  /** ppm or a.u. that make one Å. */
  readonly unitsPerAngstrom: number;
  /** Å; radius of a tensor without deviation; 0 where kind is `total`, and for polar surfaces, rods and axial vectors. */
  readonly baseRadiusAngstrom: number;
  /** Absent: ellipsoids. */
  readonly glyph?: GlyphKind;
  /** Why these tensors have no ellipsoids of their total values, in words behind "because"; absent where they have. */
  readonly totalFault?: string;
  /** `antisymmetric`: the scale is that of axial vectors. Absent: the symmetric part is drawn. */
  readonly part?: 'symmetric' | 'antisymmetric';
}

/** Which atoms are in the picture. */
export type SceneExtent = 'cell' | 'molecules' | 'asymmetric' | 'range' | 'shell';

/**
 * One picture of one crystal, ready to draw: plain arrays in Å, in the Cartesian frame of the crystal's lattice.
 * Holds nothing of a screen, a theme or a camera, and crosses worker borders.
 */
export interface Scene {
  readonly quadrics: QuadricBatch;
  readonly cylinders: CylinderBatch;
  readonly lines: LineBatch;
  /** Absent: none. */
  readonly polars?: PolarBatch;
  readonly facets?: FacetBatch;
  readonly labels: readonly LabelAnchor[];
  /** Empty without a cell. */
  readonly axes: readonly CellAxis[];
  readonly bounds: SceneBounds;
  readonly picks: readonly PickEntry[];
  readonly legend: Legend | null;
  readonly elements: readonly ElementKey[];
  readonly scale: TensorScale | null;
  /** Such as "1 Å = 250 ppm"; null without tensors. */
  readonly scaleStatement: string | null;
  /** One or two sentences: what is drawn, in which convention. */
  readonly caption: string;
  readonly extent: SceneExtent;
  /** Four bytes a site of the dossier: the sRGB colour its tensor has by the legend, and 255, or 0 where it has none. */
  readonly siteColours?: Uint8Array;
  /** Absent in scenes made by hand: nothing. */
  readonly key?: PictureKey;
  /** Sentences on wishes of the options that could not be followed, with what is drawn instead. Absent: none. */
  readonly unfollowed?: readonly string[];
  /** Sentences on tensors that the one scale of the picture hides, with their sizes. Absent: none. */
  readonly sizeNotes?: readonly string[];
  /** Sentences on what the colours cannot say: no such number, nothing but rounding, values beyond typed limits. Absent: none. */
  readonly colourNotes?: readonly string[];
  /** Colours of positive and negative lobes where all polar surfaces have the same two, for a key beside the picture. */
  readonly lobeColours?: {
    readonly positive: readonly [number, number, number];
    readonly negative: readonly [number, number, number];
  };
  /** Which site is drawn in place of one that shares its position and is not drawn, by the index of the latter. Absent: none. */
  readonly drawnInstead?: ReadonlyMap<number, number>;
  /** Elements whose tensors are drawn, where not all are; null for all, or without tensors. */
  readonly tensorElements?: readonly string[] | null;
}
