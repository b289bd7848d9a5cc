import type { ConventionEntry, EntryDraft } from './convention-entry.ts';
import { conventionEntry } from './convention-entry.ts';

const byMagnitude = 'EFG, |Vzz| ≥ |Vyy| ≥ |Vxx|';
const cohenReif = 'Cohen & Reif, Solid State Phys. 5, 321 (1957)';
const abragam = 'Abragam, The Principles of Nuclear Magnetism (1961)';
const ownDiagnostic = 'diagnostic of the calculation';
const smallCouplings = { '2H': 4, '6Li': 4 };

const components: EntryDraft[] = ['xx', 'yy', 'zz'].map((axes, index) => ({
  key: `V${axes}`,
  field: 'components',
  index,
  name: `${['smallest', 'middle', 'largest'][index] ?? ''} principal component by magnitude`,
  symbol: `V_${axes}`,
  unit: 'a.u.',
  definition: 'principal value of Vij = +∂²φ/∂xi∂xj, trace taken off; |Vzz| ≥ |Vyy| ≥ |Vxx|',
  convention: byMagnitude,
  reference: cohenReif,
  digits: 4,
}));

const couplings: EntryDraft[] = [
  {
    key: 'asymmetry',
    name: 'asymmetry',
    symbol: 'η_Q',
    unit: '',
    definition: 'η = (Vxx − Vyy)/Vzz, 0 to 1',
    convention: byMagnitude,
    reference: cohenReif,
    digits: 2,
  },
  {
    key: 'quadrupoleMomentBarn',
    name: 'nuclear quadrupole moment',
    symbol: 'Q',
    unit: 'barn',
    definition: 'signed; the set it is from is printed with it',
    convention: 'nuclear ground state',
    reference: 'year-2017 set, Mol. Phys. 116, 1328 (2018)',
    digits: 5,
  },
  {
    key: 'couplingMHz',
    name: 'quadrupolar coupling constant',
    symbol: 'C_Q',
    unit: 'MHz',
    definition: 'C_Q = e Q Vzz/h, signed; ordinary spectra show |C_Q| only',
    convention: byMagnitude,
    reference: cohenReif,
    digits: 2,
    digitsByIsotope: smallCouplings,
  },
  {
    key: 'productMHz',
    name: 'quadrupolar product',
    symbol: 'P_Q',
    unit: 'MHz',
    definition: 'P_Q = C_Q √(1 + η²/3), with the sign of C_Q',
    convention: byMagnitude,
    reference: abragam,
    digits: 2,
    digitsByIsotope: smallCouplings,
  },
  {
    key: 'quadrupoleFrequencyMHz',
    name: 'quadrupole frequency (spacing of satellites)',
    symbol: 'ν_Q',
    unit: 'MHz',
    definition: 'ν_Q = 3 C_Q/(2I(2I − 1)), not ω_Q/2π, which is a sixth of it',
    convention: 'satellite spacing at θ = 0, η = 0',
    reference: abragam,
    digits: 3,
    digitsByIsotope: smallCouplings,
  },
  {
    key: 'quadrupoleAngularFrequency',
    name: 'quadrupole angular frequency',
    symbol: 'ω_Q',
    unit: '10³ rad s⁻¹',
    definition: 'ω_Q = e²qQ/(4I(2I − 1)ħ) = 2πν_Q/6, also called quadrupole frequency',
    convention: 'angular frequency of the Hamiltonian',
    reference: abragam,
    digits: 1,
  },
];

const noise: EntryDraft[] = [
  {
    key: 'trace',
    name: 'trace as given',
    symbol: 'tr V',
    unit: 'a.u.',
    definition: 'Vxx + Vyy + Vzz of the tensor in the file; taken off in equal parts',
    convention: ownDiagnostic,
    reference: 'Laplace’s equation: a field gradient of outer charges has no trace',
    digits: 5,
  },
  {
    key: 'antisymmetricNorm',
    name: 'norm of the antisymmetric part',
    symbol: '‖A‖',
    unit: 'a.u.',
    definition: '‖A‖ = √ΣAij², A = (V − Vᵀ)/2; zero but for noise',
    convention: ownDiagnostic,
    reference: 'symmetry of second derivatives',
    digits: 5,
  },
  {
    key: 'symmetryResidual',
    name: 'residual against the site symmetry',
    symbol: '‖V − P‖',
    unit: 'a.u.',
    definition: 'Frobenius norm of V minus P, its mean over the site group, P = ⟨R V Rᵀ⟩',
    convention: ownDiagnostic,
    reference: 'Nye, Physical Properties of Crystals (1957)',
    digits: 5,
  },
  {
    key: 'equivalentSpread',
    name: 'spread among equivalent atoms',
    symbol: 's_eq',
    unit: 'a.u.',
    definition: 'largest Frobenius norm of Rᵀ V(atom) R minus the mean over the equivalent atoms',
    convention: ownDiagnostic,
    reference: 'definition of our own',
    digits: 5,
  },
];

/** Labels of everything in an EFG dossier. */
export const efgConventions: readonly ConventionEntry[] = [...components, ...couplings, ...noise].map(
  (draft) => conventionEntry('efg', draft),
);
