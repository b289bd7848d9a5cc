import type { Vec3 } from '#src/base/matrix3.ts';
import { add, subtract } from '#src/base/vector3.ts';
import type { DrawnAtom, ExtentInput } from './drawn-atoms.ts';
import { copyOf, mostAtoms, nowhere } from './drawn-atoms.ts';

/**
 * The first atom of each site, moved by whole cells so that those bonded to one another stand together: each cluster hangs on
 * its first site, which stays where the dossier has it. Linear.
 */
export function asymmetricAtoms({ dossier, hidden }: ExtentInput): DrawnAtom[] {
  const sites = dossier.sites
    .filter(({ index, equivalents }) => !hidden.has(index) && equivalents.length > 0)
    .slice(0, mostAtoms);
  const siteById = new Map(sites.map((site) => [site.equivalents[0]!.id, site]));
  const links = new Map<string, { readonly to: string; readonly shift: Vec3 }[]>();
  for (const { from, to, shift, kind } of dossier.bonds) {
    if (kind !== 'bond' || !siteById.has(from) || !siteById.has(to)) continue;
    listOf(links, from).push({ to, shift });
    listOf(links, to).push({ to: from, shift: subtract(nowhere, shift) });
  }
  const shifts = new Map<string, Vec3>();
  for (const start of siteById.keys()) {
    if (shifts.has(start)) continue;
    shifts.set(start, nowhere);
    const open = [start];
    for (const id of open) {
      for (const { to, shift } of links.get(id) ?? []) {
        if (shifts.has(to)) continue;
        shifts.set(to, add(shifts.get(id)!, shift));
        open.push(to);
      }
    }
  }
  return [...siteById].map(([id, site]) =>
    copyOf(dossier, site.equivalents[0]!, site, shifts.get(id)!, false),
  );
}

function listOf<T>(lists: Map<string, T[]>, key: string): T[] {
  const known = lists.get(key) ?? [];
  lists.set(key, known);
  return known;
}
