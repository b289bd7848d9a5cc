import { css } from 'lit';

/** Look of the crystal view: the picture takes all room that its lines of text leave. */
export const viewStyles = css`
  :host {
    display: flex;
    flex-direction: column;
    padding: 12px 0 10px 18px;
    container-type: inline-size;
  }
  .middle {
    position: relative;
    flex: 1;
    display: flex;
    min-height: 160px;
  }
  .line {
    display: flex;
    flex-wrap: wrap;
    align-items: center;
    justify-content: space-between;
    gap: 2px 10px;
    padding: 0 12px 4px 0;
    min-height: 34px;
    /* above the picture: the panel, and the focus ring of a button at its edge */
    position: relative;
    z-index: 3;
  }
  .tools {
    display: flex;
    flex-wrap: wrap;
    align-items: center;
    gap: 2px 8px;
    color: var(--soft);
    font-size: 12.5px;
  }
  .tools .group {
    display: inline-flex;
    align-items: center;
    gap: 1px;
  }
  .tools .group span {
    margin-right: 2px;
  }
  .tools button {
    color: var(--ink);
    font-size: 13px;
    padding: 2px 7px;
  }
  .tools button[aria-expanded='true'] {
    background: var(--raised);
    border-color: var(--line);
  }
  .stage {
    position: relative;
    flex: 1;
    min-height: 160px;
    overflow: hidden;
    touch-action: none;
    cursor: grab;
    margin-right: 8px;
  }
  .stage:active {
    cursor: grabbing;
  }
  /* of the crystal before, until the first frame of this one */
  .awaited canvas {
    visibility: hidden;
  }
  canvas {
    position: absolute;
    inset: 0;
    width: 100%;
    height: 100%;
    display: block;
  }
  svg,
  .label,
  .value,
  .mark,
  .pointed,
  .said {
    position: absolute;
    pointer-events: none;
  }
  svg.leaders,
  svg.annotations,
  svg.rings {
    inset: 0;
    width: 100%;
    height: 100%;
    overflow: hidden;
  }
  svg.rings ellipse {
    fill: none;
    stroke-width: 1.8;
  }
  svg.leaders line {
    stroke: var(--ink);
    stroke-width: 1;
  }
  svg.leaders circle {
    fill: var(--ink);
    stroke: var(--paper);
    stroke-width: 1.2;
  }
  svg.annotations polyline {
    fill: none;
    stroke: var(--ink);
    stroke-width: 1.3;
    stroke-dasharray: 5 3;
  }
  svg.annotations .under {
    stroke: var(--paper);
    stroke-width: 3.4;
    stroke-dasharray: none;
    opacity: 0.75;
  }
  svg.axes {
    left: 0;
    top: 0;
    overflow: visible;
  }
  svg.axes line {
    stroke: var(--ink);
    stroke-width: 1.3;
    stroke-linecap: round;
  }
  svg.axes .under {
    stroke: var(--paper);
    stroke-width: 4.5;
    opacity: 0.85;
  }
  svg.axes text {
    fill: var(--ink);
    stroke: var(--paper);
    stroke-width: 3.5;
    stroke-linejoin: round;
    paint-order: stroke;
    font-size: 12px;
    font-style: italic;
    text-anchor: middle;
    dominant-baseline: central;
  }
  .label,
  .value,
  .mark {
    left: 0;
    top: 0;
    font-size: 12px;
    line-height: 15px;
    white-space: nowrap;
  }
  .label {
    text-shadow:
      0 0 2px var(--paper),
      0 0 2px var(--paper),
      0 0 3px var(--paper);
  }
  .value {
    padding: 0 4px;
    border-radius: 3px;
    background: color-mix(in srgb, var(--paper) 86%, transparent);
    font-variant-numeric: tabular-nums lining-nums;
  }
  .mark {
    min-width: 16px;
    border-radius: 8px;
    text-align: center;
    color: var(--on-accent);
    background: var(--accent);
    font-size: 11px;
    line-height: 16px;
  }
  .picking {
    cursor: crosshair;
  }
  .pointed {
    font-size: 12px;
    width: max-content;
    background: color-mix(in srgb, var(--paper) 92%, transparent);
    border: 1px solid var(--hairline);
    border-radius: 4px;
    padding: 1px 6px;
    z-index: 1;
  }
  .said {
    inset: auto 0 4px;
    width: fit-content;
    max-width: min(60ch, 100% - 120px);
    margin: 0 8px 0 auto;
    padding: 3px 9px;
    border: 1px solid var(--line);
    border-radius: 4px;
    background: var(--raised);
    font-size: 12.5px;
  }
  .none {
    align-self: center;
    max-width: 44ch;
    margin: auto;
    color: var(--soft);
    text-align: center;
    padding: 20px;
  }
  .caption {
    color: var(--soft);
    font-size: 12.5px;
    padding: 2px 16px 0 0;
    max-width: 110ch;
  }
  ellipsite-picture-caption {
    display: flex;
    align-items: start;
    margin-right: 8px;
  }
  ellipsite-picture-caption .caption {
    padding-right: 8px;
    min-width: 0;
  }
  ellipsite-picture-caption .folded {
    overflow: hidden;
    text-overflow: ellipsis;
    white-space: nowrap;
  }
  ellipsite-picture-caption button {
    flex: none;
    min-height: 24px;
    padding: 0 7px;
    color: var(--accent);
    font-size: 12.5px;
  }
  /* beside the picture where there is room, so that one sees what one changes; else over it */
  .panel {
    flex: none;
    align-self: flex-start;
    width: 304px;
    max-height: 100%;
    margin-right: 8px;
    overflow: auto;
    overscroll-behavior: contain;
    border: 1px solid var(--line);
    border-radius: 4px;
    background: var(--raised);
    color: var(--ink);
  }
  @media (max-width: 899px) {
    .panel {
      max-height: 64vh;
      max-height: 64svh;
    }
  }
  /* a sheet below the picture, which stays in view */
  @container (max-width: 619px) {
    .middle {
      flex-direction: column;
    }
    .stage {
      min-height: 160px;
      min-height: max(160px, 30svh);
    }
    .panel {
      align-self: stretch;
      width: auto;
      max-height: 38vh;
      max-height: 38svh;
    }
  }
  .panel-head {
    position: sticky;
    top: 0;
    z-index: 1;
    display: flex;
    align-items: center;
    justify-content: space-between;
    padding: 4px 6px 0 14px;
    background: var(--raised);
    font-weight: 600;
  }
  .panel-head button {
    font-size: 16px;
    line-height: 1;
  }
`;
