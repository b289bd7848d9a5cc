import { describe, expect, it } from 'vitest';
import { diagonalMatrix } from '#src/base/matrix3.ts';
import { nuclide } from '#src/data/nuclides.ts';
import {
  convention,
  conventionCatalogue,
  digitsOf,
  formatByConvention,
  headingOf,
} from '#src/tensor/convention-catalogue.ts';
import { describeEfg } from '#src/tensor/efg.ts';
import { describeShielding } from '#src/tensor/shielding.ts';
import { describeReferencedShift } from '#src/tensor/shift.ts';
import type { Quantity } from '#src/tensor/tensor-set.ts';

const shielding = describeShielding(diagonalMatrix([20, 60, 130]));
const described: Record<Quantity, Record<string, unknown>> = {
  shielding: { ...shielding, symmetryResidual: 0, equivalentSpread: null },
  shift: {
    ...describeReferencedShift(diagonalMatrix([20, 60, 130]), {
      kind: 'simple',
      interceptPpm: 170,
      slope: -1,
    }),
  },
  efg: {
    ...describeEfg(diagonalMatrix([0.3, -0.1, -0.2]), nuclide('27Al')),
    symmetryResidual: 0,
    equivalentSpread: null,
  },
};

/** Fields that hold tensors, text, flags or directions rather than one labelled number. */
const unlabelled = [
  ...['tensor', 'symmetric', 'axes', 'axialVector', 'noise', 'undefinedBecause', 'reference'],
  ...['isotope', 'quadrupoleMomentSource', 'signDetermined'],
];

describe.each(Object.keys(conventionCatalogue) as Quantity[])('catalogue of %s', (quantity) => {
  const entries = conventionCatalogue[quantity];

  it('labels every number a dossier holds, and nothing that is not there', () => {
    const labelled = new Set(entries.map(({ field }) => field));
    const fields = Object.keys(described[quantity]).filter((field) => !unlabelled.includes(field));
    expect([...labelled].sort()).toEqual(fields.sort());
  });

  it('has unique keys and complete texts', () => {
    expect(new Set(entries.map(({ key }) => key)).size).toBe(entries.length);
    for (const entry of entries) {
      expect(entry.quantity).toBe(quantity);
      for (const text of [entry.name, entry.symbol, entry.definition, entry.convention, entry.reference]) {
        expect(text.length).toBeGreaterThan(0);
      }
      expect(entry.symbolParts[0]!.text.length).toBeGreaterThan(0);
    }
  });

  it('points at numbers', () => {
    for (const { field, index } of entries) {
      const value = described[quantity][field];
      const number = index === null ? value : (value as number[])[index];
      expect(number === null || typeof number === 'number').toBe(true);
    }
  });
});

describe('labels', () => {
  it('write symbols with parts for markup', () => {
    expect(convention('shielding', 's11')).toMatchObject({
      symbol: 'σ11',
      unit: 'ppm',
      field: 'components',
      index: 0,
      symbolParts: [
        { text: 'σ', position: 'base' },
        { text: '11', position: 'sub' },
      ],
    });
    expect(convention('efg', 'couplingMHz')?.symbol).toBe('C_Q');
    expect(convention('shift', 'nothing')).toBeNull();
  });

  it('never call the reduced anisotropy δ', () => {
    for (const quantity of ['shielding', 'shift'] as const) {
      expect(convention(quantity, 'reducedAnisotropy')!.symbolParts[0]!.text).toBe('ζ');
    }
  });

  it('head columns with the unit in parentheses', () => {
    expect(headingOf(convention('shift', 'span')!)).toBe('Ω (ppm)');
    expect(headingOf(convention('shift', 'skew')!)).toBe('κ');
  });
});

describe('formatByConvention', () => {
  const shift = convention('shift', 'isotropic')!;

  it('prints default digits, more for protons, and a true minus sign', () => {
    expect(formatByConvention(shift, -12.345)).toBe('−12.3');
    expect(formatByConvention(shift, 7.256, '1H')).toBe('7.26');
    expect(digitsOf(convention('efg', 'couplingMHz')!, '2H')).toBe(4);
  });

  it('prints a dash for what is undefined and no sign for a rounded zero', () => {
    expect(formatByConvention(shift, null)).toBe('–');
    expect(formatByConvention(shift, NaN)).toBe('–');
    expect(formatByConvention(shift, -0.01)).toBe('0.0');
  });
});
