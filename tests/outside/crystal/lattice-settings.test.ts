import { describe, expect, it } from 'vitest';
import { asMat3, transpose } from '#src/base/matrix3.ts';
import { latticeFromCell, settingsOfRows } from '#src/crystal/lattice.ts';
import type { LatticeSettingName } from '#src/crystal/settings.ts';
import facts from '#tests/outside/facts/crystal-frames.json' with { type: 'json' };

/** The facts' own names of settings, in the order of their list. */
const names: Record<string, LatticeSettingName> = {
  S1: 'a-x-b-xy',
  S2: 'a-x-c-xz',
  S3: 'b-y-a-xy',
  S4: 'b-y-c-yz',
  S5: 'c-z-a-xz',
  S6: 'c-z-b-yz',
  S7: 'ab-x-b-xy',
  S8: 'b-x-c-xy',
};

/** Cells of published structures (each reference stands in the facts file); matrices computed by another program. */
describe.each(facts.structures)('Cartesian settings of $name', ({ cell, lattice_columns }) => {
  const [a, b, c, alpha, beta, gamma] = cell as [number, number, number, number, number, number];
  const constants = { a, b, c, alpha, beta, gamma };

  it.each(Object.entries(lattice_columns))('%s agrees to 1e-9 Å', (key, columns) => {
    const expected = transpose(asMat3((columns as number[][]).flat()));
    const { rows } = latticeFromCell(constants, names[key]!);
    rows.forEach((value, i) => expect(Math.abs(value - expected[i]!)).toBeLessThan(1e-9));
    expect(settingsOfRows(expected)).toContain(names[key]);
  });
});

describe('settings that coincide', () => {
  const settingsOf = (alpha: number, beta: number, gamma: number, a = 5, b = 7, c = 11): number[] => {
    const { rows } = latticeFromCell({ a, b, c, alpha, beta, gamma }, 'a-x-b-xy');
    return settingsOfRows(rows, 1e-9).map((name) => 1 + Object.values(names).indexOf(name));
  };

  /** Geometry: which axes the angles of the crystal family make parallel. */
  it('are the first six for orthogonal cells, pairs for hexagonal, triples for monoclinic ones', () => {
    expect(settingsOf(90, 90, 90)).toEqual([1, 2, 3, 4, 5, 6]);
    expect(settingsOf(90, 90, 120, 5, 5)).toEqual([1, 2, 5]);
    expect(settingsOf(90, 105, 90)).toEqual([1, 2, 3]);
    expect(settingsOf(80, 95, 100)).toEqual([1]);
  });
});
