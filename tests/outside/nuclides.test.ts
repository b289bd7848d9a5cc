import { describe, expect, it } from 'vitest';
import {
  larmorFrequencyMHz,
  nuclide,
  nuclides,
  quadrupoleMomentBarn,
  usualIsotope,
} from '#src/data/nuclides.ts';
import facts from './facts/nuclides.json' with { type: 'json' };

/** Harris et al., Pure Appl. Chem. 73, 1795 (2001); Mol. Phys. 116, 1328 (2018); values from memory. */
describe('nuclide table', () => {
  it('holds every published row, no more', () => {
    const rows = nuclides.map((entry) => [
      entry.symbol,
      entry.atomicNumber,
      entry.massNumber,
      entry.spinText,
      entry.abundancePercent,
      entry.gamma1e7RadPerSPerT,
      entry.frequencyRatioPercent,
      entry.momentMb,
      entry.momentUncertaintyMb,
      entry.momentMbYear2008,
    ]);
    expect(rows).toHaveLength(104);
    expect(rows).toEqual(facts.nuclides);
  });

  it('gives a moment to every nuclide with I ≥ 1 and to no other', () => {
    for (const entry of nuclides) {
      expect([entry.symbol, entry.momentMb !== null]).toEqual([entry.symbol, entry.spin >= 1]);
      expect([entry.symbol, entry.momentConfidence !== null]).toEqual([entry.symbol, entry.spin >= 1]);
    }
  });

  it('has Ξ in keeping with γ: within 2 %, 5 % for the calculated Au, Ir and 235U', () => {
    const proton = nuclide('1H')!.gamma1e7RadPerSPerT;
    for (const entry of nuclides) {
      const ratio = (100 * Math.abs(entry.gamma1e7RadPerSPerT)) / proton / entry.frequencyRatioPercent;
      const limit = ['Au', 'Ir', 'U'].includes(entry.element) ? 0.06 : 0.02;
      expect([entry.symbol, Math.abs(ratio - 1) < limit]).toEqual([entry.symbol, true]);
    }
  });

  it('has half-integer spins for odd mass numbers and integer ones for even (any text on nuclear physics)', () => {
    for (const entry of nuclides) {
      expect([entry.symbol, (2 * entry.spin) % 2]).toEqual([entry.symbol, entry.massNumber % 2]);
    }
  });

  it('sums abundances to at most 100 % an element', () => {
    for (const element of new Set(nuclides.map((entry) => entry.element))) {
      const sum = nuclides
        .filter((entry) => entry.element === element)
        .reduce((total, entry) => total + entry.abundancePercent, 0);
      expect([element, sum <= 100.01]).toEqual([element, true]);
    }
  });

  it('has the negative moments whose sign people forget (Mol. Phys. 116, 1328)', () => {
    for (const symbol of ['17O', '35Cl', '37Cl', '43Ca', '7Li', '33S']) {
      expect([symbol, quadrupoleMomentBarn(nuclide(symbol)!)! < 0]).toEqual([symbol, true]);
    }
  });
});

describe('Larmor frequencies from Ξ', () => {
  /** Ξ of IUPAC 2001: 13C 25.145020 %, 29Si 19.867187 %, 27Al 26.056859 %; at ν(1H) = 500 MHz. */
  it.each([
    ['13C', 125.7251],
    ['29Si', 99.335935],
    ['27Al', 130.284295],
    ['15N', 50.683835],
  ] as const)('%s at 500 MHz: %d MHz', (symbol, frequency) => {
    expect(larmorFrequencyMHz(nuclide(symbol)!, 500)).toBeCloseTo(frequency, 9);
  });
});

/** Common practice, no source. */
describe('the isotope people mean', () => {
  it.each([
    ['H', '1H', '2H'],
    ['D', '2H', '2H'],
    ['T', '3H', '3H'],
    ['Li', '7Li', '7Li'],
    ['B', '11B', '11B'],
    ['C', '13C', '13C'],
    ['N', '15N', '14N'],
    ['O', '17O', '17O'],
    ['F', '19F', '19F'],
    ['Na', '23Na', '23Na'],
    ['Mg', '25Mg', '25Mg'],
    ['Al', '27Al', '27Al'],
    ['Si', '29Si', '29Si'],
    ['P', '31P', '31P'],
    ['S', '33S', '33S'],
    ['Cl', '35Cl', '35Cl'],
    ['K', '39K', '39K'],
    ['Ca', '43Ca', '43Ca'],
    ['Ti', '49Ti', '49Ti'],
    ['V', '51V', '51V'],
    ['Ga', '71Ga', '71Ga'],
    ['Br', '81Br', '81Br'],
    ['Rb', '87Rb', '87Rb'],
    ['Mo', '95Mo', '95Mo'],
    ['Ru', '99Ru', '99Ru'],
    ['Ag', '109Ag', '109Ag'],
    ['Cd', '113Cd', '113Cd'],
    ['Sn', '119Sn', '119Sn'],
    ['Xe', '129Xe', '131Xe'],
    ['Ba', '137Ba', '137Ba'],
    ['La', '139La', '139La'],
    ['Hg', '199Hg', '201Hg'],
    ['Pb', '207Pb', '207Pb'],
  ] as const)('of %s is %s, for a field gradient %s', (element, shielding, efg) => {
    expect(usualIsotope(element)?.symbol).toBe(shielding);
    expect(usualIsotope(element, 'shift')?.symbol).toBe(shielding);
    expect(usualIsotope(element, 'efg')?.symbol).toBe(efg);
  });

  it('is unknown for an element without a magnetic nuclide in the table', () => {
    expect(usualIsotope('Ar')).toBeNull();
    expect(usualIsotope('X')).toBeNull();
    expect(nuclide('12C')).toBeNull();
  });

  it('is found whatever the case', () => {
    expect(nuclide(' 27al ')?.symbol).toBe('27Al');
    expect(nuclide('D')?.symbol).toBe('2H');
  });
});
