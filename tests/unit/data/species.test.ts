import { describe, expect, it } from 'vitest';
import { parseMixture, parseSpecies } from '#src/data/species.ts';

describe('an atom type', () => {
  it.each([
    ['Si', 'Si', null],
    ['SI', 'Si', null],
    ['O2-', 'O', -2],
    ['O-2', 'O', -2],
    ['O2−', 'O', -2],
    ['Fe3+', 'Fe', 3],
    ['Fe+3', 'Fe', 3],
    ['Si4+', 'Si', 4],
    ['Na1+', 'Na', 1],
    ['Na+', 'Na', 1],
    ['H1-', 'H', -1],
    ['Cu0+', 'Cu', 0],
    ['Fe2.5+', 'Fe', 2.5],
    ['O--', 'O', -2],
    ['Fe2', 'Fe', null],
    ['Siva', 'Si', null],
    ['Cval', 'C', null],
    ['D', 'D', null],
    ['T', 'T', null],
    ['2H', 'D', null],
    ['2H1+', 'D', 1],
    [' K ', 'K', null],
  ])('%j is %s with charge %s', (text, element, charge) => {
    expect(parseSpecies(text)).toMatchObject({ element, charge, hydrogens: 0 });
  });

  it('keeps the mass number of an isotope', () => {
    expect(parseSpecies('13C')).toMatchObject({ element: 'C', massNumber: 13 });
    expect(parseSpecies('2H')?.massNumber).toBe(2);
    expect(parseSpecies('D')?.massNumber).toBeNull();
  });

  it('counts the hydrogens of a group that stands for one atom', () => {
    for (const text of ['OH', 'O-H', 'O_H', 'O(H)'])
      expect(parseSpecies(text)).toMatchObject({ element: 'O', hydrogens: 1 });
    expect(parseSpecies('OH1-')).toMatchObject({ element: 'O' });
    expect(parseSpecies('H2O')).toMatchObject({ element: 'O', hydrogens: 2 });
    expect(parseSpecies('H3O+')).toMatchObject({ element: 'O', hydrogens: 3, charge: 1 });
    expect(parseSpecies('Wat')).toMatchObject({ element: 'O', hydrogens: 2 });
    expect(parseSpecies('NH4')).toMatchObject({ element: 'N', hydrogens: 4 });
    expect(parseSpecies('NH4+')).toMatchObject({ element: 'N', hydrogens: 4, charge: 1 });
  });

  it.each(['', '.', '?', 'X', 'Va', 'Vac', 'M2', 'Dum', 'Xx', '123', 'Si(1)', 'SiAl', 'Aval', '__proto__'])(
    '%j is no element',
    (text) => {
      expect(parseSpecies(text)).toBeNull();
    },
  );
});

describe('a position with several elements', () => {
  const read = (text: string): string | null => {
    const mixture = parseMixture(text);
    return mixture && mixture.species.map((s) => `${s.element} ${s.share}`).join(', ');
  };

  it.each([
    ['Al0.5Si0.5', 'Al 0.5, Si 0.5'],
    ['Al.25Si.75', 'Al 0.25, Si 0.75'],
    ['(Mg0.9Fe0.1)', 'Mg 0.9, Fe 0.1'],
    ['Mg0.9 Fe0.1', 'Mg 0.9, Fe 0.1'],
    ['Mg:0.9, Fe:0.1', 'Mg 0.9, Fe 0.1'],
    ['Mg 0.9 Fe 0.1', 'Mg 0.9, Fe 0.1'],
    ['Mg(0.9)Fe(0.1)', 'Mg 0.9, Fe 0.1'],
    ['Na0.5', 'Na 0.5'],
    ['Pb2+0.5', 'Pb 0.5'],
    ['Pb2+.5', 'Pb 0.5'],
    ['Pb2+ 0.5', 'Pb 0.5'],
    ['Pb2+:0.5', 'Pb 0.5'],
    ['Pb2+(0.5)', 'Pb 0.5'],
    ['Pb2+0.50(2)', 'Pb 0.5'],
    ['Pb0.52+', 'Pb 0.5'],
    ['O2-0.25', 'O 0.25'],
    ['Na+0.5', 'Na 0.5'],
    ['Pb+20.5', 'Pb 0.5'],
    ['Fe:0.4Mg:0.6', 'Fe 0.4, Mg 0.6'],
    ['Fe2.5+', 'Fe 1'],
    ['Fe+2.5', 'Fe 1'],
    ['Al0.4+Si0.6', 'Al 0.4, Si 0.6'],
    ['FeIII', 'Fe 1'],
    ['Fe(II)', 'Fe 1'],
    ['SiIV', 'Si 1'],
    ['O.2', null],
    ['N.ar', null],
    ['Na1.5', null],
    ['Fe3+0.5Al3+0.5', 'Fe 0.5, Al 0.5'],
    ['O0.5F0.3', 'O 0.5, F 0.3'],
  ])('%s has the shares it names', (text, expected) => {
    expect(read(text)).toBe(expected);
    if (expected) expect(parseMixture(text)?.sharesGiven).toBe(true);
  });

  it.each([
    ['(Fe,Mg)', 'Fe 0.5, Mg 0.5'],
    ['(Mg,Fe)2+', 'Mg 0.5, Fe 0.5'],
    ['Al/Si', 'Al 0.5, Si 0.5'],
    ['AlSi', 'Al 0.5, Si 0.5'],
    ['Al1/Si1', 'Al 0.5, Si 0.5'],
    ['Ca2+/Sr2+', 'Ca 0.5, Sr 0.5'],
    ['Mg0.5,Fe,Al', 'Mg 0.5, Fe 0.25, Al 0.25'],
  ])('%s gets equal shares, and says so', (text, expected) => {
    expect(read(text)).toBe(expected);
    expect(parseMixture(text)?.sharesGiven).toBe(false);
  });

  it('keeps charges', () => {
    expect(parseMixture('Fe3+0.5Al3+0.5')?.species.map((s) => s.charge)).toEqual([3, 3]);
    for (const text of ['Pb2+0.5', 'Pb0.52+', 'Pb+20.5', 'Pb2+ 0.5']) {
      expect(parseMixture(text)?.species).toMatchObject([{ element: 'Pb', charge: 2, share: 0.5 }]);
    }
  });

  it('takes a single element as a mixture of one', () => {
    expect(read('O2-')).toBe('O 1');
    expect(read('OH')).toBe('O 1');
  });

  it.each(['', 'Xy/Si', 'hello world', 'Dum', '0.5', '((', 'SO'])('%j is none', (text) => {
    expect(parseMixture(text)).toBeNull();
  });
});
