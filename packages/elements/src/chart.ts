import {
  LitElement,
  html,
  nothing,
  type CSSResult,
  type PropertyDeclarations,
  type PropertyValues,
  type TemplateResult,
} from 'lit';
import { guard } from 'lit/directives/guard.js';
import { repeat } from 'lit/directives/repeat.js';
import { caretsOfRow, numberNotes, spansOfRow, type NumberedNote } from './chart/carets.js';
import { peakSpeed, trackName, usualSpeed, type ChartData } from './chart/chart-data.js';
import { ROW, rowHeight, rowPicture } from './chart/chart-row.js';
import { chartStyles } from './chart/chart-styles.js';
import { chartChoices } from './chart/choices.js';
import { chartHead, keyWords, readingWords, rowTable, twinWords } from './chart/chart-words.js';
import { closeUpSpan } from './chart/close-up-span.js';
import { foldRows, rowAt, type FoldRow } from './chart/fold.js';
import { marginOf, packNotes } from './chart/margin.js';
import { readTimesAs, sayAngle, sayTime } from './chart/quantity.js';
import { RowPictures } from './chart/row-pictures.js';
import { RowsInSight } from './chart/rows-in-sight.js';
import { linearScale, speedScale, type ScaleKind, type SpeedScale } from './chart/scale.js';
import { SheetPointer } from './chart/sheet-pointer.js';
import { rowSentence, sayReading } from './chart/text-twin.js';
import { TraceCursor, type CursorHost } from './chart/trace-cursor.js';
import { traceStyles } from './chart/trace-styles.js';
import type { SlewCloseUp } from './close-up.js';
import { ChartHands, type HandName } from './gesture/chart-hands.js';
import { hatching } from './gesture/hand-picture.js';
import { handStyles } from './gesture/hand-styles.js';
import { handWords } from './gesture/hand-words.js';
import type { HandEdit } from './gesture/hand.js';
import { placeAt, type Paper } from './gesture/paper-place.js';
import { controls } from './theme/controls.js';
import { inTurn } from './theme/in-turn.js';
import { paper } from './theme/paper.js';

type Span = readonly [number, number];

/**
 * Chart: one track. Its angular speed as played, on paper folded into rows, with its keys as posts, findings as carets and notes
 * in the margin.
 *
 * @fires cursor-moved - `{ time: number, settled: boolean }` seconds; not settled while a pointer passes over
 * @fires span-chosen - `{ span: [number, number] | undefined }` seconds
 * @fires note-chosen - `{ id: string }`
 * @fires remedy-chosen - `{ id: string, way: number }` the button of a note's remedy; 0 the proposed one, from 1 on the others
 * @fires rule-asked - `{ rule: string }` the rule's name in a note
 * @fires accept-asked - `{ id: string }` a note's finding is to be accepted with a reason
 * @fires take-back-asked - `{ id: string }` what was accepted of it is to be taken back
 * @fires play-asked - the space bar
 * @fires edit-sketched - `{ edit: HandEdit, settled: boolean, idle: boolean, motion?: Motion }` an edit is made by hand
 * @fires edit-taken - the edit at hand is to be done
 * @fires edit-dropped - it was let go
 * @fires fold-chosen - `{ fold: number }` seconds a row
 */
export class SlewChart extends LitElement implements CursorHost {
  static override properties: PropertyDeclarations = {
    data: { attribute: false },
    time: { type: Number },
    fold: { type: Number },
    scale: { type: String },
    span: { attribute: false },
    chosen: { type: String },
    opened: { attribute: false },
    edit: { attribute: false },
    hover: { state: true },
    width: { state: true },
    unfolded: { state: true },
    inWords: { state: true },
    asTable: { state: true },
  };
  static override styles: CSSResult[] = [paper, controls, traceStyles, chartStyles, handStyles];

