import { notSaved } from '#src/store/case-problems.ts';
import { Cancelled } from '#src/store/engine-client.ts';
import type { Store } from '#src/store/store.ts';
import { fileNameOf, saveBlob } from './save-bytes.ts';

/** Ending by which people know a case file; the page knows it by content. */
const ending = 'ellipsite.json';

/** Saves the case on screen into a file of the user's. */
export async function saveCase(store: Store): Promise<void> {
  const { decisions } = store.state;
  if (!decisions) return;
  const what = `save ${decisions.title}`;
  try {
    const blob = await store.caseBlob();
    const title = decisions.title.replace(/\.ellipsite\.json$/i, '');
    saveBlob(blob, fileNameOf(title, ending));
    if (store.state.refused?.what === what) store.dismissRefusal();
  } catch (error) {
    if (error instanceof Cancelled) return;
    store.refuse(what, [], [notSaved(error)]);
  }
}
