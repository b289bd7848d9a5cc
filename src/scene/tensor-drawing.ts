import type { Mat3, Vec3 } from '#src/base/matrix3.ts';
import { apply, determinant, matrixFromColumns, multiply, transpose } from '#src/base/matrix3.ts';
import { add, cross, length, normalize, scale, subtract } from '#src/base/vector3.ts';
import { anyPerpendicular } from './camera.ts';
import { legendColour } from './colour-scale.ts';
import type { Cylinder } from './cylinder-list.ts';
import { dashesToTheEnds } from './cylinder-list.ts';
import type { DrawnAtom } from './drawn-atoms.ts';
import type { PolarBatch, TensorScale } from './scene.ts';
import type { ChosenTensors } from './tensor-choice.ts';
import { lobeColours } from './tensor-choice.ts';
import type { PrincipalForm } from './tensor-shape.ts';
import { largestReach } from './tensor-shape.ts';

type Rgb = readonly [number, number, number];

/** A further ellipsoid that belongs to a drawn atom. */
export interface Bead {
  readonly centre: Vec3;
  /** Columns = semi-axis vectors, Å. */
  readonly shape: Mat3;
  readonly colour: Rgb;
  readonly pickId: number;
}

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
const centreRadii = { polar: 0.07, axes: 0.1, axial: 0.14 } as const;
/** The mark inside a polar surface, and negative lobes where colour says a value without sign. */
export const lobeCentreColour: Rgb = [96, 92, 86];
const darkLobe: Rgb = [84, 80, 74];

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
  return size < leastLengthAngstrom ? centre : Math.max(size, beadRingRadius + beadRadii[1]);
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

/** Colours of a site's lobes: of the sign alone, of plus and minus the value's size on a diverging map, else the value's and dark grey. */
function lobesOf(
  siteIndex: number,
  { colourBy, legend, values, colours }: ChosenTensors,
): { positive: Rgb; negative: Rgb } {
  if (colourBy === 'sign') return lobeColours;
  const value = values.get(siteIndex);
  if (legend?.map === 'vik' && value !== undefined) {
    const size = Math.abs(value);
    return { positive: legendColour(legend, size), negative: legendColour(legend, -size) };
  }
  return { positive: colours.get(siteIndex)!, negative: darkLobe };
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
function shaded(colour: Rgb, share: number): Rgb {
  const end = share > 0 ? 255 : 0;
  return colour.map((c) => Math.round(c + Math.abs(share) * (end - c))) as unknown as Rgb;
}

/** Å; thicker than a bond. */
const axialRodRadius = 0.07;
const beadRingRadius = 0.3;
/** Å; across the first and the last bead, and half their length along the ring, by which they overlap. */
const beadRadii = [0.018, 0.08] as const;
const beadHalfLength = 0.12;
const beadCount = 8;
/** Radians from the first bead to the last. */
const beadArc = (290 / 180) * Math.PI;

/**
 * Axial vectors as rods of half the length |a| to either side, with a ring of overlapping beads that grow thicker right-handed about a: the sense in
 * which the antisymmetric part turns the field. Copies are det(R)·R·a, as a rotation or a reflection takes a sense of turning along.
 */
export function axialVectors(
  atoms: readonly DrawnAtom[],
  drawing: TensorDrawing,
): { readonly rods: Cylinder[]; readonly beads: Bead[] } {
  const rods: Cylinder[] = [];
  const beads: Bead[] = [];
  atoms.forEach(({ atom, site, position }, i) => {
    const own = drawing.carries[i] ? drawing.axial.get(site.index) : undefined;
    if (!own) return;
    const along = scale(
      Math.sign(determinant(atom.rotation)) / drawing.scale.unitsPerAngstrom,
      apply(atom.rotation, own),
    );
    if (length(along) < leastLengthAngstrom) return;
    const colour = shaded(drawing.centreColourOf(site.index), rodShades[2]);
    const look = { radius: axialRodRadius, startColour: colour, endColour: colour, pickId: i + 1 };
    rods.push({ ...look, start: subtract(position, along), end: add(position, along) });
    const axis = normalize(along);
    const first = anyPerpendicular(axis);
    const second = cross(axis, first);
    for (let k = 0; k < beadCount; k++) {
      const share = k / (beadCount - 1);
      const [x, y] = [Math.cos(share * beadArc), Math.sin(share * beadArc)];
      const out = add(scale(beadRingRadius * x, first), scale(beadRingRadius * y, second));
      const across = beadRadii[0] + share * (beadRadii[1] - beadRadii[0]);
      const outward = normalize(out);
      const shape = matrixFromColumns(
        scale(beadHalfLength, cross(axis, outward)),
        scale(across, outward),
        scale(across, axis),
      );
      beads.push({ centre: add(position, out), shape, colour, pickId: i + 1 });
    }
  });
  return { rods, beads };
}
