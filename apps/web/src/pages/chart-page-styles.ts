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
`;
