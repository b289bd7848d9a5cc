import type { LitElement } from 'lit';

/** Tells the page, once an element is drawn, that what it shows may be that of the crystal on screen now. */
export function tellWhenShown(element: LitElement): void {
  void element.updateComplete.then(() =>
    element.dispatchEvent(new CustomEvent('part-shown', { bubbles: true, composed: true })),
  );
}
