import type { OpenedCase } from './case-exchange.ts';
import type { SourceFile } from './engine-protocol.ts';
import type { StoredWork, Work } from './kept-work.ts';
import { filesOf, openedWork, restoredWork, storedWork } from './kept-work.ts';
import { momentOf } from './moment.ts';
import type { WorkbenchState } from './state.ts';
import type { Store } from './store.ts';
import type { Claim } from './tab-claim.ts';
import { claimWork, fresh, idleOf } from './tab-claim.ts';
import { keptWorks, WorkDatabase } from './work-database.ts';

/** Least time between two writes, milliseconds; the first change is written at once. */
const pauseMs = 200;

/** Attempts after which work that never came back is left aside. */
const mostAttempts = 2;

/** Keeps what one tab does in the browser's database. */
export interface Keeper {
  /** The work of this tab before it was reloaded or killed; null where there is none. */
  readonly found: Work | null;
  /** There is work, but it ended the page each time it was brought back: it is left where it is. */
  readonly isLeftAside: boolean;
  /** Writes every change of the store from now on. Work that could not be brought back is left as it is. */
  watch(store: Store, isBack: boolean): Promise<void>;
  /** Writes now what isn't written yet: the page may be about to go. */
  flush(): void;
  /** Works of closed tabs, the newest first. */
  earlier(): Promise<readonly EarlierWork[]>;
  /** One of them, to be opened in this tab; null where it or a file of it is gone. */
  load(id: string): Promise<OpenedCase | null>;
  forget(id: string): Promise<void>;
}

/** A line in the list of earlier work. */
export interface EarlierWork {
  readonly id: string;
  readonly title: string;
  /** Milliseconds since 1970. */
  readonly savedAt: number;
  /** In the cell; null where that was not written. */
  readonly atomCount: number | null;
}

/** Opens the database and claims this tab's work. Rejects with the browser's reason where storage is blocked. */
export async function openKeeper(hashOf: (blob: Blob) => Promise<string>): Promise<Keeper> {
  const database = await WorkDatabase.open();
  const claim = await claimWork(database);
  const keeper = new TabKeeper(database, claim, hashOf);
  await keeper.find();
  void database.tidy(claim.idle.slice(keptWorks)).catch(() => undefined);
  return keeper;
}

class TabKeeper implements Keeper {
  readonly #database: WorkDatabase;
  readonly #hashOf: (blob: Blob) => Promise<string>;
  readonly #keys = new WeakMap<Blob, string>();
  #claim: Claim;
  #store: Store | null = null;
  #written: WorkbenchState | null = null;
  #isWriting = false;
  #timer: ReturnType<typeof setTimeout> | null = null;
  #lastStart = 0;
  found: Work | null = null;
  isLeftAside = false;

  constructor(database: WorkDatabase, claim: Claim, hashOf: (blob: Blob) => Promise<string>) {
    this.#database = database;
    this.#claim = claim;
    this.#hashOf = hashOf;
  }

  async find(): Promise<void> {
    const { from, idle } = this.#claim;
    const held = from === null ? null : await this.#database.load(from);
    if (!held) return;
    const { work, files } = held;
    if (work.attempts >= mostAttempts) {
      this.#claim = await fresh(null, idle);
      this.isLeftAside = true;
      return;
    }
    this.found = restoredWork(work, (key) => files.get(key));
    files.forEach((file, key) => this.#keys.set(file, key));
    const tried: StoredWork = { ...work, attempts: work.attempts + 1 };
    await this.#database.save(this.#claim.id, tried, (key) => files.get(key)).catch(() => undefined);
  }

  async watch(store: Store, isBack: boolean): Promise<void> {
    if (this.found && !isBack) this.#claim = await fresh(null, this.#claim.idle);
    this.#store = store;
    this.#written = isBack ? null : store.state;
    store.subscribe(() => this.#schedule());
    this.#schedule();
  }

  flush(): void {
    if (this.#timer !== null) clearTimeout(this.#timer);
    this.#timer = null;
    if (this.#isStale()) void this.#write();
  }

  async earlier(): Promise<readonly EarlierWork[]> {
    const works = await this.#database.works();
    const ids = works.map(({ id }) => id);
    const idle = new Set(await idleOf(ids, this.#claim.id));
    return works.flatMap(({ id, work: { moment, savedAt, atomCount = null } }) =>
      idle.has(id) && moment.decisions ? [{ id, title: moment.decisions.title, savedAt, atomCount }] : [],
    );
  }

  async load(id: string): Promise<OpenedCase | null> {
    const held = await this.#database.load(id);
    const work = held && restoredWork(held.work, (key) => held.files.get(key));
    return work && openedWork(work);
  }

  forget(id: string): Promise<void> {
    return this.#database.tidy([id]);
  }

  #isStale(): boolean {
    const { state } = this.#store ?? {};
    if (!state) return false;
    const before = this.#written;
    if (!before) return true;
    const isSame = (key: keyof WorkbenchState): boolean => state[key] === before[key];
    const work = [
      'decisions',
      'past',
      'future',
      'picture',
      'camera',
      'look',
      'savedViews',
      'measurements',
      'table',
      'selection',
      'picked',
    ] as const;
    // a sample that was only looked at is not worth keeping: the work of another tab may be
    const isUntouched = [...state.past, ...state.future].every((step) => step.isSelection);
    if (state.keeping.status === 'off' && isUntouched) return !isSame('decisions');
    return !work.every(isSame);
  }

  #schedule(): void {
    if (this.#timer !== null || this.#isWriting || !this.#isStale()) return;
    const wait = Math.max(0, this.#lastStart + pauseMs - Date.now());
    this.#timer = setTimeout(() => {
      this.#timer = null;
      void this.#write();
    }, wait);
  }

  async #write(): Promise<void> {
    const store = this.#store;
    if (!store) return;
    const { state } = store;
    this.#isWriting = true;
    this.#lastStart = Date.now();
    this.#written = state;
    try {
      const moment = momentOf(state);
      const files = filesOf(moment);
      const blobs = new Map<string, Blob>();
      for (const { blob } of files) {
        const key = this.#keys.get(blob) ?? (await this.#hashOf(blob));
        this.#keys.set(blob, key);
        blobs.set(key, blob);
      }
      const atomCount = state.derived?.crystal?.atomsInCell ?? null;
      const keyOf = ({ blob }: SourceFile): string => this.#keys.get(blob) ?? '';
      const work = storedWork({ moment }, keyOf, Date.now(), atomCount);
      await this.#database.save(this.#claim.id, work, (key) => blobs.get(key));
      store.setKeeping({ status: 'kept', reason: null });
    } catch (error) {
      store.setKeeping({ status: 'failed', reason: reasonInWords(error) });
    }
    this.#isWriting = false;
    this.#schedule();
  }
}

/** Why storage did not work, in a sentence. */
export function reasonInWords(error: unknown): string {
  const { name, message } = error instanceof Error ? error : new Error(String(error));
  const isFull = name === 'QuotaExceededError';
  const why = isFull ? "the browser's storage is full" : `the browser says: ${message || name}`;
  return `The work can't be kept in this browser (${why}). Everything else goes on; save the case to a file.`;
}
