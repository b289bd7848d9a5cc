import type { Attachment, Mapping } from '#src/attach/attachment.ts';
import type { FrameRanking } from '#src/attach/frame-ranking.ts';
import type { Problem } from '#src/base/problem.ts';
import type { CrystalDossier, UndecidedOrientation } from '#src/dossier/dossier.ts';
import {
  hydrogenLengths,
  implausibleValues,
  shortContacts,
  tensorSanity,
} from '#src/dossier/sound-calculation.ts';
import type {
  HydrogenLength,
  ImplausibleValue,
  ShortContact,
  TensorSanity,
} from '#src/dossier/sound-calculation.ts';

/** An atom by its label, and its site where there is one of that label. */
export interface NamedSite {
  readonly label: string;
  readonly siteIndex: number | null;
}

/** How one tensor set was bound, and its frame. */
export interface CheckedSet extends Pick<Attachment, 'name' | 'file' | 'quantity'> {
  readonly mapping: Omit<Mapping, 'unmatched'> & {
    readonly unmatched: readonly NamedSite[];
  };
  readonly frame: FrameRanking | null;
}

/** Whether tensors belong to the crystal, in which frame, and how sound they are: as `ellipsite check` says it. */
export interface CheckView {
  readonly sets: readonly CheckedSet[];
  readonly orientation: UndecidedOrientation | null;
  readonly contacts: readonly (ShortContact & { readonly sites: readonly NamedSite[] })[];
  readonly hydrogens: readonly (HydrogenLength & NamedSite)[];
  readonly implausible: readonly (ImplausibleValue & NamedSite)[];
  readonly unfinished: readonly Pick<Problem, 'message' | 'file' | 'line'>[];
  /** The first few hundred; `sanityCount` counts all. */
  readonly sanity: readonly (TensorSanity & NamedSite)[];
  readonly sanityCount: number;
}

/** Rows of one kind that are listed at most. */
const mostRows = 300;

/** Looks a crystal and its bound tensor sets over. */
export function checkView(dossier: CrystalDossier, attachments: readonly Attachment[]): CheckView {
  const byLabel = new Map<string, number>();
  for (const { label, index } of dossier.sites) if (!byLabel.has(label)) byLabel.set(label, index);
  const named = (label: string): NamedSite => ({ label, siteIndex: byLabel.get(label) ?? null });
  const sanity = tensorSanity(dossier.sites);
  return {
    sets: attachments.map(({ name, file, quantity, mapping, frame }) => ({
      ...{ name, file, quantity, frame },
      mapping: { ...mapping, unmatched: mapping.unmatched.slice(0, mostRows).map(named) },
    })),
    orientation: dossier.orientation ?? null,
    contacts: shortContacts(dossier)
      .slice(0, mostRows)
      .map((contact) => ({ ...contact, sites: contact.atoms.map(named) })),
    hydrogens: hydrogenLengths(dossier)
      .slice(0, mostRows)
      .map((row) => ({ ...row, ...named(row.label) })),
    implausible: implausibleValues(dossier.sites)
      .slice(0, mostRows)
      .map((row) => ({ ...row, ...named(row.label) })),
    unfinished: dossier.problems
      .filter(({ code }) => /unfinished|converge/.test(code))
      .map(({ message, file, line }) => ({ message, file, line })),
    sanity: sanity.slice(0, mostRows).map((row) => ({ ...row, ...named(row.label) })),
    sanityCount: sanity.length,
  };
}
