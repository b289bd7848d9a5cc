import { describe, expect, it } from 'vitest';
import {
  atomText,
  block,
  box,
  cellText,
  codes,
  only,
  operationsOf,
  plainColumns,
  problemOf,
} from '#tests/support/cif-structure.ts';

const atom = atomText(plainColumns, 'C1 .1 .2 .3');
const hexagonal = cellText(4.9, 4.9, 5.4, 90, 90, 120);
/** P 32 2 1, group 154 (International Tables A), in the style of the tables. */
const quartz = ['x,y,z', '-y,x-y,z+2/3', '-x+y,-x,z+1/3', 'y,x,-z', 'x-y,-y,-z+1/3', '-x,-x+y,-z+2/3'];

function list(rows: readonly string[], header = '_symmetry_equiv_pos_as_xyz'): string {
  return `loop_\n${header}\n${rows.join('\n')}\n`;
}

describe('operations listed in a loop', () => {
  it.each([
    ['quoted with blanks', quartz.map((op) => `'${op.replaceAll(',', ', ')}'`)],
    [
      'in capitals, translation first',
      [
        "'X, Y, Z'",
        "'-Y, X-Y, 2/3+Z'",
        "'Y-X, -X, 1/3+Z'",
        "'Y, X, -Z'",
        "'X-Y, -Y, 1/3-Z'",
        "'-X, Y-X, 2/3-Z'",
      ],
    ],
    [
      'with decimals',
      ['x,y,z', '-y,x-y,.6667+z', 'y-x,-x,0.3333+z', 'y,x,-z', 'x-y,-y,.33333-z', '-x,y-x,.667-z'],
    ],
    [
      'with plus signs',
      ['+x,+y,+z', '-y,+x-y,+z+2/3', '-x+y,-x,+z+1/3', '+y,+x,-z', '+x-y,-y,-z+1/3', '-x,-x+y,-z+2/3'],
    ],
    ['with time reversal', quartz.map((op, i) => `${op},${i % 2 ? '-1' : '+1'}`)],
    ['numbered with a comma', quartz.map((op, i) => `'${i + 1}, ${op}'`)],
    ['one text with blanks between', [`'${quartz.join(' ')}'`]],
    ['one text with semicolons between', [`'${quartz.join('; ')}'`]],
    ['with signs for thirds', quartz.map((op) => op.replace('1/3', '\u2153').replace('2/3', '\u2154'))],
    ['unquoted with blanks', quartz.map((op) => op.replaceAll(',', ', '))],
  ])('%s', (_, rows) => {
    const reading = block(hexagonal, list(rows), atom);
    expect(operationsOf(reading)).toEqual(quartz);
    expect(only(reading).symmetry).toMatchObject({ number: 154, source: 'file', stated: true });
    expect(codes(reading)).toEqual([]);
  });

  it('beside an id, also a negative one, also unquoted with blanks', () => {
    const header = '_space_group_symop_id\n_space_group_symop_operation_xyz';
    const ids = quartz.map((op, i) => `${i % 2 ? -i : i} ${op}`);
    expect(operationsOf(block(hexagonal, list(ids, header), atom))).toEqual(quartz);
    const loose = quartz.map((op, i) => `${i + 1} ${op.replaceAll(',', ', ')}`);
    expect(operationsOf(block(hexagonal, list(loose, header), atom))).toEqual(quartz);
  });

  it('with the id inside the string', () => {
    const rows = quartz.map((op, i) => `'${i + 1} ${op}'`);
    expect(operationsOf(block(hexagonal, list(rows), atom))).toEqual(quartz);
  });

  it('several in one text field', () => {
    const reading = block(hexagonal, `_symmetry_equiv_pos_as_xyz\n;\n${quartz.join('\n')}\n;\n`, atom);
    expect(operationsOf(reading)).toEqual(quartz);
  });

  it('a single one outside any loop is P 1', () => {
    const reading = block(box, "_symmetry_equiv_pos_as_xyz 'x,y,z'\n", atom);
    expect(operationsOf(reading)).toEqual(['x,y,z']);
    expect(only(reading).symmetry).toMatchObject({ number: 1, source: 'file', stated: true });
    expect(codes(reading)).toEqual([]);
  });

  it('names the item and line they came from', () => {
    expect(only(block(box, list(['x,y,z']), atom)).symmetry.reason).toBe(
      '1 operation listed in _symmetry_equiv_pos_as_xyz from line 10',
    );
  });
});

