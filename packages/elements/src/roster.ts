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
import type { Word } from '@slewcurve/survey';
import { trackName } from './chart/chart-data.js';
import { sayCount, sayRate, saySpan } from './chart/quantity.js';
import { drawInk, type InkPlace, type RosterInks } from './roster/draw-ink.js';
import { eventList, rankEvents, type RosterEvent } from './roster/roster-event.js';
import { findRows, foundNothing } from './roster/find-rows.js';
import { ROSTER_ORDERS, familiesOf, rankRows, type RosterOrder } from './roster/rank.js';
import { countWords, rowWords, worstLevel, type RosterRow } from './roster/roster-row.js';
import { rosterStyles } from './roster/roster-styles.js';
import { rowWindow, scrollToRow, type RowWindow } from './roster/window.js';
import { controls } from './theme/controls.js';
import { inTurn } from './theme/in-turn.js';
import { inkOf } from './theme/ink-of.js';
import { paper } from './theme/paper.js';
import { valueOf } from './theme/value-of.js';

/** Rosters longer than this begin with their rows close together, so that eighty joints are seen at one look. */
const CLOSE_FROM = 40;
const WIDE: InkPlace = { width: 0, pitch: 30, top: 7, height: 12 };
const CLOSE: InkPlace = { width: 0, pitch: 15, top: 0, height: 9 };
const NARROW: InkPlace = { width: 0, pitch: 52, top: 29, height: 12 };
/** Width below which a row takes two lines, px; the styles' own 32rem. */
const TWO_LINES = 512;
/** Milliseconds of drawing ink in one go. */
const DRAWING_MS = 8;

/**
 * Roster: all tracks of all files, one ink row each, ranked by what is wrong. How strong the ink is says how fast the track
 * turns against its own habit; carets stand where something was found.
 *
 * @fires track-chosen - `{ id: string, row: RosterRow }`
 */
export class SlewRoster extends LitElement {
  static override properties: PropertyDeclarations = {
    rows: { attribute: false },
    events: { attribute: false },
    chosen: { type: String },
    order: { type: String },
    find: { type: String },
    family: { type: String },
    book: { attribute: false },
    spacing: { type: String },
    message: { type: String },
    active: { state: true },
    unfolded: { state: true },
    allEvents: { state: true },
    top: { state: true },
    height: { state: true },
    inkWidth: { state: true },
    narrow: { state: true },
  };
  static override styles: CSSResult[] = [paper, controls, rosterStyles];

  /** A change is a new list. */
  declare rows: readonly RosterRow[];
  /** What happens on several tracks at one instant. A change is a new list. */
  declare events: readonly RosterEvent[];
  /** Id of the row whose chart is open. */
  declare chosen: string | undefined;
  declare order: RosterOrder;
  /** What is looked for. */
  declare find: string;
  /** Only rows with findings of this family; empty: all. */
  declare family: string;
  /** What else things are called; the find field answers to these words. */
  declare book: readonly Word[];
  /** Left out: by how many rows there are. */
  declare spacing: 'wide' | 'close' | undefined;
  /** What an empty roster says. */
  declare message: string;
  declare private active: string | undefined;
  /** Events whose tracks are shown. */
  declare private unfolded: ReadonlySet<string>;
  declare private allEvents: boolean;
  declare private top: number;
  declare private height: number;
  declare private inkWidth: number;
  declare private narrow: boolean;
  private shown: readonly RosterRow[] = [];
  private inkLeft = 0;
  /** The list whose size is followed. */
  private watched: Element | undefined;
  /** Read once: asking for a colour makes the browser work out all styles. */
  private inks: RosterInks | undefined;
  // Not within the observer's own step: what follows from a size may change another.
  private readonly resize = new ResizeObserver(() => requestAnimationFrame(() => this.measure()));

  constructor() {
    super();
    this.rows = [];
    this.events = [];
    this.unfolded = new Set();
    this.allEvents = false;
    this.order = 'wrong';
    this.find = '';
    this.family = '';
    this.book = [];
    this.message = 'No file is open.';
    this.top = 0;
    this.height = 600;
    this.inkWidth = 0;
    this.narrow = false;
  }

