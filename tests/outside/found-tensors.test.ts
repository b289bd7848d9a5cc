import { existsSync, readFileSync } from 'node:fs';
import { join } from 'node:path';
import { fileURLToPath } from 'node:url';
import { describe, expect, it } from 'vitest';
import type { Mat3 } from '#src/base/matrix3.ts';
import { symmetricEigen } from '#src/base/symmetric-eigen.ts';
import { sourceFromText } from '#src/bytes/source-from-text.ts';
import { findInText } from '#src/readers/text/find-in-text.ts';
import type { FoundGroup } from '#src/readers/text/found-text.ts';
import { readFoundText } from '#src/readers/text/read-found-text.ts';
import { couplingConstantMHz } from '#src/tensor/efg.ts';
import { efgUnitsPerAtomicUnit } from '#src/tensor/units.ts';
import facts from './facts/first-principles-tensors.json' with { type: 'json' };

/**
 * Real first-principles results: their numbers stand in facts/first-principles-tensors.json, in texts of our own wording here.
 * The texts they come from are read where a folder with them is at hand (`ELLIPSITE_SHARED`, else `../shared` beside the checkout).
 */
const besides = fileURLToPath(new URL('../../../shared', import.meta.url));
const folder = join(process.env['ELLIPSITE_SHARED'] ?? besides, 'data');

function proposed(text: string, quantity: FoundGroup['quantity']): FoundGroup[] {
  const { groups } = findInText(sourceFromText('log.txt', text));
  return groups.filter((group) => group.proposed && group.quantity === quantity);
}

/** Tensors of the rows of an extended XYZ: the last nine numbers of each. */
function rowsOf(text: string): number[][] {
  return text
    .trim()
    .split(/\r?\n/)
    .slice(2)
    .map((line) => line.trim().split(/\s+/).slice(-9).map(Number));
}

/** C_Q in MHz of a tensor in V/Å² and a moment in mb. */
function couplingMHz(tensor: readonly number[], momentMb: number): number {
  const { values } = symmetricEigen(tensor as unknown as Mat3);
  const vzz = Math.abs(values[0]) > Math.abs(values[2]) ? values[0] : values[2];
  return couplingConstantMHz(momentMb / 1000, vzz / efgUnitsPerAtomicUnit['V/A2']);
}

describe('first-principles results, own fixtures', () => {
  it('reads shieldings of quartz from blocks with a part before the whole', () => {
    const part = facts.quartz.flatMap(({ element, tensor }, i) => [
      `No. ${i + 1} atom ${i + 1} ${element}, diamagnetic part`,
      ...[0, 3, 6].map((at) =>
        tensor
          .slice(at, at + 3)
          .map((v) => (v * 0.3).toFixed(4))
          .join('  '),
      ),
    ]);
    const whole = facts.quartz.flatMap(({ element, tensor }, i) => [
      `atom ${i + 1} ${element}, whole shielding`,
      ...[0, 3, 6].map((at) =>
        tensor
          .slice(at, at + 3)
          .map((v) => v.toFixed(4))
          .join('  '),
      ),
    ]);
    const text = ['Shielding of each nucleus, ppm', ...part, 'Total shielding, ppm', ...whole].join('\n');
    const [group, ...others] = proposed(text, 'shielding');
    expect(others).toEqual([]);
    expect(group!.entries.map(({ tensor }) => tensor)).toEqual(facts.quartz.map(({ tensor }) => tensor));
    expect(group!.entries.map(({ element, index }) => [element, index])).toEqual(
      facts.quartz.map(({ element }, i) => [element, i + 1]),
    );
  });

  it('takes the unit of margarite’s field gradients from the couplings printed with them, where no word gives it', () => {
    const { momentMb, sites } = facts.margarite;
    const rows = sites.map(({ index, six }) => `${index} Al ${six.map((v) => v.toFixed(3)).join(' ')}`);
    const couplings = sites.map(({ index, couplingMHz: cq }) => `${index} Al ${cq.toFixed(3)} ${momentMb}`);
    const text = [
      'Field gradients',
      'site el Vxx Vyy Vzz Vxy Vxz Vyz',
      ...rows,
      '',
      'site el Cq(MHz) Q(mb)',
      ...couplings,
    ];
    const [group] = proposed(text.join('\n'), 'efg');
    expect(group!.unit).toBe('V/A2');
    group!.entries.forEach(({ tensor }, i) => {
      const { six, couplingMHz: printed } = sites[i]!;
      const [xx, yy, zz, xy, xz, yz] = six as [number, number, number, number, number, number];
      expect(tensor).toEqual([xx, xy, xz, xy, yy, yz, xz, yz, zz]);
      expect(Math.abs(couplingMHz(tensor, momentMb) - printed)).toBeLessThan(0.001);
    });
  });

  it('reads furan’s named components and finds the printed isotropic values and anisotropies in them', () => {
    const text = facts.furan.flatMap(({ element, tensor, isotropic, anisotropy }, i) => [
      `${i + 1} ${element} isotropic = ${isotropic} anisotropy = ${anisotropy}`,
      ...[0, 1, 2].map((column) =>
        ['X', 'Y', 'Z'].map((row, r) => `${row}${'XYZ'[column]}= ${tensor[3 * r + column]}`).join(' '),
      ),
    ]);
    const [group] = proposed(['Magnetic shielding, ppm', ...text].join('\n'), 'shielding');
    expect(group!.entries.map(({ tensor }) => tensor)).toEqual(facts.furan.map(({ tensor }) => tensor));
    for (const { matched } of group!.entries) {
      expect(matched.map(({ kind }) => kind)).toEqual(expect.arrayContaining(['isotropic', 'anisotropy']));
    }
  });
});

