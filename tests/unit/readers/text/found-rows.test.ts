import { describe, expect, it } from 'vitest';
import { sourceFromText } from '#src/bytes/source-from-text.ts';
import { findInText } from '#src/readers/text/find-in-text.ts';

const found = (...lines: string[]) => findInText(sourceFromText('log.txt', lines.join('\n'))).groups;
const taken = (...lines: string[]) =>
  found(...lines)
    .filter(({ proposed }) => proposed)
    .flatMap(({ quantity, entries }) =>
      entries.map(({ element, index, tensor, matched }) => ({
        quantity,
        atom: `${element ?? ''}${index ?? ''}`,
        tensor: tensor.map((value) => Number(value.toFixed(5))),
        proved: matched.map(({ kind }) => kind),
      })),
    );

describe('rows under a title that names six components', () => {
  const title = 'SHIELDING of all sites (ppm), components in order xx xy yy xz yz zz';
  const row = (number: number, iso: number): string =>
    `  C  ${number}   100.5  -2.5  130.5  3.5  4.5  ${90 + 30 * number}.0   iso= ${iso}`;
  const six = (zz: number): number[] => [100.5, -2.5, 3.5, -2.5, 130.5, 4.5, 3.5, 4.5, zz];

  it('a value with a name behind is no component but proves them', () => {
    expect(taken(title, row(1, 117), row(2, 127))).toEqual([
      { quantity: 'shielding', atom: 'C1', tensor: six(120), proved: ['isotropic'] },
      { quantity: 'shielding', atom: 'C2', tensor: six(150), proved: ['isotropic'] },
    ]);
  });

  it('a printed isotropic value that is another one makes it a question', () => {
    const groups = found(title, row(1, 107), row(2, 137));
    expect(groups.map(({ role, proposed }) => ({ role, proposed }))).toEqual([
      { role: 'unknown', proposed: false },
    ]);
  });

  it('nuclides with a number as names, couplings behind', () => {
    const six1 = '-0.51801 -0.13651 0.65452 0.37866 1.14139 -0.96395';
    const all = taken(
      'EFG tensor (a.u.)   order: xx yy zz xy xz yz',
      `17O-1   ${six1}   Cq(calc) = 10.17 MHz`,
      `17O-2   ${six1.replaceAll('0.37866', '0.27866')}   Cq(calc) = 10.00 MHz`,
    );
    const nine = [-0.51801, 0.37866, 1.14139, 0.37866, -0.13651, -0.96395, 1.14139, -0.96395, 0.65452];
    expect(all.map(({ atom }) => atom)).toEqual(['O1', 'O2']);
    expect(all[0]!.tensor).toEqual(nine);
    expect(all[1]!.tensor[1]).toBe(0.27866);
  });
});

describe('several tensors on one line', () => {
  const nine = (first: number): string => `[[${first}.5,0.5,3.1],[1.1,25.9,1.0],[3.2,1.5,32.7]]`;
  const values = (first: number): number[] => [first + 0.5, 0.5, 3.1, 1.1, 25.9, 1, 3.2, 1.5, 32.7];

  it.each([
    ['name before', (atom: string, n: number) => `{"atom":"${atom}","shielding":${nine(n)}}`],
    ['name behind', (atom: string, n: number) => `{"shielding":${nine(n)},"atom":"${atom}"}`],
  ])('objects of a list, %s: each with its own atom', (_, object) => {
    const line = `{"results":[${['H1', 'H2', 'H3'].map((atom, at) => object(atom, 20 + at)).join(',')}],"unit":"ppm"}`;
    expect(taken(line).map(({ atom, tensor }) => ({ atom, tensor }))).toEqual(
      ['H1', 'H2', 'H3'].map((atom, at) => ({ atom, tensor: values(20 + at) })),
    );
  });

  it('two quantities of one atom in one object', () => {
    const efg = '[[0.5,0.1,0.2],[0.1,-0.2,0.3],[0.2,0.3,-0.3]]';
    const objects = ['O1', 'O2'].map(
      (atom, at) => `{"atom":"${atom}","efg":${efg},"shielding":${nine(20 + at)}}`,
    );
    const all = taken(`{"unit":"a.u.","sites":[${objects.join(',')}]}`);
    expect(all.map(({ quantity, atom }) => `${quantity} ${atom}`).sort()).toEqual([
      'efg O1',
      'efg O2',
      'shielding O1',
      'shielding O2',
    ]);
    expect(all.find(({ quantity, atom }) => quantity === 'shielding' && atom === 'O2')!.tensor).toEqual(
      values(21),
    );
  });
});

describe('which atom is meant', () => {
  it('a nuclide in a title is none, so that the first atom under it is not lost', () => {
    const axes = ['( 1.0000 0.0000 0.0000 )', '( 0.0000 0.0000 1.0000 )', '( 0.0000 -1.0000 0.0000 )'];
    const atom = (name: string, values: number[]): string[] => [
      name,
      ...values.map((value, at) => ` d${at + 1}${at + 1} = ${value.toFixed(1)}   ${axes[at]!}`),
    ];
    const title = 'Chemical shift tensors of 13C, principal values (ppm) and direction cosines';
    const all = taken(title, ...atom('C1', [170.5, 160.5, 20.5]), ...atom('C2', [70.5, 60.5, 50.5]));
    expect(all.map(({ atom: name, tensor }) => [name, tensor[0], tensor[4], tensor[8]])).toEqual([
      ['C1', 170.5, 20.5, 160.5],
      ['C2', 70.5, 50.5, 60.5],
    ]);
  });

  it('principal values in the line that names the atom, over axes that have a row each', () => {
    const axes = [' axis 1:  0.0 1.0 0.0', ' axis 2:  0.0 0.0 1.0', ' axis 3:  1.0 0.0 0.0'];
    const all = taken(
      'Atom C1: principal shieldings 20.5 98.1 160.2 ppm',
      ...axes,
      'Atom C2: principal shieldings 30.5 88.1 150.2 ppm',
      ...axes,
    );
    expect(all.map(({ atom: name, tensor }) => [name, tensor[0], tensor[4], tensor[8]])).toEqual([
      ['C1', 160.2, 20.5, 98.1],
      ['C2', 150.2, 30.5, 88.1],
    ]);
  });

  it('element and number in brackets of their own', () => {
    const all = taken(
      'Field gradients (10^21 V/m2), six numbers V11 V22 V33 V23 V13 V12',
      '[Na] (1)  0.123,0.456,-0.579;0.010/0.020/0.030',
      '[Na] (2)  0.223,0.356,-0.579;0.011/0.021/0.031',
    );
    expect(all.map(({ atom, tensor }) => [atom, tensor])).toEqual([
      ['Na1', [0.123, 0.03, 0.02, 0.03, 0.456, 0.01, 0.02, 0.01, -0.579]],
      ['Na2', [0.223, 0.031, 0.021, 0.031, 0.356, 0.011, 0.021, 0.011, -0.579]],
    ]);
  });
});