  declare data: ChartData | undefined;
  /** The cursor, seconds. */
  declare time: number;
  /** Seconds a row; left out: one loop where the clip repeats, else 10 s, 5 s where narrow. */
  declare fold: number | undefined;
  /** Left out: `usual`. */
  declare scale: ScaleKind | undefined;
  /** Where an edit would act, seconds. */
  declare span: Span | undefined;
  /** Id of the chosen note. */
  declare chosen: string | undefined;
  /** Stretch that the close-up shows; undefined: closed. */
  declare opened: Span | undefined;
  /** The step at hand, but for its names: its handle stands on the trace. Undefined: none, or one that no hand makes. */
  declare edit: HandEdit | undefined;
  /** @internal */
  declare hover: number | undefined;
  declare private width: number;
  declare private unfolded: ReadonlySet<number>;
  /** The words, and the table, are open. */
  declare private inWords: boolean;
  declare private asTable: boolean;
  /** @internal Notes with the numbers that they have on the page. */
  numbered: readonly NumberedNote[] = [];
  private speedScale: SpeedScale = linearScale(1);
  /** Width of the whole, px; asking the browser anew would make it lay the page out. */
  private across = 0;
  /** The sheet whose size is followed. */
  private watched: Element | undefined;
  private readonly cursor = new TraceCursor(this);
  private readonly hands = new ChartHands(this);
  private readonly pictures = new RowPictures(this);
  private readonly inSight = new RowsInSight(this, () => this.renderRoot.querySelectorAll('.row'));
  private readonly pointer = new SheetPointer({
    hover: (time) => this.cursor.hoverAt(time),
    go: (time, widen) => this.cursor.go(time, widen),
    drag: (span, settled) => this.cursor.dragged(span, settled),
    note: (id) => this.cursor.choose(id),
    catches: (row, { x, y }) => this.hands.catches(this.paperOf(row), x, y),
    grab: (row, grip, { x, y }) => {
      const on = this.paperOf(row);
      this.hands.grab(on, grip, placeAt(on, x, y));
    },
    pull: (row, { x, y }) => this.hands.work.drag(placeAt(this.paperOf(row), x, y)),
    rest: (lost) => this.hands.rest(lost),
  });
  private readonly resize = new ResizeObserver(() => this.measure());

  constructor() {
    super();
    this.time = 0;
    this.width = 0;
    this.unfolded = new Set();
    this.inWords = false;
    this.asTable = false;
  }

  override connectedCallback(): void {
    super.connectedCallback();
    this.resize.observe(this);
    addEventListener('beforeprint', this.showAll);
  }

  override disconnectedCallback(): void {
    super.disconnectedCallback();
    this.resize.disconnect();
    removeEventListener('beforeprint', this.showAll);
  }

  /** Rows as they are folded now. */
  get rows(): FoldRow[] {
    const { data } = this;
    return data ? foldRows(data.motion.start, data.motion.end, this.foldNow) : [];
  }

  private get foldNow(): number {
    return this.fold ?? this.data?.loop ?? (this.narrow ? 5 : 10);
  }

  private get narrow(): boolean {
    const across = this.across || this.clientWidth;
    return across > 0 && across < 560;
  }

  protected override scheduleUpdate(): Promise<void> {
    return inTurn(() => this.performUpdate());
  }

  /** Puts the keyboard on the trace. */
  override focus(options?: FocusOptions): void {
    this.renderRoot.querySelector<HTMLElement>('.readout')?.focus(options);
  }

  protected override willUpdate(changed: PropertyValues<this>): void {
    const { data } = this;
    if (!data) return;
    readTimesAs(data.timeForm, data.frameRate);
    if (changed.has('data')) {
      this.numbered = numberNotes(data.notes);
      const before = changed.get('data');
      if (before && (before.track !== data.track || before.clip !== data.clip || before.file !== data.file)) {
        this.opened = undefined;
        this.unfolded = new Set();
        this.pictures.forget();
      }
      this.time = Math.min(data.motion.end, Math.max(data.motion.start, this.time));
    }
    if (changed.has('edit')) this.hands.follow(this.edit);
    if (changed.has('data') || changed.has('scale')) this.speedScale = this.chooseScale(data);
  }

  private chooseScale(data: ChartData): SpeedScale {
    const peaks = [data.motion, data.before?.motion, data.second?.motion].map((motion) =>
      motion ? peakSpeed(motion).speed : 0,
    );
    const usual = Math.max(usualSpeed(data.motion), data.noiseFloor * 2, (data.limit?.speed ?? 0) / 2);
    return speedScale(this.scale ?? 'usual', usual, Math.max(...peaks, data.noiseFloor * 4));
  }

  protected override updated(changed: PropertyValues<this>): void {
    // Measuring lays the page out; later sizes come from the observer, after the browser has done that by itself.
    if (this.width === 0) this.measure();
    const sheet = this.renderRoot.querySelector('.sheet') ?? undefined;
    if (sheet && sheet !== this.watched) this.resize.observe(sheet);
    this.watched = sheet;
    // The cursor alone moves nothing in the margin; asking for heights on every pointer move would cost frames.
    if ([...changed.keys()].some((name) => name !== 'time' && name !== 'hover' && name !== 'span'))
      packNotes(this.renderRoot);
  }

  private readonly showAll = (): void => {
    this.pictures.forget();
    this.inSight.showAll(this.rows.length);
    this.performUpdate();
  };

  private measure(): void {
    this.across = this.clientWidth;
    const sheet = this.renderRoot.querySelector('.sheet');
    if (sheet && Math.abs(sheet.clientWidth - this.width) >= 1) this.width = sheet.clientWidth;
  }

