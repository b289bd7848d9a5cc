import { html } from 'lit';
import type { TemplateResult } from 'lit';
import type { ShieldingDossier, ShiftDossier } from '#src/store/dossier-types.ts';

/** What shielding and shift have in common: the same definitions on two scales that run in opposite directions. */
export type AnisotropicDossier = Pick<
  ShieldingDossier | ShiftDossier,
  | 'isotropic'
  | 'components'
  | 'span'
  | 'skew'
  | 'reducedAnisotropy'
  | 'anisotropy'
  | 'asymmetry'
  | 'undefinedBecause'
>;

/** One number of a convention: symbol, words and definition, for either scale. */
export interface ConventionRow {
  readonly key: string;
  readonly symbol: (scale: 'shielding' | 'shift') => TemplateResult;
  readonly words: string;
  readonly definition: (scale: 'shielding' | 'shift') => TemplateResult;
  readonly unit: 'ppm' | null;
  readonly value: (part: AnisotropicDossier) => number | null;
}

export interface Convention {
  readonly name: string;
  readonly source: string;
  readonly rows: readonly ConventionRow[];
}

const letter = (scale: 'shielding' | 'shift'): string => (scale === 'shielding' ? 'σ' : 'δ');

const component = (index: 0 | 1 | 2, words: { shielding: string; shift: string }): ConventionRow => {
  const name = `${index + 1}${index + 1}`;
  return {
    key: `component-${name}`,
    symbol: (scale) => html`${letter(scale)}<sub>${name}</sub>`,
    words: 'principal component',
    definition: (scale) => html`${words[scale]}`,
    unit: 'ppm',
    value: ({ components }) => components[index],
  };
};

const standard: Convention = {
  name: 'Principal values',
  source: 'IUPAC: Harris et al. 2008',
  rows: [
    {
      key: 'isotropic',
      symbol: (scale) => html`${letter(scale)}<sub>iso</sub>`,
      words: 'isotropic value',
      definition: (scale) =>
        html`(${letter(scale)}<sub>11</sub> + ${letter(scale)}<sub>22</sub> + ${letter(scale)}<sub>33</sub>)/3`,
      unit: 'ppm',
      value: ({ isotropic }) => isotropic,
    },
    component(0, { shielding: 'least shielded', shift: 'highest shift' }),
    component(1, { shielding: 'in between', shift: 'in between' }),
    component(2, { shielding: 'most shielded', shift: 'lowest shift' }),
  ],
};

const spanAndSkew: Convention = {
  name: 'Span and skew',
  source: 'Mason 1993',
  rows: [
    {
      key: 'span',
      symbol: () => html`Ω`,
      words: 'span',
      definition: (scale) =>
        scale === 'shielding' ? html`σ<sub>33</sub> − σ<sub>11</sub>` : html`δ<sub>11</sub> − δ<sub>33</sub>`,
      unit: 'ppm',
      value: ({ span }) => span,
    },
    {
      key: 'skew',
      symbol: () => html`κ`,
      words: 'skew',
      definition: (scale) =>
        scale === 'shielding'
          ? html`3(σ<sub>iso</sub> − σ<sub>22</sub>)/Ω`
          : html`3(δ<sub>22</sub> − δ<sub>iso</sub>)/Ω`,
      unit: null,
      value: ({ skew }) => skew,
    },
  ],
};

const byDistance: Convention = {
  name: 'By distance from the mean, |zz − iso| ≥ |xx − iso| ≥ |yy − iso|',
  source: 'Haeberlen 1976',
  rows: [
    {
      key: 'reducedAnisotropy',
      symbol: () => html`ζ`,
      words: 'reduced anisotropy',
      definition: () => html`zz − iso`,
      unit: 'ppm',
      value: ({ reducedAnisotropy }) => reducedAnisotropy,
    },
    {
      key: 'anisotropy',
      symbol: () => html`Δ`,
      words: 'anisotropy',
      definition: () => html`zz − (xx + yy)/2 = 3ζ/2`,
      unit: 'ppm',
      value: ({ anisotropy }) => anisotropy,
    },
    {
      key: 'asymmetry',
      symbol: () => html`η`,
      words: 'asymmetry',
      definition: () => html`(yy − xx)/ζ`,
      unit: null,
      value: ({ asymmetry }) => asymmetry,
    },
  ],
};

/** Every convention the card shows, side by side. */
export const conventions: readonly Convention[] = [standard, spanAndSkew, byDistance];
