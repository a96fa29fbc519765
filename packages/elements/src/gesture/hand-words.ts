import { html, type TemplateResult } from 'lit';
import type { HandName } from './chart-hands.js';
import type { Ground } from './hand.js';

const LAWS: readonly (readonly [Ground['ends'], string])[] = [
  ['same', 'same ends'],
  ['run', 'let time run'],
  ['go', 'let angle go'],
];

const HANDS: readonly (readonly [HandName, string])[] = [
  ['press', 'Press the speed'],
  ['hold', 'Put a hold'],
  ['limit', 'Lower a limit'],
  ['draw', 'Draw the speed'],
];

/** What can be done by hand at the cursor, in words, and the law that a press keeps to. */
export function handWords(
  ends: Ground['ends'],
  events: { begin(name: HandName): void; ends(law: Ground['ends']): void },
): TemplateResult {
  return html`<div class="hands on-screen">
    <div role="group" aria-label="By hand, at the cursor">
      <span class="says">By hand:</span>
      ${HANDS.map(
        ([name, says]) => html`<button class="plain" @click=${() => events.begin(name)}>${says}</button>`,
      )}
    </div>
    <fieldset>
      <legend>A press keeps to</legend>
      ${LAWS.map(
        ([law, says]) =>
          html`<label
            ><input
              type="radio"
              name="law"
              value=${law}
              .checked=${law === ends}
              @change=${() => events.ends(law)}
            />${says}</label
          >`,
      )}
    </fieldset>
  </div>`;
}
