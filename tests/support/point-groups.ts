import type { Mat3 } from '#src/base/matrix3.ts';
import { identity3, multiply, scaleMatrix } from '#src/base/matrix3.ts';

const cos = (degrees: number): number => Math.cos((degrees * Math.PI) / 180);
const sin = (degrees: number): number => Math.sin((degrees * Math.PI) / 180);
const aboutZ = (degrees: number): Mat3 => [
  cos(degrees),
  -sin(degrees),
  0,
  sin(degrees),
  cos(degrees),
  0,
  0,
  0,
  1,
];
const inverted = (m: Mat3): Mat3 => scaleMatrix(-1, m);

const two = {
  x: [1, 0, 0, 0, -1, 0, 0, 0, -1],
  y: [-1, 0, 0, 0, 1, 0, 0, 0, -1],
  z: [-1, 0, 0, 0, -1, 0, 0, 0, 1],
} as const;
const mirror = { x: inverted(two.x), y: inverted(two.y), z: inverted(two.z) };
const minusOne = inverted(identity3);
const cyclic: Mat3 = [0, 0, 1, 1, 0, 0, 0, 1, 0];

/** Generators in Cartesian axes: unique axis z, monoclinic y, first secondary axis x, cubic axes along x, y, z. */
const generators: Readonly<Record<string, readonly Mat3[]>> = {
  '1': [],
  '-1': [minusOne],
  '1 2 1': [two.y],
  '1 m 1': [mirror.y],
  '1 2/m 1': [two.y, minusOne],
  '2 2 2': [two.x, two.z],
  'm m 2': [mirror.x, two.z],
  'm m m': [mirror.x, mirror.y, mirror.z],
  '4': [aboutZ(90)],
  '-4': [inverted(aboutZ(90))],
  '4/m': [aboutZ(90), minusOne],
  '4 2 2': [aboutZ(90), two.x],
  '4 m m': [aboutZ(90), mirror.x],
  '-4 2 m': [inverted(aboutZ(90)), two.x],
  '4/m m m': [aboutZ(90), two.x, minusOne],
  '3': [aboutZ(120)],
  '-3': [aboutZ(120), minusOne],
  '3 2 1': [aboutZ(120), two.x],
  '3 m 1': [aboutZ(120), mirror.x],
  '-3 m 1': [aboutZ(120), two.x, minusOne],
  '6': [aboutZ(60)],
  '-6': [inverted(aboutZ(60))],
  '6/m': [aboutZ(60), minusOne],
  '6 2 2': [aboutZ(60), two.x],
  '6 m m': [aboutZ(60), mirror.x],
  '-6 m 2': [inverted(aboutZ(60)), mirror.x],
  '6/m m m': [aboutZ(60), two.x, minusOne],
  '2 3': [two.x, two.z, cyclic],
  'm -3': [two.x, two.z, cyclic, minusOne],
  '4 3 2': [aboutZ(90), cyclic],
  '-4 3 m': [inverted(aboutZ(90)), cyclic],
  'm -3 m': [aboutZ(90), cyclic, minusOne],
};

function same(a: Mat3, b: Mat3): boolean {
  return a.every((element, i) => Math.abs(element - b[i]!) < 1e-9);
}

/** All products of the generators. */
export function closure(from: readonly Mat3[]): Mat3[] {
  const group: Mat3[] = [identity3];
  for (let i = 0; i < group.length; i += 1) {
    for (const generator of from) {
      const product = multiply(generator, group[i]!);
      if (!group.some((known) => same(known, product))) group.push(product);
    }
  }
  return group;
}

export const pointGroupNames = Object.keys(generators);

/** All operations of one of the 32 crystallographic point groups as Cartesian matrices. */
export function pointGroup(name: string): Mat3[] {
  const from = generators[name];
  if (!from) throw new RangeError(`no point group ${name}`);
  return closure(from);
}
