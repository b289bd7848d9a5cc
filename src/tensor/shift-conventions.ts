import { conventionEntry } from './convention-entry.ts';
import type { ConventionEntry, EntryDraft } from './convention-entry.ts';

const iupac2008 = 'Harris et al., Pure Appl. Chem. 80, 59 (2008)';
const mason = 'Mason, Solid State NMR 2, 285 (1993); Harris et al., Pure Appl. Chem. 80, 59 (2008)';
const haeberlen =
  'Haeberlen, High Resolution NMR in Solids (1976); Harris et al., Pure Appl. Chem. 80, 59 (2008)';
const standard = 'standard (IUPAC 2008), by frequency';
const spanSkew = 'span and skew';
const byDistance = 'Haeberlen, by distance from the mean';
const ownDiagnostic = 'diagnostic of the calculation';
const shiftDigits = { '1H': 2, '2H': 2, '3H': 2 };

/** Entries that read alike for both, with the letter of the quantity. */
function anisotropyDrafts(letter: 'σ' | 'δ', digits: number): EntryDraft[] {
  const scale = letter === 'σ' ? 'shielding' : 'shift';
  const skewFormula = letter === 'σ' ? 'κ = 3(σiso − σ22)/Ω' : 'κ = 3(δ22 − δiso)/Ω';
  const spanFormula = letter === 'σ' ? 'Ω = σ33 − σ11' : 'Ω = δ11 − δ33';
  const ppm = { unit: 'ppm', digits, digitsByIsotope: shiftDigits } as const;
  const ratio = { unit: '', digits: 2 } as const;
  const inOrder = `|${letter}zz − ${letter}iso| ≥ |${letter}xx − ${letter}iso| ≥ |${letter}yy − ${letter}iso|`;
  return [
    {
      key: 'span',
      name: 'span',
      symbol: 'Ω',
      ...ppm,
      definition: `${spanFormula} ≥ 0`,
      convention: spanSkew,
      reference: mason,
    },
    {
      key: 'skew',
      name: 'skew',
      symbol: 'κ',
      ...ratio,
      definition: `${skewFormula}, −1 to 1`,
      convention: spanSkew,
      reference: mason,
    },
    {
      key: 'reducedAnisotropy',
      name: `reduced anisotropy on the ${scale} scale`,
      symbol: `ζ_${letter}`,
      ...ppm,
      definition: `ζ = ${letter}zz − ${letter}iso; ${inOrder}; its sign differs between shielding and shift`,
      convention: byDistance,
      reference: haeberlen,
    },
    {
      key: 'anisotropy',
      name: `anisotropy on the ${scale} scale`,
      symbol: `Δ_${letter}`,
      ...ppm,
      definition: `Δ = ${letter}zz − (${letter}xx + ${letter}yy)/2 = 3ζ/2`,
      convention: byDistance,
      reference: haeberlen,
    },
    {
      key: 'asymmetry',
      name: 'asymmetry',
      symbol: 'η',
      ...ratio,
      definition: `η = (${letter}yy − ${letter}xx)/ζ, 0 to 1; ${inOrder}`,
      convention: byDistance,
      reference: haeberlen,
    },
  ];
}

function componentDrafts(letter: 'σ' | 'δ', key: 's' | 'd', digits: number): EntryDraft[] {
  const order = letter === 'σ' ? 'σ11 ≤ σ22 ≤ σ33' : 'δ11 ≥ δ22 ≥ δ33';
  const words = ['least shielded', 'intermediate', 'most shielded'];
  return words.map((word, index) => {
    const number = `${index + 1}${index + 1}`;
    return {
      key: `${key}${number}`,
      field: 'components',
      index,
      name: `${word} principal component`,
      symbol: `${letter}_${number}`,
      unit: 'ppm',
      definition: `principal value of the symmetric part; ${order}`,
      convention: standard,
      reference: iupac2008,
      digits,
      digitsByIsotope: shiftDigits,
    };
  });
}

const noiseDrafts: EntryDraft[] = [
  {
    key: 'antisymmetricNorm',
    name: 'norm of the antisymmetric part',
    symbol: '‖A‖',
    unit: 'ppm',
    definition: '‖A‖ = √ΣAij², A = (σ − σᵀ)/2; not visible to first order',
    convention: ownDiagnostic,
    reference: 'Buckingham & Malm, Mol. Phys. 22, 1127 (1971)',
    digits: 2,
  },
  {
    key: 'symmetryResidual',
    name: 'residual against the site symmetry',
    symbol: '‖σ − P‖',
    unit: 'ppm',
    definition: 'Frobenius norm of σ minus P, its mean over the site group, P = ⟨R σ Rᵀ⟩',
    convention: ownDiagnostic,
    reference: 'Nye, Physical Properties of Crystals (1957)',
    digits: 2,
  },
  {
    key: 'equivalentSpread',
    name: 'spread among equivalent atoms',
    symbol: 's_eq',
    unit: 'ppm',
    definition: 'largest Frobenius norm of Rᵀ σ(atom) R minus the mean over the equivalent atoms',
    convention: ownDiagnostic,
    reference: 'definition of our own',
    digits: 2,
  },
];

/** Labels of everything in a shielding dossier. */
export const shieldingConventions: readonly ConventionEntry[] = [
  {
    key: 'isotropic',
    name: 'isotropic shielding',
    symbol: 'σ_iso',
    unit: 'ppm' as const,
    definition: 'σiso = (σ11 + σ22 + σ33)/3 = tr σ/3',
    convention: standard,
    reference: iupac2008,
    digits: 2,
  },
  ...componentDrafts('σ', 's', 2),
  ...anisotropyDrafts('σ', 2),
  ...noiseDrafts,
].map((draft) => conventionEntry('shielding', draft));

/** Labels of everything in a shift dossier. */
export const shiftConventions: readonly ConventionEntry[] = [
  {
    key: 'isotropic',
    name: 'isotropic shift',
    symbol: 'δ_iso',
    unit: 'ppm' as const,
    definition: 'δiso = (δ11 + δ22 + δ33)/3; from shielding by the reference printed with it',
    convention: standard,
    reference: iupac2008,
    digits: 1,
    digitsByIsotope: shiftDigits,
  },
  ...componentDrafts('δ', 'd', 1),
  ...anisotropyDrafts('δ', 1),
].map((draft) => conventionEntry('shift', draft));
