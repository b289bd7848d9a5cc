import type { Mat3 } from '#src/base/matrix3.ts';
import { identity3, multiply, scaleMatrix } from '#src/base/matrix3.ts';
import { siteColourBytes } from '#src/data/site-colour.ts';
import { atomColour, atomRadius, bondColour } from './atom-style.ts';
import type { DrawnAtom } from './drawn-atoms.ts';
import type { OccupancyLook } from './occupancy.ts';
import type { PickEntry, QuadricBatch } from './scene.ts';
import type { TensorDrawing } from './tensor-drawing.ts';
import { centreRadius, glyphReach } from './tensor-drawing.ts';
import type { PrincipalForm, TensorShape } from './tensor-shape.ts';
import { tensorShape } from './tensor-shape.ts';

type Rgb = readonly [number, number, number];

/** Everything that decides how atoms look. */
export interface AtomsLook {
  readonly tensors: TensorDrawing | null;
  /** Displacement ellipsoids at the sites' own positions, by site index; `circles`: with principal circles. */
  readonly displacement: { readonly shapes: ReadonlyMap<number, Mat3>; readonly circles: boolean } | null;
  /** By site index; empty where occupancies are not shown. */
  readonly occupancy: ReadonlyMap<number, OccupancyLook>;
  /** By site index. */
  readonly patterns: ReadonlyMap<number, number>;
  /** Patterns tell alternatives of disorder apart; else they mark negative values. */
  readonly hasDisorderPatterns: boolean;
  readonly isSiteColoured: boolean;
  /** Grey where an element's colour would be read off the colour bar. */
  readonly isNeutral: boolean;
  /** Orthonormal columns: the frame of divided and patterned spheres. */
  readonly frame: Mat3;
}

/** One ellipsoid. */
export interface QuadricLook {
  readonly shape: Mat3;
  readonly circles: number;
  readonly colour: Rgb;
  /** 255: undivided. */
  readonly share: number;
  readonly rest: Rgb;
  readonly pattern: number;
  /** As QuadricBatch.ringRadii. */
  readonly ringRadius: number;
}

/** Quadrics and picks of all drawn atoms in their order. */
export function atomQuadrics(
  atoms: readonly DrawnAtom[],
  look: AtomsLook,
): { readonly quadrics: QuadricBatch; readonly picks: readonly PickEntry[] } {
  const count = atoms.length;
  const centres = new Float32Array(3 * count);
  const shapes = new Float32Array(9 * count);
  const colours = new Uint8Array(3 * count);
  const circles = new Uint8Array(count);
  const pickIds = new Uint32Array(count);
  const shares = new Uint8Array(count).fill(255);
  const restColours = new Uint8Array(3 * count);
  const patterns = new Uint8Array(count);
  const ringRadii = new Float32Array(count).fill(ownOutline);
  const picks = atoms.map((drawn, i): PickEntry => {
    const one = lookOf(drawn, i, look);
    centres.set(drawn.position, 3 * i);
    shapes.set(one.shape, 9 * i);
    colours.set(one.colour, 3 * i);
    circles[i] = one.circles;
    pickIds[i] = i + 1;
    shares[i] = one.share;
    restColours.set(one.rest, 3 * i);
    patterns[i] = one.pattern;
    ringRadii[i] = one.ringRadius;
    const { atom, site, cellShift, context } = drawn;
    return { kind: 'atom', atomId: atom.id, siteIndex: site.index, cellShift, context };
  });
  const isDivided = shares.some((share) => share < 255);
  return {
    quadrics: {
      ...{ count, centres, shapes, colours, circles, pickIds },
      ...(isDivided ? { shares, restColours } : {}),
      ...(patterns.some((pattern) => pattern > 0) ? { patterns } : {}),
      ...(ringRadii.some((radius) => radius !== ownOutline) ? { ringRadii } : {}),
    },
    picks,
  };
}

/** Neighbours outside are this much smaller, so that they stand back. */
const contextShare = 0.58;

const ownOutline = -1;
const undivided = { share: 255, rest: [0, 0, 0], circles: 0, pattern: 0, ringRadius: ownOutline } as const;

function lookOf(drawn: DrawnAtom, index: number, look: AtomsLook): QuadricLook {
  const { site, atom, context } = drawn;
  if (context) {
    // beside displacement ellipsoids a sphere of the usual size would stand in front of what it completes
    const own = look.displacement?.circles ? look.displacement.shapes.get(site.index) : undefined;
    const shape = own
      ? multiply(atom.rotation, own)
      : scaleMatrix(atomRadius(site.element) * contextShare, identity3);
    const colour = look.isSiteColoured
      ? siteColourBytes(site.index)
      : bondColour(site.element, look.isNeutral);
    return { ...undivided, shape, colour };
  }
  const occupancy = look.occupancy.get(site.index);
  const share = occupancy?.share ?? 255;
  const rest = occupancy?.rest ?? undivided.rest;
  const pattern = look.patterns.get(site.index) ?? 0;
  const divided = { share, rest, pattern, ringRadius: ownOutline };
  const form = look.tensors?.carries[index] ? look.tensors.forms.get(site.index) : undefined;
  if (form && look.tensors) {
    const colour = look.tensors.centreColourOf(site.index);
    const radius = centreRadius(look.tensors);
    if (radius !== null) {
      const ringRadius = glyphReach(site.index, form, look.tensors);
      return { ...divided, ringRadius, shape: sphere(radius, divided, look), circles: 0, colour };
    }
    return { ...divided, ...ellipsoidOf(site.index, form, atom.rotation, look.tensors), colour };
  }
  const colour = look.isSiteColoured ? siteColourBytes(site.index) : atomColour(site.element);
  const displaced = look.displacement?.shapes.get(site.index);
  if (displaced) {
    const circles = look.displacement?.circles ? 0b111 : 0;
    return { ...divided, shape: multiply(atom.rotation, displaced), circles, colour };
  }
  return { ...divided, shape: sphere(atomRadius(site.element), divided, look), circles: 0, colour };
}

const ownShapes = new WeakMap<TensorDrawing, Map<number, TensorShape>>();

/** The ellipsoid of a site, made once and turned for each of its atoms. */
function ellipsoidOf(
  siteIndex: number,
  form: PrincipalForm,
  rotation: Mat3,
  tensors: TensorDrawing,
): TensorShape {
  const shapes = ownShapes.get(tensors) ?? new Map<number, TensorShape>();
  ownShapes.set(tensors, shapes);
  const own = shapes.get(siteIndex) ?? tensorShape(form, identity3, tensors.scale);
  shapes.set(siteIndex, own);
  return { shape: multiply(rotation, own.shape), circles: own.circles };
}

/** Spheres whose surface is marked turn with the crystal: the marks stand in the frame of its cell. */
function sphere(
  radius: number,
  { share, pattern }: Pick<QuadricLook, 'share' | 'pattern'>,
  { frame }: AtomsLook,
): Mat3 {
  return scaleMatrix(radius, share < 255 || pattern > 0 ? frame : identity3);
}
