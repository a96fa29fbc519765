import { css, type CSSResult } from 'lit';

export const rosterStyles: CSSResult = css`
  :host {
    container-type: inline-size;
  }
  .tools {
    display: flex;
    flex-wrap: wrap;
    align-items: center;
    gap: 0 1.25rem;
  }
  .tools input {
    width: 14rem;
  }
  .tally {
    margin: 0.25rem 0 0.5rem;
    color: var(--_soft);
    font-size: 0.9375rem;
  }
  .events ul {
    list-style: none;
    margin: 0 0 0.25rem;
    padding: 0 0.5rem;
    max-height: 14rem;
    overflow-y: auto;
    font-size: 0.9375rem;
  }
  .events li.error > span {
    color: var(--_limit);
    font-weight: 600;
  }
  .events .tracks {
    display: flex;
    flex-wrap: wrap;
    max-height: none;
  }
  @media (pointer: fine) {
    .events button {
      min-height: 28px;
    }
  }
  .heads,
  .gauge,
  .option {
    display: grid;
    grid-template-columns: minmax(10rem, 1.4fr) minmax(0, 4fr) 14.5rem 6.5rem 4rem;
    column-gap: 0.875rem;
    align-items: center;
  }
  .heads {
    color: var(--_soft);
    font-size: 0.8125rem;
    font-style: italic;
    border-bottom: 1px solid var(--_rule);
    padding: 0 0.5rem 0.25rem;
  }
  .heads :nth-child(n + 4),
  .option > .number {
    text-align: right;
  }
  .scroll {
    position: relative;
    overflow-y: auto;
    overscroll-behavior: contain;
    max-height: var(--slew-roster-height, min(70vh, 960px));
  }
  .list {
    position: relative;
  }
  canvas {
    position: absolute;
    pointer-events: none;
  }
  .gauge,
  .option {
    position: absolute;
    left: 0;
    right: 0;
    padding: 0 0.5rem;
    box-sizing: border-box;
  }
  .option {
    cursor: pointer;
    font-size: 0.875rem;
    line-height: 1;
    white-space: nowrap;
  }
  .gauge {
    visibility: hidden;
  }
  .close .option {
    font-size: 0.6875rem;
  }
  .option > :not(.unseen) {
    overflow: hidden;
    text-overflow: ellipsis;
    line-height: 1.25;
  }
  .option .of {
    color: var(--_soft);
    font-style: italic;
  }
  .option .found {
    color: var(--_soft);
  }
  .option.error .found {
    color: var(--_limit);
    font-weight: 600;
  }
  .option.warning .found {
    color: var(--_ink);
  }
  .option:hover {
    background: color-mix(in srgb, var(--_ink) 5%, transparent);
  }
  .option.active {
    box-shadow: inset 3px 0 0 var(--_rule);
  }
  /* Outside it would be cut off by the edge of what it stands in. */
  .scroll:focus-visible {
    outline-offset: -2px;
  }
  .scroll:focus-visible .option.active {
    box-shadow:
      inset 3px 0 0 var(--_ink),
      inset 0 0 0 1px var(--_ink);
  }
  .option[aria-selected='true'] .name {
    text-decoration: underline;
    text-underline-offset: 0.2em;
    font-weight: 600;
  }
  .empty b {
    color: var(--_ink);
  }
  .empty {
    max-width: 46rem;
    font-size: 1.125rem;
    font-style: italic;
    color: var(--_soft);
    padding: 2rem 0;
  }
  @container (max-width: 56rem) {
    .heads,
    .gauge,
    .option {
      grid-template-columns: minmax(0, 1.2fr) minmax(0, 2fr) 9.25rem;
    }
    .heads > :nth-child(n + 4),
    .option > .number {
      display: none;
    }
  }
  @container (max-width: 32rem) {
    .heads {
      display: none;
    }
    .gauge,
    .option {
      grid-template-columns: minmax(55%, 1fr) minmax(0, auto);
      grid-template-rows: 1fr 1fr;
    }
    .ink {
      grid-column: 1 / -1;
      grid-row: 2;
    }
    .tools label {
      flex: 1 1 100%;
    }
    .tools input {
      flex: 1;
      width: auto;
      min-width: 0;
    }
  }
  @media print {
    .scroll {
      max-height: none;
      overflow: visible;
    }
  }
`;
