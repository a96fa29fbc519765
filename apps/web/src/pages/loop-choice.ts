import { html, nothing, type TemplateResult } from 'lit';
import { sayLoopGuess, type ClipReport } from '@slewcurve/job';
import type { FileWork } from '../session/file-work.js';

/** The switch of one clip, off until somebody says so; where the clip looks like a loop, that is asked. */
export function loopChoice(
  file: FileWork,
  clip: string,
  byRules: boolean,
  setLoop: (clip: string, on: boolean) => void,
): TemplateResult {
  const report = file.report?.clips.find((other) => other.clip === clip);
  const on = byRules || file.loops.includes(clip);
  return html`<label class="loop"
      ><input
        type="checkbox"
        .checked=${on}
        ?disabled=${byRules && !file.loops.includes(clip)}
        @change=${({ target }: Event) => target instanceof HTMLInputElement && setLoop(clip, target.checked)}
      />
      ${clip} plays as a loop${byRules && !file.loops.includes(clip) ? ', as the house rules say' : ''}</label
    >${on ? nothing : loopOffer(report, setLoop)}`;
}

/** "Walk ends where it starts in 38 of 40 moving tracks: does it loop?": asked, never assumed. */
function loopOffer(
  report: ClipReport | undefined,
  setLoop: (clip: string, on: boolean) => void,
): TemplateResult | typeof nothing {
  const guess = report && sayLoopGuess(report);
  if (report === undefined || guess === undefined) return nothing;
  return html`<span class="offer"
    >${guess}: does it loop?
    <button class="plain on-screen" @click=${() => setLoop(report.clip, true)}>
      ${report.clip} loops<span class="unseen">: look at its seam</span>
    </button></span
  >`;
}

/** The clips of a file that look like loops and are not said to be, under one line. */
export function loopOffers(
  file: FileWork,
  setLoop: (clip: string, on: boolean) => void,
): TemplateResult | typeof nothing {
  const asked = (file.report?.clips ?? []).filter(
    ({ clip, loopGuess }) => loopGuess !== undefined && !file.loops.includes(clip),
  );
  const [only] = asked;
  if (!only) return nothing;
  if (asked.length === 1) return html`<p class="loops">${loopOffer(only, setLoop)}</p>`;
  return html`<details class="loops">
    <summary>${asked.length.toLocaleString('en')} clips end where they start: do they loop?</summary>
    <ul>
      ${asked.map((clip) => html`<li>${loopOffer(clip, setLoop)}</li>`)}
    </ul>
  </details>`;
}