  override connectedCallback(): void {
    super.connectedCallback();
    this.resize.observe(this);
    matchMedia('(prefers-color-scheme: dark)').addEventListener('change', this.redraw);
    this.ownerDocument.addEventListener('keydown', this.slash);
  }

  override disconnectedCallback(): void {
    super.disconnectedCallback();
    this.resize.disconnect();
    matchMedia('(prefers-color-scheme: dark)').removeEventListener('change', this.redraw);
    this.ownerDocument.removeEventListener('keydown', this.slash);
  }

  /** Puts the keyboard on the list. */
  override focus(options?: FocusOptions): void {
    this.renderRoot.querySelector<HTMLElement>('.scroll')?.focus(options);
  }

  /** Puts the keyboard on "Find a track"; what was looked for before gives way to what is typed. */
  focusFind(): void {
    const field = this.renderRoot.querySelector('input');
    field?.focus();
    field?.select();
  }

  /** Draws the ink again, after the page changed its own inks or scheme. */
  readonly redraw = (): void => {
    this.inks = undefined;
    this.requestUpdate();
  };

  protected override scheduleUpdate(): Promise<void> {
    return inTurn(() => this.performUpdate());
  }

  private get place(): InkPlace {
    if (this.narrow) return { ...NARROW, width: this.inkWidth };
    return { ...(this.isClose ? CLOSE : WIDE), width: this.inkWidth };
  }

  private get isClose(): boolean {
    return (this.spacing ?? (this.rows.length > CLOSE_FROM ? 'close' : 'wide')) === 'close' && !this.narrow;
  }

  private get window(): RowWindow {
    return rowWindow(this.shown.length, this.place.pitch, this.top, this.height);
  }

  protected override willUpdate(changed: PropertyValues<this>): void {
    if ((['rows', 'order', 'find', 'family', 'book'] as const).some((name) => changed.has(name)))
      this.shown = rankRows(findRows(this.rows, this.find, this.family, this.book), this.order);
    if (this.active !== undefined && !this.shown.some((row) => row.id === this.active))
      this.active = undefined;
  }

  protected override render(): TemplateResult {
    if (this.rows.length === 0) return html`<p class="empty">${this.message}</p>`;
    return html`${this.tools()}
      <p class="tally" role="status">${tally(this.rows, this.shown)}</p>
      ${guard([this.events, this.unfolded, this.allEvents], () => this.eventsSeen())}
      ${this.shown.length === 0 ? this.nothing() : this.list()}
      <span class="swatch"></span>`;
  }

  private eventsSeen(): TemplateResult | typeof nothing {
    return eventList(
      rankEvents(this.events),
      { open: this.unfolded, all: this.allEvents },
      {
        choose: (id) => {
          const row = this.rows.find((other) => other.id === id);
          if (row) this.choose(row);
        },
        toggle: (id) => {
          const rest = new Set(this.unfolded);
          if (!rest.delete(id)) rest.add(id);
          this.unfolded = rest;
        },
        showAll: () => (this.allEvents = true),
      },
    );
  }

  private nothing(): TemplateResult {
    const { says, leads } = foundNothing(this.find, this.book);
    return html`<div class="empty">
      <p>${says}</p>
      ${leads.map(({ name, summary }) => html`<p><b>${name}</b>: ${summary}</p>`)}
    </div>`;
  }

  private tools(): TemplateResult {
    const families = familiesOf(this.rows);
    return html`<div class="tools on-screen" role="search">
      <label>
        Find a track
        <input
          type="search"
          .value=${this.find}
          autocomplete="off"
          spellcheck="false"
          aria-keyshortcuts="/"
          @input=${this.findTyped}
          @keydown=${this.findKeyed}
        />
      </label>
      <label>
        Ranked by
        <select @change=${(event: Event) => this.chooseOrder(valueOf(event))}>
          ${ROSTER_ORDERS.map(
            ({ order, says }) =>
              html`<option value=${order} ?selected=${order === this.order}>${says}</option>`,
          )}
        </select>
      </label>
      ${
        families.length === 0
          ? nothing
          : html`<label>
              With findings of
              <select @change=${(event: Event) => (this.family = valueOf(event))}>
                <option value="" ?selected=${this.family === ''}>any kind or none</option>
                ${families.map(
                  ({ family, rows }) =>
                    html`<option value=${family} ?selected=${family === this.family}>
                      ${family}, ${sayCount(rows, 'track')}
                    </option>`,
                )}
              </select>
            </label>`
      }
      ${
        this.narrow
          ? nothing
          : html`<button class="plain" @click=${() => (this.spacing = this.isClose ? 'wide' : 'close')}>
              ${this.isClose ? 'Set rows wider' : 'Set rows closer'}
            </button>`
      }
    </div>`;
  }

