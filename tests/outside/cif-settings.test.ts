import { readFileSync } from 'node:fs';
import { createRequire } from 'node:module';
import { hall_symbol_entry, initSync, operations_from_number, wyckoff_positions } from '@spglib/moyo-wasm';
import { describe, expect, it } from 'vitest';
import { sourceFromText } from '#src/bytes/source-from-text.ts';
import { addMatrices, asMat3, multiply, scaleMatrix, transpose } from '#src/base/matrix3.ts';
import type { Mat3 } from '#src/base/matrix3.ts';
import { ProblemLog } from '#src/base/problem.ts';
import { seededRandom } from '#src/base/seeded-random.ts';
import { cellAtoms } from '#src/dossier/cell-atoms.ts';
import { readText } from '#src/readers/read.ts';

/**
 * A crystal in each of the 530 tabulated settings, written as a CIF in four ways (operations listed, Hall symbol,
 * Hermann–Mauguin symbol, number), with one atom on every Wyckoff position. Outside facts: operations, symbols and
 * multiplicities of International Tables A as tabulated in @spglib/moyo-wasm.
 */
const require = createRequire(import.meta.url);
initSync({ module: readFileSync(require.resolve('@spglib/moyo-wasm/moyo_wasm_bg.wasm')) });

interface Operation {
  readonly rotation: Mat3;
  readonly translation: readonly number[];
}

function operationsOf(hallNumber: number): Operation[] {
  const { number } = hall_symbol_entry(hallNumber);
  // moyo hands matrices over column by column
  return operations_from_number(number, { type: 'HallNumber', value: hallNumber }, false).map(
    (operation) => ({
      rotation: matrixOf(operation.rotation),
      translation: operation.translation,
    }),
  );
}

function matrixOf(numbers: readonly number[]): Mat3 {
  return transpose(asMat3(numbers));
}

/** Cell constants of a random metric averaged over the group: Σ WᵀGW. */
function cellFor(operations: readonly Operation[], random: () => number): number[] {
  const a = asMat3([
    7 + random(),
    0,
    0,
    1 + random(),
    8 + random(),
    0,
    -1 - random(),
    0.7 + random(),
    9 + random(),
  ]);
  const metric = multiply(a, transpose(a));
  const sum = operations
    .map(({ rotation }) => multiply(multiply(transpose(rotation), metric), rotation))
    .reduce(addMatrices);
  const g = scaleMatrix(1 / operations.length, sum);
  const lengths = [Math.sqrt(g[0]), Math.sqrt(g[4]), Math.sqrt(g[8])] as const;
  const angle = (product: number, p: number, q: number) => (Math.acos(product / (p * q)) * 180) / Math.PI;
  return [
    ...lengths,
    angle(g[5], lengths[1], lengths[2]),
    angle(g[2], lengths[0], lengths[2]),
    angle(g[1], lengths[0], lengths[1]),
  ];
}

function operationText({ rotation, translation }: Operation): string {
  return [0, 1, 2]
    .map((row) => {
      const terms = ['x', 'y', 'z'].flatMap((letter, column) => {
        const factor = rotation[3 * row + column]!;
        return factor === 0 ? [] : [`${factor < 0 ? '-' : '+'}${letter}`];
      });
      const twelfths = Math.round(translation[row]! * 24);
      return terms.join('') + (twelfths === 0 ? '' : `${twelfths < 0 ? '' : '+'}${twelfths}/24`);
    })
    .join(',');
}

/** A coordinate triplet such as `x,-x,z+1/2` at the given x, y, z. */
function evaluate(triplet: string, [x, y, z]: readonly [number, number, number]): number[] {
  return triplet.split(',').map((expression) =>
    [...expression.replaceAll(' ', '').matchAll(/([+-]?)(\d+\/\d+|\d+(?:\.\d+)?)?([xyz])?/g)].reduce(
      (sum, match) => {
        const [whole, sign, number, letter] = match;
        if (whole === '') return sum;
        const [top, bottom] = (number ?? '1').split('/').map(Number) as [number, number?];
        const value =
          (top / (bottom ?? 1)) * (letter === undefined ? 1 : { x, y, z }[letter as 'x' | 'y' | 'z']);
        return sum + (sign === '-' ? -value : value);
      },
      0,
    ),
  );
}

