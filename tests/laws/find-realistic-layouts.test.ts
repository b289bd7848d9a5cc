import { describe, expect, it } from 'vitest';
import { sourceFromText } from '#src/bytes/source-from-text.ts';
import { findInText } from '#src/readers/text/find-in-text.ts';
import { madeSystem } from '#tests/support/log-layouts/made-system.ts';
import { realisticLayouts } from '#tests/support/log-layouts/realistic-layouts.ts';
import type { WrittenTensor } from '#tests/support/log-layouts/log-writer.ts';

const seeds = Array.from({ length: 6 }, (_, i) => 307 + 6007 * i);

type Named = Pick<WrittenTensor, 'element' | 'quantity' | 'unit' | 'index'>;

function told({ quantity, unit, element, index }: { [key in keyof Named]: unknown }): string {
  return `${quantity} ${unit} ${element} ${index}`;
}

describe('whole logs and tables of invented calculations', () => {
  it.each(realisticLayouts)('%s: each tensor with its atom, quantity and unit, and no other', (_, layout) => {
    for (const seed of seeds) {
      const { text, expected, allowed } = layout(madeSystem(seed));
      const { groups } = findInText(sourceFromText('log.txt', text));
      const taken = groups
        .filter(({ proposed }) => proposed)
        .flatMap(({ quantity, unit, entries }) =>
          entries.filter(({ isComplete }) => isComplete).map((entry) => ({ ...entry, quantity, unit })),
        );
      expect(taken.map(told).sort(), `seed ${seed}`).toEqual(expected.map(told).sort());
      for (const entry of taken) {
        const forms = [...expected, ...allowed].filter((form) => told(form) === told(entry));
        const isPrinted = forms.some(({ tensor, tolerance }) =>
          tensor.every((value, at) => Math.abs(value - entry.tensor[at]!) <= Math.max(tolerance, 1e-9)),
        );
        expect(isPrinted, `seed ${seed}, line ${entry.line}, ${told(entry)}: ${entry.tensor.join(' ')}`).toBe(
          true,
        );
      }
    }
  });

  it.each(realisticLayouts)('%s: the printed structures and no other', (_, layout) => {
    for (const seed of seeds) {
      const system = madeSystem(seed);
      const { text, structures = 0 } = layout(system);
      const found = findInText(sourceFromText('log.txt', text)).structures;
      expect(
        found.map(({ line }) => line),
        `seed ${seed}`,
      ).toHaveLength(structures);
      const last = found[found.length - 1];
      if (last === undefined) continue;
      expect(last.atoms.map(({ element }) => element)).toEqual(system.atoms.map(({ element }) => element));
      last.lattice?.rows.forEach((value, i) => expect(value).toBeCloseTo(system.lattice[i]!, 4));
      last.atoms.forEach(({ cartesian }, i) => {
        cartesian!.forEach((value, k) => expect(value).toBeCloseTo(system.atoms[i]!.position[k]!, 4));
      });
    }
  });
});
