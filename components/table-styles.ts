import { css } from 'lit';

/** Look of the site table: hairlines between rows, no boxes. */
export const tableStyles = css`
  :host {
    position: relative;
    display: flex;
    flex-direction: column;
    min-height: 0;
    min-width: 0;
  }
  .line {
    display: flex;
    flex-wrap: wrap;
    align-items: center;
    justify-content: space-between;
    gap: 0 10px;
    padding: 0 12px 2px 0;
  }
  .tools {
    display: flex;
    gap: 2px;
    color: var(--soft);
  }
  .tools button {
    font-size: 13px;
    color: var(--ink);
  }
  .tools button[aria-expanded='true'] {
    background: var(--raised);
  }
  /* below the table, over the card: the columns stay in view while they are chosen */
  ellipsite-column-chooser {
    position: absolute;
    z-index: 4;
    top: 100%;
    right: 12px;
    width: min(600px, 100% - 24px);
    max-height: min(52vh, 520px);
    border: 1px solid var(--line);
    border-radius: 4px;
  }
  .empty {
    padding: 14px 8px;
    color: var(--soft);
  }
  .scroller {
    overflow: auto;
    flex: 1;
    min-height: 0;
    overscroll-behavior: contain;
    /* a shade at an edge beyond which there is more; the paper scrolls along and covers it where there is none */
    background:
      linear-gradient(to right, var(--paper) 40%, transparent) 0 0 / 40px 100% local no-repeat,
      linear-gradient(to left, var(--paper) 40%, transparent) 100% 0 / 40px 100% local no-repeat,
      linear-gradient(to right, var(--line), transparent) 0 0 / 10px 100% scroll no-repeat,
      linear-gradient(to left, var(--line), transparent) 100% 0 / 10px 100% scroll no-repeat;
  }
  .scroller:focus-visible {
    outline: none;
  }
  .row {
    display: grid;
    grid-template-columns: var(--columns);
    column-gap: 8px;
    align-items: center;
    /* where the columns leave room for more */
    padding: 0 clamp(8px, 100% - var(--least), 14px) 0 0;
    border-bottom: 1px solid var(--hairline);
    min-width: var(--least);
    width: 100%;
  }
  .head {
    position: sticky;
    top: 0;
    z-index: 2;
    height: 32px;
    background: var(--paper);
    color: var(--soft);
    font-size: 12.5px;
    white-space: nowrap;
  }
  .head button {
    font-size: 12.5px;
    color: var(--soft);
    padding: 0;
    margin: 0;
    max-width: 100%;
    text-align: inherit;
    border: none;
    white-space: nowrap;
  }
  .head .number button {
    width: 100%;
  }
  .head [aria-sort='ascending'] button,
  .head [aria-sort='descending'] button {
    color: var(--ink);
  }
  .mark {
    font-size: 8px;
    margin-left: 3px;
    vertical-align: 1px;
  }
  /* the site stays in view while the other columns are scrolled past it */
  .head [role='columnheader']:first-child,
  .site .name {
    position: sticky;
    left: 0;
    z-index: 1;
    align-self: stretch;
    background: var(--paper);
  }
  .head [role='columnheader']:first-child {
    display: flex;
    align-items: center;
  }
  .site.hovered .name {
    background: linear-gradient(var(--hovered), var(--hovered)), var(--paper);
  }
  .site.selected .name {
    background: linear-gradient(var(--lit), var(--lit)), var(--paper);
  }
  .scroller:focus-visible .active .name {
    box-shadow:
      inset 2px 2px var(--accent),
      inset 0 -1px var(--accent);
  }
  .body {
    position: relative;
  }
  .body .row {
    position: absolute;
    left: 0;
    cursor: pointer;
  }
  .site {
    height: 32px;
  }
  .atom {
    height: 50px;
    grid-template-columns: 1fr;
    font-size: 12.5px;
  }
  .atom-cell {
    padding-left: 30px;
    font-variant-numeric: tabular-nums lining-nums;
    white-space: nowrap;
  }
  .operation {
    display: inline-block;
    min-width: 150px;
    padding-right: 12px;
  }
  .axes {
    color: var(--soft);
    font-size: 11.5px;
  }
  .axes span + span {
    margin-left: 10px;
  }
  .hovered {
    background: var(--hovered);
  }
  .selected {
    background: var(--lit);
  }
  .scroller:focus-visible .active {
    outline: 2px solid var(--accent);
    outline-offset: -2px;
  }
  .name {
    display: flex;
    align-items: center;
    gap: 6px;
    min-width: 0;
  }
  .label {
    overflow: hidden;
    text-overflow: ellipsis;
    white-space: nowrap;
  }
  .text {
    white-space: nowrap;
    overflow: hidden;
    text-overflow: ellipsis;
  }
  .opener {
    min-width: 24px;
    min-height: 24px;
    padding: 0;
    color: var(--soft);
    line-height: 1;
  }
  .undefined {
    font-style: italic;
    color: var(--soft);
    font-size: 12px;
  }
`;
