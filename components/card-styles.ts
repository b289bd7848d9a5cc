import { css } from 'lit';

/** Look of the site card: headings, hairlines, tables of numbers. */
export const cardStyles = css`
  :host {
    display: block;
    overflow: auto;
    min-width: 0;
  }
  .title {
    display: flex;
    flex-wrap: wrap;
    align-items: center;
    gap: 7px;
    font-size: 14px;
  }
  .title strong {
    color: var(--ink);
    font-size: 15px;
  }
  h3 {
    margin: 16px 0 4px;
  }
  section {
    display: flex;
    flex-direction: column;
    gap: 8px;
    align-items: flex-start;
  }
  section h3 {
    margin-bottom: -4px;
  }
  .facts {
    display: grid;
    grid-template-columns: fit-content(40%) minmax(0, 1fr);
    gap: 2px 14px;
    margin: 6px 0 0;
    font-variant-numeric: tabular-nums lining-nums;
  }
  .facts dt {
    color: var(--soft);
  }
  .facts dd {
    margin: 0;
  }
  .hint {
    margin-top: 14px;
  }
  .scroll {
    overflow-x: auto;
    max-width: 100%;
  }
  table {
    border-collapse: collapse;
  }
  th {
    font-weight: 400;
    text-align: left;
  }
  thead th {
    color: var(--soft);
    font-size: 12.5px;
    padding: 2px 0 3px 14px;
    border-bottom: 1px solid var(--hairline);
  }
  thead th:first-child {
    padding-left: 0;
  }
  thead th.number {
    text-align: right;
  }
  .conventions td,
  .axes td {
    padding: 2px 0 2px 14px;
  }
  .conventions td,
  .conventions tbody th {
    vertical-align: baseline;
  }
  .conventions tbody th,
  .axes tbody th {
    padding: 2px 4px 2px 0;
    white-space: nowrap;
  }
  .conventions .group th {
    padding-top: 7px;
    color: var(--soft);
    font-size: 12.5px;
    white-space: normal;
  }
  .words,
  .definition {
    color: var(--soft);
    font-size: 12.5px;
  }
  .conventions td.words {
    padding-left: 8px;
    max-width: 24ch;
  }
  .conventions td.definition {
    padding-left: 18px;
    min-width: 17ch;
  }
  summary {
    cursor: pointer;
    line-height: 24px;
  }
  summary::marker {
    color: var(--line);
  }
  details p {
    padding: 0 0 3px 14px;
    max-width: 52ch;
    color: var(--ink);
  }
  caption {
    text-align: left;
    color: var(--soft);
    font-size: 12.5px;
    padding-bottom: 2px;
  }
  .undefined {
    font-style: italic;
    color: var(--soft);
  }
  .reason {
    border-left: 2px solid var(--accent);
    padding: 2px 0 2px 10px;
    font-size: 13px;
  }
  pre {
    margin: -4px 0 0;
    max-width: 100%;
    white-space: pre-wrap;
    overflow-wrap: anywhere;
    font:
      12px/18px ui-monospace,
      'Cascadia Mono',
      'DejaVu Sans Mono',
      monospace;
    background: var(--raised);
    padding: 4px 8px;
  }
  /* no room for a column of definitions: each goes below its number */
  @media (max-width: 560px) {
    .conventions,
    .conventions thead,
    .conventions tbody {
      display: block;
    }
    .conventions tr:not(.group) {
      display: flex;
      flex-wrap: wrap;
      align-items: baseline;
    }
    .conventions thead th:first-child {
      flex: 1;
    }
    .conventions thead th:last-child {
      display: none;
    }
    .conventions td.words {
      flex: 1;
      max-width: none;
    }
    .conventions .number {
      flex: 0 0 10ch;
    }
    /* a reason is a sentence: name and reason each have a line of their own below the term */
    .noise {
      grid-template-columns: minmax(0, 1fr);
    }
    .noise dd {
      padding: 0 0 6px 14px;
    }
    .conventions td.definition {
      flex-basis: 100%;
      padding: 0 0 4px;
    }
  }
`;