  protected override render(): TemplateResult {
    const { data } = this;
    if (!data) return html`<p class="empty">No track is open. Choose one on the roster.</p>`;
    if (data.keys.length === 0)
      return html`${chartHead(data)}
        <p class="empty">This track has no keys to play.</p>`;
    const rows = this.rows;
    const now = this.hover ?? this.time;
    const here = rowAt(rows, now);
    return html`${guard([data], () => chartHead(data))}
      ${chartChoices(
        { data, fold: this.foldNow, scale: this.scale ?? 'usual', opened: this.opened !== undefined },
        {
          fold: (fold) => this.chooseFold(fold),
          scale: (scale) => (this.scale = scale),
          closeUp: () => this.cursor.act({ kind: this.opened ? 'back' : 'open-close-up' }),
        },
      )}
      ${
        data.keys.length < 2
          ? nothing
          : handWords(this.hands.ends, {
              begin: (name) => this.begin(name),
              ends: (law) => this.hands.chooseEnds(law),
            })
      }
      ${this.readout(data, now)} ${hatching}
      <p class="unseen" role="status">${this.hands.spoken}</p>
      <div class="heads" aria-hidden="true">
        <span>time</span><span>angular speed, as played</span><span>odometer</span><span>findings</span>
      </div>
      <ol class="rows" aria-label="Rows of the trace" @pointerleave=${this.cursor.leave}>
        ${repeat(
          rows.slice(0, this.inSight.builtOf(rows.length)),
          (row) => row.index,
          (row) => this.row(data, rows, row, now, here),
        )}
      </ol>
      ${keyWords()}
      ${guard([data, this.inWords], () => twinWords(data, this.inWords, (open) => (this.inWords = open)))}
      ${guard([data, this.foldNow, this.asTable], () =>
        rowTable(data, this.foldNow, this.asTable, (open) => (this.asTable = open)),
      )}`;
  }

  private readout(data: ChartData, now: number): TemplateResult {
    const reading = (this.hands.shown ?? data.motion).read(now);
    return html`<div
      class="readout"
      role="slider"
      tabindex="0"
      aria-label="Cursor on the trace of ${trackName(data.track)}"
      aria-describedby="keys"
      aria-orientation="horizontal"
      aria-valuemin=${data.motion.start}
      aria-valuemax=${data.motion.end}
      aria-valuenow=${reading.time}
      aria-valuetext=${sayReading(reading, data.rateNames)}
      @keydown=${this.cursor.keyed}
    >
      ${readingWords(reading, data, this.span)}
    </div>`;
  }

  private row(
    data: ChartData,
    rows: readonly FoldRow[],
    row: FoldRow,
    now: number,
    here: number,
  ): TemplateResult {
    const last = row.index === rows.length - 1;
    const notes = this.numbered.filter(({ note }) => rowAt(rows, note.time) === row.index);
    const open = this.opened && rowAt(rows, (this.opened[0] + this.opened[1]) / 2) === row.index;
    const shown = this.hands.shown ?? data.motion;
    const carried = shown.read(Math.min(row.to, shown.end)).odometer;
    const on = this.paperOf(row);
    return html`<li class="row ${row.index === here ? 'here' : ''}" data-row=${row.index}>
      <span class="from">${sayTime(row.from, row.from % 1 === 0 ? 0 : 2)}</span>
      <div
        class="sheet ${this.hands.sketched ? 'sketched' : ''}"
        @pointermove=${(event: PointerEvent) => this.pointer.move(event, row)}
        @pointerdown=${(event: PointerEvent) => this.pointer.down(event, row)}
        @pointerup=${(event: PointerEvent) => this.pointer.up(event, row) && this.focus({ preventScroll: true })}
        @pointercancel=${() => this.pointer.cancel()}
        @dblclick=${() => this.cursor.act({ kind: 'open-close-up' })}
      >
        ${this.picture(data, row)} ${this.spanMark(row)}
        ${this.hands.picture(on, row.index === rowAt(rows, this.time))}
        ${row.index === here ? html`<div class="cursor" .style=${`left:${this.left(row, now)}px`}></div>` : nothing}
        ${this.hands.grips(on, row.index === rowAt(rows, this.time))}
      </div>
      <span class="carried"
        ><span class="unseen">odometer </span>${sayAngle(carried, 4)}<span class="unseen"
          >${last ? ' in all' : ''}</span
        ></span
      >
      <div class="notes">
        ${marginOf(row.index, notes, this.chosen, this.unfolded.has(row.index), {
          choose: (note) => this.cursor.choose(note.id),
          mend: (note, way) => this.send('remedy-chosen', { id: note.id, way }),
          accept: ({ id }) => this.send('accept-asked', { id }),
          takeBack: ({ id }) => this.send('take-back-asked', { id }),
          explain: (rule) => this.send('rule-asked', { rule }),
          unfold: (index) => (this.unfolded = new Set([...this.unfolded, index])),
        })}
      </div>
      ${open ? this.closeUp(data, now) : nothing}
      <div class="between"><slot name=${`row-${row.index}`}></slot></div>
    </li>`;
  }

