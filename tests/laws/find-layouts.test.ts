import { describe, expect, it } from 'vitest';
import { sourceFromText } from '#src/bytes/source-from-text.ts';
import { findInText } from '#src/readers/text/find-in-text.ts';
import { structureFinder } from '#src/readers/text/find-structures.ts';
import { tokenise } from '#src/readers/text/tokenise.ts';
import { logLayouts } from '#tests/support/log-layouts/all-layouts.ts';
import type { WrittenTensor } from '#tests/support/log-layouts/log-writer.ts';
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

/** A tensor in one line, so that sets of them compare as texts. */
function told(quantity: string, unit: string, element: string | null, index: number | null): string {
  return `${quantity} ${unit} ${element} ${index}`;
}

function equals(written: WrittenTensor, tensor: readonly number[]): boolean {
  const allowance = Math.max(written.tolerance, 1e-9);
  return written.tensor.every((value, i) => Math.abs(value - tensor[i]!) <= allowance);
}

describe('tensors in invented logs', () => {
  it.each(logLayouts)(
    '%s: each tensor with its atom, quantity and unit, and nothing invented',
    (_, layout) => {
      for (const seed of seeds) {
        const { text, expected, allowed } = layout(madeSystem(seed));
        const { groups } = findInText(sourceFromText('log.txt', text));
        const taken = groups
          .filter(({ proposed }) => proposed)
          .flatMap(({ quantity, unit, entries }) =>
            entries.filter(({ isComplete }) => isComplete).map((entry) => ({ quantity, unit, ...entry })),
          );
        const names = taken.map(({ quantity, unit, element, index }) => told(quantity, unit, element, index));
        const wanted = expected.map(({ quantity, unit, element, index }) =>
          told(quantity, unit, element, index),
        );
        expect(names.sort(), `seed ${seed}\n${text}`).toEqual(wanted.sort());
        for (const { quantity, unit, element, index, tensor } of taken) {
          const name = told(quantity, unit, element, index);
          const forms = [...expected, ...allowed].filter(
            (w) => told(w.quantity, w.unit, w.element, w.index) === name,
          );
          expect(
            forms.some((form) => equals(form, tensor)),
            `seed ${seed}, ${name}: ${tensor.join(' ')}`,
          ).toBe(true);
        }
      }
    },
  );
});
