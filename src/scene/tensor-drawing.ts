import type { Mat3, Vec3 } from '#src/base/matrix3.ts';
import { apply, determinant, multiply, transpose } from '#src/base/matrix3.ts';
import { add, length, normalize, scale, subtract } from '#src/base/vector3.ts';
import type { Cylinder } from './cylinder-list.ts';
import { dashesToTheEnds } from './cylinder-list.ts';
import type { DrawnAtom } from './drawn-atoms.ts';
import type { PolarBatch, TensorScale } from './scene.ts';
import type { ChosenTensors } from './tensor-choice.ts';
import { lobeColours } from './tensor-choice.ts';
import type { PrincipalForm } from './tensor-shape.ts';
import { largestReach } from './tensor-shape.ts';

type Rgb = readonly [number, number, number];

/** What the atoms' tensors are drawn with. */
export interface TensorDrawing {
  readonly choice: ChosenTensors;
  /** By site index. */
  readonly forms: ReadonlyMap<number, PrincipalForm>;
  /** Axial vectors of the antisymmetric parts by site index, ppm or a.u.; empty unless they are drawn. */
  readonly axial: ReadonlyMap<number, Vec3>;
  readonly scale: TensorScale;
  /** One for each drawn atom: whether its tensor is drawn. */
  readonly carries: Uint8Array;
  /** Colour of the ellipsoid or sphere in the atom's place. */
  readonly centreColourOf: (siteIndex: number) => Rgb;
}

/** Å; spheres that mark the atom inside a polar surface, rods or an axial vector. */
const centreRadii = { polar: 0.07, axes: 0.1, axial: 0.1 } as const;
/** The mark inside a polar surface. */
export const lobeCentreColour: Rgb = [96, 92, 86];
/** How far negative lobes are darker where colour says a value: seen beside the positive ones, with the hue still plain. */
export const negativeLobeShade = -0.4;

/** Radius of the sphere in the middle of a glyph, Å; null where the tensor is an ellipsoid itself. */
export function centreRadius({ scale: { glyph, part } }: TensorDrawing): number | null {
  if (part === 'antisymmetric') return centreRadii.axial;
  return glyph === 'polar' || glyph === 'axes' ? centreRadii[glyph] : null;
}

/** Å; how far the polar surface, rods or axial vector of a site reach from the atom, the sphere in the middle at least. */
export function glyphReach(siteIndex: number, form: PrincipalForm, drawing: TensorDrawing): number {
  const { kind, part, unitsPerAngstrom } = drawing.scale;
  const centre = centreRadius(drawing) ?? 0;
  if (part !== 'antisymmetric') return Math.max(centre, largestReach(form, kind) / unitsPerAngstrom);
  const size = length(drawing.axial.get(siteIndex) ?? [0, 0, 0]) / unitsPerAngstrom;
  return Math.max(centre, size);
}

/** R M Rᵀ */
export function turned(rotation: Mat3, m: Mat3): Mat3 {
  return multiply(multiply(rotation, m), transpose(rotation));
}

/** Signed polar surfaces of the tensors drawn: total, or without the isotropic value, each turned with its atom (R T Rᵀ). */
export function polarSurfaces(atoms: readonly DrawnAtom[], drawing: TensorDrawing): PolarBatch {
  const places = [...atoms.keys()].filter((i) => drawing.carries[i]);
  const count = places.length;
  const batch = {
    count,
    centres: new Float32Array(3 * count),
    tensors: new Float32Array(6 * count),
    positiveColours: new Uint8Array(3 * count),
    negativeColours: new Uint8Array(3 * count),
    pickIds: new Uint32Array(count),
  };
  const { kind, unitsPerAngstrom } = drawing.scale;
  places.forEach((place, k) => {
    const { atom, site, position } = atoms[place]!;
    const form = drawing.forms.get(site.index)!;
    const zero = kind === 'total' ? 0 : form.isotropic;
    const [xx, xy, xz, , yy, yz, , , zz] = turned(atom.rotation, form.matrix);
    const six = [xx - zero, yy - zero, zz - zero, xy, xz, yz].map((value) => value / unitsPerAngstrom);
    const { positive, negative } = lobesOf(site.index, drawing.choice);
    batch.centres.set(position, 3 * k);
    batch.tensors.set(six, 6 * k);
    batch.positiveColours.set(positive, 3 * k);
    batch.negativeColours.set(negative, 3 * k);
    batch.pickIds[k] = place + 1;
  });
  return batch;
}

/** Colours of a site's lobes: of the sign alone; else all of its value, the negative ones darker (and striped, as always). */
function lobesOf(
  siteIndex: number,
  { colourBy, colours }: ChosenTensors,
): { readonly positive: Rgb; readonly negative: Rgb } {
  if (colourBy === 'sign') return lobeColours;
  const positive = colours.get(siteIndex)!;
  return { positive, negative: shaded(positive, negativeLobeShade) };
}

