import type { SiteDossier } from '#src/dossier/dossier.ts';
import type { PrincipalForm } from './tensor-shape.ts';
import type { EllipsoidKind, SceneQuantity, TensorScale } from './scene.ts';
import type { SceneOptions } from './scene-options.ts';

/** Sites of two neighbouring atoms and how far apart these are: what limits the size of tensors. */
export interface NearPair {
  readonly first: SiteDossier;
  readonly second: SiteDossier;
  readonly distanceAngstrom: number;
}

/** Semi-axes of two neighbours together take at most this share of their distance, so that the bond stays visible. */
const filledShare = { total: 0.74, deviation: 0.92 } as const;
/** Å; no semi-axis is longer, however far the neighbours are. */
const longestAngstrom = 1.1;
/**
 * Deviations draw a sphere in by at most this share of its radius; those of an upper quarter of the sites at least by the other one, so
 * that a single giant doesn't make spheres of all the rest.
 */
const deepest = { of: 0.8, usual: 0.5 } as const;
/** The same for a scale that was asked for: beyond 1 the ellipsoid would turn inside out. */
const deepestBulge = 0.95;
/** Å; a base radius never exceeds this. */
const largestBaseAngstrom = 0.55;
/** Å; ellipsoids thinner than this vanish beside a bond. */
const thinnestAngstrom = 0.14;
/** Values more unequal than this make a picture of a few giants. */
const largestRatio = 4;

/** Why ellipsoids of total values are not possible. */
const totalFault = 'some principal values are not positive, so their totals have no ellipsoid';

export interface ScaleChoice {
  readonly scale: TensorScale;
  /** Sentences: why another kind of ellipsoid or another scale was taken than asked for or usual. */
  readonly notes: readonly string[];
}

/**
 * One scale for the whole picture. Total values where every principal value drawn is positive and the smallest ellipsoid
 * would still be seen beside its bond; else deviations from the isotropic value about one base radius. Sizes follow the
 * tightest pair of neighbours; the number of units for one Å is rounded to a readable one.
 */
export function chooseScale(
  forms: ReadonlyMap<number, PrincipalForm>,
  pairs: readonly NearPair[],
  quantity: SceneQuantity,
  options: Pick<SceneOptions, 'ellipsoid' | 'unitsPerAngstrom'>,
  otherRadius: (site: SiteDossier) => number,
): ScaleChoice {
  const all = [...forms.values()];
  const total = totalScale(forms, pairs, quantity, options.unitsPerAngstrom, otherRadius);
  const { kind, because } = chooseKind(all, total, options.ellipsoid);
  // an EFG has no trace: it is never asked why it isn't drawn as a total, unless someone does ask for it
  const expected = quantity === 'efg' && options.ellipsoid === 'auto';
  const notes = because && !expected ? [`Deviations are drawn because ${because}.`] : [];
  if (kind === 'total') return { scale: total, notes };
  const deviation = deviationScale(forms, pairs, quantity, options.unitsPerAngstrom, otherRadius);
  const scale = areAllPositive(all) ? deviation : { ...deviation, totalFault };
  if (options.unitsPerAngstrom !== null && options.unitsPerAngstrom < scale.unitsPerAngstrom) {
    notes.push('The scale asked for would turn an ellipsoid inside out; the nearest possible one is taken.');
  }
  return { scale, notes };
}

function chooseKind(
  forms: readonly PrincipalForm[],
  total: TensorScale,
  asked: SceneOptions['ellipsoid'],
): { kind: EllipsoidKind; because: string | null } {
  if (asked === 'deviation') return { kind: 'deviation', because: null };
  if (!areAllPositive(forms)) {
    return {
      kind: 'deviation',
      because: totalFault,
    };
  }
  const lowest = extremeValue(forms, Math.min);
  const vanishing = lowest / total.unitsPerAngstrom < thinnestAngstrom || areTooUnequal(forms);
  if (asked === 'auto' && vanishing) {
    return {
      kind: 'deviation',
      because: 'the totals are so unequal that the smallest ellipsoids would be lost at one scale',
    };
  }
  return { kind: 'total', because: null };
}

/** Whether ellipsoids of these tensors have to be those of deviations, whatever the neighbours. */
export function needDeviations(forms: readonly PrincipalForm[]): boolean {
  return !areAllPositive(forms) || areTooUnequal(forms);
}

const areAllPositive = (forms: readonly PrincipalForm[]): boolean => extremeValue(forms, Math.min) > 0;

const areTooUnequal = (forms: readonly PrincipalForm[]): boolean =>
  extremeValue(forms, Math.max) > largestRatio * extremeValue(forms, Math.min);

function extremeValue(forms: readonly PrincipalForm[], choose: typeof Math.min): number {
  return forms.reduce((found, { values }) => choose(found, ...values), choose());
}

function totalScale(
  forms: ReadonlyMap<number, PrincipalForm>,
  pairs: readonly NearPair[],
  quantity: SceneQuantity,
  asked: number | null,
  otherRadius: (site: SiteDossier) => number,
): TensorScale {
  const reaches = new Map([...forms].map(([index, { values }]) => [index, Math.max(0, ...values)]));
  const limits = { longestAngstrom, filledShare: filledShare.total };
  const unitsPerAngstrom = asked ?? fittingScale(reaches, pairs, limits, otherRadius);
  return { quantity, kind: 'total', unitsPerAngstrom, baseRadiusAngstrom: 0 };
}

