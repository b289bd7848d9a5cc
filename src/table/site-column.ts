import type { SiteDossier } from '#src/dossier/dossier.ts';

/** One run of a heading: on the line, lowered or raised. */
export interface HeadingPart {
  readonly text: string;
  readonly position: 'base' | 'sub' | 'sup';
}

/** What a column is about, for a grouped list of all of them. */
export type ColumnGroup = 'site' | 'position' | 'shielding' | 'shift' | 'efg' | 'source';

/** One number or text of a site's dossier as a column: how it is headed, spoken, sorted and filled. */
export interface SiteColumn {
  /** Unique and kept: saved cases name columns by it. */
  readonly key: string;
  readonly group: ColumnGroup;
  /** Without the unit. */
  readonly heading: readonly HeadingPart[];
  /** The heading in plain words, unit left out. */
  readonly words: string;
  /** Empty for a text or a dimensionless number. */
  readonly unit: string;
  readonly numeric: boolean;
  /** Decimals it is usually printed with. */
  readonly digits: number;
  /** What it is sorted and filtered by; null where undefined or absent. */
  readonly value: (site: SiteDossier) => number | string | null;
  /** As printed: empty where the site has no such thing, `undefined` or – where it has no value. */
  readonly text: (site: SiteDossier) => string;
  /** Why the value is undefined, where it is. */
  readonly because: (site: SiteDossier) => string | undefined;
}
