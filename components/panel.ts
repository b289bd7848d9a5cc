/** Which drawer stands over the page. */
export type Panel = 'problems' | 'settings' | 'case' | 'found' | 'check' | null;

/** Asks the workbench for a drawer, or with null to close the one that is open. */
export function askForPanel(from: HTMLElement, panel: Panel): void {
  from.dispatchEvent(new CustomEvent<Panel>('ask-panel', { detail: panel, bubbles: true, composed: true }));
}
