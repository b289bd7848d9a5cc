import { describe, expect, it } from 'vitest';
import { knownConvention, mainNumbers, printedValue, siteNumber } from '#src/table/printed-value.ts';
import type { EfgDossier, SiteDossier } from '#src/dossier/dossier.ts';
import { fixtureDossier } from '#tests/support/dossier-fixture.ts';

const coupling = knownConvention('efg', 'couplingMHz');
const aluminium = fixtureDossier.sites[0]!;
const withEfg = (change: Partial<EfgDossier>, isotope = '27Al'): SiteDossier => ({
  ...aluminium,
  isotope,
  shielding: null,
  shift: null,
  efg: { ...aluminium.efg!, ...change },
});

describe('couplings as printed', () => {
  it('name their isotope where it is not the nuclide of the row', () => {
    const nitrogen = withEfg({ isotope: '14N', couplingMHz: -0.9312 }, '15N');
    expect(siteNumber(nitrogen, coupling)).toBe('−0.93 (¹⁴N)');
    expect(mainNumbers(nitrogen)).toEqual(['C_Q(¹⁴N) −0.93 MHz']);
    expect(siteNumber(aluminium, coupling)).toBe('−5.17');
  });

  it('carry ± where the sign is open, and so do Vzz and, the other way, Vyy', () => {
    const open = { signDetermined: false, couplingMHz: -1.2, components: [0, 0.15, -0.15] } as const;
    const site = withEfg(open);
    expect(siteNumber(site, coupling)).toBe('±1.20');
    const printed = ['Vxx', 'Vyy', 'Vzz'].map((key) =>
      printedValue(site.efg!, knownConvention('efg', key), '27Al'),
    );
    expect(printed).toEqual(['0.0000', '∓0.1500', '±0.1500']);
    expect(siteNumber(withEfg({ signDetermined: false, couplingMHz: 0 }), coupling)).toBe('0.00');
  });

  it('are a dash for a nucleus without a moment, and no MHz follows "undefined" in a sentence', () => {
    const proton = withEfg({ isotope: '1H', couplingMHz: null }, '1H');
    expect(siteNumber(proton, coupling)).toBe('–');
    expect(mainNumbers(proton)).toEqual(['C_Q undefined']);
  });
});
