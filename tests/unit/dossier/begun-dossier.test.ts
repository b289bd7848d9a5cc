import { describe, expect, it } from 'vitest';
import { sourceFromText } from '#src/bytes/source-from-text.ts';
import { defaultSettings } from '#src/dossier/default-settings.ts';
import { beginDossier, deriveDossier } from '#src/dossier/derive-dossier.ts';
import { readText } from '#src/readers/read.ts';
import { seededRandom } from '#src/base/seeded-random.ts';
import { symmetryTables } from '#tests/support/derive.ts';

/** Invented: `count` carbon and hydrogen atoms in a cube, with or without a cell, of which some have round tensors. */
function atoms(count: number, edge: number, cell: boolean): string {
  const random = seededRandom(count);
  const rows = Array.from({ length: count }, (_none, i) => {
    const position = [0, 1, 2].map(() => (edge * random()).toFixed(3));
    const tensor = i % 3 === 0 ? '9 0 0 0 9 0 0 0 9' : '1 0.2 0 0 5 0 0 0.1 9.33';
    return `${i % 2 === 0 ? 'C' : 'H'} ${position.join(' ')} ${tensor}`;
  });
  const lattice = cell ? `Lattice="${edge} 0 0 0 ${edge} 0 0 0 ${edge}" ` : '';
  return `${count}\n${lattice}Properties=species:S:1:pos:R:3:shielding:R:9\n${rows.join('\n')}\n`;
}

function inputOf(text: string) {
  const { structures, tensorSets, problems } = readText(sourceFromText('a.xyz', text));
  return { crystal: structures[0]!, tensorSets, tables: symmetryTables, settings: defaultSettings, problems };
}

describe('a begun dossier', () => {
  // The last two are heaps in which the search for bonds is stopped or not begun.
  it.each([
    ['a crystal', atoms(200, 14, true)],
    ['a molecule', atoms(120, 12, false)],
    ['a heap in a cell', atoms(1500, 4, true)],
    ['a heap without a cell', atoms(3000, 1, false)],
  ])('gives site by site what the whole one holds: %s', (_name, text) => {
    const whole = deriveDossier(inputOf(text));
    const { sites, problems } = whole;
    const begun = beginDossier(inputOf(text));
    expect(whole).toMatchObject(begun.head);
    expect(Array.from({ length: begun.siteCount }, (_none, index) => begun.site(index))).toEqual(sites);
    begun.reportBonds();
    expect(begun.problems()).toEqual(problems);
  });

  it('tells of bonds that are missing or not looked for', () => {
    const codes = (text: string): string[] => {
      const begun = beginDossier(inputOf(text));
      begun.reportBonds();
      return begun.problems().map(({ code }) => code);
    };
    expect(codes(atoms(1500, 4, true))).toContain('bonds-incomplete');
    expect(codes(atoms(3000, 1, false))).toContain('cell-too-crowded');
    expect(codes(atoms(200, 14, true))).not.toContain('bonds-incomplete');
  });
});

it('reports its progress from 0 to 1, never falling, with words for every stage', () => {
  const told: { share: number; stage: string }[] = [];
  deriveDossier(inputOf(atoms(300, 16, true)), (share, stage) => void told.push({ share, stage }));
  const shares = told.map(({ share }) => share);
  expect([shares[0], shares.at(-1)]).toEqual([0, 1]);
  expect([...shares].sort((a, b) => a - b)).toEqual(shares);
  expect(told.length).toBeGreaterThan(60);
  expect(told.length).toBeLessThan(200);
  expect(told.map(({ stage }) => stage)).toEqual(expect.arrayContaining(['symmetry', 'sites', 'bonds']));
});
