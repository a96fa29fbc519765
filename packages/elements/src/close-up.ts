import {
  LitElement,
  html,
  nothing,
  svg,
  type CSSResult,
  type PropertyDeclarations,
  type PropertyValues,
  type TemplateResult,
} from 'lit';
import { guard } from 'lit/directives/guard.js';
import { caretsOfRow, numberNotes, spansOfRow } from './chart/carets.js';
import { peakSpeed, type ChartData } from './chart/chart-data.js';
import { TALL_ROW, rowPicture } from './chart/chart-row.js';
import { traceStyles } from './chart/trace-styles.js';
import { moveSpan } from './chart/close-up-span.js';
import { closeUpStyles } from './chart/close-up-styles.js';
import type { FoldRow } from './chart/fold.js';
import { keyNumbers } from './chart/key-numbers.js';
import { keyWords } from './chart/key-words.js';
import { firstKeyAfter, firstKeyAt, nearestKey } from './chart/posts.js';
import { sayTime } from './chart/quantity.js';
import { linearScale, logScale, niceStep, type ScaleKind, type SpeedScale } from './chart/scale.js';
import { segmentWords } from './chart/segment-words.js';
import { SheetPointer } from './chart/sheet-pointer.js';
import type { ChartHands } from './gesture/chart-hands.js';
import { hatching } from './gesture/hand-picture.js';
import { handStyles } from './gesture/hand-styles.js';
import type { Hand } from './gesture/hand.js';
import { placeAt, type Paper } from './gesture/paper-place.js';
import { controls } from './theme/controls.js';
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
 * @fires edit-chosen - `{ edit: HandEdit }` the segment is to be played otherwise
 */
export class SlewCloseUp extends LitElement {
  static override properties: PropertyDeclarations = {
    data: { attribute: false },
    span: { attribute: false },
    time: { type: Number },
    scale: { type: String },
    chosen: { type: String },
    hands: { attribute: false },
    hand: { attribute: false },
    ease: { state: true },
    width: { state: true },
  };
  static override styles: CSSResult[] = [paper, controls, traceStyles, closeUpStyles, handStyles];

  declare data: ChartData | undefined;
  declare span: readonly [number, number] | undefined;
  declare time: number;
  declare scale: ScaleKind | undefined;
  declare chosen: string | undefined;
  /** The chart's edits by hand; left out: none can be made here. */
  declare hands: ChartHands | undefined;
  /** The one at work. */
  declare hand: Hand | undefined;
  /** Chosen for the segment after the key. */
  declare private ease: string;
  declare private width: number;
  private scaleNow: SpeedScale = linearScale(1);
  private readonly pointer = new SheetPointer({
    hover: () => {},
    go: (time) => this.send('time-chosen', { time }),
    drag: ([from], settled) => settled && this.send('time-chosen', { time: from }),
    note: () => {},
    catches: (row, { x, y }) => this.hands?.catches(this.paperOf(row), x, y),
    grab: (row, grip, { x, y }) => {
      const on = this.paperOf(row);
      this.hands?.grab(on, grip, placeAt(on, x, y));
    },
    pull: (row, { x, y }) => this.hands?.work.drag(placeAt(this.paperOf(row), x, y)),
    rest: (lost) => this.hands?.rest(lost),
  });
  private readonly resize = new ResizeObserver(() => this.measure());

  constructor() {
    super();
    this.time = 0;
    this.width = 0;
    this.ease = 'minimum-jerk';
  }

  override connectedCallback(): void {
    super.connectedCallback();
    this.resize.observe(this);
  }

  override disconnectedCallback(): void {
    super.disconnectedCallback();
    this.resize.disconnect();
  }

  protected override willUpdate(changed: PropertyValues<this>): void {
    const { data, span } = this;
    if (data && span && (changed.has('data') || changed.has('span') || changed.has('scale')))
      this.scaleNow = this.ownScale(data, { index: 0, from: span[0], to: span[1] });
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
        <div
          class="sheet ${this.hands?.sketched ? 'sketched' : ''}"
          @pointerdown=${(event: PointerEvent) => this.pointer.down(event, row)}
          @pointermove=${(event: PointerEvent) => this.pointer.move(event, row)}
          @pointerup=${(event: PointerEvent) => this.pointer.up(event, row)}
          @pointercancel=${() => this.pointer.cancel()}
        >
          ${guard([data, span, this.width, this.scale, this.chosen, key], () => this.picture(data, row, key))}
          ${this.hands?.picture(this.paperOf(row), true) ?? nothing}
          ${x >= 0 && x <= this.width ? html`<div class="cursor" .style=${`left:${x}px`}></div>` : nothing}
          ${this.hands?.keyGrips(this.paperOf(row), key) ?? nothing}
        </div>
        ${key < 0 ? nothing : keyWords(keyNumbers(data, key), data.playback)}
      </div>
      ${key < 0 || !this.hands ? nothing : this.segment(data, key)} ${hatching}
    </section>`;
  }

  private segment(data: ChartData, key: number): TemplateResult | typeof nothing {
    return segmentWords(data, key, this.ease, {
      choose: (ease) => (this.ease = ease),
      take: (edit) => this.send('edit-chosen', { edit }),
    });
  }

  private paperOf(row: FoldRow): Paper {
    return { row, width: this.width, bands: TALL_ROW, scale: this.scaleNow };
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
    const scale = this.scaleNow;
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
    const { base, top, posts, feet, bottom } = TALL_ROW;
    const at = (key: number): number => ((data.keys[key] - row.from) / (row.to - row.from)) * this.width;
    const every = niceStep(Math.max(1, (NUMBER_ROOM * (last - first)) / this.width));
    const keys = Array.from({ length: last - first }, (_, i) => first + i);
    const grips = this.hands && !data.tried;
    return html`<svg class="paper keys" width=${this.width} height=${bottom} aria-hidden="true">
      ${keys.map((key) => {
        const { speed } = data.motion.read(data.keys[key]);
        const mark = key === here ? 'here' : '';
        return svg`<circle class="knob ${mark}" cx=${at(key)} cy=${base - scale.share(speed) * (base - top)} r=${key === here ? 5 : 4} />
          ${grips ? svg`<circle class="touch knob-touch" data-grip="knob-${key}" cx=${at(key)} cy=${base - scale.share(speed) * (base - top)} r="12" /><rect class="touch post-touch" data-grip="post-${key}" x=${at(key) - 8} y=${posts - 3} width="16" height=${feet - posts + 8} />` : nothing}
          ${key === here || (key % every === 0 && Math.abs(at(key) - at(here)) >= NUMBER_ROOM) ? svg`<text class="key ${mark}" x=${at(key)} y=${feet + 11}>${key}</text>` : nothing}`;
      })}
    </svg>`;
  }

  private move(share: number, factor?: number): void {
    if (!this.data || !this.span) return;
    this.send('span-moved', { span: moveSpan(this.span, this.data.motion, share, factor, this.time) });
  }

  private send(type: string, detail: unknown): void {
    this.dispatchEvent(new CustomEvent(type, { detail, bubbles: true, composed: true }));
  }
}
