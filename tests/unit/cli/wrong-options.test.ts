import { describe, expect, it } from 'vitest';
import { parseCommonArguments } from '#src/cli/arguments.ts';
import { dossierOfText } from '#tests/support/derive.ts';

describe('options that cannot be followed', () => {
  it.each([
    [['--tolerance', '-1'], /must be positive: allowed are 0 < Å ≤ 1/],
    [['--isotope', '30Si'], /30Si: .*spin 0.*; of Si allowed are 29Si\./],
    [['--isotope', '26Al'], /26Al: it is not in the table of nuclides; of Al allowed are 27Al\./],
    [['--isotope', '27Xx'], /no such nuclide/],
  ])('%j says why', (options, sentence) => {
    expect(() => parseCommonArguments(['a.cif', ...options])).toThrow(sentence);
  });

  it('a frame without tensors is told to have nothing to act on', () => {
    const bare = '1\nLattice="5 0 0 0 6 0 0 0 7" Properties=species:S:1:pos:R:3\nSi 0 0 0\n';
    const { problems } = dossierOfText('a.xyz', bare, { frame: 'a-x-b-xy' });
    expect(problems.filter(({ code }) => code === 'frame-without-tensors')).toMatchObject([
      { severity: 'note' },
    ]);
  });
});
