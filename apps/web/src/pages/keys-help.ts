import { html, type TemplateResult } from 'lit';

const KEYS: readonly (readonly [string, string])[] = [
  ['← →', 'a frame back, a frame on'],
  ['Ctrl ← →', 'to the key before, to the next key'],
  ['Home End', 'to the row’s start, to its end'],
  ['↑ ↓', 'a row up, a row down'],
  ['Page Up, Page Down', 'to the finding before, to the next'],
  ['Shift with these', 'widens the span'],
  ['Enter', 'opens the close-up, or what is chosen'],
  ['Escape', 'closes it, or lets go'],
  ['Space', 'plays and stops'],
  ['/', 'finds a track'],
  ['on a handle: arrows', 'press, limit, hold by a step; ten with Shift'],
  ['on a handle: + −', 'a press reaches further, less far'],
  ['on a handle: Enter, Escape', 'takes the edit, lets it go'],
  ['Ctrl Enter', 'applies the sentence'],
  ['Ctrl Z, Ctrl Shift Z', 'undoes, does again'],
  ['Ctrl S', 'saves a mended copy, or over the file once you saved over it'],
  ['Tab', 'to everything else'],
];

/** The keys, always at the foot of the page. */
export function keysHelp(): TemplateResult {
  return html`<footer class="on-screen">
    <details>
      <summary>Keys</summary>
      <dl>
        ${KEYS.map(
          ([key, does]) =>
            html`<div>
              <dt>${key}</dt>
              <dd>${does}</dd>
            </div>`,
        )}
      </dl>
    </details>
  </footer>`;
}
