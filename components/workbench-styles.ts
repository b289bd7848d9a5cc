import { css } from 'lit';

/** Layout of the page: two columns from 900 px on, one below. */
export const workbenchStyles = css`
  :host {
    display: grid;
    grid-template-rows: auto auto minmax(0, 1fr);
    height: 100dvh;
    background: var(--paper);
    position: relative;
  }
  main {
    display: grid;
    grid-template-columns: minmax(0, 1fr) clamp(440px, 50%, 980px);
    min-height: 0;
  }
  main.cleared > :not(.start) {
    visibility: hidden;
  }
  .start {
    position: absolute;
    inset: 30% 20px auto;
    margin: 0 auto;
    max-width: 44ch;
    text-align: center;
    color: var(--soft);
  }
  ellipsite-crystal-view {
    min-width: 0;
    min-height: 0;
  }
  .numbers {
    display: grid;
    grid-template-rows: fit-content(46%) minmax(0, 1fr);
    min-height: 0;
    min-width: 0;
    border-left: 1px solid var(--hairline);
  }
  ellipsite-site-table {
    padding: 12px 0 0 16px;
    min-height: 96px;
  }
  ellipsite-site-card {
    padding: 12px 18px 24px;
    border-top: 1px solid var(--hairline);
  }
  /* drawers take room of their own, below or beside: numbers stay in view while they are changed */
  .drawer {
    height: min(380px, 42dvh);
    overflow: auto;
    overscroll-behavior: contain;
    background: var(--raised);
    border-top: 1px solid var(--line);
  }
  .drawer:focus-visible {
    outline: none;
  }
  .body {
    position: relative;
    min-height: 0;
    display: grid;
    grid-template-rows: minmax(0, 1fr) auto auto;
    grid-template-columns: minmax(0, 1fr);
  }
  ellipsite-source-view {
    height: min(340px, 45dvh);
    border-top: 1px solid var(--line);
  }
  @media (min-width: 1200px) {
    .with-drawer {
      grid-template-columns: minmax(0, 1fr) clamp(340px, 27%, 460px);
    }
    .drawer {
      grid-column: 2;
      grid-row: 1 / span 3;
      height: auto;
      border-top: none;
      border-left: 1px solid var(--line);
    }
  }
  @media (max-width: 899px) {
    :host {
      display: block;
      height: auto;
      min-height: 100dvh;
    }
    .body,
    main,
    .numbers {
      display: block;
    }
    /* grows where its lines of text leave too little for the picture */
    ellipsite-crystal-view {
      min-height: 72vh;
      min-height: 72svh;
    }
    .numbers {
      border-left: none;
    }
    ellipsite-site-table {
      border-top: 1px solid var(--hairline);
      height: 60vh;
      height: 60svh;
      max-height: var(--content-height);
    }
    .drawer,
    ellipsite-source-view {
      position: fixed;
      z-index: 5;
      inset: 0;
    }
    .drawer {
      top: auto;
      height: 45vh;
      height: 45svh;
    }
    .with-drawer main {
      padding-bottom: 45vh;
    }
    ellipsite-source-view {
      height: auto;
      z-index: 6;
    }
  }
`;
