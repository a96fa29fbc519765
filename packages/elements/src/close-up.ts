import {
  LitElement,
  css,
  html,
  nothing,
  svg,
  type CSSResult,
  type PropertyDeclarations,
  type TemplateResult,
} from 'lit';
import { guard } from 'lit/directives/guard.js';
import { caretsOfRow, numberNotes, spansOfRow } from './chart/carets.js';
import { peakSpeed, type ChartData } from './chart/chart-data.js';
import { TALL_ROW, rowPicture } from './chart/chart-row.js';
import { traceStyles } from './chart/trace-styles.js';
import { moveSpan } from './chart/close-up-span.js';
import type { FoldRow } from './chart/fold.js';
import { keyNumbers, type KeyNumbers } from './chart/key-numbers.js';
import { firstKeyAfter, firstKeyAt, nearestKey } from './chart/posts.js';
import { sayAngle, sayNumber, sayRate, saySpan, sayTime } from './chart/quantity.js';
import { linearScale, logScale, niceStep, type ScaleKind, type SpeedScale } from './chart/scale.js';
import { controls } from './theme/controls.js';
import { shareAcross } from './theme/hold-pointer.js';
import { paper } from './theme/paper.js';

/** Key numbers are written at least this far apart, px. */
const NUMBER_ROOM = 34;

/**
 * Close-up: a few seconds opened between two rows, with one post a key, the speed at each key as a plain knob, and the numbers of
 * the key nearest the cursor beside it.
 *
 * @fires span-moved - `{ span: [number, number] }` seconds
 * @fires time-chosen - `{ time: number }` seconds
 * @fires closed
 */
export class SlewCloseUp extends LitElement {
  static override properties: PropertyDeclarations = {
    data: { attribute: false },
    span: { attribute: false },
    time: { type: Number },
    scale: { type: String },
    chosen: { type: String },
    width: { state: true },
  };
  static override styles: CSSResult[] = [
    paper,
    controls,
    traceStyles,
    css`
      :host {
        margin: 0.5rem 0 1.25rem;
        padding: 0.25rem 1rem 1rem;
        border: solid var(--_rule);
        border-width: 1px 0;
        background: var(--_sheet);
        container-type: inline-size;
      }
      .head {
        display: flex;
        flex-wrap: wrap;
        align-items: center;
        gap: 0 1rem;
      }
      h3 {
        flex: 1 1 auto;
        margin: 0;
        font-size: 1.0625rem;
        font-weight: 400;
      }
      .body {
        display: grid;
        grid-template-columns: minmax(0, 1fr) 15rem;
        gap: 1.5rem;
        align-items: start;
      }
      .sheet {
        position: relative;
        min-width: 0;
        cursor: crosshair;
      }
      .cursor {
        position: absolute;
        top: 6px;
        bottom: 28px;
        width: 1px;
        background: var(--_ink);
        pointer-events: none;
      }
      svg.over {
        position: absolute;
        inset: 0 auto auto 0;
        pointer-events: none;
      }
      .knob {
        fill: var(--_sheet);
        stroke: var(--_ink);
        stroke-width: 1.3;
      }
      .knob.here {
        fill: var(--_ink);
      }
      svg text.key {
        text-anchor: middle;
        font-size: 10px;
      }
      svg text.key.here {
        font-weight: 700;
        fill: var(--_ink);
      }
      dl {
        margin: 0.75rem 0 0;
        font-size: 0.9375rem;
        line-height: 1.45;
      }
      dt {
        color: var(--_soft);
        font-style: italic;
      }
      dd {
        margin: 0 0 0.35rem;
      }
      h4 {
        margin: 1rem 0 0;
        font-size: 1.125rem;
        font-weight: 400;
      }
      @container (max-width: 44rem) {
        .body {
          grid-template-columns: minmax(0, 1fr);
          gap: 0;
        }
        dl {
          columns: 2;
        }
      }
    `,
  ];

  declare data: ChartData | undefined;
  declare span: readonly [number, number] | undefined;
  declare time: number;
  declare scale: ScaleKind | undefined;
  declare chosen: string | undefined;
  declare private width: number;
  private readonly resize = new ResizeObserver(() => this.measure());

  constructor() {
    super();
    this.time = 0;
    this.width = 0;
  }

  override connectedCallback(): void {
    super.connectedCallback();
    this.resize.observe(this);
  }

  override disconnectedCallback(): void {
    super.disconnectedCallback();
    this.resize.disconnect();
  }

  protected override updated(): void {
    this.measure();
  }

  private measure(): void {
    const sheet = this.renderRoot.querySelector('.sheet');
    if (sheet && Math.abs(sheet.clientWidth - this.width) >= 1) this.width = sheet.clientWidth;
  }

  protected override render(): TemplateResult | typeof nothing {
    const { data, span } = this;
    if (!data || !span) return nothing;
    const row: FoldRow = { index: 0, from: span[0], to: span[1] };
    const key = nearestKey(data.keys, this.time);
    const x = ((this.time - row.from) / (row.to - row.from)) * this.width;
    return html`<section aria-label=${`Close-up, ${sayTime(span[0])} to ${sayTime(span[1])}`}>
      <div class="head">
        <h3>Close-up, ${sayTime(span[0], 2)} to ${sayTime(span[1], 2)}</h3>
        ${this.moves()}
      </div>
      <div class="body">
        <div class="sheet" @pointerdown=${(event: PointerEvent) => this.point(event, row)}>
          ${guard([data, span, this.width, this.scale, this.chosen, key], () => this.picture(data, row, key))}
          ${x >= 0 && x <= this.width ? html`<div class="cursor" .style=${`left:${x}px`}></div>` : nothing}
        </div>
        ${key < 0 ? nothing : keyWords(keyNumbers(data, key), data.playback)}
      </div>
    </section>`;
  }

