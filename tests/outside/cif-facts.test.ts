import { readdirSync, readFileSync } from 'node:fs';
import { describe, expect, it } from 'vitest';
import { sourceFromText } from '#src/bytes/source-from-text.ts';
import { readCif } from '#src/readers/cif/read-cif.ts';
import { contentOfCell } from '#tests/support/cell-content.ts';
import facts from './facts/cif-structures.json' with { type: 'json' };

/**
 * Published crystal structures in fixtures of our own (each cites its paper) against counts that independent tools
 * found: facts/cif-structures.json says how.
 */
const folder = new URL('./fixtures/', import.meta.url);

function read(name: string) {
  return readCif(sourceFromText(name, readFileSync(new URL(name, folder), 'utf8')));
}

/** Warnings that are facts of these structures. */
const expectedWarnings: Readonly<Record<string, readonly string[]>> = {
  'phosphinidene-molybdenum.cif': ['cif-hydrogens-missing'],
  'strontium-oxalate-hall.cif': ['cif-b-called-u'],
  'strontium-oxalate-symbol.cif': ['cif-b-called-u'],
  'strontium-oxalate-unknown-occupancy.cif': ['cif-b-called-u'],
};

describe.each(facts.structures)('$fixture', (fact) => {
  const { structures, problems, format } = read(fact.fixture);
  const crystal = structures[0]!;

  it('holds one crystal, read without an error', () => {
    expect(format).toBe('cif');
    expect(structures).toHaveLength(1);
    const serious = problems.filter(({ severity }) => severity !== 'note').map(({ code }) => code);
    expect(serious).toEqual(expectedWarnings[fact.fixture] ?? []);
  });

  it('has the published cell', () => {
    const { a, b, c, alpha, beta, gamma } = crystal.lattice!.cell;
    expect([a, b, c, alpha, beta, gamma]).toEqual(fact.cell);
  });

  it('has the operations of the group, from the item that gives them', () => {
    const { operations, source, hermannMauguin, reason, stated } = crystal.symmetry;
    expect(operations).toHaveLength(fact.operations);
    expect(source).toBe(fact.symmetryFrom === 'list' ? 'file' : 'symbol');
    if (fact.symmetryFrom === 'hall') expect(reason).toContain('Hall symbol');
    if (fact.symmetryFrom === 'hm') expect(reason).toContain('Hermann–Mauguin symbol');
    expect(hermannMauguin).toBe(fact.hermannMauguin);
    expect(stated).toBe(true);
  });

  it('has the sites, atoms and composition', () => {
    expect(crystal.sites).toHaveLength(fact.sites);
    const { atoms, composition } = contentOfCell(crystal);
    expect(atoms).toBe(fact.atomsInCell);
    expect(Object.keys(composition).sort()).toEqual(Object.keys(fact.composition).sort());
    for (const [element, count] of Object.entries(fact.composition))
      expect(composition[element]).toBeCloseTo(count, 2);
  });

  it('knows the formula units', () => {
    if (fact.formulaUnits !== null) expect(crystal.formula.units).toBe(fact.formulaUnits);
    else expect(Number.isInteger(crystal.formula.units)).toBe(true);
  });
});

it('has a fixture for every fact and a fact for every fixture', () => {
  const files = readdirSync(folder).filter((name) => name.endsWith('.cif'));
  expect(files.sort()).toEqual(facts.structures.map(({ fixture }) => fixture).sort());
});
