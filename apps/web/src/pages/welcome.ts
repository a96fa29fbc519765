import { html, type TemplateResult } from 'lit';

// A trace of speed with a pop in it, a row of key posts, and a caret under the place: what the page is about, at a glance.
const TRACE =
  'M0 78C40 78 60 40 110 40S180 70 220 70 290 30 330 30L352 30 352 4 366 4 366 32C400 34 420 74 470 74S560 44 600 44 660 78 700 78';
const POSTS = Array.from({ length: 51 }, (_, i) => `M${i * 14} 86V94`).join('');

/** What an empty page says. */
export function welcome(): TemplateResult {
  return html`<section class="welcome" aria-label="How to begin">
    <svg viewBox="0 0 700 116" aria-hidden="true">
      <path class="base" d="M0 86H700" />
      <path class="base" d=${POSTS} />
      <path class="trace" d=${TRACE} />
      <path class="caret" d="M353 110L359 100" />
    </svg>
    <h2>See how fast it turns, find what pops, mend it.</h2>
    <ol>
      <li>Drop a glTF file (.glb or .gltf) anywhere on this page, open one, or begin with the demo scene.</li>
      <li>
        The roster lists every rotation track, what is wrong at the top; its chart shows the angular speed as
        it will be played.
      </li>
      <li>Each finding offers its remedy. Apply it, and save the mended file.</li>
    </ol>
    <p class="says">Files stay on this machine.</p>
  </section>`;
}
