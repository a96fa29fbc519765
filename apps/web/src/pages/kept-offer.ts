import { html, nothing, type TemplateResult } from 'lit';
import type { SavedWork } from '../session/recovery.js';

/** Work that somebody would miss: edits, what was accepted, loops that were declared. */
export function isWorthKeeping({ lines, stamps = [], loops = [] }: SavedWork): boolean {
  return lines.length + stamps.length + loops.length > 0;
}

/** Work that an earlier visit left, to be taken up or left. */
export function keptOffer(
  kept: readonly SavedWork[],
  doings: { readonly resume: () => void; readonly leave: () => void },
): TemplateResult | typeof nothing {
  if (kept.length === 0) return nothing;
  const names = kept.map((work) => work.name).join(', ');
  return html`<aside class="kept" aria-label="Work that was left">
    <p>An earlier visit left ${leftWords(kept)} on ${names}.</p>
    <p class="doings">
      <button class="main" @click=${doings.resume}>Go on with it</button
      ><button @click=${doings.leave}>Leave it</button>
    </p>
  </aside>`;
}

function leftWords(kept: readonly SavedWork[]): string {
  const count = (of: (work: SavedWork) => number): number => kept.reduce((sum, work) => sum + of(work), 0);
  const parts = [
    [count(({ lines }) => lines.length), 'edit'],
    [count(({ stamps = [] }) => stamps.length), 'accepted place'],
    [count(({ loops = [] }) => loops.length), 'loop'],
  ] as const;
  return parts
    .flatMap(([number, what]) => (number > 0 ? [`${number} ${what}${number === 1 ? '' : 's'}`] : []))
    .join(', ');
}
