import { css } from 'lit';

/** What all drawers share: raised paper, a heading with a way to close. */
export const drawerStyles = css`
  :host {
    display: block;
    background: var(--raised);
    padding: 14px 18px 18px;
  }
  header {
    display: flex;
    align-items: baseline;
    justify-content: space-between;
    gap: 12px;
    margin-bottom: 6px;
  }
  h2 {
    font-size: 14px;
    font-weight: 600;
    color: var(--ink);
  }
  h3 {
    margin: 16px 0 4px;
  }
  .commands {
    display: flex;
    flex-wrap: wrap;
    gap: 8px;
    margin: 8px 0 6px;
  }
  button:hover:not(:disabled) {
    background: var(--paper);
  }
`;
