import { readdirSync, readFileSync } from 'node:fs';
import { describe, expect, it } from 'vitest';
import { seededRandom } from '#src/base/seeded-random.ts';
import { sourceFromText } from '#src/bytes/source-from-text.ts';
import { readCif } from '#src/readers/cif/read-cif.ts';
import type { Reading } from '#src/readers/reading.ts';

/** Published structures, damaged in every way a seed can think of: whatever is read must hold together. */
const folder = new URL('../outside/fixtures/', import.meta.url);
const names = readdirSync(folder).filter((name) => name.endsWith('.cif'));
const wholes = new Map(names.map((name) => [name, readFileSync(new URL(name, folder), 'utf8')]));
const splinters = [
  '?',
  '.',
  "'",
  '"',
  '\n;\n',
  'loop_',
  'data_x',
  '_cell_length_a',
  '-',
  '1e999',
  '0',
  '(',
  'NaN',
  '\u0000',
  ',',
  'x',
  '1/0',
  '999999999999',
  '#',
  '[',
  '$',
];

type Damage = (text: string, random: () => number) => string;

function pick<T>(items: readonly T[], random: () => number): T {
  return items[Math.floor(random() * items.length)]!;
}

const damages: readonly Damage[] = [
  (text, random) => text.slice(0, Math.floor(random() * text.length)),
  (text, random) => {
    const at = Math.floor(random() * text.length);
    return text.slice(0, at) + pick(splinters, random) + text.slice(at + Math.floor(random() * 4));
  },
  (text, random) => {
    const words = text.split(/(\s+)/);
    words[2 * Math.floor((random() * words.length) / 2)] = pick(splinters, random);
    return words.join('');
  },
  (text, random) => {
    const lines = text.split('\n');
    lines.splice(Math.floor(random() * lines.length), 1 + Math.floor(random() * 3));
    return lines.join('\n');
  },
  (text, random) => {
    const lines = text.split('\n');
    const at = Math.floor(random() * lines.length);
    lines.splice(Math.floor(random() * lines.length), 0, ...lines.slice(at, at + 2));
    return lines.join('\n');
  },
  (text, random) =>
    text.replace(/\d+\.\d+/g, (digits) => (random() < 0.03 ? pick(splinters, random) : digits)),
];

function expectSound(reading: Reading): void {
  const clone = structuredClone(reading);
  expect(clone.structures).toHaveLength(reading.structures.length);
  if (reading.structures.length === 0)
    expect(reading.problems.some(({ severity }) => severity === 'error')).toBe(true);
  for (const { sites, symmetry, lattice, formula } of reading.structures) {
    expect(sites.length).toBeGreaterThan(0);
    expect(symmetry.operations.length).toBeGreaterThan(0);
    expect(symmetry.operations[0]).toMatchObject({ rotation: [1, 0, 0, 0, 1, 0, 0, 0, 1] });
    expect(lattice === null || lattice.volume > 0).toBe(true);
    expect(formula.units === null || Number.isFinite(formula.units)).toBe(true);
    sites.forEach((site, i) => {
      expect(site.index).toBe(i);
      expect([...(site.fractional ?? []), ...site.cartesian, site.occupancy].every(Number.isFinite)).toBe(
        true,
      );
      expect(site.species.length).toBeGreaterThan(0);
    });
  }
}

describe.each(names)('%s', (name) => {
  it('damaged at random is read without a fault', () => {
    const random = seededRandom(names.indexOf(name) + 17);
    for (let run = 0; run < 40; run++) {
      let text = wholes.get(name)!;
      const times = 1 + Math.floor(random() * 4);
      for (let i = 0; i < times; i++) text = pick(damages, random)(text, random);
      expectSound(readCif(sourceFromText(name, text)));
    }
  });
});

describe('hostile numbers', () => {
  const head = (cell: string): string =>
    `data_h\n_cell_length_a ${cell}\n_cell_length_b 5\n_cell_length_c 5\n_cell_angle_alpha 90\n_cell_angle_beta 90\n_cell_angle_gamma 90\n_symmetry_equiv_pos_as_xyz x,y,z\n`;
  const atom = (x: string, occupancy = '1'): string =>
    `loop_\n_atom_site_label\n_atom_site_fract_x\n_atom_site_fract_y\n_atom_site_fract_z\n_atom_site_occupancy\nC1 ${x} 0 0 ${occupancy}\n`;

  it.each([
    '1e308',
    '-1e308',
    '1e-308',
    '9'.repeat(400),
    '0.1(999999999999999999999)',
    '1/999999999999999999999999',
  ])('%s as a coordinate', (x) => {
    expectSound(readCif(sourceFromText('h.cif', head('5') + atom(x))));
  });

  it.each(['1e308', '-5', '1e-9', '1e9', 'NaN', 'Infinity', '0x10'])('%s as a length', (a) => {
    const reading = readCif(sourceFromText('h.cif', head(a) + atom('0.1')));
    expectSound(reading);
    expect(reading.structures).toEqual([]);
  });

  it('occupancies without bound', () => {
    expectSound(readCif(sourceFromText('h.cif', head('5') + atom('0.1', '1e300'))));
  });
});
