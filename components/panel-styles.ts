import { css } from 'lit';

/** The small panels that open from the picture's tools. */
export const panelStyles = css`
  :host {
    display: block;
    background: var(--raised);
    padding: 4px 14px 12px;
    font-size: 13px;
  }
  fieldset {
    border: none;
    margin: 0 0 8px;
    padding: 0;
    min-width: 0;
  }
  legend,
  h3 {
    color: var(--soft);
    font-size: 13px;
    font-weight: 400;
    padding: 0;
    margin: 0;
  }
  .choice {
    display: grid;
    grid-template-columns: 92px minmax(0, 1fr);
    margin-bottom: 2px;
  }
  .choice select {
    width: 100%;
  }
  .row {
    display: flex;
    flex-wrap: wrap;
    align-items: center;
    gap: 4px 10px;
    min-height: 28px;
  }
  fieldset > * + .row,
  .row + .note {
    margin-top: 4px;
  }
  label {
    display: inline-flex;
    align-items: center;
    gap: 5px;
    min-height: 26px;
  }
  input[type='text'] {
    width: 8ch;
    text-align: right;
  }
  input[type='text'].words {
    width: 15ch;
    text-align: left;
  }
  /* a field for words takes what its button leaves */
  form.row label:has(.words) {
    flex: 1 1 0;
    min-width: min-content;
  }
  form.row label .words {
    flex: 1 1 0;
    min-width: 8ch;
  }
  select {
    font-size: 13px;
    max-width: 100%;
  }
  button:hover:not(:disabled) {
    background: var(--paper);
  }
  button {
    font-size: 13px;
  }
  ol,
  ul {
    list-style: none;
    margin: 0;
    padding: 0;
  }
  .note {
    color: var(--soft);
    max-width: 46ch;
  }
  .fault {
    color: var(--error);
    max-width: 46ch;
  }
`;
