import { existsSync, readdirSync, readFileSync } from 'node:fs';
import { join } from 'node:path';
import { fileURLToPath } from 'node:url';
import { expect, it } from 'vitest';
import { decodeBytes } from '#src/bytes/decode-bytes.ts';
import { readCif } from '#src/readers/cif/read-cif.ts';
import { contentOfCell } from '#tests/support/cell-content.ts';
import facts from './facts/cif-structures.json' with { type: 'json' };

/**
 * The files the fixtures were made from, where a folder with them is at hand: named by the environment variable
 * ELLIPSITE_SHARED, else `../shared` beside the checkout. Nothing needs it: elsewhere the fixtures are checked to be complete.
 */
const besides = fileURLToPath(new URL('../../../shared', import.meta.url));
const folder = join(process.env['ELLIPSITE_SHARED'] ?? besides, 'data', 'cif');
const expected = join(folder, 'expected.json');

interface SharedFact {
  readonly file: string;
  readonly operations: number;
  readonly sites: number;
  readonly atomsInCell: number;
  readonly composition: Readonly<Record<string, number>>;
}

async function countsOf(file: string): Promise<Omit<SharedFact, 'file'>> {
  const { source } = await decodeBytes(file, readFileSync(join(folder, file)));
  const crystal = readCif(source!).structures[0]!;
  const { atoms, composition } = contentOfCell(crystal);
  const rounded = Object.entries(composition).map(([element, n]) => [element, Number(n.toFixed(2))]);
  return {
    operations: crystal.symmetry.operations.length,
    sites: crystal.sites.length,
    atomsInCell: atoms,
    composition: Object.fromEntries(rounded) as Record<string, number>,
  };
}

it('agrees with independent tools on the files as published, or says that they are not here', async () => {
  if (!existsSync(expected)) {
    console.info(
      `no files at ${folder}: only the ${facts.structures.length} fixtures made from them are checked`,
    );
    const fixtures = readdirSync(new URL('./fixtures/', import.meta.url));
    expect(fixtures).toEqual(expect.arrayContaining(facts.structures.map(({ fixture }) => fixture)));
    return;
  }
  const wanted = JSON.parse(readFileSync(expected, 'utf8')) as SharedFact[];
  const found = await Promise.all(wanted.map(({ file }) => countsOf(file)));
  expect(found).toEqual(
    wanted.map(({ operations, sites, atomsInCell, composition }) => ({
      operations,
      sites,
      atomsInCell,
      composition,
    })),
  );
});