  private moves(): TemplateResult {
    const move = (words: string, share: number, factor?: number): TemplateResult =>
      html`<button class="plain" @click=${() => this.move(share, factor)}>${words}</button>`;
    return html`<div class="on-screen" role="group" aria-label="What the close-up shows">
      ${move('Earlier', -0.5)} ${move('Later', 0.5)} ${move('Closer', 0, 0.5)} ${move('Wider', 0, 2)}
      <button class="plain" @click=${() => this.send('closed', undefined)}>Close</button>
    </div>`;
  }

  private picture(data: ChartData, row: FoldRow, key: number): TemplateResult {
    if (this.width === 0) return html`<svg width="1" height=${TALL_ROW.bottom} aria-hidden="true"></svg>`;
    const scale = this.ownScale(data, row);
    const numbered = numberNotes(data.notes);
    return html`${rowPicture({
      data,
      row,
      scale,
      width: this.width,
      bands: TALL_ROW,
      carets: caretsOfRow(numbered, row, this.width),
      spans: spansOfRow(numbered, row, this.width),
      chosen: this.chosen,
      says: `Keys ${firstKeyAt(data.keys, row.from)} to ${firstKeyAfter(data.keys, row.to) - 1} of the trace`,
    })}
    ${this.knobs(data, row, scale, key)}`;
  }

  /** The close-up's own top: what stands in it, so that slow stretches are seen. */
  private ownScale(data: ChartData, row: FoldRow): SpeedScale {
    const part = (motion: ChartData['motion']): number =>
      peakSpeed(
        { ...motion, start: Math.max(row.from, motion.start), end: Math.min(row.to, motion.end) },
        256,
      ).speed;
    const others = [data.before, data.second].map((other) => (other ? part(other.motion) : 0));
    const all = Math.max(part(data.motion), data.noiseFloor * 4, ...others);
    return this.scale === 'log' ? logScale(all) : linearScale(all);
  }

  private knobs(
    data: ChartData,
    row: FoldRow,
    scale: SpeedScale,
    here: number,
  ): TemplateResult | typeof nothing {
    const first = firstKeyAt(data.keys, row.from);
    const last = firstKeyAfter(data.keys, row.to);
    if ((last - first) * 8 > this.width) return nothing;
    const { base, top, feet, bottom } = TALL_ROW;
    const at = (key: number): number => ((data.keys[key] - row.from) / (row.to - row.from)) * this.width;
    const every = niceStep(Math.max(1, (NUMBER_ROOM * (last - first)) / this.width));
    const keys = Array.from({ length: last - first }, (_, i) => first + i);
    return html`<svg class="paper over" width=${this.width} height=${bottom} aria-hidden="true">
      ${keys.map((key) => {
        const { speed } = data.motion.read(data.keys[key]);
        const mark = key === here ? 'here' : '';
        return svg`<circle class="knob ${mark}" cx=${at(key)} cy=${base - scale.share(speed) * (base - top)} r="3.2" />
          ${key === here || (key % every === 0 && Math.abs(at(key) - at(here)) >= NUMBER_ROOM) ? svg`<text class="key ${mark}" x=${at(key)} y=${feet + 11}>${key}</text>` : nothing}`;
      })}
    </svg>`;
  }

  private point(event: PointerEvent, row: FoldRow): void {
    if (event.button !== 0) return;
    this.send('time-chosen', { time: row.from + shareAcross(event) * (row.to - row.from) });
  }

  private move(share: number, factor?: number): void {
    if (!this.data || !this.span) return;
    this.send('span-moved', { span: moveSpan(this.span, this.data.motion, share, factor, this.time) });
  }

  private send(type: string, detail: unknown): void {
    this.dispatchEvent(new CustomEvent(type, { detail, bubbles: true, composed: true }));
  }
}

function keyWords(numbers: KeyNumbers, playback: string): TemplateResult {
  const { speedIn, speedOut, before, after } = numbers;
  return html`<div>
    <h4>Key ${numbers.key}, ${sayTime(numbers.time)}</h4>
    <dl>
      ${line('orientation', `${sayAngle(numbers.angle, 4)} about ${numbers.axis.map((v) => sayNumber(v)).join(', ')} (parent)`)}
      ${line('as a quaternion x, y, z, w', numbers.orientation.map((v) => sayNumber(v, 5)).join(', '))}
      ${speedIn === undefined ? nothing : line('speed just before', sayRate(speedIn, 4))}
      ${speedOut === undefined ? nothing : line('speed just after', sayRate(speedOut, 4))}
      ${before ? line('from the key before', `${sayAngle(before.angle)} in ${saySpan(before.gap)}`) : nothing}
      ${after ? line('to the key after', `${sayAngle(after.angle)} in ${saySpan(after.gap)}`) : nothing}
      ${line('played', playback)}
    </dl>
  </div>`;
}

function line(term: string, words: string): TemplateResult {
  return html`<div>
    <dt>${term}</dt>
    <dd>${words}</dd>
  </div>`;
}
