import { css, type CSSResult } from 'lit';
import { pageStyles } from './page-styles.js';

/** How the page lies: one page at a time, two side by side where there is room. */
export const appStyles: CSSResult[] = [
  ...pageStyles,
  css`
    :host {
      --slew-roster-height: max(20rem, calc(100vh - 17rem));
      min-height: 100vh;
      padding: 0.75rem clamp(0.75rem, 2.5vw, 2.5rem) 2rem;
      box-sizing: border-box;
    }
    header {
      display: flex;
      flex-wrap: wrap;
      align-items: baseline;
      gap: 0.25rem 1.75rem;
      border-bottom: 1px solid var(--_rule);
      padding-bottom: 0.25rem;
    }
    nav {
      display: flex;
      flex-wrap: wrap;
      gap: 0 1.25rem;
      flex: 1 1 auto;
    }
    button.word {
      border: 0;
      background: none;
      padding: 0 0.1rem;
      font: inherit;
      color: var(--_soft);
      min-height: 44px;
    }
    button.word[aria-current] {
      color: var(--_ink);
      text-decoration: underline;
      text-decoration-thickness: 2px;
      text-underline-offset: 0.35em;
    }
    .openers {
      display: flex;
      flex-wrap: wrap;
      gap: 0.25rem 0.5rem;
    }
    .notice:empty {
      display: none;
    }
    .notice,
    .kept {
      border-left: 3px double var(--_rule);
      padding-left: 0.75rem;
      margin: 0.75rem 0;
    }
    .kept p {
      margin: 0;
    }
    .files {
      list-style: none;
      padding: 0;
      margin: 0.5rem 0;
    }
    .files li {
      display: flex;
      flex-wrap: wrap;
      align-items: center;
      gap: 0 1rem;
    }
    .files p {
      margin: 0;
    }
    .files li + li {
      border-top: 1px solid var(--_hairline);
      margin-top: 0.25rem;
      padding-top: 0.25rem;
    }
    .welcome {
      display: grid;
      justify-items: start;
      gap: 1rem;
      padding: clamp(1rem, 6vh, 4rem) 0 2rem;
      max-width: 44rem;
    }
    .welcome svg {
      width: 100%;
      height: auto;
      overflow: visible;
    }
    .welcome path,
    .welcome text {
      vector-effect: non-scaling-stroke;
    }
    .welcome h2 {
      font-size: clamp(1.5rem, 4vw, 2.25rem);
      line-height: 1.25;
    }
    .welcome ol {
      margin: 0;
      padding-left: 1.5rem;
      line-height: 1.7;
    }
    .welcome .trace {
      fill: none;
      stroke: var(--_trace);
      stroke-width: 2;
    }
    .welcome .base {
      stroke: var(--_rule);
    }
    .welcome .caret {
      fill: none;
      stroke: var(--_caution);
      stroke-width: 2;
    }
    progress {
      width: 8rem;
      accent-color: var(--_trace);
    }
    main > section {
      display: none;
    }
    main.roster > .roster,
    main.chart > .chart,
    main.docket > .docket,
    main > .welcome {
      display: block;
    }
    .over {
      position: fixed;
      inset: 0;
      display: grid;
      place-items: center;
      margin: 0;
      background: color-mix(in srgb, var(--_paper) 88%, transparent);
      font-size: 1.5rem;
      pointer-events: none;
    }
    footer {
      margin-top: 2rem;
      border-top: 1px solid var(--_hairline);
      color: var(--_soft);
    }
    summary {
      min-height: 44px;
      line-height: 44px;
      cursor: default;
    }
    dl {
      columns: 18rem;
      margin: 0;
    }
    dl div {
      display: flex;
      gap: 0.75rem;
      break-inside: avoid;
    }
    dt {
      min-width: 9.5rem;
      color: var(--_ink);
    }
    dd {
      margin: 0;
    }
    @media (min-width: 100rem) {
      main.roster,
      main.chart {
        display: grid;
        grid-template-columns: minmax(28rem, 1fr) minmax(0, 2fr);
        gap: 2.5rem;
        align-items: start;
      }
      main.roster > .roster,
      main.roster > .chart,
      main.chart > .roster,
      main.chart > .chart {
        display: block;
        min-width: 0;
      }
    }
  `,
];