  private picture(data: ChartData, row: FoldRow): unknown {
    if (this.width === 0 || !this.inSight.has(row.index))
      return html`<svg class="paper" width="1" height=${rowHeight(data, ROW)} aria-hidden="true"></svg>`;
    const of = [data, this.speedScale, this.width, this.chosen, row.from, row.to];
    const drawn = this.pictures.drawn(row.index, of, () => this.drawRow(data, row));
    return guard([drawn], () => drawn.picture);
  }

  private drawRow(data: ChartData, row: FoldRow): TemplateResult {
    return rowPicture({
      data,
      row,
      scale: this.speedScale,
      width: this.width,
      bands: ROW,
      carets: caretsOfRow(this.numbered, row, this.width),
      spans: spansOfRow(this.numbered, row, this.width),
      chosen: this.chosen,
      says: rowSentence(data, row),
    });
  }

  private closeUp(data: ChartData, now: number): TemplateResult {
    return html`<slew-close-up
      class="between"
      .data=${data}
      .span=${this.opened}
      .time=${now}
      .scale=${this.scale ?? 'usual'}
      .chosen=${this.chosen}
      .hands=${this.hands}
      .hand=${this.hands.hand}
      @edit-chosen=${(event: CustomEvent<{ edit: HandEdit }>) => this.choose(event.detail.edit)}
      @span-moved=${(event: CustomEvent<{ span: Span }>) => (this.opened = event.detail.span)}
      @closed=${() => this.cursor.act({ kind: 'back' })}
      @time-chosen=${(event: CustomEvent<{ time: number }>) => this.cursor.go(event.detail.time, false)}
    ></slew-close-up>`;
  }

  private spanMark(row: FoldRow): TemplateResult | typeof nothing {
    const { span } = this;
    if (!span || span[1] <= row.from || span[0] >= row.to) return nothing;
    const left = Math.max(0, this.left(row, span[0]));
    const right = Math.min(this.width, this.left(row, span[1]));
    return html`<div
      class="chosen-span"
      .style=${`left:${left}px;width:${Math.max(0, right - left)}px`}
    ></div>`;
  }

  private left(row: FoldRow, time: number): number {
    return ((time - row.from) / (row.to - row.from)) * this.width;
  }

  /** @internal */
  get pressed(): boolean {
    return this.pointer.pressed;
  }

  /** @internal */
  release(): void {
    this.pointer.cancel();
  }

  private paperOf(row: FoldRow): Paper {
    return { row, width: this.width, bands: ROW, scale: this.speedScale };
  }

  private begin(name: HandName): void {
    const { rows } = this;
    this.hands.begin(this.paperOf(rows[rowAt(rows, this.time)]), name);
  }

  /** @internal */
  focusGrip(): void {
    void this.updateComplete.then(async () => {
      const closeUp = this.renderRoot.querySelector<SlewCloseUp>('slew-close-up');
      await closeUp?.updateComplete;
      (gripAtWork(closeUp?.renderRoot) ?? gripAtWork(this.renderRoot))?.focus({ preventScroll: true });
    });
  }

  /** An edit that was chosen in words; no hand holds it. */
  private choose(edit: HandEdit): void {
    this.hands.follow(undefined);
    this.send('edit-sketched', { edit, settled: true, idle: false });
  }

  /** Opens the close-up at the cursor, or around the span. */
  openCloseUp(): void {
    if (this.data) this.opened = closeUpSpan(this.time, this.span, this.foldNow, this.data);
  }

  closeCloseUp(): void {
    this.opened = undefined;
    this.focus({ preventScroll: true });
  }

  /** @internal */
  async bringHere(): Promise<void> {
    await this.updateComplete;
    this.renderRoot.querySelector('.row.here .sheet')?.scrollIntoView({ block: 'nearest' });
  }

  private chooseFold(fold: number): void {
    this.fold = fold;
    this.inSight.forget();
    this.pictures.forget();
    this.send('fold-chosen', { fold });
  }

  /** @internal */
  send(type: string, detail: unknown): void {
    this.dispatchEvent(new CustomEvent(type, { detail, bubbles: true, composed: true }));
  }
}

function gripAtWork(root: ParentNode | undefined): HTMLElement | null | undefined {
  return root?.querySelector<HTMLElement>('.grip.at-work');
}
