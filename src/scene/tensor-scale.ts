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
const filledShare = { total: 0.74, deviation: 0.8 } as const;
/** Å; no semi-axis is longer, however far the neighbours are. */
const longestAngstrom = 1.1;
/** A deviation bulges a sphere by at most this share of its radius, either way. */
const largestBulge = 0.65;
/** The same for a scale that was asked for: beyond 1 the ellipsoid would turn inside out. */
const deepestBulge = 0.95;
/** Å; a base radius never exceeds this. */
const largestBaseAngstrom = 0.55;
/** Å; ellipsoids thinner than this vanish beside a bond. */
const thinnestAngstrom = 0.14;
/** Values more unequal than this make a picture of a few giants. */
const largestRatio = 4;

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
  const scale = deviationScale(forms, pairs, quantity, options.unitsPerAngstrom, otherRadius);
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
  const lowest = forms.reduce((least, form) => Math.min(least, ...form.values), Infinity);
  if (!(lowest > 0)) {
    return {
      kind: 'deviation',
      because: 'some principal values are not positive, so their totals have no ellipsoid',
    };
  }
  const highest = forms.reduce((most, form) => Math.max(most, ...form.values), -Infinity);
  const vanishing = lowest / total.unitsPerAngstrom < thinnestAngstrom || highest > largestRatio * lowest;
  if (asked === 'auto' && vanishing) {
    return {
      kind: 'deviation',
      because: 'the totals are so unequal that the smallest ellipsoids would be lost at one scale',
    };
  }
  return { kind: 'total', because: null };
}

function totalScale(
  forms: ReadonlyMap<number, PrincipalForm>,
  pairs: readonly NearPair[],
  quantity: SceneQuantity,
  asked: number | null,
  otherRadius: (site: SiteDossier) => number,
): TensorScale {
  const reach = (site: SiteDossier) => Math.max(0, ...(forms.get(site.index)?.values ?? [0]));
  const largest = [...forms.values()].reduce((most, form) => Math.max(most, ...form.values), -Infinity);
  let needed = largest / longestAngstrom;
  for (const pair of pairs) {
    const units = reach(pair.first) + reach(pair.second);
    const fixed = [pair.first, pair.second].filter((site) => !forms.has(site.index));
    const room =
      filledShare.total * pair.distanceAngstrom - fixed.reduce((sum, site) => sum + otherRadius(site), 0);
    if (units > 0 && room > 0.2) needed = Math.max(needed, units / room);
  }
  const unitsPerAngstrom = asked ?? readableAtLeast(needed);
  return { quantity, kind: 'total', unitsPerAngstrom, baseRadiusAngstrom: 0 };
}

function deviationScale(
  forms: ReadonlyMap<number, PrincipalForm>,
  pairs: readonly NearPair[],
  quantity: SceneQuantity,
  asked: number | null,
  otherRadius: (site: SiteDossier) => number,
): TensorScale {
  const outward = new Map<number, number>();
  let largest = 0;
  for (const [index, { values, isotropic }] of forms) {
    outward.set(index, Math.max(...values) - isotropic);
    largest = Math.max(largest, ...values.map((value) => Math.abs(value - isotropic)));
  }
  const bulge = (index: number) => (largest > 0 ? (largestBulge * (outward.get(index) ?? 0)) / largest : 0);
  let base = largestBaseAngstrom;
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
  const needed = largest / (largestBulge * baseRadiusAngstrom);
  const least = largest / (deepestBulge * baseRadiusAngstrom);
  const unitsPerAngstrom =
    asked === null ? (needed > 0 ? readableAtLeast(needed) : 1) : Math.max(asked, least);
  return { quantity, kind: 'deviation', unitsPerAngstrom, baseRadiusAngstrom };
}

const readableDigits = [1, 1.2, 1.5, 2, 2.5, 3, 3.5, 4, 5, 6, 7, 8, 10];

/** The smallest number not below `value` whose leading digits are easy to read: 237 → 250. */
export function readableAtLeast(value: number): number {
  if (!(value > 0) || !Number.isFinite(value)) return 1;
  const decade = 10 ** Math.floor(Math.log10(value));
  const digit = readableDigits.find((candidate) => candidate >= (value / decade) * (1 - 1e-12)) ?? 10;
  return Number((digit * decade).toPrecision(3));
}
