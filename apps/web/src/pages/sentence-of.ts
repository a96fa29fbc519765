import { html, type TemplateResult } from 'lit';
import type { SentenceAtHand } from '../session/sentence-at-hand.js';

/** What can be done with a sentence on the page. */
export interface SentenceDoings {
  rewrite(text: string): void;
  apply(): void;
  leave(): void;
}

/** The sentence at hand, between the rows of the chart. */
export function sentenceOf(
  { text, price, problem }: SentenceAtHand,
  row: number,
  busy: boolean,
  doings: SentenceDoings,
): TemplateResult {
  return html`<slew-sentence
    slot=${`row-${row}`}
    .text=${text}
    .price=${price}
    .problem=${problem}
    .busy=${busy}
    @sentence-changed=${(event: CustomEvent<{ text: string }>) => doings.rewrite(event.detail.text)}
    @apply-asked=${() => doings.apply()}
    @left-alone=${() => doings.leave()}
  ></slew-sentence>`;
}
