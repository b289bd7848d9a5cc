import { readFileSync } from 'node:fs';
import { describe, expect, it } from 'vitest';
import { apply } from '#src/base/matrix3.ts';
import type { VecFrac } from '#src/base/matrix3.ts';
import { sourceFromText } from '#src/bytes/source-from-text.ts';
import { applyOperation } from '#src/crystal/symmetry-operation.ts';
import { readText } from '#src/readers/read.ts';

/** Shortest distance from a site to any image of another site, Å. */
function shortest(file: string, from: string, to: string, skip = 0): number {
  const text = readFileSync(new URL(`../../samples/${file}`, import.meta.url), 'utf8');
  const [crystal] = readText(sourceFromText(file, text)).structures;
  const site = (label: string): VecFrac => crystal!.sites.find((one) => one.label === label)!.fractional!;
  const distances = crystal!.symmetry.operations.map((operation) => {
    const image = applyOperation(operation, site(to));
    const step = image.map((value, i) => value - site(from)[i]! - Math.round(value - site(from)[i]!));
    return Math.hypot(...apply(crystal!.lattice!.toCartesian, step as unknown as VecFrac));
  });
  return distances.filter((length) => length > 0.01).sort((a, b) => a - b)[skip]!;
}

/** Published bond lengths prove that cell, coordinates and operations of the samples were copied rightly. */
describe('bond lengths of the samples as published', () => {
  // Levien, Prewitt & Weidner, Am. Mineral. 65, 920 (1980): Si-O 1.605 and 1.614; values from memory.
  it('quartz', () => {
    expect(shortest('drum-1-quartz.cif', 'Si1', 'O1')).toBeCloseTo(1.605, 2);
    expect(shortest('drum-1-quartz.cif', 'Si1', 'O1', 2)).toBeCloseTo(1.614, 2);
  });

  // Cameron, Sueno, Prewitt & Papike, Am. Mineral. 58, 594 (1973): Si-O1 1.602, Si-O2 1.585, Si-O3 1.665 and 1.687,
  // Mg-O2 2.050, Ca-O2 2.353; values from memory.
  it.each([
    ['Si1', 'O1', 0, 1.602],
    ['Si1', 'O2', 0, 1.585],
    ['Si1', 'O3', 0, 1.665],
    ['Si1', 'O3', 1, 1.687],
    ['Mg1', 'O2', 0, 2.05],
    ['Ca1', 'O2', 0, 2.353],
  ])('diopside %s-%s (%i)', (from, to, skip, length) => {
    expect(shortest('drum-2-diopside.cif', from, to, skip)).toBeCloseTo(length, 2);
  });

  // Turkington, Ferguson, Lough & Glidewell, Acta Cryst. C60, o617 (2004), geometry list of the deposited file.
  it.each([
    ['O1', 'C1', 1.269],
    ['O2', 'C1', 1.235],
    ['O3', 'C4', 1.298],
    ['O4', 'C4', 1.215],
    ['O5', 'C2', 1.432],
    ['C1', 'C2', 1.547],
    ['C2', 'C3', 1.521],
    ['C3', 'C4', 1.541],
    ['N1', 'C17', 1.509],
    ['C11', 'C12', 1.39],
    ['C14', 'C15', 1.376],
    ['C17', 'C18', 1.522],
    ['C18', 'H18A', 0.98],
    ['N1', 'H1C', 0.91],
    ['O3', 'H3', 0.84],
  ])('malate %s-%s', (from, to, length) => {
    expect(Math.abs(shortest('drum-3-malate.cif', from, to) - length)).toBeLessThan(0.005);
  });
});