describe('flawed lists', () => {
  it('drop a string that is no operation, with its place', () => {
    const reading = block(box, list(['x,y,z', 'x,y', '-x,-y,-z']), atom);
    expect(operationsOf(reading)).toEqual(['x,y,z', '-x,-y,-z']);
    expect(problemOf(reading, 'cif-bad-operation')).toMatchObject({
      line: 11,
      severity: 'error',
      got: 'x,y',
    });
  });

  it('drop a string that makes space flat', () => {
    const reading = block(box, list(['x,y,z', 'x,x,z']), atom);
    expect(operationsOf(reading)).toEqual(['x,y,z']);
    expect(problemOf(reading, 'cif-bad-operation')).toMatchObject({ severity: 'error', got: 'x,x,z' });
  });

  it('put a missing identity first and say so', () => {
    const reading = block(box, list(['-x,-y,-z', '-x,y,-z', 'x,-y,z']), atom);
    expect(operationsOf(reading)[0]).toBe('x,y,z');
    expect(codes(reading, true)).toContain('cif-identity-missing');
    expect(codes(reading)).toEqual([]);
  });

  it('move the identity to the front without a word', () => {
    const reading = block(box, list(['-x,-y,-z', 'x,y,z']), atom);
    expect(operationsOf(reading)).toEqual(['x,y,z', '-x,-y,-z']);
    expect(codes(reading, true)).toEqual(['cif-element-from-label']);
  });

  it('count a repetition once', () => {
    const reading = block(box, list(['x,y,z', '-x,-y,-z', '1-x,1-y,1-z']), atom);
    expect(operationsOf(reading)).toHaveLength(2);
    expect(codes(reading, true)).toContain('cif-repeated-operation');
  });

  it('that are no group are kept, with what they lack', () => {
    const reading = block(box, list(['x,y,z', '-x,-y,-z', '-x,y+1/2,-z']), atom);
    expect(operationsOf(reading)).toHaveLength(3);
    expect(problemOf(reading, 'cif-operations-not-closed').allowed).toContain('x,-y+1/2,z');
  });
});

describe('two lists', () => {
  const older = list(['x,y,z', '-x,-y,-z']);
  const newer = (rows: readonly string[]): string => list(rows, '_space_group_symop_operation_xyz');

  it('that agree are no problem', () => {
    expect(codes(block(box, older, newer(['-x,-y,-z', 'x,y,z']), atom))).toEqual([]);
  });

  it('that differ: the newer one, unless the named group confirms the other', () => {
    const first = block(box, older, newer(['x,y,z']), atom);
    expect(operationsOf(first)).toHaveLength(1);
    expect(codes(first)).toContain('cif-operation-lists-disagree');
    const second = block(box, "_space_group_name_H-M_alt 'P -1'\n", older, newer(['x,y,z']), atom);
    expect(operationsOf(second)).toHaveLength(2);
    expect(codes(second)).toContain('cif-operation-lists-disagree');
  });

  it('of which one is unknown: the other', () => {
    const reading = block(box, older, newer(['?']), atom);
    expect(operationsOf(reading)).toHaveLength(2);
    expect(codes(reading)).toEqual([]);
  });
});

describe('magnetic and modulated structures', () => {
  it('centring of its own list multiplies the operations; time reversal is left out', () => {
    const reading = block(
      box,
      list(
        ['1 x,y,z,+1', '2 -x,-y,-z,-1'],
        '_space_group_symop_magn_operation.id\n_space_group_symop_magn_operation.xyz',
      ),
      list(
        ['1 x,y,z,+1', '2 x+1/2,y+1/2,z+1/2,-1'],
        '_space_group_symop_magn_centering.id\n_space_group_symop_magn_centering.xyz',
      ),
      atom,
    );
    expect(operationsOf(reading).sort()).toEqual(
      ['x,y,z', '-x,-y,-z', 'x+1/2,y+1/2,z+1/2', '-x+1/2,-y+1/2,-z+1/2'].sort(),
    );
    expect(codes(reading, true)).toContain('cif-magnetic');
  });

  it('further coordinates are left out with a clear warning', () => {
    const reading = block(
      box,
      '_cell_modulation_dimension 1\n',
      list(
        ['1 x1,x2,x3,x4', '2 -x1,x2+1/2,-x3,-x4+1/2', '3 x1,x2,x3,x4+1/2'],
        '_space_group_symop_ssg_id\n_space_group_symop_ssg_operation_algebraic',
      ),
      atom,
    );
    expect(operationsOf(reading)).toEqual(['x,y,z', '-x,y+1/2,-z']);
    expect(codes(reading)).toEqual(['cif-modulated', 'cif-modulated']);
  });
});