/** Å; rods of the first, second and third principal axis, the last one thicker than a bond that it may lie in. */
const rodRadii: Vec3 = [0.034, 0.052, 0.075];
/** How far their colours are moved: towards white, not at all, towards black. */
const rodShades: Vec3 = [0.45, 0, -0.4];
/** Å; dash and gap of rods of negative values. */
const rodDashAngstrom = 0.15;
/** Dashes of one rod, at most: each is a cylinder, and there are three rods on every atom. Of many atoms the eye sees fewer. */
const mostDashes = (carrying: number): number => (carrying > 3000 ? 3 : 7);
/** Å; shorter rods and vectors are not drawn. */
const leastLengthAngstrom = 1e-3;

/** Rods along the defined principal axes through the atom, half as long as the principal value (or its deviation); negative ones dashed. */
export function axisRods(atoms: readonly DrawnAtom[], drawing: TensorDrawing): Cylinder[] {
  const rods: Cylinder[] = [];
  const { kind, unitsPerAngstrom } = drawing.scale;
  const carrying = drawing.carries.reduce((sum, one) => sum + one, 0);
  const dashes = { periodAngstrom: rodDashAngstrom, mostDashes: mostDashes(carrying) };
  atoms.forEach(({ atom, site, position }, i) => {
    const form = drawing.carries[i] ? drawing.forms.get(site.index) : undefined;
    if (!form) return;
    const own = drawing.centreColourOf(site.index);
    for (const k of [0, 1, 2] as const) {
      const axis = form.axes[k];
      const value = (form.values[k] - (kind === 'total' ? 0 : form.isotropic)) / unitsPerAngstrom;
      if (!axis || Math.abs(value) < leastLengthAngstrom) continue;
      const half = scale(Math.abs(value), normalize(apply(atom.rotation, axis)));
      const colour = shaded(own, rodShades[k]);
      const look = { radius: rodRadii[k], startColour: colour, endColour: colour, pickId: i + 1 };
      const [start, end] = [subtract(position, half), add(position, half)];
      if (value < 0) rods.push(...dashesToTheEnds(start, end, dashes, look));
      else rods.push({ ...look, start, end });
    }
  });
  return rods;
}

/** A colour moved towards white (share above 0) or black (below). */
export function shaded(colour: Rgb, share: number): Rgb {
  const end = share > 0 ? 255 : 0;
  return colour.map((c) => Math.round(c + Math.abs(share) * (end - c))) as unknown as Rgb;
}

/** Å; shaft and head of the arrow along an axial vector. The head takes at most the given share of a short one. */
const arrow = { shaftRadius: 0.05, headRadius: 0.13, headLength: 0.32, largestHeadShare: 0.4 } as const;
/** A cone is drawn as so many discs, the last of a fifth of the first one's radius at least. */
const headDiscs = 8;

/**
 * Axial vectors as arrows of half the length |a| to either side of the atom: the antisymmetric part turns the field right-handed about
 * the arrow. Copies are det(R)·R·a, as a rotation or a reflection takes a sense of turning along.
 */
export function axialArrows(atoms: readonly DrawnAtom[], drawing: TensorDrawing): Cylinder[] {
  const pieces: Cylinder[] = [];
  atoms.forEach(({ atom, site, position }, i) => {
    const own = drawing.carries[i] ? drawing.axial.get(site.index) : undefined;
    if (!own) return;
    const along = scale(
      Math.sign(determinant(atom.rotation)) / drawing.scale.unitsPerAngstrom,
      apply(atom.rotation, own),
    );
    if (length(along) < leastLengthAngstrom) return;
    const colour = shaded(drawing.centreColourOf(site.index), rodShades[2]);
    const look = { startColour: colour, endColour: colour, pickId: i + 1 };
    pieces.push(...arrowBetween(subtract(position, along), add(position, along), look));
  });
  return pieces;
}

/** A shaft and a head of discs that narrow towards the end; short arrows are as slender as long ones. */
function arrowBetween(start: Vec3, end: Vec3, look: Omit<Cylinder, 'start' | 'end' | 'radius'>): Cylinder[] {
  const whole = subtract(end, start);
  const size = length(whole);
  const head = Math.min(arrow.headLength, arrow.largestHeadShare * size);
  const shrunk = head / arrow.headLength;
  const at = (fromEnd: number) => subtract(end, scale(fromEnd / size, whole));
  const pieces: Cylinder[] = [{ ...look, start, end: at(head), radius: shrunk * arrow.shaftRadius }];
  for (let k = 0; k < headDiscs; k++) {
    const radius = shrunk * arrow.headRadius * (1 - (0.8 * k) / (headDiscs - 1));
    const [from, to] = [k, k + 1].map((step) => at(head * (1 - step / headDiscs))) as [Vec3, Vec3];
    pieces.push({ ...look, start: from, end: to, radius });
  }
  return pieces;
}
