import type { Keeper } from '#src/store/keeper.ts';
import type { Store } from '#src/store/store.ts';

/** Milliseconds after which a database that does not answer is done without. */
const patienceMs = 3000;

/** What keeps this tab's work; null, said once, where the browser has no storage for it. */
export async function findWork(store: Store): Promise<Keeper | null> {
  try {
    const [{ openKeeper }, { createHasher }] = await Promise.all([
      import('#src/store/keeper.ts'),
      import('#src/store/hash.ts'),
    ]);
    return await Promise.race([openKeeper(createHasher()), tooLate()]);
  } catch (error) {
    const { reasonInWords } = await import('#src/store/keeper.ts');
    store.setKeeping({ status: 'failed', reason: reasonInWords(error) });
    return null;
  }
}

/** Keeps every change from now on, the last one before the page goes too. */
export function keepWork(keeper: Keeper, store: Store, isBack: boolean): void {
  void keeper.watch(store, isBack);
  document.addEventListener('visibilitychange', () => {
    if (document.visibilityState === 'hidden') keeper.flush();
  });
  window.addEventListener('pagehide', () => keeper.flush());
}

function tooLate(): Promise<never> {
  return new Promise((_, reject) => {
    setTimeout(() => reject(new Error('its database does not answer')), patienceMs);
  });
}
