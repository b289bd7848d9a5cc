import { readFileSync } from 'node:fs';
import { describe, expect, it } from 'vitest';
import { runCommand } from '#tests/support/command-io.ts';

interface CalculatedCell {
  readonly lattice: readonly number[];
  readonly atoms: readonly {
    readonly element: string;
    readonly at: readonly number[];
    readonly tensor: readonly number[];
  }[];
}

const read = (path: string): string => readFileSync(new URL(path, import.meta.url), 'utf8');
/** First-principles results, own fixtures. */
const cells = JSON.parse(read('./facts/calculated-cells.json')) as Record<
  'quartz' | 'margarite',
  CalculatedCell
>;

function xyzOf({ lattice, atoms }: CalculatedCell, column: string, unit: string): string {
  const rows = atoms.map(({ element, at, tensor }) => [element, ...at, ...tensor].join(' '));
  const head = `Lattice="${lattice.join(' ')}" Properties=species:S:1:pos:R:3${column} ${unit} pbc="T T T"`;
  return `${atoms.length}\n${head}\n${rows.join('\n')}\n`;
}

describe('tensors of a calculation on a structure of another file', () => {
  it('lays calculated quartz on published quartz of the same hand in its usual setting', async () => {
    const { quartz } = cells;
    const { out } = await runCommand(['check', 'quartz.cif', 'tensors.xyz', '--json'], {
      'quartz.cif': read('./fixtures/on-structures/quartz-usual-setting.cif'),
      'tensors.xyz': xyzOf(quartz, ':shielding:R:9', 'shielding_unit=ppm'),
    });
    const said = JSON.parse(out);
    expect(said.mapping).toMatchObject({
      method: 'geometry',
      atoms: 9,
      matched: 9,
      unmatched: [],
      doubtful: [],
      handedness: 'same',
    });
    expect(said.mapping.rmsDisplacement).toBeLessThan(0.05);
    // the two tensors are of 14 and 63 ppm anisotropy; another frame leaves several ppm
    expect(said.sanity).toHaveLength(2);
    for (const { symmetryResidual, equivalentSpread } of said.sanity) {
      expect(symmetryResidual).toBeLessThan(0.1);
      expect(equivalentSpread).toBeLessThan(0.1);
    }
    const chance = said.problems.filter(({ code }: { code: string }) => code === 'attach-by-chance');
    expect(chance).toEqual([]);
  });

  it('lays calculated margarite, all 42 atoms, on its own structure in another file', async () => {
    const { margarite } = cells;
    const bare = { ...margarite, atoms: margarite.atoms.map((atom) => ({ ...atom, tensor: [] })) };
    const { out } = await runCommand(['check', 'margarite.xyz', 'gradients.xyz', '--json'], {
      'margarite.xyz': xyzOf(bare, '', ''),
      'gradients.xyz': xyzOf(margarite, ':efg:R:9', 'efg_unit=V/A2'),
    });
    const { mapping } = JSON.parse(out);
    expect(mapping).toMatchObject({ method: 'geometry', atoms: 42, matched: 42, handedness: 'same' });
    expect(mapping.rmsDisplacement).toBeLessThan(0.001);
  });
});
