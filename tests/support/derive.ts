import { readFileSync } from 'node:fs';
import { createRequire } from 'node:module';
import { sourceFromText } from '#src/bytes/source-from-text.ts';
import { symmetryTablesFromBytes } from '#src/crystal/symmetry-tables.ts';
import { defaultSettings } from '#src/dossier/default-settings.ts';
import { deriveDossier } from '#src/dossier/derive-dossier.ts';
import type { CrystalDossier, DossierSettings } from '#src/dossier/dossier.ts';
import { readText } from '#src/readers/read.ts';

const require = createRequire(import.meta.url);

export const symmetryTables = symmetryTablesFromBytes(
  readFileSync(require.resolve('@spglib/moyo-wasm/moyo_wasm_bg.wasm')),
);

/** The dossier of the first structure of one text. */
export function dossierOfText(
  name: string,
  text: string,
  settings: Partial<DossierSettings> = {},
): CrystalDossier {
  const reading = readText(sourceFromText(name, text));
  const [crystal] = reading.structures;
  if (!crystal) throw new Error(`${name} holds no structure: ${JSON.stringify(reading.problems)}`);
  return deriveDossier({
    crystal,
    tensorSets: reading.tensorSets.filter(({ structureIndex }) => structureIndex === 0),
    tables: symmetryTables,
    settings: { ...defaultSettings, ...settings },
    problems: reading.problems,
  });
}
