import type { DerivedCase } from './engine-protocol.ts';
import type { KnownSite } from './engine-queries.ts';

/** Sites kept at most; those read longest ago are given up first. */
const keptSites = 500;

/**
 * The few whole sites the page shows: card, opened rows, sentences. Sites asked for in one go travel together. One that
 * could not be read is not asked for again unless someone waits for it.
 */
export class SiteCache {
  readonly #read: (derived: DerivedCase, indices: readonly number[]) => Promise<readonly KnownSite[]>;
  readonly #arrived: () => void;
  /** By derivation and index, least recently read first; null where it could not be read. */
  readonly #known = new Map<string, KnownSite | null>();
  /** Asked for without waiting, sent at the end of the present task. */
  readonly #wanted = new Map<DerivedCase, Set<number>>();
  readonly #underway = new Set<string>();

  constructor(
    read: (derived: DerivedCase, indices: readonly number[]) => Promise<readonly KnownSite[]>,
    arrived: () => void,
  ) {
    this.#read = read;
    this.#arrived = arrived;
  }

  /** The site where it is here; else null, and `arrived` is called once it is. */
  get(derived: DerivedCase, index: number): KnownSite | null {
    const key = keyOf(derived, index);
    const known = this.#known.get(key);
    if (known !== undefined) {
      this.#keep(key, known);
      return known;
    }
    if (!this.#underway.has(key)) this.#want(derived, index, key);
    return null;
  }

  /** The sites of these indices, from here or from the engine. Rejects where they cannot be read. */
  async read(derived: DerivedCase, indices: readonly number[]): Promise<KnownSite[]> {
    const missing = indices.filter((index) => !this.#known.get(keyOf(derived, index)));
    const fetched = missing.length > 0 ? await this.#read(derived, missing) : [];
    for (const site of fetched) this.#keep(keyOf(derived, site.index), site);
    const byIndex = new Map(fetched.map((site) => [site.index, site]));
    return indices.flatMap((index) => byIndex.get(index) ?? this.#known.get(keyOf(derived, index)) ?? []);
  }

  #want(derived: DerivedCase, index: number, key: string): void {
    this.#underway.add(key);
    const wanted = this.#wanted.get(derived);
    if (wanted) {
      wanted.add(index);
      return;
    }
    this.#wanted.set(derived, new Set([index]));
    queueMicrotask(() => void this.#send(derived));
  }

  async #send(derived: DerivedCase): Promise<void> {
    const indices = [...(this.#wanted.get(derived) ?? [])];
    this.#wanted.delete(derived);
    try {
      await this.read(derived, indices);
    } catch {
      // nothing of the page hangs on it: what shows the site goes on without it
    }
    for (const index of indices) {
      const key = keyOf(derived, index);
      this.#underway.delete(key);
      if (!this.#known.has(key)) this.#keep(key, null);
    }
    this.#arrived();
  }

  #keep(key: string, site: KnownSite | null): void {
    this.#known.delete(key);
    this.#known.set(key, site);
    for (const oldest of this.#known.keys()) {
      if (this.#known.size <= keptSites) break;
      this.#known.delete(oldest);
    }
  }
}

function keyOf({ derivation }: DerivedCase, index: number): string {
  return `${derivation} ${index}`;
}