/** How large lengths may get: alone, and as a share of the distance of two neighbours together. */
interface LengthLimits {
  readonly longestAngstrom: number;
  readonly filledShare: number;
}

/** Units for one Å at which lengths (units, by site index) stay within their limits, rounded to a readable number. */
function fittingScale(
  reaches: ReadonlyMap<number, number>,
  pairs: readonly NearPair[],
  limits: LengthLimits,
  otherRadius: (site: SiteDossier) => number,
): number {
  let needed =
    [...reaches.values()].reduce((most, reach) => Math.max(most, reach), 0) / limits.longestAngstrom;
  for (const { first, second, distanceAngstrom } of pairs) {
    let units = 0;
    let room = limits.filledShare * distanceAngstrom;
    for (const site of [first, second]) {
      const reach = reaches.get(site.index);
      if (reach === undefined) room -= otherRadius(site);
      else units += reach;
    }
    if (units > 0 && room > 0.2) needed = Math.max(needed, units / room);
  }
  return readableAtLeast(needed);
}

/** Å and share: lobes and rods of neighbours may come nearer to each other than closed bodies, as they are thin. */
const openLimits: LengthLimits = { longestAngstrom: 1.2, filledShare: 0.9 };

/** One scale for lengths from the atom's centre (ppm or a.u., by site index): polar surfaces, rods, axial vectors. */
export function chooseLengthScale(
  reaches: ReadonlyMap<number, number>,
  pairs: readonly NearPair[],
  drawn: Pick<TensorScale, 'quantity' | 'kind' | 'glyph' | 'part'>,
  asked: number | null,
): TensorScale {
  const unitsPerAngstrom = asked ?? fittingScale(reaches, pairs, openLimits, () => 0.1);
  return { ...drawn, unitsPerAngstrom, baseRadiusAngstrom: 0 };
}

function deviationScale(
  forms: ReadonlyMap<number, PrincipalForm>,
  pairs: readonly NearPair[],
  quantity: SceneQuantity,
  asked: number | null,
  otherRadius: (site: SiteDossier) => number,
): TensorScale {
  const inward = [...forms.values()].map(({ values, isotropic }) => isotropic - Math.min(...values));
  const perUnit = bulgePerUnit(inward);
  const bulges = new Map(
    [...forms].map(([index, { values, isotropic }]) => [index, perUnit * (Math.max(...values) - isotropic)]),
  );
  const bulge = (index: number) => bulges.get(index) ?? 0;
  const largest = [...bulges.values()].reduce((most, one) => Math.max(most, one), 0);
  let base = Math.min(largestBaseAngstrom, longestAngstrom / (1 + largest));
  for (const { first, second, distanceAngstrom } of pairs) {
    const drawn = [first, second].filter((site) => forms.has(site.index));
    if (drawn.length === 0) continue;
    const fixed = [first, second].filter((site) => !forms.has(site.index));
    const room =
      filledShare.deviation * distanceAngstrom - fixed.reduce((sum, site) => sum + otherRadius(site), 0);
    const radii = drawn.reduce((sum, site) => sum + 1 + bulge(site.index), 0);
    if (room > 0.2) base = Math.min(base, room / radii);
  }
  const baseRadiusAngstrom = Math.max(0.1, Math.floor(100 * base) / 100);
  const needed = perUnit > 0 ? 1 / (perUnit * baseRadiusAngstrom) : 0;
  const least = inward.reduce((most, one) => Math.max(most, one), 0) / (deepestBulge * baseRadiusAngstrom);
  const unitsPerAngstrom =
    asked === null ? (needed > 0 ? readableAtLeast(needed) : 1) : Math.max(asked, least);
  return { quantity, kind: 'deviation', unitsPerAngstrom, baseRadiusAngstrom };
}

/** Share of the base radius for one ppm or a.u.; 0 where nothing deviates. `inward`: how far each tensor falls below its isotropic value. */
function bulgePerUnit(inward: readonly number[]): number {
  const sorted = [...inward].sort((p, q) => p - q);
  const largest = sorted.at(-1) ?? 0;
  if (!(largest > 0)) return 0;
  const usual = sorted[Math.floor(0.75 * (sorted.length - 1))]!;
  return Math.min(deepest.of / largest, usual > 0 ? deepest.usual / usual : Infinity);
}

const readableDigits = [1, 1.2, 1.5, 2, 2.5, 3, 3.5, 4, 5, 6, 7, 8, 9, 10];

/** The smallest number not below `value` whose leading digits are easy to read: 237 → 250. */
export function readableAtLeast(value: number): number {
  if (!(value > 0) || !Number.isFinite(value)) return 1;
  const decade = 10 ** Math.floor(Math.log10(value));
  const digit = readableDigits.find((candidate) => candidate >= (value / decade) * (1 - 1e-12)) ?? 10;
  return Number((digit * decade).toPrecision(3));
}
