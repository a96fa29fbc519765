import {
  LitElement,
  css,
  html,
  nothing,
  type CSSResult,
  type PropertyDeclarations,
  type PropertyValues,
  type TemplateResult,
} from 'lit';
import {
  STORAGE_MODELS,
  TICK_READINGS,
  type PlaybackId,
  type StorageModel,
  type TickReading,
} from '@slewcurve/core';
import { sayAngle, sayRate, sayTime } from './chart/quantity.js';
import { controls } from './theme/controls.js';
import { paper } from './theme/paper.js';
import { valueOf } from './theme/value-of.js';

/** One playback at one tick rate. deg/s, degrees, seconds. */
export interface MatrixPlace {
  readonly playback: PlaybackId;
  /** Ticks a second; left out: at every moment. */
  readonly ticks?: number;
  readonly worstRate: number;
  readonly worstRateAt: number;
  readonly departure: number;
  readonly departureAt: number;
}

/** What the matrix is to be worked out for. */
export interface MatrixWish {
  readonly ticks: readonly number[];
  readonly reading: TickReading;
  readonly storage?: StorageModel;
}

const READING_WORDS: Readonly<Record<TickReading, string>> = {
  own: 'its own curve',
  linear: 'the arc between keys',
  nearest: 'the nearest key',
};

const TICKS: readonly number[] = [24, 30, 60, 120];

/**
 * Worst speed and worst departure of a track by playback and tick rate. It is worked out when it is opened, and each number leads to its place.
 *
 * @fires place-chosen - `{ time: number, playback: PlaybackId }`
 */
export class SlewPlaybackMatrix extends LitElement {
  static override properties: PropertyDeclarations = {
    load: { attribute: false },
    subject: { attribute: false },
    open: { state: true },
    places: { state: true },
    reading: { state: true },
    storage: { state: true },
    problem: { state: true },
  };
  static override styles: CSSResult[] = [
    paper,
    controls,
    css`
      summary {
        min-height: 44px;
        line-height: 44px;
        cursor: default;
      }
      .frame {
        overflow-x: auto;
      }
      table {
        border-collapse: collapse;
      }
      caption {
        text-align: left;
        color: var(--_soft);
        font-style: italic;
        padding-bottom: 0.5rem;
      }
      th {
        font-weight: 400;
        text-align: left;
        padding: 0.25rem 1rem 0.25rem 0;
      }
      td {
        border-top: 1px solid var(--_hairline);
        padding: 0 1rem 0 0;
        white-space: nowrap;
      }
      tbody th {
        border-top: 1px solid var(--_hairline);
      }
      .wishes {
        display: flex;
        flex-wrap: wrap;
        gap: 0 1.5rem;
        margin: 0 0 0.5rem;
      }
      .problem {
        color: var(--_limit);
      }
    `,
  ];

  /** Works the matrix out. */
  declare load: ((wish: MatrixWish) => Promise<readonly MatrixPlace[]>) | undefined;
  /** What it is about: another object, another matrix. */
  declare subject: unknown;
  declare private open: boolean;
  declare private places: readonly MatrixPlace[] | undefined;
  declare private reading: TickReading;
  declare private storage: StorageModel | undefined;
  declare private problem: string;
  private asked = 0;

  constructor() {
    super();
    this.load = undefined;
    this.subject = undefined;
    this.open = false;
    this.places = undefined;
    this.reading = 'own';
    this.storage = undefined;
    this.problem = '';
  }

  protected override willUpdate(changed: PropertyValues): void {
    const isOther = ['subject', 'reading', 'storage', 'open'].some((name) => changed.has(name));
    if (isOther && this.open) void this.work();
  }

  private async work(): Promise<void> {
    const { load, reading, storage } = this;
    const asked = ++this.asked;
    this.places = undefined;
    this.problem = '';
    try {
      const places = await load?.({ ticks: TICKS, reading, ...(storage && { storage }) });
      if (asked === this.asked) this.places = places ?? [];
    } catch (error) {
      if (asked === this.asked) this.problem = error instanceof Error ? error.message : String(error);
    }
  }

  protected override render(): TemplateResult {
    return html`<details
      @toggle=${({ target }: Event) => (this.open = target instanceof HTMLDetailsElement && target.open)}
    >
      <summary>Compare playbacks</summary>
      ${this.open ? this.matrix() : nothing}
    </details>`;
  }

  private matrix(): TemplateResult {
    return html`<p class="wishes on-screen">
        <label
          >a program reads at a tick:
          <select
            @change=${(event: Event) => (this.reading = TICK_READINGS.find((one) => one === valueOf(event)) ?? 'own')}
          >
            ${TICK_READINGS.map((one) => html`<option value=${one} ?selected=${one === this.reading}>${READING_WORDS[one]}</option>`)}
          </select></label
        >
        <label
          >and stores the keys as:
          <select
            @change=${(event: Event) => (this.storage = STORAGE_MODELS.find((one) => one === valueOf(event)))}
          >
            <option value="" ?selected=${!this.storage}>the file does</option>
            ${STORAGE_MODELS.map((one) => html`<option value=${one} ?selected=${one === this.storage}>${one.replaceAll('-', ' ')}${one.startsWith('smallest') ? ' bits' : ''}</option>`)}
          </select></label
        >
      </p>
      ${this.problem ? html`<p class="problem" role="alert">${this.problem}</p>` : nothing}
      ${this.places ? this.table(this.places) : html`<p role="status">${this.problem ? '' : 'Working it out.'}</p>`}`;
  }

  private table(places: readonly MatrixPlace[]): TemplateResult {
    const ticks = [...new Set(places.map((place) => place.ticks))];
    const playbacks = [...new Set(places.map(({ playback }) => playback))];
    return html`<div class="frame" tabindex="0" role="group" aria-label="Playbacks by tick rate">
      <table>
        <caption>
          Greatest speed, and farthest from the file as written
        </caption>
        <thead>
          <tr>
            <th scope="col">played</th>
            ${ticks.map((rate) => html`<th scope="col">${rate === undefined ? 'at every moment' : `at ${rate} ticks a second`}</th>`)}
          </tr>
        </thead>
        <tbody>
          ${playbacks.map(
            (playback) =>
              html`<tr>
                <th scope="row">${playback.replaceAll('-', ' ')}</th>
                ${ticks.map((rate) => this.cell(places.find((place) => place.playback === playback && place.ticks === rate)))}
              </tr>`,
          )}
        </tbody>
      </table>
    </div>`;
  }

  private cell(place: MatrixPlace | undefined): TemplateResult {
    if (!place) return html`<td>cannot be played</td>`;
    const go = (time: number): void => {
      const detail = { time, playback: place.playback };
      this.dispatchEvent(new CustomEvent('place-chosen', { detail, bubbles: true, composed: true }));
    };
    return html`<td>
      <button class="plain" @click=${() => go(place.worstRateAt)}>
        ${sayRate(place.worstRate)}<span class="unseen"> at ${sayTime(place.worstRateAt)}</span>
      </button>
      <button class="plain" @click=${() => go(place.departureAt)}>
        ${sayAngle(place.departure)}<span class="unseen"> off at ${sayTime(place.departureAt)}</span>
      </button>
    </td>`;
  }
}