const isHere = existsSync(join(folder, 'quartz-blocks.txt'));
const shared = (name: string): string => readFileSync(join(folder, name), 'utf8');

describe.skipIf(!isHere)('the texts as printed', () => {
  it('quartz: every total to the last digit, printed isotropic values, nothing else proposed', () => {
    const text = shared('quartz-blocks.txt');
    const groups = findInText(sourceFromText('q', text)).groups.filter((group) => group.proposed);
    expect(groups).toHaveLength(1);
    const [{ entries, quantity, unit }] = groups as [FoundGroup];
    expect([quantity, unit]).toEqual(['shielding', 'ppm']);
    expect(entries.map(({ tensor }) => [...tensor])).toEqual(rowsOf(shared('quartz-calculated.xyz')));
    for (const { matched } of entries) {
      const kinds = matched.map(({ kind }) => kind);
      expect(kinds).toEqual(expect.arrayContaining(['isotropic', 'anisotropy', 'asymmetry']));
    }
  });

  it('margarite: every field gradient, its asymmetry and principal values, couplings to 0.001 MHz', () => {
    const groups = findInText(sourceFromText('m', shared('margarite-six-components.txt'))).groups.filter(
      (group) => group.proposed,
    );
    expect(groups).toHaveLength(1);
    const [{ entries, unit }] = groups as [FoundGroup];
    expect(unit).toBe('V/A2');
    expect(entries.map(({ tensor }) => [...tensor])).toEqual(rowsOf(shared('margarite-calculated.xyz')));
    for (const { matched } of entries) {
      expect(matched.map(({ kind }) => kind)).toEqual(expect.arrayContaining(['principal', 'asymmetry']));
    }
    const printed = { 3: -5.573, 5: 6.327, 7: -7.453, 9: -5.58 };
    for (const [index, value] of Object.entries(printed)) {
      const entry = entries.find((one) => one.index === Number(index))!;
      expect(entry.element).toBe('Al');
      expect(Math.abs(couplingMHz(entry.tensor, 146.6) - value)).toBeLessThan(0.001);
    }
  });

  it('ethanol: keyword rows to the last digit, the boxed blocks known as the same tensors', () => {
    const text = shared('ethanol-keyword-rows.txt');
    const { groups } = findInText(sourceFromText('e', text));
    for (const [keyword, quantity, unit] of [
      ['ms', 'shielding', 'ppm'],
      ['efg', 'efg', 'au'],
    ] as const) {
      const rows = text.split('\n').filter((line) => line.startsWith(`${keyword} `));
      const own = groups.filter((group) => group.proposed && group.quantity === quantity);
      expect(own).toHaveLength(1);
      expect(own[0]!.unit).toBe(unit);
      expect(own[0]!.entries.map(({ element, index, tensor }) => [element, index, ...tensor])).toEqual(
        rows.map((line) => {
          const [, element, index, ...numbers] = line.trim().split(/\s+/);
          return [element, Number(index), ...numbers.map(Number)];
        }),
      );
      const again = groups.filter(
        (group) => group.role === 'repeated' && group.shape === 'block' && group.quantity === quantity,
      );
      expect(again.flatMap(({ entries }) => entries)).toHaveLength(rows.length);
    }
  });

  it('furan: components by their names, printed isotropic values, anisotropies and principal values', () => {
    const text = shared('furan-named-components.txt');
    const [group, ...others] = findInText(sourceFromText('f', text)).groups;
    expect(others).toEqual([]);
    const named = [...text.matchAll(/([XYZ])([XYZ])=\s*(-?[\d.]+)/g)];
    expect(named).toHaveLength(9 * group!.entries.length);
    named.forEach(([, row = '', column = '', value], i) => {
      const tensor = group!.entries[Math.floor(i / 9)]!.tensor;
      expect(tensor['XYZ'.indexOf(row) * 3 + 'XYZ'.indexOf(column)]).toBe(Number(value));
    });
    for (const { matched } of group!.entries) {
      const kinds = matched.map(({ kind }) => kind);
      expect(kinds).toEqual(expect.arrayContaining(['isotropic', 'anisotropy', 'principal']));
    }
  });

  it('gives sets in canonical units, bound to the atoms of the text’s own structure', () => {
    const reading = readFoundText(sourceFromText('m', shared('margarite-six-components.txt')))!;
    const [set] = reading.tensorSets;
    expect(set).toMatchObject({ quantity: 'efg', structureIndex: 0, unitGiven: 'V Å⁻²' });
    expect(set!.entries.map(({ atomIndex }) => atomIndex)).toEqual(
      reading.structures[0]!.sites.map(({ index }) => index),
    );
    expect(set!.entries[0]!.tensor[0]).toBeCloseTo(-2.568 / 97.17362442, 8);
  });
});

it.skipIf(isHere)(`no texts at ${folder}: only the fixtures made from their numbers were read`, () => {
  expect(facts.quartz).toHaveLength(9);
});
