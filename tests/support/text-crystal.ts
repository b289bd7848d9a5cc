import { expect } from 'vitest';
import type { FoundStructure } from '#src/readers/text/find-structures.ts';
import { structureFinder } from '#src/readers/text/find-structures.ts';
import { tokenise } from '#src/readers/text/tokenise.ts';

/** A made crystal with plain bonds (a perovskite-like cell, sheared so that no two axes agree): invented. */
export const rows = [4.1, 0, 0, 0.3, 4.2, 0, -0.2, 0.4, 4.4];
export const atoms: [string, number, number, number, number][] = [
  ['Ti', 22, 0.02, 0.01, 0.03],
  ['Sr', 38, 0.52, 0.49, 0.51],
  ['O', 8, 0.5, 0.02, 0.01],
  ['O', 8, 0.03, 0.49, 0.02],
  ['O', 8, 0.01, 0.03, 0.47],
];
/** CODATA 2018, Å; the last digits do not matter here. */
export const bohr = 0.529177210903;
export const perElement = [1, 1, 1, 2, 3];

export const fractional = atoms.map(([, , u, v, w]) => [u, v, w]);
export const cartesian = fractional.map((f) =>
  [0, 1, 2].map((k) => f[0]! * rows[k]! + f[1]! * rows[3 + k]! + f[2]! * rows[6 + k]!),
);

export const n = (value: number, digits = 7): string => value.toFixed(digits).padStart(digits + 6);
export const vector = (v: readonly number[], factor = 1): string => v.map((x) => n(x * factor)).join(' ');
export const latticeRows = (factor = 1): string[] =>
  [0, 3, 6].map((i) => vector(rows.slice(i, i + 3), factor));

export function find(text: string): FoundStructure[] {
  const finder = structureFinder();
  text.split('\n').forEach((line, i) => finder.take(tokenise(line, i + 1)));
  return finder.finish();
}

export function expectCrystal(text: string, digits = 4): FoundStructure {
  const found = find(text);
  expect(found.map((s) => s.atoms.length)).toEqual([5]);
  const [structure] = found as [FoundStructure];
  expect(structure.isLast).toBe(true);
  expect(structure.atoms.map(({ element }) => element)).toEqual(atoms.map(([symbol]) => symbol));
  structure.atoms.forEach((atom, i) => {
    atom.fractional!.forEach((value, k) => expect(value).toBeCloseTo(fractional[i]![k]!, digits));
  });
  return structure;
}

export function expectFrame(structure: FoundStructure): void {
  structure.lattice!.rows.forEach((value, i) => expect(value).toBeCloseTo(rows[i]!, 4));
  structure.atoms.forEach((atom, i) => {
    atom.cartesian!.forEach((value, k) => expect(value).toBeCloseTo(cartesian[i]![k]!, 3));
  });
}

export const inBohr = [
  'Primitive translations, bohr',
  ...latticeRows(1 / bohr).map((row, i) => `  t${i + 1} ${row}`),
  '',
];
export const inAngstrom = ['Cell vectors / Å', ...latticeRows(), ''];
