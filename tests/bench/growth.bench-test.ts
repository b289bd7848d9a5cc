import { spawnSync } from 'node:child_process';
import { join } from 'node:path';
import { expect, it } from 'vitest';
import { sourceFromText } from '#src/bytes/source-from-text.ts';
import { defaultSettings } from '#src/dossier/default-settings.ts';
import { deriveDossier } from '#src/dossier/derive-dossier.ts';
import { seededRandom } from '#src/base/seeded-random.ts';
import { readText } from '#src/readers/read.ts';
import { projectRoot } from '#tests/guard/project-files.ts';
import { symmetryTables } from '#tests/support/derive.ts';
import { recordResult } from './record-result.ts';

/** A P -1 crystal of silicon and oxygen with about n atoms in the cell, made up, no two closer than a bond. */
function crystalText(n: number): string {
  const random = seededRandom(n);
  const edge = Math.ceil((n / 2) ** (1 / 3));
  const rows = Array.from({ length: Math.floor(n / 2) }, (_, index) => {
    const at = [index % edge, Math.floor(index / edge) % edge, Math.floor(index / edge ** 2)];
    const [x, y, z] = at.map((i, axis) => ((i + 0.2 + 0.2 * random()) / edge) * (axis === 2 ? 0.5 : 1));
    const element = index % 3 === 0 ? 'Si' : 'O';
    return `${element}${index} ${element} ${x!.toFixed(5)} ${y!.toFixed(5)} ${z!.toFixed(5)}`;
  });
  const cell = `_cell_length_a ${2.6 * edge}\n_cell_length_b ${2.6 * edge}\n_cell_length_c ${5.2 * edge}\n`;
  const angles = '_cell_angle_alpha 88\n_cell_angle_beta 92\n_cell_angle_gamma 95\n';
  const loop =
    'loop_\n_atom_site_label\n_atom_site_type_symbol\n_atom_site_fract_x\n_atom_site_fract_y\n_atom_site_fract_z\n';
  return `data_big\n${cell}${angles}_space_group_name_H-M_alt 'P -1'\n${loop}${rows.join('\n')}\n`;
}

function milliseconds(work: () => void): number {
  const times = [0, 1, 2].map(() => {
    const start = performance.now();
    work();
    return performance.now() - start;
  });
  return Math.min(...times);
}

it('row 8: symmetry, neighbours, bonds and dossiers grow linearly', () => {
  const sizes = [2_000, 10_000, 50_000, 100_000];
  const random = seededRandom(8);
  const numbers = Array.from({ length: 10_000 }, random);
  const sort = milliseconds(() => [...numbers].sort((a, b) => a - b));
  const times = sizes.map((n) => {
    const [crystal] = readText(sourceFromText('big.cif', crystalText(n))).structures;
    return milliseconds(() =>
      deriveDossier({
        crystal: crystal!,
        tensorSets: [],
        tables: symmetryTables,
        settings: defaultSettings,
        problems: [],
      }),
    );
  });
  const exponent = Math.log(times[3]! / times[1]!) / Math.log(sizes[3]! / sizes[1]!);
  recordResult('growth', { sizes, inSortsOf10000Numbers: times.map((time) => time / sort), exponent });
  expect(exponent, 'the aim of row 8, not reached yet').toBeLessThan(1.1);
});

it('row 14: the command line against an empty Node process', () => {
  const run = (...argv: string[]) =>
    milliseconds(() => void spawnSync(process.execPath, argv, { stdio: 'ignore' }));
  const empty = run('-e', '0');
  const command = run(
    join(projectRoot, 'dist/cli/main.js'),
    'sites',
    join(projectRoot, 'samples/drum-1-quartz.cif'),
  );
  recordResult('command-line', { timesOfEmptyProcess: command / empty });
  expect(command).toBeGreaterThan(empty);
});
