import { describe, expect, it } from 'vitest';
import { sourceFromText } from '#src/bytes/source-from-text.ts';
import type { Reading } from '#src/readers/reading.ts';
import { readCif } from '#src/readers/cif/read-cif.ts';
import { readFoundText } from '#src/readers/text/read-found-text.ts';
import { readXyz } from '#src/readers/xyz/read-xyz.ts';
import { componentBeyondLimit } from '#src/tensor/component-limit.ts';

/* All tensors are invented. The limits are bounds of our own: 10⁶ ppm, at which a shielding cancels the whole field, and 10⁵ a.u. */

function diagonal(size: string): string {
  return `${size} 0 0 0 1 0 0 0 2`;
}

function xyz(columns: string, ...rows: readonly string[]): Reading {
  const head = `Lattice="5 0 0 0 6 0 0 0 7" Properties=species:S:1:pos:R:3:${columns}`;
  return readXyz(sourceFromText('t.xyz', `${rows.length}\n${head}\n${rows.join('\n')}\n`));
}

function labelsAndErrors({ tensorSets, problems }: Reading) {
  return {
    labels: tensorSets.flatMap(({ entries }) => entries.map(({ label, element }) => label ?? element)),
    errors: problems.filter(({ severity }) => severity === 'error').map(({ code, line }) => [code, line]),
  };
}

describe('the limit of a component', () => {
  it('takes what is at it and leaves what is beyond, of either sign, and what is no number', () => {
    const at = (size: number, quantity: 'shielding' | 'efg') =>
      componentBeyondLimit([0, size, 0, 0, 0, 0, 0, 0, 0], quantity);
    expect([at(1e6, 'shielding'), at(-1e6, 'shielding'), at(1e5, 'efg')]).toEqual([null, null, null]);
    expect([at(-1000001, 'shielding'), at(1e6, 'efg')]).toEqual([-1000001, 1e6]);
    expect(at(NaN, 'efg')).toBeNaN();
  });
});

describe('a tensor no atom can have', () => {
  it('is left out of an extended XYZ with an error that states found and allowed; the others stay', () => {
    const reading = xyz('shielding:R:9', `Si 0 0 0 ${diagonal('-1e300')}`, `O 1 1 1 ${diagonal('999999')}`);
    expect(labelsAndErrors(reading)).toEqual({ labels: ['O'], errors: [['xyz-tensor-too-large', 3]] });
    expect(reading.structures[0]!.sites).toHaveLength(2);
    expect(reading.problems.find(({ code }) => code === 'xyz-tensor-too-large')).toMatchObject({
      got: '-1e+300 ppm',
      allowed: '−1000000 to 1000000 ppm',
    });
  });

  it('is judged in the canonical unit: volts per square metre of an ordinary gradient are no large ones', () => {
    const rows = [`Al 0 0 0 ${diagonal('1e21')}`, `O 1 1 1 ${diagonal('1e27')}`];
    const head = `Lattice="5 0 0 0 6 0 0 0 7" efg_unit="V/m2" Properties=species:S:1:pos:R:3:efg:R:9`;
    const reading = readXyz(sourceFromText('t.xyz', `2\n${head}\n${rows.join('\n')}\n`));
    expect(labelsAndErrors(reading)).toEqual({ labels: ['Al'], errors: [['xyz-tensor-too-large', 4]] });
  });

  it('is left out of the tensor loop of a CIF', () => {
    const components = [11, 12, 13, 21, 22, 23, 31, 32, 33].map((index) => `_ellipsite_tensor_${index}`);
    const text = `data_t
_cell_length_a 5
_cell_length_b 6
_cell_length_c 7
_cell_angle_alpha 90
_cell_angle_beta 90
_cell_angle_gamma 90
_space_group_name_H-M_alt 'P 1'
loop_
_atom_site_label
_atom_site_fract_x
_atom_site_fract_y
_atom_site_fract_z
Al1 0 0 0
O1 .5 .5 .5
loop_
_ellipsite_tensor_site_label
_ellipsite_tensor_quantity
_ellipsite_tensor_unit
${components.join('\n')}
Al1 efg a.u. ${diagonal('1e6')}
O1 efg a.u. ${diagonal('0.3')}
`;
    const reading = readCif(sourceFromText('t.cif', text));
    expect(labelsAndErrors(reading)).toEqual({ labels: ['O1'], errors: [['cif-bad-tensor', 29]] });
    expect(reading.problems.find(({ code }) => code === 'cif-bad-tensor')).toMatchObject({
      got: '1000000 a.u.',
      allowed: '−100000 to 100000 a.u.',
    });
  });

  it('is left out of what is found in a text', () => {
    const text = `Invented run
 Shielding tensors (ppm)
 atom Si1
   520.0  2.0  0.0
   -4.0 530.0  0.0
    0.0   7.0 54900000.0
 atom O1
   520.0  2.0  0.0
   -4.0 530.0  0.0
    0.0   7.0 549.0
`;
    const reading = readFoundText(sourceFromText('t.log', text))!;
    const { labels, errors } = labelsAndErrors(reading);
    expect(labels).toEqual(['O1']);
    expect(errors.map(([code]) => code)).toEqual(['find-tensor-too-large']);
  });
});