interface Case {
  readonly text: (symmetry: string) => string;
  readonly multiplicities: number[];
  readonly listed: string;
}

function caseOf(hallNumber: number): Case {
  const random = seededRandom(hallNumber);
  const operations = operationsOf(hallNumber);
  const [a, b, c, alpha, beta, gamma] = cellFor(operations, random);
  const positions = wyckoff_positions(hallNumber);
  const rows = positions.map(({ coordinates }, index) => {
    const at = evaluate(coordinates, [0.043, 0.187, 0.293]);
    return `A${index} Si ${at.map((x) => x.toFixed(7)).join(' ')}`;
  });
  const text = (symmetry: string) =>
    `data_s${hallNumber}\n_cell_length_a ${a}\n_cell_length_b ${b}\n_cell_length_c ${c}\n_cell_angle_alpha ${alpha}\n` +
    `_cell_angle_beta ${beta}\n_cell_angle_gamma ${gamma}\n${symmetry}\nloop_\n_atom_site_label\n` +
    `_atom_site_type_symbol\n_atom_site_fract_x\n_atom_site_fract_y\n_atom_site_fract_z\n${rows.join('\n')}\n`;
  const listed = `loop_\n_space_group_symop_operation_xyz\n${operations.map((one) => `'${operationText(one)}'`).join('\n')}`;
  return { text, multiplicities: positions.map(({ multiplicity }) => multiplicity), listed };
}

function multiplicitiesRead(text: string): { operations: number; multiplicities: number[] } {
  const [crystal] = readText(sourceFromText('case.cif', text)).structures;
  if (!crystal) return { operations: 0, multiplicities: [] };
  const sites = cellAtoms(crystal, 0.1, new ProblemLog());
  return {
    operations: crystal.symmetry.operations.length,
    multiplicities: sites.map(({ atoms }) => atoms.length),
  };
}

const hallNumbers = Array.from({ length: 530 }, (_, index) => index + 1);

/** Every tenth setting in every way would miss symbols: all 530, but each way in one test to keep the list short. */
describe('all 530 settings written as CIF', () => {
  const ways: readonly (readonly [string, (hallNumber: number, listed: string) => string | null])[] = [
    ['operations', (_, listed) => listed],
    ['Hall symbol', (hallNumber) => `_space_group_name_Hall '${hall_symbol_entry(hallNumber).hall_symbol}'`],
    [
      'full Hermann–Mauguin symbol with its setting',
      (hallNumber) => {
        const { hm_full, setting } = hall_symbol_entry(hallNumber);
        const suffix = /^[12HR]$/.test(setting) ? ` :${setting}` : '';
        return `_space_group_name_H-M_alt '${hm_full}${suffix}'`;
      },
    ],
    [
      'number, where the setting is the first of its group',
      (hallNumber) => {
        const { number } = hall_symbol_entry(hallNumber);
        const first = hallNumber === 1 || hall_symbol_entry(hallNumber - 1).number !== number;
        return first ? `_space_group_IT_number ${number}` : null;
      },
    ],
  ];
  it.each(ways)('%s', (_, symmetry) => {
    const wrong: string[] = [];
    let tried = 0;
    for (const hallNumber of hallNumbers) {
      const one = caseOf(hallNumber);
      const written = symmetry(hallNumber, one.listed);
      if (written === null) continue;
      tried += 1;
      const read = multiplicitiesRead(one.text(written));
      const expected = { operations: one.multiplicities[0], multiplicities: one.multiplicities };
      if (JSON.stringify(read) !== JSON.stringify(expected)) {
        wrong.push(
          `${hallNumber} ${written.slice(0, 60)}: ${JSON.stringify(read)} for ${JSON.stringify(expected)}`,
        );
      }
    }
    expect(tried).toBeGreaterThanOrEqual(230);
    expect(wrong).toEqual([]);
  });
});
