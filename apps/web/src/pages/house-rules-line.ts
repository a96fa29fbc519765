import { html, nothing, type TemplateResult } from 'lit';

/** By which house rules a file is surveyed; `leave` puts them away, where that can be. */
export function houseRulesLine(
  name: string | undefined,
  leave: (() => void) | undefined,
): TemplateResult | typeof nothing {
  if (name === undefined) return nothing;
  return html`<p class="read-by">
    house rules: ${name}
    ${leave ? html`<button class="plain on-screen" @click=${leave}>Put the house rules away</button>` : nothing}
  </p>`;
}
