import { css, type CSSResult } from 'lit';

/** Handles, hatching and price tags, for the chart and its close-up. */
export const handStyles: CSSResult = css`
  svg.over,
  svg.hatching {
    position: absolute;
    inset: 0 auto auto 0;
    pointer-events: none;
  }
  .hatch {
    stroke: var(--_ink);
    stroke-width: 1;
    opacity: 0.55;
  }
  .lent {
    fill: url(#hatch);
  }
  .hand-line {
    fill: none;
    stroke: var(--_ink);
    stroke-width: 1;
    stroke-dasharray: 7 3 1 3;
  }
  svg.over .line.trace {
    stroke-width: 2;
  }
  svg text.lent-words,
  svg text.price {
    paint-order: stroke;
    stroke: var(--_paper);
    stroke-width: 4px;
    fill: var(--_ink);
  }
  svg text.lent-words {
    text-anchor: middle;
    font-style: italic;
    font-size: 12px;
  }
  svg text.price {
    font-size: 13px;
  }
  svg text.price.limit {
    fill: var(--_limit);
  }
  /* While a hand moves, what was is dotted and what will be is drawn over it. */
  .sketched svg.paper:not(.over) .line.trace {
    stroke-width: 1.3;
    stroke-dasharray: 0.1 3.4;
    stroke-linecap: round;
  }
  .grip {
    position: absolute;
    width: 44px;
    height: 44px;
    margin: -22px 0 0 -22px;
    border-radius: 50%;
    touch-action: none;
    cursor: ns-resize;
  }
  .grip::before {
    content: '';
    position: absolute;
    inset: 15px;
    border: 2px solid var(--_trace);
    border-radius: 50%;
    background: var(--_paper);
  }
  .grip:hover::before,
  .grip.at-work::before {
    inset: 13px;
    background: var(--_trace);
    box-shadow: 0 0 0 2px var(--_paper);
  }
  .grip:focus-visible {
    outline-offset: -8px;
  }
  .grip.hold,
  .grip.retime {
    cursor: ew-resize;
  }
  .grip.hold::before,
  .grip.retime::before {
    inset: 12px 19px;
    border: 0;
    border-radius: 2px;
    background: var(--_ink);
  }
  /* The end of a ruled line: a short bar across it. */
  .grip.limit::before {
    inset: 18px 11px 18px 3px;
    border: 0;
    border-radius: 3px;
    background: var(--_limit);
  }
  .hands {
    display: flex;
    flex-wrap: wrap;
    gap: 0 1.25rem;
    align-items: center;
    font-size: 0.9375rem;
  }
  .hands > div {
    display: flex;
    flex-wrap: wrap;
    gap: 0 0.75rem;
    align-items: center;
  }
  .hands .says,
  .hands legend {
    color: var(--_soft);
  }
  .hands fieldset {
    display: flex;
    flex-wrap: wrap;
    align-items: center;
    gap: 0 0.9rem;
    margin: 0;
    padding: 0;
    border: 0;
  }
  .hands legend {
    float: left;
    padding: 0;
  }
  .hands fieldset label {
    min-height: 44px;
    gap: 0.35rem;
    color: var(--_ink);
    cursor: pointer;
  }
  .hands input {
    accent-color: var(--_trace);
    width: 1rem;
    height: 1rem;
    margin: 0;
  }
  @media (pointer: fine) {
    .hands button,
    .hands fieldset label {
      min-height: 32px;
    }
  }
`;
