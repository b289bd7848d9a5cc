import { expect, it } from 'vitest';
import { ProblemLog } from '#src/base/problem.ts';
import { seededRandom } from '#src/base/seeded-random.ts';
import { defaultSettings } from '#src/dossier/default-settings.ts';
import { kindsToSearch } from '#src/dossier/search-size.ts';
import { sourceFromText } from '#src/bytes/source-from-text.ts';
import { readText } from '#src/readers/read.ts';

/** Carbon in a cube of edge 4 Å an atom, on its grid or moved at random by up to the given distance along each axis, Å. */
function carbon(atoms: number, movedAngstrom: number) {
  const n = Math.ceil(Math.cbrt(atoms));
  const random = seededRandom(atoms);
  const rows = Array.from({ length: atoms }, (_none, i) => {
    const grid = [i % n, Math.floor(i / n) % n, Math.floor(i / n / n)];
    return ['C', ...grid.map((x) => 4 * x + 2 * (random() - 0.5) * movedAngstrom)].join(' ');
  });
  const edges = `${4 * n} 0 0 0 ${4 * n} 0 0 0 ${4 * n}`;
  const text = `${atoms}\nLattice="${edges}" Properties=species:S:1:pos:R:3\n${rows.join('\n')}\n`;
  return readText(sourceFromText('carbon.xyz', text)).structures[0]!;
}

function refused(atoms: number, movedAngstrom: number, symmetry: 'auto' | 'find') {
  const crystal = carbon(atoms, movedAngstrom);
  const log = new ProblemLog();
  const settings = { ...defaultSettings, symmetry };
  const kinds = crystal.sites.map(() => 1);
  const refusal = kindsToSearch(crystal, crystal.lattice!, settings, kinds, log) === null;
  expect(refusal).toBe(log.list().some(({ code }) => code === 'symmetry-search-too-large'));
  return { refusal, message: log.list()[0]?.message ?? '' };
}

it('refuses many atoms that all look alike and are no copies of each other, unless asked', () => {
  const { refusal, message } = refused(17 ** 3, 0.03, 'auto');
  expect(refusal).toBe(true);
  expect(message).toContain('4913 atoms, of which at least 4913 have the same surroundings');
  expect(refused(17 ** 3, 0.03, 'find').refusal).toBe(false);
});

it('searches as many atoms that are copies of each other', () => {
  expect(refused(17 ** 3, 0.002, 'auto').refusal).toBe(false);
});

it('searches as many atoms where some differ from all others', () => {
  expect(refused(17 ** 3, 0.5, 'auto').refusal).toBe(false);
});

it('refuses more than 20,000 atoms, unless asked', () => {
  expect(refused(20_001, 0.5, 'auto')).toEqual({
    refusal: true,
    message: 'No symmetry stated and 20001 atoms: not searched.',
  });
  expect(refused(20_001, 0.5, 'find').refusal).toBe(false);
});
