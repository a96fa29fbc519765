import { css, type CSSResult } from 'lit';

/** The close-up: a wide, tall piece of paper between two rows. */
export const closeUpStyles: CSSResult = css`
  :host {
    margin: 0.5rem 0 1.25rem;
    padding: 0.25rem 1rem 1rem;
    border: solid var(--_rule);
    border-width: 1px 0;
    background: var(--_sheet);
    container-type: inline-size;
  }
  .head {
    display: flex;
    flex-wrap: wrap;
    align-items: center;
    gap: 0 1rem;
  }
  h3 {
    flex: 1 1 auto;
    margin: 0;
    font-size: 1.0625rem;
    font-weight: 400;
  }
  .body {
    display: grid;
    grid-template-columns: minmax(0, 1fr) 15rem;
    gap: 1.5rem;
    align-items: start;
  }
  .sheet {
    position: relative;
    min-width: 0;
    cursor: crosshair;
    user-select: none;
  }
  .cursor {
    position: absolute;
    top: 6px;
    bottom: 28px;
    width: 1px;
    background: var(--_ink);
    pointer-events: none;
  }
  svg.keys {
    position: absolute;
    inset: 0 auto auto 0;
  }
  .touch {
    fill: transparent;
    pointer-events: all;
    touch-action: none;
  }
  .touch.knob-touch {
    cursor: ns-resize;
  }
  .touch.post-touch {
    cursor: ew-resize;
  }
  svg.keys {
    pointer-events: none;
  }
  .knob {
    fill: var(--_sheet);
    stroke: var(--_ink);
    stroke-width: 1.3;
  }
  .knob.here {
    fill: var(--_ink);
  }
  svg text.key {
    text-anchor: middle;
    font-size: 12px;
  }
  svg text.key.here {
    font-weight: 700;
    fill: var(--_ink);
  }
  dl {
    margin: 0.75rem 0 0;
    font-size: 0.9375rem;
    line-height: 1.45;
  }
  dt {
    color: var(--_soft);
    font-style: italic;
  }
  dd {
    margin: 0 0 0.35rem;
  }
  h4 {
    margin: 1rem 0 0;
    font-size: 1.125rem;
    font-weight: 400;
  }
  @container (max-width: 44rem) {
    .body {
      grid-template-columns: minmax(0, 1fr);
      gap: 0;
    }
    dl {
      columns: 2;
    }
  }

  .segment {
    display: flex;
    flex-wrap: wrap;
    gap: 0 1rem;
    align-items: baseline;
    margin-top: 0.5rem;
  }
  .segment select {
    background: var(--_sheet);
  }
  .segment p {
    flex: 1 1 100%;
    margin: 0;
    font-style: italic;
    color: var(--_soft);
  }
`;
