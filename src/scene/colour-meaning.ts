import { convention, digitsOf } from '#src/dossier/conventions.ts';
import type { SiteDossier } from '#src/dossier/dossier.ts';
import type { Legend, SceneQuantity } from './scene.ts';
import type { ColourMeaning } from './scene-options.ts';

/** A number of a site that a colour can say. */
export interface ColouredValue {
  /** Of the colour bar. */
  readonly title: string;
  readonly unit: Legend['unit'];
  /** True where the sign matters: a diverging map about zero. */
  readonly isSigned: boolean;
  /** Limits that belong to the number itself. */
  readonly naturalLimits: readonly [number, number] | null;
  /** Quantity and key of the convention that says how many digits are printed. */
  readonly convention: { readonly quantity: SceneQuantity; readonly key: string };
  /** Whether a site's tensor leaves the sign open. Absent: never. */
  readonly isSignOpen?: (site: SiteDossier) => boolean;
  /** Null where the number is undefined or the site has none. */
  readonly valueOf: (site: SiteDossier) => number | null;
}

type NumberMeaning = Exclude<ColourMeaning, 'element' | 'site'>;

const words: Readonly<Record<SceneQuantity, string>> = {
  shielding: 'shielding',
  shift: 'shift',
  efg: 'field gradient',
};
const letters: Readonly<Record<SceneQuantity, string>> = { shielding: 'σ', shift: 'δ', efg: 'V' };

/**
 * The number that `meaning` is for a quantity; null where the quantity has none: a field gradient has no isotropic value, no span
 * and no anisotropy. V(zz) and C(Q) are always those of the field gradient, whatever tensors are drawn.
 */
export function colouredValue(meaning: NumberMeaning, quantity: SceneQuantity): ColouredValue | null {
  const letter = letters[quantity];
  const of = (key: string) => ({ quantity, key });
  const ppm = { unit: 'ppm', naturalLimits: null } as const;
  switch (meaning) {
    case 'isotropic':
      if (quantity === 'efg') return null;
      return {
        ...ppm,
        title: `isotropic ${quantity} ${letter}(iso)`,
        isSigned: false,
        convention: of('isotropic'),
        valueOf: (site) => site[quantity]?.isotropic ?? null,
      };
    case 'span':
      if (quantity === 'efg') return null;
      return {
        ...ppm,
        title: `span Ω of the ${quantity}`,
        isSigned: false,
        convention: of('span'),
        valueOf: (site) => site[quantity]?.span ?? null,
      };
    case 'anisotropy':
      if (quantity === 'efg') return null;
      return {
        ...ppm,
        title: `anisotropy Δ of the ${quantity}`,
        isSigned: true,
        convention: of('anisotropy'),
        valueOf: (site) => site[quantity]?.anisotropy ?? null,
      };
    case 'asymmetry':
      return {
        title: `asymmetry η of the ${words[quantity]}`,
        unit: '',
        isSigned: false,
        naturalLimits: [0, 1],
        convention: of('asymmetry'),
        valueOf: (site) => site[quantity]?.asymmetry ?? null,
      };
    case 'vzz':
      return largestComponent;
    case 'coupling':
      return {
        title: 'quadrupolar coupling constant C(Q)',
        unit: 'MHz',
        isSigned: true,
        naturalLimits: null,
        convention: { quantity: 'efg', key: 'couplingMHz' },
        isSignOpen,
        valueOf: (site) => site.efg?.couplingMHz ?? null,
      };
    case 'residual':
      return residual(quantity);
    case 'difference':
      return difference(quantity);
  }
}

/** η ≈ 1: Vyy and Vzz tie in size. */
function isSignOpen(site: SiteDossier): boolean {
  return site.efg?.signDetermined === false;
}

/** Decimals with which the number of a site is printed everywhere. */
export function printedDigits(site: SiteDossier, { convention: { quantity, key } }: ColouredValue): number {
  const entry = convention(quantity, key);
  const isotope = quantity === 'efg' ? (site.efg?.isotope ?? site.isotope) : site.isotope;
  return entry ? digitsOf(entry, isotope) : 2;
}

/** The number that the colour of a site says: what is printed as zero is zero. Null where there is none. */
export function shownValue(site: SiteDossier, coloured: ColouredValue): number | null {
  const value = coloured.valueOf(site);
  if (value === null || !Number.isFinite(value)) return null;
  return Math.abs(value) < 0.5 * 10 ** -printedDigits(site, coloured) ? 0 : value;
}

/** What colours say where nothing else is asked for or possible. */
export function usualValue(quantity: SceneQuantity): ColouredValue {
  return colouredValue('isotropic', quantity) ?? largestComponent;
}

const largestComponent: ColouredValue = {
  title: 'largest EFG component V(zz)',
  unit: 'a.u.',
  isSigned: true,
  naturalLimits: null,
  convention: { quantity: 'efg', key: 'Vzz' },
  isSignOpen,
  valueOf: (site) => site.efg?.components[2] ?? null,
};

/** Of a shift it is the residual of the shielding it was made from. */
function residual(quantity: SceneQuantity): ColouredValue {
  const judged = quantity === 'shift' ? 'shielding' : quantity;
  return {
    title: `residual of the ${words[judged]} against the site symmetry`,
    unit: judged === 'efg' ? 'a.u.' : 'ppm',
    isSigned: false,
    naturalLimits: null,
    convention: { quantity: judged, key: 'symmetryResidual' },
    valueOf: (site) => site[judged]?.symmetryResidual ?? null,
  };
}

/** Other minus main set, of the isotropic value or V(zz). */
function difference(quantity: SceneQuantity): ColouredValue {
  const name = quantity === 'efg' ? 'V(zz)' : `${letters[quantity]}(iso)`;
  return {
    title: `difference of ${name}, other set minus main set`,
    unit: quantity === 'efg' ? 'a.u.' : 'ppm',
    isSigned: true,
    naturalLimits: null,
    convention: { quantity, key: quantity === 'efg' ? 'Vzz' : 'isotropic' },
    valueOf: ({ [quantity]: main, other }) => {
      const second = other?.[quantity];
      if (!main || !second) return null;
      return 'isotropic' in main && 'isotropic' in second
        ? second.isotropic - main.isotropic
        : second.components[2] - main.components[2];
    },
  };
}
