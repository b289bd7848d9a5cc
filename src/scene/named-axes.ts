import { apply } from '#src/base/matrix3.ts';
import { withReadableSign } from '#src/base/vector3.ts';
import type { EquivalentAtom, SiteDossier } from '#src/dossier/dossier.ts';
import type { NamedAxis } from './look-along.ts';

type Quantity = 'shielding' | 'shift' | 'efg';

const quantities = ['shielding', 'shift', 'efg'] as const;
const symbols = {
  shielding: ['σ11', 'σ22', 'σ33'],
  shift: ['δ11', 'δ22', 'δ33'],
  efg: ['Vxx', 'Vyy', 'Vzz'],
} as const;

/**
 * Principal axes of one atom of a site (its first without an id), turned along with it, by the names `parseLookAlong` reads;
 * of a component without a quantity, such as `p33`, the quantity `first` is meant.
 */
export function axesOfAtom(
  site: Pick<SiteDossier, 'label' | 'equivalents' | Quantity>,
  atomId: string | null,
  first: Quantity | null,
): NamedAxis[] {
  const atom: EquivalentAtom | undefined =
    site.equivalents.find(({ id }) => id === atomId) ?? site.equivalents[0];
  if (!atom) return [];
  const order = [...new Set([...(first ? [first] : []), ...quantities])];
  return order.flatMap((quantity) =>
    (site[quantity]?.axes ?? []).map((axis, k) => ({
      name: symbols[quantity][k]!,
      of: site.label,
      others: [`${k + 1}${k + 1}`, ...(quantity === 'efg' ? [`V${k + 1}${k + 1}`] : [])],
      axis: axis && withReadableSign(apply(atom.rotation, axis)),
    })),
  );
}

/**
 * Principal axes of the first atoms of the sites that a text mentions, see `axesOfAtom`. Without a mention: those of the first site that
 * has any.
 */
export function axesNamedIn(
  text: string,
  sites: readonly SiteDossier[],
  first: Quantity | null,
): NamedAxis[] {
  const typed = text.toLowerCase();
  const withAxes = sites.filter((site) => quantities.some((quantity) => site[quantity]));
  const mentioned = withAxes.filter(({ label }) => typed.includes(label.toLowerCase()));
  const meant = mentioned.length > 0 ? mentioned : withAxes.slice(0, 1);
  return meant.flatMap((site) => axesOfAtom(site, null, first));
}
