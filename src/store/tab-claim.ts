import type { WorkDatabase } from './work-database.ts';

/** Whose work this tab goes on with. */
export interface Claim {
  /** Under this name the tab's work is written; no other open tab has it. */
  readonly id: string;
  /** Work to bring back; null where there is none. Another id than `id` where a tab was duplicated. */
  readonly from: string | null;
  /** Ids of works no open tab has, the newest first. */
  readonly idle: readonly string[];
}

/** Remembered by the tab over a reload, and copied by the browser where a tab is duplicated. */
const tabKey = 'ellipsite tab';

/** Milliseconds a reloaded page waits for the page before it to let go. */
const patience = 800;

/**
 * Every tab has a work of its own: while a tab is open it holds a lock on the name of its work, which the browser frees when the
 * tab is closed, reloaded or killed. So a reloaded tab finds its own work, a new one takes up the newest that no tab has,
 * a duplicated one starts from a copy, and two tabs never write over each other.
 */
export async function claimWork(database: WorkDatabase): Promise<Claim> {
  const known = read();
  const ids = await database.ids();
  if (known !== null && (await hold(known, patience))) {
    return { id: known, from: ids.includes(known) ? known : null, idle: await idleOf(ids, known) };
  }
  if (known !== null && ids.includes(known)) return fresh(known, await idleOf(ids, known));
  const idle = await idleOf(ids, null);
  for (const id of idle) {
    if (!(await hold(id, 0))) continue;
    remember(id);
    return { id, from: id, idle: idle.filter((other) => other !== id) };
  }
  return fresh(null, idle);
}

/** A claim on a work of a new name. */
export async function fresh(from: string | null, idle: readonly string[]): Promise<Claim> {
  const id = `${Date.now().toString(36)}-${Math.random().toString(36).slice(2, 10)}`;
  await hold(id, 0);
  remember(id);
  return { id, from, idle };
}

function read(): string | null {
  try {
    return sessionStorage.getItem(tabKey);
  } catch {
    return null;
  }
}

function remember(id: string): void {
  try {
    sessionStorage.setItem(tabKey, id);
  } catch {
    // without it a reload takes up the newest work, which is this one
  }
}

function lockName(id: string): string {
  return `ellipsite work ${id}`;
}

/** Takes the lock until the tab ends; false where another tab has it. Browsers without locks give it to everyone. */
function hold(id: string, waitMs: number): Promise<boolean> {
  const locks = (navigator as Partial<Navigator>).locks;
  if (!locks) return Promise.resolve(true);
  return new Promise((resolve) => {
    const options = waitMs > 0 ? { signal: AbortSignal.timeout(waitMs) } : { ifAvailable: true };
    locks
      .request(lockName(id), options, (lock) => {
        resolve(lock !== null);
        return lock === null ? undefined : new Promise(() => undefined);
      })
      .catch(() => resolve(false));
  });
}

/** Works without a lock on them. */
export async function idleOf(ids: readonly string[], own: string | null): Promise<string[]> {
  const locks = (navigator as Partial<Navigator>).locks;
  const held = new Set((await locks?.query())?.held?.map(({ name }) => name) ?? []);
  return ids.filter((id) => id !== own && !held.has(lockName(id)));
}
