import { withReadableSign } from '#src/base/vector3.ts';
import type { SiteDossier } from '#src/dossier/dossier.ts';
import type { NamedAxis } from './look-along.ts';

const quantities = ['shielding', 'shift', 'efg'] as const;
const symbols = {
  shielding: ['σ11', 'σ22', 'σ33'],
  shift: ['δ11', 'δ22', 'δ33'],
  efg: ['Vxx', 'Vyy', 'Vzz'],
} as const;

/**
 * Principal axes of the first atoms of the sites that a text mentions, by the names `parseLookAlong` reads; of a component
 * without a quantity, such as `p33`, the quantity `first` is meant. Without a mention: those of the first site that has any.
 */
export function axesNamedIn(
  text: string,
  sites: readonly SiteDossier[],
  first: (typeof quantities)[number] | null,
): NamedAxis[] {
  const typed = text.toLowerCase();
  const withAxes = sites.filter((site) => quantities.some((quantity) => site[quantity]));
  const mentioned = withAxes.filter(({ label }) => typed.includes(label.toLowerCase()));
  const order = [...new Set([...(first ? [first] : []), ...quantities])];
  return (mentioned.length > 0 ? mentioned : withAxes.slice(0, 1)).flatMap((site) =>
    order.flatMap((quantity) =>
      (site[quantity]?.axes ?? []).map((axis, k) => ({
        name: symbols[quantity][k]!,
        of: site.label,
        others: [`${k + 1}${k + 1}`, ...(quantity === 'efg' ? [`V${k + 1}${k + 1}`] : [])],
        axis: axis && withReadableSign(axis),
      })),
    ),
  );
}
