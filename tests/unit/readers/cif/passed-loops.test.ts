import { describe, expect, it, vi } from 'vitest';
import { ProblemLog } from '#src/base/problem.ts';
import { sourceFromText } from '#src/bytes/source-from-text.ts';
import type * as Limits from '#src/readers/cif/limits.ts';
import { parseCif } from '#src/readers/cif/parse.ts';
import {
  atomText,
  block,
  box,
  codes,
  inversion,
  only,
  plainColumns,
  problemOf,
} from '#tests/support/cif-structure.ts';

vi.mock('#src/readers/cif/limits.ts', async (original) => {
  const { cifLimits } = await original<typeof Limits>();
  return { cifLimits: { ...cifLimits, values: 400 } };
});

const reflectionNames = ['_refln_index_h', '_refln_index_k', '_refln_index_l', '_refln_F_squared_meas'];
const dottedNames = ['_pd_data.point_id', '_pd_meas.2theta_scan', '_pd_meas.counts_total', '_pd_calc.x'];
const profileNames = dottedNames.map((name) => name.replace('.', '_'));
const atoms = atomText(plainColumns, 'C1 .1 .2 .3');
const rows = Array.from({ length: 1000 }, (_, i) => `${i} -1 2 ${i}.5(3)\n`);

function loop(names: readonly string[], ...values: readonly string[]): string {
  return `loop_\n${names.join('\n')}\n${values.join('')}`;
}

describe('loops that nobody reads', () => {
  it.each([
    ['reflections', reflectionNames],
    ['a profile', profileNames],
    ['a profile in dotted names', dottedNames],
    ['a profile in capitals', profileNames.map((name) => name.toUpperCase())],
  ])('%s of more values than may be kept hide no structure', (_, names) => {
    const reading = block(box, inversion, loop(names, ...rows), atoms);
    expect(only(reading).sites).toHaveLength(1);
    expect(codes(reading)).toEqual([]);
  });

  it.each([
    ['in the middle', [...rows.slice(0, 500), '7 8 9\n', ...rows.slice(500)]],
    ['at the end', [...rows, '7 8 9\n']],
    ['all on one line', [...rows.map((row) => row.replace('\n', ' ')), '7 8 9\n']],
  ])('give one warning for a row cut short %s, with its place', (_, values) => {
    const broken = loop(reflectionNames, ...values);
    for (const parts of [
      [broken, atoms],
      [atoms, broken],
    ]) {
      const text = [box, inversion, ...parts].join('');
      const reading = block(text);
      expect(only(reading).sites).toHaveLength(1);
      expect(codes(reading)).toEqual(['cif-loop-row-broken']);
      const { severity, line, column } = problemOf(reading, 'cif-loop-row-broken');
      expect(severity).toBe('warning');
      const written = `data_t\n${text}`.split('\n')[line! - 1]!;
      expect(written.slice(column! - 1)).toMatch(/^7 8 9/);
    }
  });

  it('keep a structure behind a text field that was never closed', () => {
    const open = loop(reflectionNames, '1 2 3\n;never closed\n', ...rows.slice(0, 3));
    const reading = block(box, inversion, open, atoms);
    expect(only(reading).sites).toHaveLength(1);
    expect(codes(reading)).toContain('cif-unclosed-text-field');
  });

  it('still have their syntax checked', () => {
    const reading = block(box, inversion, loop(reflectionNames, "1 2 3 'open\n1 2 3 4\n"), atoms);
    expect(codes(reading)).toEqual(['cif-unclosed-quote']);
  });

  it('are told by a count of rows in the document, and by values where their names are asked for', () => {
    const source = sourceFromText('t.cif', `data_t\n${loop(reflectionNames, ...rows.slice(0, 50))}`);
    const asked = parseCif(source, new ProblemLog());
    const passed = parseCif(
      source,
      new ProblemLog(),
      () => undefined,
      () => false,
    );
    expect(asked.blocks[0]!.loops[0]).toMatchObject({ values: { length: 200 } });
    expect(passed.blocks[0]!.loops[0]).toMatchObject({ values: [], rowsPassedOver: 50 });
  });
});

describe('the limit of values', () => {
  const many = Array.from({ length: 90 }, (_, i) => `C${i} 0.${1 + (i % 9)} 0.${Math.floor(i / 9)} .2 .5\n`);

  it('cuts a loop that is needed, and says nothing more than that', () => {
    const text = atomText(`${plainColumns} occupancy`, ...many);
    const reading = block(box, inversion, text);
    const said = codes(reading).filter((code) => code !== 'cif-element-guessed');
    expect(said).toEqual(['cif-too-large']);
    expect(only(reading).sites.length).toBeGreaterThan(70);
    expect(only(reading).sites.length).toBeLessThan(90);
  });

  it('says nothing more either where the loop_ is missing', () => {
    const names = `${plainColumns} occupancy`.split(' ').map((name) => `_atom_site_${name}\n`);
    const reading = block(box, inversion, ...names, ...many);
    expect(codes(reading)).toEqual(['cif-missing-loop', 'cif-too-large']);
  });
});
