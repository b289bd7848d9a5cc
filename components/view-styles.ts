import { css } from 'lit';

/** Look of the crystal view: the picture takes all room that its lines of text leave. */
export const viewStyles = css`
  :host {
    display: flex;
    flex-direction: column;
    padding: 12px 0 10px 18px;
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
    align-items: center;
    gap: 2px;
    color: var(--soft);
    font-size: 12.5px;
  }
  .tools button {
    color: var(--ink);
    font-size: 13px;
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
  canvas {
    position: absolute;
    inset: 0;
    width: 100%;
    height: 100%;
    display: block;
  }
  svg,
  .label,
  .pointed,
  .lost {
    position: absolute;
    pointer-events: none;
  }
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
  svg.axes {
    left: 4px;
    bottom: 4px;
    width: 100px;
    height: 100px;
    overflow: visible;
    background: radial-gradient(
      closest-side,
      color-mix(in srgb, var(--paper) 88%, transparent) 80%,
      transparent
    );
  }
  svg.axes line {
    stroke: var(--ink);
    stroke-width: 1.2;
  }
  svg.axes text {
    fill: var(--ink);
    font-size: 12px;
    font-style: italic;
    text-anchor: middle;
    dominant-baseline: central;
    paint-order: stroke;
    stroke: var(--paper);
    stroke-width: 3px;
  }
  .label {
    font-size: 12px;
    line-height: 15px;
    white-space: nowrap;
    text-shadow:
      0 0 2px var(--paper),
      0 0 2px var(--paper),
      0 0 3px var(--paper);
  }
  .pointed {
    left: 0;
    top: 2px;
    font-size: 12.5px;
    max-width: 100%;
    background: color-mix(in srgb, var(--paper) 80%, transparent);
    padding: 1px 6px 1px 0;
  }
  .lost,
  .none {
    align-self: center;
    max-width: 44ch;
    margin: auto;
    color: var(--soft);
    text-align: center;
    padding: 20px;
  }
  .lost {
    inset: 0;
    display: grid;
    place-content: center;
    background: var(--paper);
    max-width: none;
  }
  .caption {
    color: var(--soft);
    font-size: 12.5px;
    padding: 2px 16px 0 0;
    max-width: 110ch;
  }
  ellipsite-show-panel {
    position: absolute;
    z-index: 3;
    right: 12px;
    top: 100%;
    width: max-content;
    max-width: min(320px, 100% - 12px);
    border: 1px solid var(--line);
    border-radius: 4px;
    color: var(--ink);
  }
`;
