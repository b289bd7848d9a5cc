import { css, unsafeCSS } from 'lit';
import { darkTokens, declarations, lightTokens } from './theme-tokens.ts';

const light = unsafeCSS(declarations(lightTokens));
const dark = unsafeCSS(declarations(darkTokens));

/** Colours of both themes, set on the outermost element and inherited by all others. */
export const themes = css`
  :host {
    color-scheme: light;
    ${light}
  }
  :host([theme='dark']) {
    color-scheme: dark;
    ${dark}
  }
`;

/** What all elements share: type, controls, focus, tables of numbers. */
export const shared = css`
  :host {
    box-sizing: border-box;
    font-family:
      ui-sans-serif,
      system-ui,
      -apple-system,
      'Segoe UI',
      'Noto Sans',
      sans-serif;
    font-size: 14px;
    line-height: 1.4;
    color: var(--ink);
  }
  :host([hidden]) {
    display: none;
  }
  *,
  *::before,
  *::after {
    box-sizing: inherit;
  }
  h2,
  h3,
  p,
  ul {
    margin: 0;
    padding: 0;
  }
  h2 {
    font-size: 12.5px;
    font-weight: 400;
    color: var(--soft);
  }
  h3 {
    font-size: 13px;
    font-weight: 600;
  }
  button,
  select,
  input,
  .button {
    font: inherit;
    color: inherit;
    min-height: 28px;
  }
  button,
  .button {
    background: none;
    border: 1px solid transparent;
    border-radius: 4px;
    padding: 2px 8px;
    min-width: 28px;
    cursor: pointer;
  }
  button:hover:not(:disabled),
  .button:hover {
    background: var(--raised);
  }
  button:disabled {
    color: var(--soft);
    opacity: 0.55;
    cursor: default;
  }
  button[aria-pressed='true'] {
    border-color: var(--accent);
    color: var(--accent);
  }
  button.line {
    border-color: var(--line);
  }
  a,
  button.link {
    color: var(--accent);
  }
  button.link {
    text-decoration: underline;
    text-underline-offset: 2px;
    padding: 0 4px;
    margin-left: -4px;
    text-align: left;
  }
  select,
  input:not([type='checkbox'], [type='radio'], [type='range']) {
    background: var(--paper);
    border: 1px solid var(--line);
    border-radius: 4px;
    padding: 2px 6px;
  }
  input[type='checkbox'],
  input[type='radio'],
  input[type='range'] {
    accent-color: var(--accent);
    min-height: 24px;
    min-width: 18px;
  }
  /* browsers give them uneven margins, which leaves them below their words */
  input[type='checkbox'],
  input[type='radio'] {
    margin: 0 2px;
  }
  :focus-visible {
    outline: 2px solid var(--accent);
    outline-offset: 1px;
  }
  :focus:not(:focus-visible) {
    outline: none;
  }
  sub,
  sup {
    font-size: 0.75em;
    line-height: 0;
  }
  .number {
    font-variant-numeric: tabular-nums lining-nums;
    text-align: right;
    white-space: nowrap;
  }
  .soft {
    color: var(--soft);
  }
  .chip {
    display: inline-block;
    width: 10px;
    height: 10px;
    border: 1.5px solid;
    border-radius: 50%;
    flex: none;
  }
  .swatch {
    display: inline-block;
    width: 9px;
    height: 9px;
    border-radius: 2px;
    margin-right: 5px;
    flex: none;
  }
  .hidden-but-spoken {
    position: absolute;
    width: 1px;
    height: 1px;
    overflow: hidden;
    clip-path: inset(50%);
    white-space: nowrap;
  }
  @media (forced-colors: active) {
    .chip,
    .swatch {
      forced-color-adjust: none;
    }
  }
`;