  private list(): TemplateResult {
    const { first, last } = this.window;
    const { pitch } = this.place;
    return html`<div class="heads" aria-hidden="true">
        <span>track</span><span>the stronger the ink, the faster against what is usual there</span
        ><span>found</span><span>greatest speed</span><span>length</span>
      </div>
      <div
        class="scroll ${this.isClose ? 'close' : ''}"
        role="listbox"
        tabindex="0"
        aria-label="Tracks"
        aria-activedescendant=${this.active === undefined ? nothing : this.optionId(this.active)}
        @scroll=${this.scrolled}
        @keydown=${this.keyed}
        @focus=${this.entered}
      >
        <div class="list" role="presentation" .style=${`height:${this.shown.length * pitch}px`}>
          <div class="gauge" role="presentation"><span></span><span class="ink"></span></div>
          <canvas aria-hidden="true" .style=${`top:${first * pitch}px`}></canvas>
          ${repeat(
            this.shown.slice(first, last),
            (row) => row.id,
            (row, i) => this.option(row, first + i),
          )}
        </div>
      </div>`;
  }

  private option(row: RosterRow, index: number): TemplateResult {
    const { pitch } = this.place;
    const several = this.rows.some((other) => other.file !== this.rows[0].file);
    return html`<div
      class="option ${worstLevel(row) ?? ''} ${row.id === this.active ? 'active' : ''}"
      id=${this.optionId(row.id)}
      role="option"
      aria-selected=${row.id === this.chosen ? 'true' : 'false'}
      aria-setsize=${this.shown.length}
      aria-posinset=${index + 1}
      title=${`${row.track}, ${row.clip}, ${row.file}`}
      .style=${`top:${index * pitch}px;height:${pitch}px`}
      @click=${() => this.choose(row)}
    >
      <span class="unseen">${rowWords(row)}</span>
      <span class="name" aria-hidden="true"
        >${trackName(row.track)} <span class="of">${row.clip}${several ? `, ${row.file}` : ''}</span></span
      >
      <span class="ink" aria-hidden="true"></span>
      <span class="found" aria-hidden="true">${countWords(row)}</span>
      <span class="number" aria-hidden="true">${sayRate(row.peak)}</span>
      <span class="number" aria-hidden="true">${saySpan(row.seconds)}</span>
    </div>`;
  }

  /** Ids are looked up within the element's own root, so the row's own id serves. */
  private optionId(id: string): string {
    return `row-${id}`;
  }

  protected override updated(changed: PropertyValues<this>): void {
    // Measuring lays the page out; later sizes come from the observer, after the browser has done that by itself.
    if (this.inkWidth === 0 || changed.has('spacing')) this.measure();
    const scroll = this.renderRoot.querySelector('.scroll') ?? undefined;
    if (scroll === this.watched) return this.draw();
    this.watched = scroll;
    for (const part of this.renderRoot.querySelectorAll('.scroll, .gauge .ink')) this.resize.observe(part);
    this.draw();
  }

  private measure(): void {
    this.narrow = this.clientWidth > 0 && this.clientWidth < TWO_LINES;
    const ink = this.renderRoot.querySelector<HTMLElement>('.gauge .ink');
    const scroll = this.renderRoot.querySelector('.scroll');
    if (!ink || !scroll) return;
    this.inkWidth = ink.clientWidth;
    this.inkLeft = ink.offsetLeft;
    this.height = scroll.clientHeight;
  }

