import { notSaved } from '#src/store/case-problems.ts';
import type { Store } from '#src/store/store.ts';
import { fileNameOf, saveBytes } from './save-bytes.ts';

/** Ending by which people know a case file; the page knows it by content. */
const ending = 'ellipsite.json';

/** Saves the case on screen into a file of the user's. */
export async function saveCase(store: Store): Promise<void> {
  const { decisions } = store.state;
  if (!decisions) return;
  const what = `save ${decisions.title}`;
  try {
    const text = await store.caseText();
    const title = decisions.title.replace(/\.ellipsite\.json$/i, '');
    saveBytes(new TextEncoder().encode(text), fileNameOf(title, ending), 'application/json');
    if (store.state.refused?.what === what) store.dismissRefusal();
  } catch (error) {
    store.refuse(what, [], [notSaved(error)]);
  }
}
