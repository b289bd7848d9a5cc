import { describe, expect, it } from 'vitest';
import { structureFinder } from '#src/readers/text/find-structures.ts';
import { tokenise } from '#src/readers/text/tokenise.ts';
import { logLayouts } from '#tests/support/log-layouts/all-layouts.ts';
import { madeSystem } from '#tests/support/log-layouts/made-system.ts';

const seeds = Array.from({ length: 12 }, (_, i) => 101 + 7919 * i);

describe('structures in invented logs', () => {
  it.each(logLayouts)('%s: the printed one and no other', (_, layout) => {
    for (const seed of seeds) {
      const system = madeSystem(seed);
      const { text } = layout(system);
      const finder = structureFinder();
      text.split(/\r?\n/).forEach((line, i) => finder.take(tokenise(line, i + 1)));
      const found = finder.finish();
      const printed = text.includes('Cartesian positions of the atoms');
      expect(
        found.map(({ line }) => line),
        `seed ${seed}\n${text}`,
      ).toHaveLength(printed ? 1 : 0);
      if (!printed) continue;
      found[0]!.lattice!.rows.forEach((value, i) => expect(value).toBeCloseTo(system.lattice[i]!, 5));
      expect(found[0]!.atoms.map(({ element }) => element)).toEqual(
        system.atoms.map(({ element }) => element),
      );
      found[0]!.atoms.forEach(({ cartesian }, i) => {
        cartesian!.forEach((value, k) => expect(value).toBeCloseTo(system.atoms[i]!.position[k]!, 5));
      });
    }
  });
});
