import { css, type CSSResult } from 'lit';

/** The page of the chart: time at the left, paper, odometer, margin. */
export const chartStyles: CSSResult = css`
  :host {
    container-type: inline-size;
    overflow-x: clip;
    padding: 0.25rem 0 1rem;
  }
  header {
    display: flex;
    flex-wrap: wrap;
    align-items: baseline;
    gap: 0 1.5rem;
  }
  h2 {
    margin: 0;
    font-size: 1.5rem;
    font-weight: 400;
    line-height: 1.3;
  }
  h2 .of {
    color: var(--_soft);
    font-style: italic;
    font-size: 1.0625rem;
  }
  .facts,
  .legend {
    margin: 0;
    color: var(--_soft);
    font-size: 0.9375rem;
  }
  .legend span {
    white-space: nowrap;
    margin-right: 1rem;
  }
  .legend svg {
    vertical-align: 0.25em;
    margin-right: 0.4em;
  }
  .choices {
    display: flex;
    flex-wrap: wrap;
    gap: 0 1.25rem;
    align-items: center;
  }
  .readout {
    position: sticky;
    top: 0;
    z-index: 2;
    display: flex;
    flex-wrap: wrap;
    gap: 0 1.4rem;
    align-items: baseline;
    padding: 0.5rem 0;
    margin-bottom: 0.25rem;
    background: var(--_paper);
    border-bottom: 1px solid var(--_rule);
    min-height: 28px;
    cursor: default;
  }
  .readout b {
    font-weight: 400;
    font-size: 1.25rem;
  }
  .readout span {
    color: var(--_soft);
    font-size: 0.9375rem;
    white-space: nowrap;
  }
  .readout i {
    font-style: normal;
    color: var(--_ink);
  }
  ol {
    list-style: none;
    margin: 0;
    padding: 0;
  }
  .rows {
    position: relative;
  }
  .rows::before {
    content: '';
    position: absolute;
    top: 0.5rem;
    bottom: 0;
    right: 16.5rem;
    border-left: 1px solid var(--_hairline);
  }
  .row,
  .heads {
    position: relative;
    display: grid;
    grid-template-columns: 3.75rem minmax(0, 1fr) 4.5rem 16.5rem;
    column-gap: 0.75rem;
    align-items: start;
  }
  .heads {
    color: var(--_soft);
    font-style: italic;
    font-size: 0.8125rem;
    padding-top: 0.25rem;
  }
  .heads :first-child {
    text-align: right;
  }
  .heads :last-child {
    padding-left: 0.875rem;
  }
  .row > .from,
  .row > .carried {
    padding-top: 108px;
    font-size: 0.875rem;
    line-height: 1;
    color: var(--_soft);
    text-align: right;
    white-space: nowrap;
  }
  .row > .carried {
    text-align: left;
    color: var(--_ink);
  }
  .sheet {
    position: relative;
    min-width: 0;
    cursor: crosshair;
    user-select: none;
  }
  .cursor {
    position: absolute;
    top: 2px;
    bottom: 24px;
    width: 1px;
    background: var(--_ink);
    pointer-events: none;
  }
  .cursor.carried {
    opacity: 0.18;
  }
  .chosen-span {
    position: absolute;
    top: 14px;
    bottom: 42px;
    border: solid var(--_ink);
    border-width: 0 1px;
    background: repeating-linear-gradient(
      135deg,
      transparent 0 5px,
      color-mix(in srgb, var(--_ink) 14%, transparent) 5px 6px
    );
    pointer-events: none;
  }
  .notes {
    position: absolute;
    /* Notes may hang down over the rows below. */
    z-index: 1;
    top: 0;
    right: 0;
    width: 16.5rem;
    padding: 14px 0 0 0.875rem;
    box-sizing: border-box;
    font-size: 0.9375rem;
    line-height: 1.38;
  }
  .notes li {
    position: relative;
    padding-left: 1.5rem;
    margin-bottom: 0.25rem;
  }
  .notes li > .number {
    position: absolute;
    left: 0;
    font-size: 0.8125rem;
    font-weight: 600;
  }
  .notes li[data-level='error'] > .number {
    color: var(--_limit);
  }
  .notes li.chosen {
    box-shadow: -0.875rem 0 0 -0.75rem var(--_ink);
  }
  .notes li.chosen .message {
    text-decoration: underline;
    text-decoration-thickness: 1px;
    text-underline-offset: 0.2em;
  }
  .notes .message {
    margin: 0;
  }
  .notes .level {
    font-style: italic;
    color: var(--_soft);
  }
  .notes .whole {
    white-space: nowrap;
  }
  .notes li.stamped .message {
    text-decoration: line-through;
  }
  .notes .more {
    display: block;
    color: var(--_soft);
  }
  .notes .remedy {
    margin: 0;
    color: var(--_soft);
    font-style: italic;
  }
  /* What is scrolled to must not stand under the numbers that stay at the top. */
  .sheet,
  .notes button {
    scroll-margin-top: 6rem;
  }
  .notes button {
    display: block;
    margin-left: -0.25rem;
    text-align: left;
  }
  .notes a.rule {
    color: inherit;
    text-decoration: underline dotted 1px;
    text-underline-offset: 0.2em;
  }
  @media (pointer: fine) {
    .notes button {
      min-height: 28px;
    }
  }
  .between {
    grid-column: 1 / 4;
  }
  details {
    margin-top: 1rem;
    max-width: 60rem;
  }
  summary {
    min-height: 44px;
    line-height: 44px;
    cursor: pointer;
  }
  .table {
    overflow-x: auto;
  }
  table {
    border-collapse: collapse;
    font-size: 0.9375rem;
  }
  th,
  td {
    padding: 0.25rem 0.9rem;
    text-align: right;
    border-bottom: 1px solid var(--_hairline);
    font-weight: 400;
    white-space: nowrap;
  }
  thead th {
    color: var(--_soft);
    font-style: italic;
  }
  .keys {
    color: var(--_soft);
    font-size: 0.875rem;
    max-width: 60rem;
  }
  kbd {
    font: inherit;
    color: var(--_ink);
    border-bottom: 1px solid var(--_rule);
  }
  .empty {
    font-size: 1.125rem;
    font-style: italic;
    color: var(--_soft);
    padding: 2rem 0;
  }
  :host(:focus-within) .row.here .sheet {
    box-shadow: -5px 0 0 -2px var(--_ink);
  }
  @container (max-width: 48rem) {
    .heads,
    .rows::before {
      display: none;
    }
    .row {
      grid-template-columns: minmax(0, 1fr) auto;
      row-gap: 0;
      border-top: 1px solid var(--_hairline);
      padding-top: 0.25rem;
    }
    .row > .from,
    .row > .carried {
      padding-top: 0;
      grid-row: 1;
      text-align: left;
    }
    .row > .carried {
      text-align: right;
      grid-column: 2;
    }
    .row > .sheet,
    .row > .notes,
    .between {
      grid-column: 1 / -1;
    }
    .row > .notes {
      position: static;
      width: auto;
      padding: 0 0 0.75rem;
    }
    h2 {
      font-size: 1.25rem;
    }
  }
  @media print {
    details:not([open]) {
      display: none;
    }
    .row {
      break-inside: avoid;
    }
    .readout {
      position: static;
    }
  }
`;
