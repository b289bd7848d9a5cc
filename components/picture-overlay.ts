import { html, nothing, svg } from 'lit';
import type { TemplateResult } from 'lit';
import { unbroken } from '#src/scene/printed.ts';
import type { PickEntry, Scene } from '#src/scene/scene.ts';
import type { Store } from '#src/store/store.ts';
import { siteColour } from '#src/store/site-colour.ts';
import type { Selection, WorkbenchState } from '#src/store/state.ts';
import type { CrystalPicture, PictureOverlay } from './crystal-picture.ts';
import { valueText } from './measure-words.ts';
import type { BoardEntry } from './measurement-board.ts';
import type { Badge } from './picture-badges.ts';
import type { PicturePoint } from './picture-controls.ts';
import './picture-caption.ts';
import { pointedSentence } from './pointed-sentence.ts';
import { sampleOf } from './sample-cases.ts';
import { withSubscripts } from './symbol-text.ts';

/** Rings round the atoms of the hovered site, in its colour. */
export function ringsDrawing(
  { rings }: PictureOverlay,
  hover: Selection | null,
): TemplateResult | typeof nothing {
  if (rings.length === 0 || !hover) return nothing;
  const colour = siteColour(hover.siteIndex);
  return html`<svg class="rings" aria-hidden="true">
    ${rings.map(
      (ring) =>
        svg`<ellipse cx=${ring.xPx} cy=${ring.yPx} rx=${ring.halfWidthPx + 4} ry=${ring.halfHeightPx + 4} stroke=${colour}></ellipse>`,
    )}
  </svg>`;
}

/** Labels beside their atoms, and the leader lines of those that stand away: a dot says on which atom a line ends. */
export function labelsDrawing({ labels }: PictureOverlay): TemplateResult | typeof nothing {
  if (labels.length === 0) return nothing;
  const leaders = labels.flatMap(({ leader }) => (leader ? [leader] : []));
  return html`${
    leaders.length > 0
      ? html`<svg class="leaders" aria-hidden="true">
          ${leaders.map(([x1, y1, x2, y2]) => svg`<line x1=${x1} y1=${y1} x2=${x2} y2=${y2}></line><circle cx=${x1} cy=${y1} r="2.4"></circle>`)}
        </svg>`
      : nothing
  }${labels.map(
    ({ text, leftPx, topPx }) =>
      html`<span
        class="label"
        aria-hidden="true"
        .style=${`transform: translate(${leftPx.toFixed(1)}px, ${topPx.toFixed(1)}px)`}
        >${text}</span
      >`,
  )}`;
}

/** Cell axes in a corner: lines with letters, the farther ones drawn first, each with a rim of paper that sets it off from what is behind. */
export function axesDrawing({ axes }: PictureOverlay): TemplateResult | typeof nothing {
  if (!axes) return nothing;
  const [x, y] = axes.originPx;
  const line = ({ xPx, yPx }: { xPx: number; yPx: number }, kind: string): TemplateResult =>
    svg`<line class=${kind} x1="0" y1="0" x2=${xPx} y2=${yPx}></line>`;
  return html`<svg
    class="axes"
    width="1"
    height="1"
    aria-hidden="true"
    .style=${`transform: translate(${x.toFixed(1)}px, ${y.toFixed(1)}px)`}
  >
    ${axes.axes.map((axis) => line(axis, 'under'))} ${axes.axes.map((axis) => line(axis, ''))}
    ${axes.letters.map(({ letter, xPx, yPx }) => svg`<text x=${xPx} y=${yPx}>${letter}</text>`)}
  </svg>`;
}

/** Kept measurements as they stand on screen: their lines, and their values that are to stand on them. */
export interface FlatMeasurements {
  readonly lines: readonly string[];
  readonly values: readonly Badge[];
}

export function flatMeasurements(entries: readonly BoardEntry[], picture: CrystalPicture): FlatMeasurements {
  const drawn = entries.flatMap(({ measured, drawing }) =>
    measured && drawing ? [{ measured, ...picture.project(drawing) }] : [],
  );
  return {
    lines: drawn.flatMap(({ lines }) => lines),
    values: drawn.flatMap(({ measured, textAt }) =>
      textAt ? [{ text: valueText(measured), at: textAt }] : [],
    ),
  };
}