  private readonly draw = (): void => {
    const canvas = this.renderRoot.querySelector('canvas');
    const swatch = this.renderRoot.querySelector<HTMLElement>('.swatch');
    if (!canvas || !swatch || this.inkWidth === 0) return;
    const { first, last } = this.window;
    const { place } = this;
    canvas.style.left = `${this.inkLeft}px`;
    canvas.style.width = `${place.width}px`;
    canvas.style.height = `${(last - first) * place.pitch}px`;
    this.inks ??= {
      trace: inkOf(swatch, '--_trace'),
      limit: inkOf(swatch, '--_limit'),
      caution: inkOf(swatch, '--_caution'),
      soft: inkOf(swatch, '--_soft'),
      hairline: inkOf(swatch, '--_hairline'),
    };
    if (!drawInk(canvas, this.shown.slice(first, last), place, this.inks, DRAWING_MS)) void inTurn(this.draw);
  };

  private readonly scrolled = (): void => {
    this.top = this.renderRoot.querySelector('.scroll')?.scrollTop ?? 0;
  };

  private readonly entered = (): void => {
    this.active ??= this.shown.find((row) => row.id === this.chosen)?.id ?? this.shown[0]?.id;
  };

  private readonly keyed = (event: KeyboardEvent): void => {
    if (event.ctrlKey || event.metaKey || event.altKey) return;
    const at = this.shown.findIndex((row) => row.id === this.active);
    const page = Math.max(1, Math.floor(this.height / this.place.pitch) - 1);
    const steps: Readonly<Record<string, number>> = {
      ArrowDown: at + 1,
      ArrowUp: at - 1,
      PageDown: at + page,
      PageUp: at - page,
      Home: 0,
      End: this.shown.length - 1,
    };
    if ((event.key === 'Enter' || event.key === ' ') && at >= 0) this.choose(this.shown[at]);
    else if (event.key in steps) this.activate(steps[event.key]);
    else return;
    event.preventDefault();
    event.stopPropagation();
  };

  private activate(index: number): void {
    const held = Math.min(this.shown.length - 1, Math.max(0, index));
    this.active = this.shown[held]?.id;
    const scroll = this.renderRoot.querySelector('.scroll');
    if (!scroll) return;
    scroll.scrollTop = scrollToRow(held, this.place.pitch, scroll.scrollTop, scroll.clientHeight);
    this.top = scroll.scrollTop;
  }

  private choose(row: RosterRow): void {
    this.active = row.id;
    this.chosen = row.id;
    this.dispatchEvent(
      new CustomEvent('track-chosen', { detail: { id: row.id, row }, bubbles: true, composed: true }),
    );
  }

  private chooseOrder(order: string): void {
    this.order = ROSTER_ORDERS.find((known) => known.order === order)?.order ?? 'wrong';
  }

  private readonly findTyped = (event: Event): void => {
    this.find = valueOf(event);
    this.top = 0;
    this.renderRoot.querySelector('.scroll')?.scrollTo({ top: 0 });
    // What is typed next, Enter perhaps, is about the rows that are found now; their turn may come too late.
    this.performUpdate();
  };

  /** Enter opens the best match, Down walks into the list, Escape lets go of what was typed. */
  private readonly findKeyed = (event: KeyboardEvent): void => {
    if (event.key === 'ArrowDown') this.focus();
    else if (event.key === 'Enter' && this.shown[0]) this.choose(this.shown[0]);
    else if (event.key === 'Escape' && this.find) this.find = '';
    else return;
    event.preventDefault();
  };

  private readonly slash = (event: KeyboardEvent): void => {
    if (event.key !== '/' || event.ctrlKey || event.metaKey || event.altKey || event.defaultPrevented) return;
    const target = event.composedPath()[0];
    if (
      target instanceof HTMLElement &&
      (target.matches('input, textarea, select') || target.isContentEditable)
    )
      return;
    if (!this.checkVisibility()) return;
    event.preventDefault();
    this.focusFind();
  };
}

function tally(rows: readonly RosterRow[], shown: readonly RosterRow[]): string {
  const found = shown.filter((row) => worstLevel(row) !== undefined).length;
  const all =
    shown.length === rows.length
      ? sayCount(rows.length, 'track')
      : `${shown.length} of ${sayCount(rows.length, 'track')}`;
  return `${all}, ${found === 0 ? 'none' : found.toLocaleString('en')} with findings.`;
}
