import type { NewCase } from '#src/case/new-case.ts';
import { defaultSettings } from '#src/dossier/default-settings.ts';

/** A small case with a decision of every kind. */
export const everyDecision: NewCase = {
  title: 'every decision',
  sources: [
    { name: 'a.cif', text: 'data_a\n' },
    { name: 'b.xyz', text: '0\n\n' },
  ],
  decisions: {
    structure: { source: 1, index: 2 },
    settings: {
      ...defaultSettings,
      isotopes: { H: '2H' },
      references: { '13C': { kind: 'regression', interceptPpm: 170.25, slope: -0.97, isotope: '13C' } },
      quadrupoleMomentsBarn: { '27Al': 0.15 },
      symmetry: 'find',
      symmetryToleranceAngstrom: 0.05,
      frame: 'c-z-b-yz',
    },
    accepted: [{ source: 1, columns: { tens: { quantity: 'efg', unit: 'a.u.' } } }],
    textChoices: [
      {
        signature: 'six | tensor | field',
        quantity: 'efg',
        unit: 'V/A2',
        sign: -1,
        order: 'xx xy xz yy yz zz',
        taken: true,
        file: 'c.log',
      },
    ],
  },
};

/** A case file's text with one change to its JSON. */
export function changedText(text: string, change: (document: Record<string, unknown>) => unknown): string {
  return JSON.stringify(change(JSON.parse(text) as Record<string, unknown>), null, 2);
}
