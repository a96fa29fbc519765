import { html, nothing, type TemplateResult } from 'lit';
import { levelRank } from '../chart/carets.js';
import { trackName, type NoteLevel } from '../chart/chart-data.js';
import { sayCount } from '../chart/quantity.js';

/** What happens on several tracks within one frame, as the roster shows it: once. */
export interface RosterEvent {
  /** A name that stays the same. */
  readonly id: string;
  /** "Walk, 1.200 s: 20 tracks jump within one frame: one event; look at Hips first". */
  readonly says: string;
  readonly level: NoteLevel;
  /** Row of the track to look at first, and of all that it is on. */
  readonly owner: string;
  readonly rows: readonly { readonly id: string; readonly track: string }[];
}

/** Events shown before "and 12 more". */
const EVENTS_AT_FIRST = 5;

/** What the list of events tells the roster. */
export interface EventListEvents {
  choose(row: string): void;
  /** Show or hide an event's tracks. */
  toggle(id: string): void;
  showAll(): void;
}

/** What of the list is unfolded. */
export interface EventListState {
  /** Events whose tracks are shown. */
  readonly open: ReadonlySet<string>;
  readonly all: boolean;
}

/** Events, worst first, then those on the most tracks. */
export function rankEvents(events: readonly RosterEvent[]): RosterEvent[] {
  return events.toSorted((a, b) => levelRank(b.level) - levelRank(a.level) || b.rows.length - a.rows.length);
}

/** The events over the rows: each once, leading to its owner, with its tracks behind a fold. */
export function eventList(
  events: readonly RosterEvent[],
  { open, all }: EventListState,
  tell: EventListEvents,
): TemplateResult | typeof nothing {
  if (events.length === 0) return nothing;
  const shown = all ? events : events.slice(0, EVENTS_AT_FIRST);
  const hidden = events.length - shown.length;
  return html`<section class="events" aria-label="At the same instant on several tracks">
    <ul>
      ${shown.map((event) => eventItem(event, open.has(event.id), tell))}
    </ul>
    ${
      hidden > 0
        ? html`<button class="plain on-screen" @click=${() => tell.showAll()}>
            Show ${sayCount(hidden, 'more event')}
          </button>`
        : nothing
    }
  </section>`;
}

function eventItem(
  { id, says, level, owner, rows }: RosterEvent,
  open: boolean,
  tell: EventListEvents,
): TemplateResult {
  const name = trackName(rows.find((row) => row.id === owner)?.track ?? '');
  return html`<li class=${level}>
    <span>${says} (${level}).</span>
    <button class="plain on-screen" @click=${() => tell.choose(owner)}>Open ${name}</button>
    <button class="plain on-screen" aria-expanded=${open ? 'true' : 'false'} @click=${() => tell.toggle(id)}>
      ${open ? 'Hide' : 'Show'} its ${sayCount(rows.length, 'track')}
    </button>
    ${
      open
        ? html`<ul class="tracks">
            ${rows.map(
              (row) =>
                html`<li>
                  <button class="plain" @click=${() => tell.choose(row.id)}>${trackName(row.track)}</button>
                </li>`,
            )}
          </ul>`
        : nothing
    }
  </li>`;
}
