import { describe, expect, it } from 'vitest';
import { elementFromLabel, elementOf, elements, symbolOfAtomicNumber } from '#src/data/elements.ts';

describe('the table of elements', () => {
  it('holds each atomic number from 1 to 118 once, with deuterium and tritium beside hydrogen', () => {
    const numbers = elements.filter(({ symbol }) => !/^[DT]$/.test(symbol)).map((e) => e.atomicNumber);
    expect(numbers).toEqual(Array.from({ length: 118 }, (_, i) => i + 1));
    expect(new Set(elements.map(({ symbol }) => symbol)).size).toBe(120);
    expect(elementOf('D')?.atomicNumber).toBe(1);
    expect(elementOf('T')?.atomicNumber).toBe(1);
  });

  /** Shape of the periodic system: the noble gases close the periods at 2, 10, 18, 36, 54, 86, 118. */
  it('has periods and groups that follow from the noble gases', () => {
    const closings = [0, 2, 10, 18, 36, 54, 86, 118];
    for (const element of elements) {
      const period = closings.findIndex((last) => element.atomicNumber <= last);
      expect(element.period, element.symbol).toBe(period);
      if (closings.includes(element.atomicNumber)) expect(element.group).toBe(18);
    }
    const columns = elements.filter((e) => e.group === 14).map((e) => e.symbol);
    expect(columns).toEqual(['C', 'Si', 'Ge', 'Sn', 'Pb', 'Fl']);
    expect(elements.filter((e) => e.group === null)).toHaveLength(28);
  });

  it('reads symbols in any case and knows what is none', () => {
    expect(elementOf('SI')?.name).toBe('silicon');
    expect(elementOf('cl')?.symbol).toBe('Cl');
    expect(elementOf('Al')).toMatchObject({
      atomicNumber: 13,
      period: 3,
      group: 13,
      hasStandardWeight: true,
    });
    expect(elementOf('Tc')?.hasStandardWeight).toBe(false);
    expect(elementOf('Wat')).toBeNull();
    expect(elementOf('')).toBeNull();
    expect(elementOf('constructor')).toBeNull();
  });

  it('names atomic numbers', () => {
    expect(symbolOfAtomicNumber(1)).toBe('H');
    expect(symbolOfAtomicNumber(29)).toBe('Cu');
    expect(symbolOfAtomicNumber(118)).toBe('Og');
    expect([0, 119, 1.5, NaN].map(symbolOfAtomicNumber)).toEqual([null, null, null, null]);
  });
});

describe('an element from a label', () => {
  it.each([
    ['Si1A', 'Si'],
    ['O12', 'O'],
    ['C1', 'C'],
    ['H2B', 'H'],
    ['Ow3', 'O'],
    ['Oh', 'O'],
    ['OH1', 'O'],
    ['Hw', 'H'],
    ['Wat', 'O'],
    ['Wat2', 'O'],
    ['D3', 'D'],
    ['1HB', 'H'],
    ['2H', 'H'],
    ['Fe3+', 'Fe'],
    ['(Na1)', 'Na'],
    ['K', 'K'],
    ['ZN1', 'Zn'],
    ['AL2', 'Al'],
  ])('%s is surely %s', (label, element) => {
    expect(elementFromLabel(label)).toEqual({ element, certain: true });
  });

  it.each([
    ['CL1', 'Cl'],
    ['BR2', 'Br'],
    ['NA1', 'Na'],
    ['SI1', 'Si'],
    ['FE1', 'Fe'],
    ['CA1', 'C'],
    ['CD2', 'C'],
    ['NE1', 'N'],
    ['HG2', 'H'],
    ['HO1', 'H'],
    ['Cn1', 'C'],
    ['No2', 'N'],
    ['W1', 'W'],
  ])('%s is taken for %s, with a doubt', (label, element) => {
    expect(elementFromLabel(label)).toEqual({ element, certain: false });
  });

  it.each([
    ['Carbon3', 'C'],
    ['nitrogen', 'N'],
    ['SODIUM1', 'Na'],
    ['Iron', 'Fe'],
  ])('%s is a name', (label, element) => {
    expect(elementFromLabel(label)).toEqual({ element, certain: true });
    expect(elementFromLabel(label, new Set(['Li']))?.certain).not.toBe(true);
  });

  it.each(['T1', 'M2', 'X', 'A1', '?', '', '12', 'Q3', 'Dum', 'DUM1', 'Du2'])(
    '%j names no element',
    (label) => {
      expect(elementFromLabel(label)).toBeNull();
    },
  );

  it('follows the formula where there is one', () => {
    const organic = new Set(['C', 'H', 'N', 'O']);
    const mineral = new Set(['Ca', 'Mg', 'Si', 'O']);
    expect(elementFromLabel('CA1', organic)).toEqual({ element: 'C', certain: true });
    expect(elementFromLabel('CA1', mineral)).toEqual({ element: 'Ca', certain: true });
    expect(elementFromLabel('Ca1', organic)).toEqual({ element: 'C', certain: true });
    expect(elementFromLabel('Ho1', organic)).toEqual({ element: 'H', certain: true });
    expect(elementFromLabel('OS1', new Set(['Os', 'C', 'P']))).toEqual({ element: 'Os', certain: true });
    expect(elementFromLabel('W2', mineral)).toEqual({ element: 'O', certain: false });
    expect(elementFromLabel('T1', new Set(['T', 'O']))).toEqual({ element: 'T', certain: true });
  });

  it('takes an empty set for no formula', () => {
    for (const label of ['Wat1', 'CA1', 'Si2', 'Carbon', 'Fe3', 'W1']) {
      expect(elementFromLabel(label, new Set())).toEqual(elementFromLabel(label));
    }
    expect(elementFromLabel('Wat1', new Set())).toEqual({ element: 'O', certain: true });
  });

  it('keeps a reading that the formula lacks, with a doubt', () => {
    expect(elementFromLabel('Fe1', new Set(['Si', 'O']))).toEqual({ element: 'Fe', certain: false });
    expect(elementFromLabel('D1', new Set(['H', 'O']))).toEqual({ element: 'D', certain: true });
  });

  it('leaves a doubt where the formula allows both', () => {
    const both = new Set(['C', 'Cl', 'Ca']);
    expect(elementFromLabel('Cl1', both)).toEqual({ element: 'Cl', certain: true });
    expect(elementFromLabel('CL1', both)).toEqual({ element: 'Cl', certain: false });
    expect(elementFromLabel('CA1', both)).toEqual({ element: 'C', certain: false });
  });
});
