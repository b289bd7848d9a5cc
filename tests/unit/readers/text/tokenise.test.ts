import { describe, expect, it } from 'vitest';
import { atomMention } from '#src/readers/text/atom-mention.ts';
import { componentOf } from '#src/readers/text/component-name.ts';
import { tokenise } from '#src/readers/text/tokenise.ts';

function numbers(text: string): number[] {
  return tokenise(text, 1)
    .tokens.filter(({ kind }) => kind === 'number')
    .map(({ value }) => value);
}

describe('tokenise', () => {
  it.each([
    ['run-together minus signs', '0.00000000-19.396266833-1.5', [0, -19.396266833, -1.5]],
    ['D exponents', '1.5D-03 -2.0d+01', [0.0015, -20]],
    ['an exponent without its letter', '0.103-246 -.246E-09', [0.103e-246, -0.246e-9]],
    ['true minus signs', '−2.5 −3', [-2.5, -3]],
    ['uncertainties', '432.5(3) 1.25(12)', [432.5, 1.25]],
    ['decimal commas between semicolons', '432,5;-0,58;6,17', [432.5, -0.58, 6.17]],
    ['commas between cells', '432.5,-0.58,6.17', [432.5, -0.58, 6.17]],
    ['whole numbers between commas', '1,2,3', [1, 2, 3]],
    ['a unit behind a number', '4.255A 3.1ppm', [4.255, 3.1]],
  ])('reads %s', (_, text, wanted) => {
    expect(numbers(text)).toEqual(wanted);
  });

  it('keeps overflow and what was not computed as numbers without a value', () => {
    expect(numbers('1.0 ******** N/A nan 2.0')).toEqual([1, NaN, NaN, NaN, 2]);
  });

  it('keeps labels and names of components whole', () => {
    const words = tokenise('Si12 0C 3XX-RR V_xy sigma_11= 27Al C1', 1).tokens;
    expect(words.filter(({ kind }) => kind === 'word').map(({ text }) => text)).toEqual([
      'Si12',
      '0C',
      '3XX-RR',
      'V_xy',
      'sigma_11',
      '27Al',
      'C1',
    ]);
  });
});

describe('atomMention', () => {
  it.each([
    ['Atom 3 Si pos:', 'Si', 3],
    ['  5  O   Isotropic = 45.5', 'O', 5],
    ['Nucleus   0C :', 'C', 0],
    ['[ Al_2 ]', 'Al', 2],
    ['Centre 4   Z = 14', 'Si', 4],
    ['nuclide 27Al, site 2', 'Al', 2],
    ['<atom element="Na" number="7">', 'Na', 7],
    ['{"label": "Si3"', 'Si', 3],
    ['ion   12', null, 12],
    ['Nucleus: N 6', 'N', 6],
  ])('%s', (text, element, index) => {
    expect(atomMention(tokenise(text, 1))).toMatchObject({ element, index });
  });

  it.each([
    'I = 5/2',
    'V / m**2 and more',
    'stage done after 3 passes',
    'In the end we found nothing at all',
  ])('finds none in: %s', (text) => {
    expect(atomMention(tokenise(text, 1))).toBeNull();
  });
});

describe('componentOf', () => {
  it.each([
    ['XY', 1],
    ['V_zz', 8],
    ['sigma12', 1],
    ['3XX-RR', 0],
    ['szx', 6],
  ])('%s', (word, at) => {
    const { row, column } = componentOf(word)!;
    expect(row * 3 + column).toBe(at);
  });

  it.each(['lazy', 'total', 'energy', 'Si12', 'x'])('%s names none', (word) => {
    expect(componentOf(word)).toBeNull();
  });
});
