import { LitElement, html, type TemplateResult } from 'lit';

/** The chart of one track. */
export class SlewChart extends LitElement {
  override render(): TemplateResult {
    return html`<p>No track is open.</p>`;
  }
}
