import { css } from 'lit';

export const figureDialogStyles = css`
  dialog {
    width: min(1040px, 96vw);
    max-height: 94vh;
    padding: 18px 20px;
    border: 1px solid var(--hairline);
    border-radius: 8px;
    background: var(--paper);
    color: var(--ink);
    overflow: auto;
  }
  dialog::backdrop {
    background: rgb(20 19 17 / 45%);
  }
  .head {
    display: flex;
    justify-content: space-between;
    align-items: baseline;
  }
  .head h2 {
    font-size: 16px;
    font-weight: 600;
    color: var(--ink);
  }
  .columns {
    display: grid;
    grid-template-columns: minmax(0, 1fr) 300px;
    gap: 22px;
    margin-top: 10px;
  }
  @media (max-width: 720px) {
    .columns {
      grid-template-columns: 1fr;
    }
  }
  .preview {
    display: flex;
    flex-direction: column;
    align-items: center;
    justify-content: center;
    gap: 8px;
    min-height: 260px;
  }
  canvas {
    max-width: 100%;
    max-height: 66vh;
    border: 1px solid var(--hairline);
  }
  canvas.clear {
    background: repeating-conic-gradient(#bdb8ad 0% 25%, #d9d5cb 0% 50%) 0 0 / 16px 16px;
  }
  canvas.clear.dark {
    background: repeating-conic-gradient(#3b3833 0% 25%, #2c2a26 0% 50%) 0 0 / 16px 16px;
  }
  fieldset {
    border: 0;
    margin: 0 0 12px;
    padding: 0;
    min-width: 0;
  }
  legend {
    font-size: 12.5px;
    color: var(--soft);
    padding: 0;
    margin-bottom: 4px;
  }
  .row {
    display: flex;
    flex-wrap: wrap;
    align-items: center;
    gap: 4px 8px;
    margin-bottom: 4px;
  }
  .row select {
    max-width: 100%;
  }
  .row input[type='text'] {
    width: 62px;
    text-align: right;
  }
  .checks {
    display: grid;
    grid-template-columns: 1fr 1fr;
    gap: 0 8px;
  }
  .checks .wide {
    grid-column: 1 / -1;
  }
  label.check {
    display: flex;
    align-items: center;
    gap: 6px;
    min-height: 26px;
  }
  .end {
    display: flex;
    flex-wrap: wrap;
    align-items: center;
    gap: 8px;
    margin-top: 12px;
  }
  .end .main {
    background: var(--accent);
    color: var(--on-accent);
    padding: 2px 14px;
  }
  .end .main:hover:not(:disabled) {
    background: color-mix(in srgb, var(--accent) 88%, var(--ink));
  }
  .end progress {
    width: 150px;
    accent-color: var(--accent);
  }
  .said {
    min-height: 20px;
    font-size: 13px;
  }
  .fault {
    color: var(--error);
  }
`;
