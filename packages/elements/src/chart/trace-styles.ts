import { css, type CSSResult } from 'lit';

/** Lines and letters of the trace; shared by the chart and the close-up. */
export const traceStyles: CSSResult = css`
  svg.paper {
    display: block;
    overflow: visible;
    font-family: var(--_prose);
    font-variant-numeric: tabular-nums lining-nums;
    touch-action: pan-y;
  }
  .line {
    fill: none;
    stroke-linejoin: round;
  }
  .line.trace {
    stroke: var(--_trace);
    stroke-width: 1.6;
  }
  .line.before {
    stroke: var(--_trace);
    stroke-width: 1.3;
    stroke-dasharray: 0.1 3.4;
    stroke-linecap: round;
  }
  .line.second {
    stroke: var(--_second);
    stroke-width: 1.3;
    stroke-dasharray: 6 3;
  }
  .ruled {
    stroke: var(--_hairline);
  }
  .baseline,
  .second-mark {
    stroke: var(--_rule);
  }
  .noise {
    fill: var(--_rule);
    opacity: 0.28;
  }
  .limit {
    stroke: var(--_limit);
    stroke-width: 1;
  }
  .hold {
    fill: var(--_ink);
  }
  .post,
  .rail,
  .cut {
    fill: none;
    stroke: var(--_ink);
    stroke-width: 1;
  }
  .rail {
    stroke: var(--_rule);
  }
  .fold {
    fill: none;
    stroke: var(--_rule);
  }
  svg text {
    font-size: 11px;
    fill: var(--_soft);
  }
  text.time,
  text.rail-words {
    text-anchor: middle;
  }
  text.rail-words {
    font-size: 10.5px;
    font-style: italic;
    paint-order: stroke;
    stroke: var(--_paper);
    stroke-width: 6px;
  }
  text.limit-name {
    text-anchor: end;
    fill: var(--_limit);
    paint-order: stroke;
    stroke: var(--_paper);
    stroke-width: 3px;
  }
  text.speed {
    paint-order: stroke;
    stroke: var(--_paper);
    stroke-width: 3px;
  }
  .difference {
    fill: var(--_rule);
    opacity: 0.6;
  }
  .caret {
    cursor: pointer;
  }
  .caret .touch {
    fill: transparent;
  }
  .caret .mark {
    fill: none;
    stroke: var(--_ink);
    stroke-width: 1.6;
    stroke-linejoin: round;
    stroke-linecap: round;
  }
  .span {
    fill: none;
    stroke: var(--_soft);
    stroke-width: 1;
  }
  .span.stamped,
  .span.mended {
    stroke: var(--_rule);
    stroke-dasharray: 1 3;
  }
  .leaves {
    fill: none;
    stroke: var(--_trace);
  }
  text.leaves {
    fill: var(--_ink);
    paint-order: stroke;
    stroke: var(--_paper);
    stroke-width: 3px;
  }
  .caret text {
    fill: var(--_ink);
    font-weight: 600;
  }
  .caret.error .mark {
    fill: var(--_limit);
    stroke: var(--_limit);
  }
  .caret.error text {
    fill: var(--_limit);
  }
  .caret.warning .mark {
    stroke: var(--_caution);
    stroke-width: 2;
  }
  .caret.note .mark {
    fill: var(--_soft);
    stroke: none;
  }
  .caret .struck {
    stroke: var(--_ink);
    stroke-width: 1;
  }
  .caret .ring {
    fill: none;
    stroke: var(--_ink);
    stroke-width: 1.2;
  }
`;
