import { css, type CSSResult } from 'lit';
import { controls } from '@slewcurve/elements/theme/controls';
import { paper } from '@slewcurve/elements/theme/paper';

/** Paper, ink and buttons for the page around the elements. */
export const pageStyles: CSSResult[] = [
  paper,
  controls,
  css`
    h1,
    h2,
    h3 {
      font-weight: 400;
      text-wrap: balance;
      margin: 0;
    }
    h1 {
      font-size: 1.5rem;
      letter-spacing: 0.01em;
    }
    .empty {
      color: var(--_soft);
      font-style: italic;
      max-width: 40rem;
      padding: 2rem 0;
    }
    .problem {
      color: var(--_limit);
    }
    .caution {
      border-left: 3px double var(--_caution);
      padding-left: 0.75rem;
      max-width: 46rem;
    }
    .doings {
      display: flex;
      flex-wrap: wrap;
      gap: 0.25rem 0.75rem;
      margin: 0.25rem 0;
    }
    .playbacks {
      display: flex;
      flex-wrap: wrap;
      gap: 0 1.25rem;
      align-items: baseline;
      margin: 0.5rem 0;
    }
    label.loop,
    .loops p {
      min-height: 44px;
    }
    .loops summary {
      line-height: 1.4;
      padding: 0.65rem 0;
      box-sizing: border-box;
    }
    .loops ul {
      list-style: none;
      margin: 0;
      padding: 0 0 0 1rem;
    }
    .says {
      color: var(--_soft);
      font-style: italic;
    }
    code {
      font:
        0.875em/1.4 ui-monospace,
        'DejaVu Sans Mono',
        monospace;
      overflow-wrap: anywhere;
    }
    table {
      border-collapse: collapse;
      width: 100%;
      font-size: 0.9375rem;
    }
    th,
    td {
      text-align: left;
      vertical-align: top;
      font-weight: 400;
      padding: 0.2rem 0.75rem 0.2rem 0;
      border-top: 1px solid var(--_hairline);
      overflow-wrap: anywhere;
    }
    th {
      color: var(--_soft);
      border-top: 0;
    }
    .whole {
      white-space: nowrap;
    }
    td:nth-child(2) {
      min-width: 8rem;
    }
    @media screen and (max-width: 40rem) {
      thead {
        display: none;
      }
      tr {
        display: block;
        border-top: 1px solid var(--_hairline);
        padding: 0.35rem 0;
      }
      td {
        display: inline;
        border: 0;
        padding: 0 0.5rem 0 0;
      }
      tr > td:nth-child(4) {
        display: block;
      }
    }
  `,
];
