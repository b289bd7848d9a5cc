import type { Store } from '#src/store/store.ts';
import { saveCase } from './save-case.ts';

/**
 * Keys that hold everywhere on the page: Ctrl or Cmd with Z undoes, with Shift+Z or Y redoes, with S saves the case. Undo
 * and redo are left to a field that text is typed into. True where the key was one of them.
 */
export function caseKey(event: KeyboardEvent, store: Store | null): boolean {
  if (!store || !(event.ctrlKey || event.metaKey) || event.altKey) return false;
  const key = event.key.toLowerCase();
  if (key === 's' && !event.shiftKey) {
    event.preventDefault();
    void saveCase(store);
    return true;
  }
  const undoes = key === 'z' && !event.shiftKey;
  const redoes = (key === 'z' && event.shiftKey) || (key === 'y' && !event.shiftKey);
  if (!(undoes || redoes) || isTyped(event.composedPath()[0])) return false;
  event.preventDefault();
  void (undoes ? store.undo() : store.redo());
  return true;
}

const withoutText = new Set([
  'checkbox',
  'radio',
  'button',
  'submit',
  'range',
  'color',
  'file',
  'reset',
  'image',
]);

/** Fields with an undo of their own. */
function isTyped(target: EventTarget | undefined): boolean {
  if (target instanceof HTMLInputElement) return !withoutText.has(target.type);
  return target instanceof HTMLTextAreaElement || (target instanceof HTMLElement && target.isContentEditable);
}