/** Kept measurements: thin lines and arcs with their values. */
export function annotations(
  { lines, values }: FlatMeasurements,
  { badges }: PictureOverlay,
): TemplateResult | typeof nothing {
  if (lines.length === 0 && values.length === 0) return nothing;
  return html`<svg class="annotations" aria-hidden="true">
      ${lines.map(
        (points) =>
          svg`<polyline class="under" points=${points}></polyline><polyline points=${points}></polyline>`,
      )}
    </svg>
    ${badges.map(
      ({ leftPx, topPx }, i) =>
        html`<span
          class="value"
          aria-hidden="true"
          .style=${`transform: translate(${leftPx.toFixed(1)}px, ${topPx.toFixed(1)}px)`}
          >${values[i]?.text}</span
        >`,
    )}`;
}

/** Atoms that were picked one after another, numbered. */
export function marksDrawing(marks: readonly (PicturePoint | null)[]): TemplateResult | typeof nothing {
  return marks.length === 0
    ? nothing
    : html`${marks.map((at, i) =>
        at
          ? html`<span
              class="mark"
              aria-hidden="true"
              .style=${`transform: translate(${at.xPx.toFixed(1)}px, ${at.yPx.toFixed(1)}px) translate(-50%, -50%)`}
              >${i + 1}</span
            >`
          : nothing,
      )}`;
}

/** Pixels between the pointer and the sentence about what is under it. */
const besidePx = 16;

/** The sentence about what is under the pointer, beside it on the side that has room. */
export function pointedDrawing(
  pointed: { readonly entry: PickEntry; readonly at: PicturePoint } | null,
  { scene, viewport }: CrystalPicture,
  store: Store,
): TemplateResult | typeof nothing {
  const sentence =
    pointed && scene ? pointedSentence(pointed.entry, scene, (index) => store.site(index)) : '';
  if (!pointed || !sentence) return nothing;
  const { xPx, yPx } = pointed.at;
  const isRight = xPx > viewport.widthPx / 2;
  const isLow = yPx > viewport.heightPx / 2;
  const across = isRight ? `right: ${viewport.widthPx - xPx + besidePx}px` : `left: ${xPx + besidePx}px`;
  const down = isLow ? `bottom: ${viewport.heightPx - yPx + besidePx}px` : `top: ${yPx + besidePx}px`;
  const room = Math.max(150, (isRight ? xPx : viewport.widthPx - xPx) - besidePx - 4);
  return html`<div class="pointed" .style=${`${across}; ${down}; max-width: ${Math.min(room, 420)}px`}>
    ${withSubscripts(sentence)}
  </div>`;
}

/** The same sentence, to be spoken. */
export function pointedWords(entry: PickEntry, { scene }: CrystalPicture, store: Store): string {
  return scene ? pointedSentence(entry, scene, (index) => store.site(index)) : '';
}

/** What there is to say over the picture: it could not be made, is being made, or the graphics chip took it away. */
export function overPicture(
  { sceneFault, isDrawing }: WorkbenchState,
  isLost: boolean,
  hasPicture: boolean,
): TemplateResult | typeof nothing {
  if (sceneFault)
    return html`<p class="said" role="alert">
      The picture could not be made: ${sceneFault}. ${hasPicture ? 'What is shown is the one before.' : ''}
    </p>`;
  if (isDrawing) return html`<p class="said" role="status">The new picture is being made.</p>`;
  return isLost
    ? html`<p class="said" role="status">
        The graphics chip took the picture away; until it comes back the CPU draws.
      </p>`
    : nothing;
}

/** What the picture shows, in words; with what to do about tensors that it hides. */
export function captionOf(scene: Scene | null, drawnBy: string | null): TemplateResult {
  const hasHidden = (scene?.sizeNotes ?? []).length > 0;
  const advice = hasHidden ? ' Ticked alone under Show, they are drawn at a scale of their own.' : '';
  return html`<ellipsite-picture-caption
    .text=${unbroken(`${scene?.caption ?? ''}${advice}`)}
    .drawnBy=${drawnBy}
  ></ellipsite-picture-caption>`;
}

/** A sample says that its tensors are invented. */
export function sampleLine(decisions: WorkbenchState['decisions']): TemplateResult | typeof nothing {
  const names = decisions?.sources.map(({ name }) => name) ?? [];
  const sample = decisions && sampleOf(decisions.title, names);
  return sample ? html`<p class="caption sample">Sample case. ${sample.sentence}</p>` : nothing;
}

export function faultWords(error: unknown): string {
  return error instanceof Error ? error.message : String(error);
}
