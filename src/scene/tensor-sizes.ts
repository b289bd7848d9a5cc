import type { CrystalDossier } from '#src/dossier/dossier.ts';
import type { EllipsoidKind, SceneQuantity } from './scene.ts';
import type { PrincipalForm } from './tensor-shape.ts';
import { largestReach, principalForm } from './tensor-shape.ts';

/** The largest length of an element's tensors before scaling: a principal value or a deviation, ppm or a.u. */
export interface ElementReach {
  readonly element: string;
  readonly reach: number;
}

/** How unequal the tensors of a picture are, element by element; ppm or a.u. */
export interface TensorSizes {
  /** Of the tensors drawn. */
  readonly largest: ElementReach | null;
  /** Drawn, but too small beside the largest to be seen. */
  readonly tiny: readonly ElementReach[];
  /** Left out by the picture itself, as one scale does not suit them. */
  readonly leftOut: readonly ElementReach[];
}

/** Elements of which no length is more than this share of the picture's largest are hardly seen. Our own choice. */
export const invisibleShare = 1 / 12;

/** Reach of each element's tensors, in the order of the sites. */
function reachesOf(
  dossier: CrystalDossier,
  forms: Iterable<readonly [number, PrincipalForm]>,
  kind: EllipsoidKind,
): ElementReach[] {
  const reaches = new Map<string, number>();
  for (const [index, form] of forms) {
    const { element } = dossier.sites[index]!;
    reaches.set(element, Math.max(largestReach(form, kind), reaches.get(element) ?? 0));
  }
  return [...reaches].map(([element, reach]) => ({ element, reach }));
}

/** Sizes of the tensors drawn (`forms`, by site index) and of those of elements that were left out. */
export function tensorSizes(
  dossier: CrystalDossier,
  forms: ReadonlyMap<number, PrincipalForm>,
  scale: { readonly quantity: SceneQuantity; readonly kind: EllipsoidKind },
  leftOut: readonly string[],
): TensorSizes {
  // a field gradient has no isotropic value: its deviation is itself
  const drawn = reachesOf(dossier, forms, scale.kind);
  const largest = drawn.reduce<ElementReach | null>(
    (most, one) => (most && most.reach >= one.reach ? most : one),
    null,
  );
  const isTiny = ({ reach }: ElementReach): boolean => reach < invisibleShare * (largest?.reach ?? 0);
  const others = dossier.sites.flatMap((site): (readonly [number, PrincipalForm])[] => {
    const form = leftOut.includes(site.element) ? principalForm(site, scale.quantity) : null;
    return form ? [[site.index, form]] : [];
  });
  return { largest, tiny: drawn.filter(isTiny), leftOut: reachesOf(dossier, others, scale.kind) };
}

/** Sentences on what one scale hides, with the sizes; none where all tensors are seen. */
export function sizeSentences(sizes: TensorSizes, quantity: SceneQuantity): string[] {
  const { largest, tiny, leftOut } = sizes;
  if (!largest) return [];
  const unit = quantity === 'efg' ? 'a.u.' : 'ppm';
  const upTo = ({ element, reach }: ElementReach): string => `${element} (up to ${twoDigits(reach)} ${unit})`;
  const few = (list: readonly ElementReach[]): string => {
    const more = list.length - mostNamed;
    return list.slice(0, mostNamed).map(upTo).join(', ') + (more > 0 ? ` and ${more} more` : '');
  };
  const sentences: string[] = [];
  if (leftOut.length > 0 && quantity === 'efg')
    sentences.push(
      `At one scale the tensors of ${few(leftOut)} and those drawn, ${upTo(largest)}, would drown one another.`,
    );
  else if (leftOut.length > 0)
    sentences.push(
      `Those of ${few(leftOut)} would look like plain spheres at the one scale of the picture, beside ${upTo(largest)}.`,
    );
  if (tiny.length > 0)
    sentences.push(
      `Those of ${few(tiny)} are hardly seen at the one scale of the picture, beside ${upTo(largest)}.`,
    );
  return sentences;
}

/** Elements named in a sentence. */
const mostNamed = 6;

function twoDigits(value: number): string {
  return String(Number(value.toPrecision(2)));
}
