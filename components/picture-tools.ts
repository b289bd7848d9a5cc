import { html, nothing } from 'lit';
import type { TemplateResult } from 'lit';
import type { Measurement } from '#src/scene/measurement.ts';
import type { Store } from '#src/store/store.ts';
import type { CrystalPicture } from './crystal-picture.ts';
import type { PickedKind } from './measure-words.ts';
import type { BoardEntry } from './measurement-board.ts';
import type { PictureCommand } from './picture-keys.ts';
import type { PictureMarker } from './picture-marker.ts';

/** The panels that open from the picture's tools; one at a time. */
export type PicturePanel = 'view' | 'measure' | 'show' | 'help';

/** What the tools need of the element they stand in. */
export interface ToolsHost {
  readonly store: Store | null;
  readonly picture: CrystalPicture | null;
  readonly marker: PictureMarker;
  readonly entries: readonly BoardEntry[];
  readonly open: PicturePanel | null;
  readonly pivots: boolean;
  readonly hasSelection: boolean;
  readonly theme: 'light' | 'dark';
  readonly setOpen: (open: PicturePanel) => void;
  readonly setPivots: (pivots: boolean) => void;
  readonly openFigure: () => void;
  readonly run: (command: PictureCommand) => boolean;
  /** Closes the panel and gives the focus back. */
  readonly close: () => void;
}

const panelNames: Readonly<Record<PicturePanel, string>> = {
  view: 'View',
  measure: 'Measure',
  show: 'Show',
  help: '?',
};

/** Buttons above the picture and the panel that is open. */
export function pictureTools(host: ToolsHost): TemplateResult {
  const { run, picture } = host;
  const hasAxes = picture?.scene?.axes.length === 3;
  const axis = (letter: 'a' | 'b' | 'c'): TemplateResult =>
    html`<button aria-label="Look along ${letter}" @click=${() => run({ do: 'look', along: letter })}>
      <i>${letter}</i>
    </button>`;
  const panel = (name: PicturePanel, label?: string): TemplateResult =>
    html`<button
      aria-label=${label ?? panelNames[name]}
      aria-expanded=${host.open === name ? 'true' : 'false'}
      @click=${() => (host.open === name ? host.close() : host.setOpen(name))}
    >
      ${panelNames[name]}
    </button>`;
  return html`<div class="tools" role="toolbar" aria-label="View" @keydown=${closesByKey(host)}>
    <span class="group">
      ${hasAxes ? html`<span>along</span> ${axis('a')}${axis('b')}${axis('c')}` : nothing}
      <button title="the first view" @click=${() => run({ do: 'first' })}>all</button>
      <button aria-label="Smaller" @click=${() => run({ do: 'zoom', factor: 1 / 1.25 })}>−</button>
      <button aria-label="Larger" @click=${() => run({ do: 'zoom', factor: 1.25 })}>+</button>
    </span>
    <span class="group">
      ${panel('view')}${panel('measure')}${panel('show')}
      <button title="a picture to take away" @click=${() => host.openFigure()}>Picture</button>
      ${panel('help', 'Keys and gestures')}
    </span>
  </div>`;
}

/** What a panel needs is loaded when it is opened first. */
export function loadPanel(open: PicturePanel): Promise<unknown> {
  switch (open) {
    case 'help':
      return import('./keys-help.ts');
    case 'show':
      return import('./show-panel.ts');
    case 'view':
      return import('./view-panel.ts');
    case 'measure':
      return import('./measure-panel.ts');
  }
}

/** Escape closes the panel from inside it and from the buttons. */
function closesByKey(host: ToolsHost): (event: KeyboardEvent) => void {
  return (event) => {
    if (event.key !== 'Escape' || event.defaultPrevented || !host.open) return;
    event.preventDefault();
    host.close();
  };
}

/** The panel that is open, beside the picture or over it. */
export function openPanel(host: ToolsHost): TemplateResult | typeof nothing {
  const { open } = host;
  if (!open) return nothing;
  const name = open === 'help' ? 'Keys and gestures' : panelNames[open];
  return html`<div class="panel" role="dialog" tabindex="-1" aria-label=${name} @keydown=${closesByKey(host)}>
    <div class="panel-head">${name}<button aria-label="Close" @click=${() => host.close()}>×</button></div>
    ${panelContent(host, open)}
  </div>`;
}

function panelContent(host: ToolsHost, open: PicturePanel): TemplateResult {
  const { store, picture, marker } = host;
  switch (open) {
    case 'help':
      return html`<ellipsite-keys-help></ellipsite-keys-help>`;
    case 'show':
      return html`<ellipsite-show-panel .store=${store}></ellipsite-show-panel>`;
    case 'view':
      return html`<ellipsite-view-panel
        .store=${store}
        .picture=${picture}
        .camera=${picture?.camera ?? null}
        .pivots=${host.pivots}
        .hasSelection=${host.hasSelection}
        @to-selection=${() => host.run({ do: 'toSelection' })}
        @pivots=${({ detail }: CustomEvent<boolean>) => host.setPivots(detail)}
      ></ellipsite-view-panel>`;
    case 'measure':
      return html`<ellipsite-measure-panel
        .store=${store}
        .kind=${marker.kind}
        .marks=${marker.marks}
        .entries=${host.entries}
        @measure-kind=${({ detail }: CustomEvent<PickedKind | null>) => store && marker.measure(detail, store)}
        @measure-axes=${({ detail }: CustomEvent<NonNullable<Measurement['axes']>>) =>
          store && marker.measureAxes(detail, store)}
      ></ellipsite-measure-panel>`;
  }
}
