import type { WebGLProbe } from '#src/render/probe-webgl.ts';
import type { DerivedCase } from '#src/store/engine-protocol.ts';
import type { Store } from '#src/store/store.ts';
import { createStore } from '#src/store/store.ts';
import { Workbench } from '#components/workbench.ts';
import { fixtureCase, fixtureEngine } from '#tests/support/dossier-fixture.ts';

export interface Mounted {
  readonly workbench: Workbench;
  readonly store: Store;
  /** One element of the page by its tag, its shadow root ready to query. */
  readonly part: (tag: string) => Element & { readonly shadowRoot: ShadowRoot };
}

export const nothingDraws: WebGLProbe = {
  available: false,
  software: false,
  renderer: null,
  canPaint: false,
  sentence: 'This browser draws nothing.',
};

/** Lets elements draw what they were told: two frames are enough for an element inside an element. */
export async function settle(): Promise<void> {
  for (let i = 0; i < 3; i++) await new Promise((resolve) => requestAnimationFrame(resolve));
}

/** The whole page on a fixture case, without the drawn picture unless asked for. */
export async function mountWorkbench(
  answer: DerivedCase = fixtureCase(),
  withPicture = false,
): Promise<Mounted> {
  document.body.replaceChildren();
  const store = createStore(fixtureEngine(answer));
  await store.open([{ name: 'invented.xyz', blob: new Blob(['x']) }]);
  const workbench = new Workbench();
  workbench.store = store;
  if (!withPicture) workbench.probe = nothingDraws;
  document.body.append(workbench);
  await settle();
  const part = (tag: string): Element & { readonly shadowRoot: ShadowRoot } => {
    const found = workbench.renderRoot.querySelector(tag);
    if (!found?.shadowRoot) throw new Error(`${tag} is not on the page`);
    return found as Element & { readonly shadowRoot: ShadowRoot };
  };
  return { workbench, store, part };
}

/** A key on an element, as the browser would send it. */
export function press(target: Element, key: string, init: KeyboardEventInit = {}): void {
  target.dispatchEvent(
    new KeyboardEvent('keydown', { key, bubbles: true, composed: true, cancelable: true, ...init }),
  );
}

/** Text of an element without the runs of blanks of its template. */
export function textOf(node: Element | ShadowRoot | null | undefined): string {
  return (node?.textContent ?? '').replace(/\s+/g, ' ').trim();
}
