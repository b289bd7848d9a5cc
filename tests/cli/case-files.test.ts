import { describe, expect, it } from 'vitest';
import { sourceFromText } from '#src/bytes/source-from-text.ts';
import { newCase } from '#src/case/new-case.ts';
import { serialiseCase } from '#src/case/serialise-case.ts';
import { defaultSettings } from '#src/dossier/default-settings.ts';
import type { DossierSettings } from '#src/dossier/dossier.ts';
import { findInText } from '#src/readers/text/find-in-text.ts';
import { noChoice } from '#src/tensor/text-choice.ts';
import { runCommand } from '#tests/support/command-io.ts';

/** Two frames with invented tensors; the second also has a column under a foreign name. */
const frames = `2
Lattice="4 0 0 0 4 0 0 0 6" Properties=species:S:1:pos:R:3:shielding:R:9:tens:R:9 name=first
Al 0 0 0 500 3 0 -3 510 0 0 0 550 0.1 0 0 0 0.1 0 0 0 -0.2
O 2 2 3 200 0 0 0 200 0 0 0 260 -0.1 0 0 0 -0.1 0 0 0 0.2
2
Lattice="4 0 0 0 4 0 0 0 6" Properties=species:S:1:pos:R:3:shielding:R:9:tens:R:9 name=second
Al 0 0 0 400 3 0 -3 410 0 0 0 450 0.3 0 0 0 0.1 0 0 0 -0.4
O 2 2 3 100 0 0 0 100 0 0 0 160 -0.3 0 0 0 -0.1 0 0 0 0.4
`;

const settings: DossierSettings = {
  ...defaultSettings,
  isotopes: { O: '17O' },
  references: { '27Al': { kind: 'simple', interceptPpm: 550, slope: -1, isotope: '27Al' } },
  quadrupoleMomentsBarn: { '27Al': 0.15 },
  symmetry: 'none',
};

const plain = serialiseCase(await newCase({ title: 'frames', sources: [{ name: 'f.xyz', text: frames }] }));
const decided = serialiseCase(
  await newCase({
    title: 'decided',
    sources: [{ name: 'f.xyz', text: frames }],
    decisions: {
      structure: { source: 0, index: 1 },
      settings,
      accepted: [{ source: 0, columns: { tens: { quantity: 'efg' } } }],
    },
  }),
);

async function sites(files: Record<string, string>, ...options: string[]) {
  const result = await runCommand(['sites', ...Object.keys(files), '--json', ...options], files);
  return { ...result, document: JSON.parse(result.out) };
}

describe('a case file on the command line', () => {
  it('gives the numbers of the files it was made of', async () => {
    const direct = await sites({ 'f.xyz': frames });
    const opened = await sites({ 'f.ellipsite.json': plain });
    expect(direct.document.sites.length).toBe(2);
    expect(opened.document.sites).toEqual(direct.document.sites);
    expect(opened.document.crystal).toEqual(direct.document.crystal);
    expect(opened.status).toBe(direct.status);
  });

  it('keeps structure, settings and taken columns', async () => {
    const { document } = await sites({ c: decided });
    const [aluminium] = document.sites;
    // (400 + 410 + 450)/3 = 420; 550 − 420 = 130
    expect(aluminium.shielding.isotropic).toBeCloseTo(420, 9);
    expect(aluminium.shift.isotropic).toBeCloseTo(130, 9);
    expect(document.crystal.symmetry.operations).toBe(1);
    // V_zz = −0.4 a.u.: e Q V_zz / h = 234.9648 MHz/(barn a.u.) × 0.15 × −0.4 (CODATA 2022)
    expect(aluminium.efg.couplingMHz).toBeCloseTo(-234.9648 * 0.15 * 0.4, 2);
  });

  it('reads tensors of a text as they were chosen to be read', async () => {
    const log = `Invented run

 Tensors, nothing more is said
 atom Al1
   520.0   2.0   0.0
    -4.0  530.0  0.0
     0.0   0.0  549.0
`;
    const crystal = `1
Lattice="4 0 0 0 4 0 0 0 6" Properties=label:S:1:species:S:1:pos:R:3
Al1 Al 0 0 0
`;
    const { groups } = findInText(sourceFromText('a.log', log));
    const choice = { ...noChoice, signature: groups[0]!.signature!, quantity: 'shift', sign: -1 } as const;
    const chosen = await newCase({
      title: 'chosen',
      sources: [
        { name: 'crystal.xyz', text: crystal },
        { name: 'a.log', text: log },
      ],
      decisions: { textChoices: [{ ...choice, file: 'a.log' }] },
    });
    const { document } = await sites({ c: serialiseCase(chosen) });
    // −(520 + 530 + 549)/3 = −533
    expect(document.sites[0].shift.isotropic).toBeCloseTo(-533, 9);
    const unasked = await sites({ 'crystal.xyz': crystal, 'a.log': log });
    expect(unasked.document.sites[0].shift).toBeNull();
  });

  it('lets options go before its settings, one by one', async () => {
    const { document } = await sites({ c: decided }, '--reference', '27Al=500', '--block', 'first, frame 1');
    const [aluminium] = document.sites;
    // (500 + 510 + 550)/3 = 520
    expect(aluminium.shift.isotropic).toBeCloseTo(500 - 520, 9);
    expect(document.crystal.symmetry.operations).toBe(1);
  });

  it('refuses a broken one with its place, and two of them', async () => {
    const { status, document } = await sites({ 'c.json': plain.slice(0, 300) });
    expect(status).toBe(1);
    expect(document.problems[0]).toMatchObject({ code: 'case-not-json', file: 'c.json' });
    expect(document.problems[0].line).toBeGreaterThan(5);
    const two = await runCommand(['sites', 'a', 'b'], { a: plain, b: decided });
    expect(two.status).toBe(2);
    expect(two.error).toContain('name one of them');
  });
});
