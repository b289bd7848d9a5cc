import type { DerivedCase, DossierPart } from './engine-protocol.ts';

/** Sites or bonds that cross from the worker in one message. */
const partLength = 4000;

/** A case as messages of bearable size: parts of its dossier, then the case without what the parts hold. */
export function inParts(result: DerivedCase): {
  readonly parts: readonly DossierPart[];
  readonly rest: DerivedCase;
} {
  const { dossier } = result;
  if (!dossier || Math.max(dossier.sites.length, dossier.bonds.length) <= partLength)
    return { parts: [], rest: result };
  const { sites, bonds } = dossier;
  const parts: DossierPart[] = [];
  for (let i = 0; i < sites.length; i += partLength)
    parts.push({ sites: sites.slice(i, i + partLength), bonds: [] });
  for (let i = 0; i < bonds.length; i += partLength)
    parts.push({ sites: [], bonds: bonds.slice(i, i + partLength) });
  return { parts, rest: { ...result, dossier: { ...dossier, sites: [], bonds: [] } } };
}

/** The case again from its parts, in the order they came. */
export function joined(parts: readonly DossierPart[], rest: DerivedCase): DerivedCase {
  if (parts.length === 0 || !rest.dossier) return rest;
  const sites = parts.flatMap((part) => part.sites);
  const bonds = parts.flatMap((part) => part.bonds);
  return { ...rest, dossier: { ...rest.dossier, sites, bonds } };
}
