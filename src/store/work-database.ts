import type { StoredMoment, StoredWork } from './kept-work.ts';

const databaseName = 'ellipsite';
/** Work by tab, and the bytes of files by their hash, each once however often work is written. */
const workStore = 'work';
const fileStore = 'files';

/** Works of closed tabs that are kept beside those of open ones. */
export const keptWorks = 8;

/** The browser's database of works. Every method rejects where the storage is blocked, broken or full. */
export class WorkDatabase {
  readonly #database: IDBDatabase;

  private constructor(database: IDBDatabase) {
    this.#database = database;
  }

  static open(): Promise<WorkDatabase> {
    return new Promise((resolve, reject) => {
      const request = indexedDB.open(databaseName, 1);
      request.onupgradeneeded = () => {
        request.result.createObjectStore(workStore);
        request.result.createObjectStore(fileStore);
      };
      request.onsuccess = () => {
        // a newer page in another tab may need another form of the database: make room for it
        request.result.onversionchange = () => request.result.close();
        resolve(new WorkDatabase(request.result));
      };
      request.onerror = () => reject(faultOf(request));
      request.onblocked = () => reject(new Error('another tab holds the database'));
    });
  }

  /** All works without the bytes of their files, the newest first. */
  async works(): Promise<{ readonly id: string; readonly work: StoredWork }[]> {
    const [keys, works] = await this.#read(
      workStore,
      (store) => [store.getAllKeys(), store.getAll() as IDBRequest<StoredWork[]>] as const,
    );
    const all = keys.map((key, i) => ({ id: String(key), work: works[i]! }));
    return all.sort((a, b) => b.work.savedAt - a.work.savedAt);
  }

  /** Ids of all works, the newest first. */
  async ids(): Promise<string[]> {
    return (await this.works()).map(({ id }) => id);
  }

  /** One tab's work with the bytes it names; null where there is none of a form that is known. */
  async load(
    id: string,
  ): Promise<{ readonly work: StoredWork; readonly files: ReadonlyMap<string, Blob> } | null> {
    const [work] = await this.#read(workStore, (store) => [
      store.get(id) as IDBRequest<StoredWork | undefined>,
    ]);
    if (work?.format !== 1) return null;
    const keys = [...keysOf(work)];
    const blobs = await this.#read(fileStore, (store) =>
      keys.map((key) => store.get(key) as IDBRequest<Blob | undefined>),
    );
    const files = keys.flatMap((key, i) => (blobs[i] ? [[key, blobs[i]] as const] : []));
    return { work, files: new Map(files) };
  }

  /** Writes a work; of its files those that aren't there yet. All or nothing. */
  save(id: string, work: StoredWork, fileOf: (key: string) => Blob | undefined): Promise<void> {
    return this.#write((transaction) => {
      const files = transaction.objectStore(fileStore);
      for (const key of keysOf(work)) {
        const known = files.getKey(key);
        known.onsuccess = () => {
          const file = fileOf(key);
          if (known.result === undefined && file) files.put(file, key);
        };
      }
      transaction.objectStore(workStore).put(work, id);
    });
  }

  remove(id: string): Promise<void> {
    return this.#write((transaction) => void transaction.objectStore(workStore).delete(id));
  }

  /** Forgets works of the given ids and every file that no work names any more. */
  tidy(gone: readonly string[]): Promise<void> {
    return this.#write((transaction) => {
      const works = transaction.objectStore(workStore);
      const files = transaction.objectStore(fileStore);
      gone.forEach((id) => works.delete(id));
      const rest = works.getAll() as IDBRequest<StoredWork[]>;
      rest.onsuccess = () => {
        const used = new Set(rest.result.flatMap((work) => [...keysOf(work)]));
        const keys = files.getAllKeys();
        keys.onsuccess = () =>
          keys.result.filter((key) => !used.has(String(key))).forEach((key) => files.delete(key));
      };
    });
  }

  async #read<Requests extends readonly IDBRequest[]>(
    name: string,
    ask: (store: IDBObjectStore) => Requests,
  ): Promise<{
    -readonly [Index in keyof Requests]: Requests[Index] extends IDBRequest<infer Result> ? Result : never;
  }> {
    const transaction = this.#database.transaction(name, 'readonly');
    const requests = ask(transaction.objectStore(name));
    await finished(transaction);
    return requests.map((request) => request.result as unknown) as never;
  }

  async #write(change: (transaction: IDBTransaction) => void): Promise<void> {
    const transaction = this.#database.transaction([workStore, fileStore], 'readwrite');
    change(transaction);
    await finished(transaction);
  }
}

function finished(transaction: IDBTransaction): Promise<void> {
  return new Promise((resolve, reject) => {
    transaction.oncomplete = () => resolve();
    transaction.onabort = () => reject(faultOf(transaction));
    transaction.onerror = () => reject(faultOf(transaction));
  });
}

function faultOf({ error }: { readonly error: DOMException | null }): Error {
  return error ?? new Error('the database gave no reason');
}

function keysOf({ moment }: { readonly moment: StoredMoment }): Set<string> {
  const all = [moment, ...moment.past, ...moment.future].map(({ decisions }) => decisions);
  return new Set(all.flatMap((one) => one?.sources.map(({ key }) => key) ?? []));
}
