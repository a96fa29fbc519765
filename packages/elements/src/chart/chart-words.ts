import { html, nothing, svg, type TemplateResult } from 'lit';
import { peakSpeed, trackName, type ChartData, type OtherMotion } from './chart-data.js';
import type { Motion, Reading } from './motion.js';
import { sayAngle, sayCount, sayRate, saySpan, sayTime } from './quantity.js';
import { tableLines, textTwin } from './text-twin.js';

/** Head of the chart: whose trace it is and how it is played. */
export function chartHead(data: ChartData): TemplateResult {
  return html`<header>
      <h2 title=${data.track}>
        ${trackName(data.track)} <span class="of">in ${data.clip}, ${data.file}</span>
      </h2>
    </header>
    <p class="facts">
      As played: ${data.playback}${data.second ? html`; also ${data.second.name}` : nothing}.
      ${sayCount(data.keys.length, 'key')}, ${saySpan(data.motion.end - data.motion.start)}. Noise floor
      ${sayFloor(data.noiseFloor)}.
    </p>
    ${legend(data)}`;
}

function sample(kind: string): TemplateResult {
  return html`<svg width="34" height="4" aria-hidden="true">
    ${svg`<path class="line ${kind}" d="M1 2H33" />`}
  </svg>`;
}

/** The lines and what they are, by line, not by hue. */
function legend(data: ChartData): TemplateResult | typeof nothing {
  if (!data.before && !data.second) return nothing;
  return html`<p class="legend">
    <span>${sample('trace')}${data.before ? 'after' : data.playback}, ${upTo(data.motion)}</span>
    ${data.before ? html`<span>${sample('before')}${data.before.name}, ${upTo(data.before.motion)}</span>` : nothing}
    ${data.second ? html`<span>${sample('second')}${data.second.name}, ${upTo(data.second.motion)}</span>` : nothing}
  </p>`;
}

function upTo(motion: Motion): string {
  return `up to ${sayRate(peakSpeed(motion).speed)}`;
}

/** Floors so low that nobody minds them need no digits. */
function sayFloor(floor: number): string {
  return floor < 0.001 ? 'below 0.001 deg/s' : sayRate(floor);
}

/** The numbers under the cursor. */
export function readingWords(
  reading: Reading,
  data: ChartData,
  span: readonly [number, number] | undefined,
): TemplateResult {
  return html`<b>${sayTime(reading.time)}</b><b>${sayRate(claimed(reading.speed, data), 4)}</b>
    ${data.rateNames.map((name, i) => html`<span>${name} <i>${sayRate(claimed(reading.own[i], data))}</i></span>`)}
    <span>odometer <i>${sayAngle(reading.odometer, 4)}</i></span>
    ${data.before ? other(data.before, reading.time, data) : nothing}
    ${data.second ? other(data.second, reading.time, data) : nothing}
    ${span ? html`<span>span <i>${sayTime(span[0])} to ${sayTime(span[1])}</i></span>` : nothing}`;
}

function other({ name, motion }: OtherMotion, time: number, data: ChartData): TemplateResult {
  return html`<span>${name} <i>${sayRate(claimed(motion.read(time).speed, data))}</i></span>`;
}

/** Under the noise floor nothing is claimed: it reads 0. */
function claimed(rate: number, { noiseFloor }: ChartData): number {
  return Math.abs(rate) < noiseFloor ? 0 : rate;
}

/** The chart in words; written when somebody opens it. */
export function twinWords(data: ChartData, open: boolean, opened: (open: boolean) => void): TemplateResult {
  return html`<details ?open=${open} @toggle=${(event: Event) => opened(isOpen(event))}>
    <summary>The chart in words</summary>
    ${open ? textTwin(data).map((paragraph) => html`<p>${paragraph}</p>`) : nothing}
  </details>`;
}

function isOpen({ currentTarget }: Event): boolean {
  return currentTarget instanceof HTMLDetailsElement && currentTarget.open;
}

/** The chart as a table, a line a row; written when somebody opens it. */
export function rowTable(
  data: ChartData,
  fold: number,
  open: boolean,
  opened: (open: boolean) => void,
): TemplateResult {
  return html`<details ?open=${open} @toggle=${(event: Event) => opened(isOpen(event))}>
    <summary>The chart as a table</summary>
    ${open ? table(data, fold) : nothing}
  </details>`;
}

function table(data: ChartData, fold: number): TemplateResult {
  return html`<div class="table" tabindex="0" role="region" aria-label="Rows of the chart">
    <table>
      <thead>
        <tr>
          ${['from', 'to', 'greatest speed', 'turned', 'odometer', 'keys'].map(
            (head) => html`<th scope="col">${head}</th>`,
          )}
        </tr>
      </thead>
      <tbody>
        ${tableLines(data, fold).map(
          (line) =>
            html`<tr>
              <th scope="row">${sayTime(line.from)}</th>
              <td>${sayTime(line.to)}</td>
              <td>${sayRate(line.peak, 4)}</td>
              <td>${sayAngle(line.turned, 4)}</td>
              <td>${sayAngle(line.odometer, 4)}</td>
              <td>${line.keys.toLocaleString('en')} keys</td>
            </tr>`,
        )}
      </tbody>
    </table>
  </div>`;
}

const KEYS: readonly (readonly [string, string])[] = [
  ['Left, Right', 'a frame'],
  ['Ctrl+Left, Ctrl+Right', 'previous or next key'],
  ['Home, End', 'ends of the row'],
  ['Up, Down', 'a row'],
  ['Page Up, Page Down', 'previous or next finding'],
  ['Shift', 'widens the span'],
  ['Enter', 'close-up'],
  ['Escape', 'back'],
  ['Space', 'play'],
];

/** The keys, shown on the page. */
export function keyWords(): TemplateResult {
  return html`<p class="keys on-screen" id="keys">
    The trace is drawn up or down where it stands, or by its ring at the cursor; the rust bar draws a limit
    down; the arrow keys do the same on ring and bar, <kbd>+</kbd> and <kbd>−</kbd> widen and narrow a press,
    <kbd>Enter</kbd> takes it and <kbd>Escape</kbd> lets it go. On the trace:
    ${KEYS.map(([key, does], i) => html`${i > 0 ? '; ' : ''}<kbd>${key}</kbd> ${does}`)}.
  </p>`;
}
