import type { Mat3, Vec3 } from '#src/base/matrix3.ts';
import type { MadeAtom, MadeSystem } from './made-system.ts';

export type WrittenQuantity = 'shielding' | 'shift' | 'efg';
export type WrittenUnit = 'ppm' | 'au' | '1e21V/m2' | 'V/A2';

/** A tensor that a reader of the text must give back. */
export interface WrittenTensor {
  readonly quantity: WrittenQuantity;
  readonly unit: WrittenUnit;
  readonly element: string;
  /** From 1, as the layout counts. */
  readonly index: number;
  /** The numbers as printed. */
  readonly tensor: Mat3;
  /** How far the tensor read may be from it: half a digit where it is put together from printed principal values. */
  readonly tolerance: number;
}

export interface WrittenLog {
  readonly text: string;
  readonly expected: readonly WrittenTensor[];
  /** Other forms of the expected tensors that may come back in their place, such as the symmetrised one beside the raw. */
  readonly allowed: readonly WrittenTensor[];
  /** How many structures stand in the text; the last is the system's. Without it: one where positions are Cartesian. */
  readonly structures?: number;
}

export type LogLayout = (system: MadeSystem) => WrittenLog;

/** Lines of a text under way, with what must be read from them. */
export class LogWriter {
  readonly #lines: string[] = [];
  readonly #expected: WrittenTensor[] = [];
  readonly #allowed: WrittenTensor[] = [];
  #structures: number | undefined;
  readonly system: MadeSystem;

  constructor(system: MadeSystem) {
    this.system = system;
  }

  add(...lines: string[]): this {
    this.#lines.push(...lines);
    return this;
  }

  /** Says that a tensor was written; `index` counts over all atoms unless told. */
  expect(
    atom: MadeAtom,
    quantity: WrittenQuantity,
    unit: WrittenUnit,
    tensor: readonly number[],
    options: { within?: boolean; tolerance?: number; onlyAllowed?: boolean } = {},
  ): this {
    const written = {
      quantity,
      unit,
      element: atom.element,
      index: options.within ? atom.within : atom.overall,
      tensor: tensor as unknown as Mat3,
      tolerance: options.tolerance ?? 0,
    };
    (options.onlyAllowed ? this.#allowed : this.#expected).push(written);
    return this;
  }

  /** Says that so many structures were written, the last of them the system's. */
  printsStructure(count = 1): this {
    this.#structures = count;
    return this;
  }

  written(newline = '\n'): WrittenLog {
    const log = { text: this.#lines.join(newline), expected: this.#expected, allowed: this.#allowed };
    return this.#structures === undefined ? log : { ...log, structures: this.#structures };
  }
}

/** Numbers rounded to digits after the point, as they will stand in the text. */
export function rounded(values: readonly number[], digits = 4): number[] {
  return values.map((value) => Number(value.toFixed(digits)) + 0);
}

export function cells(values: readonly number[], digits = 4, width = 13): string {
  return values.map((value) => value.toFixed(digits).padStart(width)).join('');
}

export function blockLines(nine: readonly number[], digits = 4, indent = '   '): string[] {
  return [0, 3, 6].map((i) => indent + cells(nine.slice(i, i + 3), digits));
}

export function isotropic(nine: readonly number[]): number {
  return (nine[0]! + nine[4]! + nine[8]!) / 3;
}

/** xx, yy, zz, xy, xz, yz as places of the nine. */
export const places = { xx: 0, xy: 1, xz: 2, yx: 3, yy: 4, yz: 5, zx: 6, zy: 7, zz: 8 } as const;
export type Place = keyof typeof places;

export function component(nine: readonly number[], place: Place): number {
  return nine[places[place]]!;
}

/** Symmetric nine numbers as they are after their six were printed. */
export function symmetricRounded(nine: readonly number[], digits = 4): number[] {
  const [xx, xy, xz, , yy, yz, , , zz] = rounded(nine, digits) as number[];
  return [xx!, xy!, xz!, xy!, yy!, yz!, xz!, yz!, zz!];
}

export function positionLines(system: MadeSystem): string[] {
  return [
    'Cell vectors (Angstrom)',
    ...[0, 3, 6].map((i) => `   ${cells(system.lattice.slice(i, i + 3), 6)}`),
    '',
    'Cartesian positions of the atoms (Angstrom)',
    ...system.atoms.map(
      ({ element, overall, position }) => `  ${overall} ${element.padEnd(3)}${cells(position, 6)}`,
    ),
    '',
  ];
}

export function randomVector(random: () => number, size: number): Vec3 {
  return [random() * 2 * size - size, random() * 2 * size - size, random() * 2 * size - size];
}

export function randomNine(random: () => number, size: number, diagonal = 0): number[] {
  return Array.from({ length: 9 }, (_, i) => random() * 2 * size - size + (i % 4 === 0 ? diagonal : 0));
}
