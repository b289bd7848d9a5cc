import { describe, expect, it } from 'vitest';
import { sourceFromText } from '#src/bytes/source-from-text.ts';
import { readXyz } from '#src/readers/xyz/read-xyz.ts';

const overlaps = (lattice: string, ...rows: readonly string[]) =>
  readXyz(sourceFromText('t.xyz', `${rows.length}\n${lattice}\n${rows.join('\n')}\n`)).problems.filter(
    ({ code }) => code === 'xyz-atoms-overlap',
  );
const cell = 'Lattice="5 0 0 0 6 0 0 0 7" Properties=species:S:1:pos:R:3';

describe('atoms on one position', () => {
  it('are named with their lines and distance', () => {
    const found = overlaps(cell, 'Si 0 0 0', 'O 1 1 1', 'Si 0 0 0.125');
    expect(found).toMatchObject([{ severity: 'warning', line: 5, got: '0.125 Å' }]);
    expect(found[0]!.message).toContain('Si1 and Si2 (lines 3 and 5), 0.125 Å apart');
  });

  it('are found across the faces of a cell that repeats, and in a molecule', () => {
    const image = ['Si 0 0 0', 'Si 5 6 7'];
    expect(overlaps(cell, ...image)[0]?.message).toContain('0 Å apart');
    expect(overlaps(`${cell} pbc="T T F"`, ...image)).toEqual([]);
    expect(overlaps('', ...image)).toEqual([]);
    expect(overlaps('', 'H 0 0 0', 'H 0 0 0.1')).toHaveLength(1);
  });

  it('are not two that are merely near, nor the images of one atom', () => {
    expect(overlaps(cell, 'H 0 0 0', 'H 0 0 0.31')).toEqual([]);
    expect(overlaps('Lattice=".25 0 0 0 6 0 0 0 7" Properties=species:S:1:pos:R:3', 'H 0 0 0')).toEqual([]);
  });
});
