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
const filledShare = 0.74;
/** Å; no semi-axis is longer, however far the neighbours are. */
const longestAngstrom = 1.1;
/** A deviation bulges a sphere by at most this share of its radius, either way. */
const largestBulge = 0.6;
/** Å; ellipsoids thinner than this vanish in a bond. */
const thinnestAngstrom = 0.1;

export interface ScaleChoice {
  readonly scale: TensorScale;
  /** Why another kind of ellipsoid was taken than asked for or usual; null otherwise. */
  readonly because: string | null;
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
  if (kind === 'total') return { scale: total, because };
  return { scale: deviationScale(forms, pairs, quantity, options.unitsPerAngstrom, otherRadius), because };
}

function chooseKind(
  forms: readonly PrincipalForm[],
  total: TensorScale,
  asked: SceneOptions['ellipsoid'],
): { kind: EllipsoidKind; because: string | null } {
  if (asked === 'deviation') return { kind: 'deviation', because: null };
  const lowest = Math.min(...forms.map((form) => Math.min(...form.values)));
  if (!(lowest > 0)) {
    return {
      kind: 'deviation',
      because: 'some principal values are not positive, so their totals have no ellipsoid',
    };
  }
  if (asked === 'auto' && lowest / total.unitsPerAngstrom < thinnestAngstrom) {
    return {
      kind: 'deviation',
      because: 'the values are so unequal that the smallest ellipsoids would vanish at one scale',
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
  const largest = Math.max(...[...forms.values()].map((form) => Math.max(...form.values)));
  let needed = largest / longestAngstrom;
  for (const pair of pairs) {
    const units = reach(pair.first) + reach(pair.second);
    const fixed = [pair.first, pair.second].filter((site) => !forms.has(site.index));
    const room =
      filledShare * pair.distanceAngstrom - fixed.reduce((sum, site) => sum + otherRadius(site), 0);
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
  let room = 2 * longestAngstrom;
  for (const { first, second, distanceAngstrom } of pairs) {
    const fixed = [first, second].filter((site) => !forms.has(site.index));
    if (fixed.length === 2) continue;
    const free = filledShare * distanceAngstrom - fixed.reduce((sum, site) => sum + otherRadius(site), 0);
    if (free > 0.2) room = Math.min(room, fixed.length === 1 ? 2 * free : free);
  }
  const baseRadiusAngstrom = Math.round(100 * Math.min(0.55, room / 2 / (1 + largestBulge / 2))) / 100;
  const deviations = [...forms.values()].map((form) =>
    Math.max(...form.values.map((value) => Math.abs(value - form.isotropic))),
  );
  const largest = Math.max(...deviations);
  const needed = largest / (largestBulge * baseRadiusAngstrom);
  const unitsPerAngstrom = asked ?? (needed > 0 ? readableAtLeast(needed) : 1);
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
