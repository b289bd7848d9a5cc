import { css } from 'lit';

/** The panel of found tensors: groups one below the other, each with its ways to be read. */
export const foundStyles = css`
  h3 {
    overflow-wrap: anywhere;
  }
  /* what stands in details does not inherit it */
  details,
  details * {
    box-sizing: border-box;
  }
  .soft,
  dd,
  td,
  th {
    font-size: 13px;
  }
  .group {
    border-top: 1px solid var(--hairline);
    padding: 4px 0;
  }
  .group.aside > summary {
    color: var(--soft);
  }
  summary {
    display: flex;
    flex-wrap: wrap;
    align-items: baseline;
    gap: 2px 8px;
    min-height: 28px;
    cursor: pointer;
    list-style: none;
  }
  summary::before {
    content: '▸';
    color: var(--soft);
  }
  details[open] > summary::before {
    content: '▾';
  }
  .letter {
    border-left: 4px solid;
    padding-left: 4px;
    font-weight: 600;
  }
  .fate {
    border: 1px solid var(--hairline);
    border-radius: 8px;
    padding: 0 7px;
    font-size: 12.5px;
    color: var(--soft);
    margin-left: auto;
  }
  .fate.taken {
    border-color: var(--accent);
    color: var(--accent);
  }
  .fate.asks {
    border-color: var(--warning);
    color: var(--warning);
    font-weight: 600;
  }
  .body {
    padding: 0 0 8px 12px;
  }
  .evidence {
    margin: 2px 0 6px;
    padding: 0;
    list-style: none;
    color: var(--soft);
    font-size: 13px;
    overflow-wrap: anywhere;
  }
  .question {
    border-left: 2px solid var(--warning);
    padding-left: 10px;
    margin: 6px 0 8px;
  }
  .scroll {
    overflow-x: auto;
  }
  table {
    border-collapse: collapse;
  }
  th {
    text-align: left;
    font-weight: 400;
    color: var(--soft);
    padding: 1px 10px 1px 0;
    white-space: nowrap;
  }
  td {
    padding: 0 10px 0 0;
    white-space: nowrap;
  }
  td button {
    white-space: nowrap;
    margin: 1px 0;
  }
  td.proofs {
    white-space: normal;
    min-width: 12ch;
  }
  tr.selected td {
    background: var(--lit);
  }
  .ways {
    display: grid;
    grid-template-columns: max-content minmax(0, 1fr) max-content minmax(0, 1fr);
    gap: 4px 8px;
    align-items: center;
    margin: 4px 0 6px;
  }
  .ways select {
    width: 100%;
    font-size: 13px;
  }
  .ways label,
  .take {
    font-size: 13px;
  }
  .take {
    display: inline-flex;
    align-items: center;
    gap: 4px;
    min-height: 28px;
  }
  @media (max-width: 420px) {
    .ways {
      grid-template-columns: max-content minmax(0, 1fr);
    }
  }
`;
