import { css, type CSSResult } from 'lit';

/** Trace and 3-D view side by side, or one under the other where it is narrow. */
export const chartPageStyles: CSSResult = css`
  :host {
    container: chart-page / inline-size;
  }
  .sheet {
    display: flex;
    flex-direction: column;
  }
  .figure {
    max-width: 24rem;
  }
  summary {
    min-height: 44px;
    line-height: 44px;
    cursor: default;
  }
  @media (width < 40rem) {
    .figure {
      order: -1;
    }
  }
  @media (width >= 40rem) {
    summary {
      display: none;
    }
  }
  @container chart-page (min-width: 56rem) {
    .sheet {
      display: grid;
      grid-template-columns: minmax(0, 1fr) 16rem;
      gap: 1.5rem;
      align-items: start;
    }
    .figure {
      position: sticky;
      top: 0.5rem;
    }
  }
  /* Over the page, at its right, so that nobody loses their place. */
  .explanation {
    position: fixed;
    z-index: 5;
    inset: 1rem 1rem 1rem auto;
    width: min(34rem, 100vw - 4rem);
    overflow-y: auto;
    padding: 0.75rem 1rem 1rem;
    border: 1px solid var(--_ink);
    background: var(--_sheet);
    box-shadow: -6px 0 0 -5px var(--_rule);
  }
  .explanation h2 {
    font-size: 1.25rem;
    font-weight: 400;
    margin: 0;
  }
  .explanation h3 {
    font-size: 1rem;
    font-style: italic;
    color: var(--_soft);
    margin: 0.75rem 0 0;
  }
  .explanation p {
    margin: 0.15rem 0;
  }
`;
