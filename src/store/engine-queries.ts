import type { CrystalDossier, SiteDossier } from '#src/dossier/dossier.ts';
import { buildScene } from '#src/scene/build-scene.ts';
import type { SceneOptions } from '#src/scene/scene-options.ts';
import type { Scene } from '#src/scene/scene.ts';
import { sharedPositions } from '#src/scene/shared-positions.ts';
import { columnsOf } from '#src/table/site-columns.ts';
import { orderSites } from '#src/table/table-order.ts';
import { tableRow } from '#src/table/table-rows.ts';
import type { TableOrder, TablePage, TableRequest, TableTextRequest } from '#src/table/table-settings.ts';
import type { Attachment } from '#src/attach/attachment.ts';
import { checkView } from './check-desk.ts';
import type { CheckView } from './check-desk.ts';
import { FoundDesk } from './found-desk.ts';
import type { SearchedText } from './found-desk.ts';
import type {
  FoundEntriesRequest,
  FoundEntryView,
  FoundFileView,
  FoundMark,
  FoundMarksRequest,
} from './found-protocol.ts';
import { tableHtml, tableText } from '#src/table/table-text.ts';

/** Another site on the same position. */
export interface SharingSite {
  readonly siteIndex: number;
  readonly label: string;
  readonly occupancy: number;
}

/** A site's dossier with what only the whole crystal tells. */
export interface KnownSite extends SiteDossier {
  /** Sites that share its position, such as two elements that mix on it. */
  readonly sharing: readonly SharingSite[];
}

/** Everything that can be asked of a crystal that was derived: question and answer by kind. */
export interface Queries {
  readonly scene: { readonly ask: Partial<SceneOptions>; readonly answer: Scene };
  /** Sites of these indices; those that do not exist are passed over. */
  readonly sites: { readonly ask: readonly number[]; readonly answer: readonly KnownSite[] };
  /** Sites whose label stands in a text, the longest labels first, at most a handful. */
  readonly sitesNamed: { readonly ask: string; readonly answer: readonly KnownSite[] };
  readonly table: { readonly ask: TableRequest; readonly answer: TablePage };
  /** Whether the tensors belong to the crystal, and how sound they are. */
  readonly check: { readonly ask: null; readonly answer: CheckView };
  /** What was found in the texts of the case, text by text. */
  readonly found: { readonly ask: null; readonly answer: readonly FoundFileView[] };
  readonly foundEntries: { readonly ask: FoundEntriesRequest; readonly answer: readonly FoundEntryView[] };
  readonly foundMarks: { readonly ask: FoundMarksRequest; readonly answer: readonly FoundMark[] };
  readonly tableText: { readonly ask: TableTextRequest; readonly answer: string };
}

export type QueryKind = keyof Queries;

/** One question of any kind, as it travels. */
export type Query = {
  readonly [Kind in QueryKind]: { readonly kind: Kind; readonly ask: Queries[Kind]['ask'] };
}[QueryKind];

export type QueryAnswer = Queries[QueryKind]['answer'];

/** Sites named in one text, at most: a text names one or two, the others only have parts of its words as labels. */
const namedSites = 12;

/** Answers questions about one crystal; keeps the order of the table, of which many windows are asked for. */
export class CrystalDesk {
  readonly #dossier: CrystalDossier;
  #order: (TableOrder & { readonly key: string }) | null = null;

  readonly #found: FoundDesk;

  readonly #rankedSets: () => readonly Attachment[];

  /** `rankedSets` binds the tensor sets once more with all frames ranked: it is asked when it is needed. */
  constructor(
    dossier: CrystalDossier,
    texts: readonly SearchedText[] = [],
    rankedSets: () => readonly Attachment[] = () => [],
  ) {
    this.#rankedSets = rankedSets;
    this.#dossier = dossier;
    this.#found = new FoundDesk(texts, dossier, rankedSets);
  }

  answer(query: Query): QueryAnswer {
    switch (query.kind) {
      case 'scene':
        return buildScene(this.#dossier, query.ask);
      case 'sites':
        return this.#sites(query.ask);
      case 'sitesNamed':
        return this.#sites(this.#named(query.ask));
      case 'table':
        return this.#page(query.ask);
      case 'check':
        return checkView(this.#dossier, this.#rankedSets());
      case 'found':
        return this.#found.files();
      case 'foundEntries':
        return this.#found.entries(query.ask);
      case 'foundMarks':
        return this.#found.marks(query.ask);
      case 'tableText':
        return this.#text(query.ask);
    }
  }

  #sites(indices: readonly number[]): KnownSite[] {
    const { others } = sharedPositions(this.#dossier);
    return indices.flatMap((index) => {
      const site = this.#dossier.sites[index];
      if (!site) return [];
      const sharing = (others.get(index) ?? []).map(({ index: siteIndex, label, occupancy }) => ({
        siteIndex,
        label,
        occupancy,
      }));
      return [{ ...site, sharing }];
    });
  }

  #named(text: string): number[] {
    const typed = text.toLowerCase();
    return this.#dossier.sites
      .filter(({ label }) => typed.includes(label.toLowerCase()))
      .sort((one, other) => other.label.length - one.label.length || one.index - other.index)
      .slice(0, namedSites)
      .map(({ index }) => index);
  }

  #page(request: TableRequest): TablePage {
    const order = this.#ordered(request);
    const columns = columnsOf(request.columns);
    const window = order.sites.subarray(request.first, request.first + request.count);
    return {
      // copies: what is sent is given away
      order: request.withOrder ? { sites: order.sites.slice(), places: order.places.slice() } : null,
      total: order.sites.length,
      first: request.first,
      rows: Array.from(window, (index) => tableRow(this.#dossier.sites[index]!, columns)),
    };
  }

  #text(request: TableTextRequest): string {
    const sites = Array.from(this.#ordered(request).sites, (index) => this.#dossier.sites[index]!);
    const columns = columnsOf(request.columns);
    return request.format === 'html' ? tableHtml(sites, columns) : tableText(sites, columns);
  }

  #ordered({ filter, sort }: Pick<TableRequest, 'filter' | 'sort'>): TableOrder {
    const key = JSON.stringify([filter, sort]);
    let order = this.#order;
    if (order?.key !== key) order = { key, ...orderSites(this.#dossier.sites, filter, sort) };
    this.#order = order;
    return order;
  }
}

/** Buffers of an answer that are given to the other side instead of being copied. */
export function transferablesOf(answer: unknown): ArrayBuffer[] {
  const buffers = new Set<ArrayBuffer>();
  const collect = (value: unknown, depth: number): void => {
    if (ArrayBuffer.isView(value)) {
      if (value.buffer instanceof ArrayBuffer) buffers.add(value.buffer);
      return;
    }
    // the arrays of a scene lie in it and in its batches, no deeper
    if (depth < 2 && typeof value === 'object' && value !== null && !Array.isArray(value))
      for (const part of Object.values(value)) collect(part, depth + 1);
  };
  collect(answer, 0);
  return [...buffers];
}
