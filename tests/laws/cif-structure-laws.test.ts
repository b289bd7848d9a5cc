import { readdirSync, readFileSync } from 'node:fs';
import { describe, expect, it } from 'vitest';
import type { Mat3 } from '#src/base/matrix3.ts';
import { seededRandom } from '#src/base/seeded-random.ts';
import { sourceFromText } from '#src/bytes/source-from-text.ts';
import type { Crystal } from '#src/crystal/crystal.ts';
import { readCif } from '#src/readers/cif/read-cif.ts';
import { contentOfCell } from '#tests/support/cell-content.ts';
import type { CrystalManner } from '#tests/support/crystal-cif.ts';
import { crystalAsCif } from '#tests/support/crystal-cif.ts';

/** Published structures written again in other ways: what the cell holds must not depend on how it is written. */
const folder = new URL('../outside/fixtures/', import.meta.url);
const names = readdirSync(folder).filter((name) => name.endsWith('.cif') && !name.startsWith('tungsten'));

function crystalOf(text: string): Crystal {
  const { structures, problems } = readCif(sourceFromText('law.cif', text));
  const serious = problems.filter(({ severity }) => severity === 'error');
  expect(serious).toEqual([]);
  return structures[0]!;
}

function again(crystal: Crystal, manner: CrystalManner): Crystal {
  return crystalOf(crystalAsCif(crystal, manner));
}

function expectSame(crystal: Crystal, other: Crystal, cells = 1): void {
  const [here, there] = [contentOfCell(crystal), contentOfCell(other)];
  expect(there.atoms).toBe(cells * here.atoms);
  expect(Object.keys(there.composition).sort()).toEqual(Object.keys(here.composition).sort());
  for (const [element, count] of Object.entries(here.composition))
    expect(there.composition[element]).toBeCloseTo(cells * count, 6);
  expect(other.symmetry.operations).toHaveLength(cells * crystal.symmetry.operations.length);
}

describe.each(names)('%s', (name) => {
  const crystal = crystalOf(readFileSync(new URL(name, folder), 'utf8'));

  it('in the other dialect and with other line ends is the same', () => {
    expectSame(crystal, again(crystal, { dotted: true }));
    expectSame(crystal, again(crystal, { lineEnd: '\r\n' }));
  });

  it('with rows, columns and operations in any order and atoms in other cells is the same', () => {
    for (const seed of [1, 2, 3]) {
      const other = again(crystal, { random: seededRandom(seed), dotted: seed === 2 });
      expectSame(crystal, other);
      expect(other.symmetry.number).toBe(crystal.symmetry.number);
    }
  });

  it('on another origin is the same', () => {
    expectSame(crystal, again(crystal, { origin: [0.113, 0.27, -0.391] }));
  });

  it('on skewed axes is the same, and in a doubled cell twice that', () => {
    const skewed: Mat3 = [1, 1, 0, 0, 1, -1, 0, 0, 1];
    expectSame(crystal, again(crystal, { basis: skewed, origin: [0.25, 0, 0.5] }));
    if (crystal.symmetry.operations.length <= 16 && crystal.symmetry.number! <= 74)
      expectSame(crystal, again(crystal, { basis: [1, 0, 0, 0, 1, 0, 0, 0, 2] }), 2);
  });
});
