import { css, type CSSResult } from 'lit';

/** Buttons, choices and fields: words on paper, ruled underneath, 44 px high for fingers. */
export const controls: CSSResult = css`
  button,
  select,
  input {
    font: inherit;
    color: inherit;
    font-variant-numeric: inherit;
  }
  button {
    min-height: 44px;
    min-width: 44px;
    padding: 0 0.75rem;
    border: 1px solid var(--_rule);
    border-radius: 3px;
    background: var(--_sheet);
    font-size: 0.9375rem;
    line-height: 1.2;
    cursor: pointer;
  }
  button:hover:not(:disabled) {
    border-color: var(--_ink);
  }
  button:disabled {
    border-style: dotted;
    color: var(--_soft);
    cursor: default;
  }
  button.plain {
    border-color: transparent;
    background: none;
    text-decoration: underline;
    text-decoration-thickness: 1px;
    text-underline-offset: 0.2em;
    text-decoration-color: var(--_rule);
    padding: 0 0.25rem;
  }
  button.plain:hover:not(:disabled) {
    text-decoration-color: currentColor;
    text-decoration-thickness: 2px;
  }
  button.plain:disabled {
    text-decoration: none;
  }
  button.main {
    border-color: var(--_ink);
    background: var(--_ink);
    color: var(--_paper);
  }
  button.main:disabled {
    border-color: var(--_rule);
    background: none;
    color: var(--_soft);
  }
  @media (forced-colors: active) {
    /* Else the words get a backing of their own. */
    button.main {
      forced-color-adjust: none;
    }
  }
  select,
  input:not([type='range'], [type='radio'], [type='checkbox']) {
    min-height: 44px;
    padding: 0 0.25rem;
    border: 0;
    border-bottom: 1px solid var(--_rule);
    border-radius: 0;
    background: transparent;
    font-size: 0.9375rem;
  }
  select {
    background: var(--_paper);
  }
  label {
    display: inline-flex;
    align-items: center;
    gap: 0.5rem;
    color: var(--_soft);
    font-size: 0.9375rem;
  }
  label > select,
  label > input {
    color: var(--_ink);
  }
  input[type='range'] {
    min-height: 44px;
    accent-color: var(--_trace);
  }
  :focus-visible {
    outline: 2px solid var(--_ink);
    outline-offset: 2px;
  }
`;
