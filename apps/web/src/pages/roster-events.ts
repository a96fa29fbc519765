import { trackName, type RosterEvent } from '@slewcurve/elements/plot';
import { sayEvent } from '@slewcurve/job';
import type { SurveyEvent } from '@slewcurve/survey';
import type { FileWork } from '../session/file-work.js';
import { rowId } from './roster-rows.js';

/** Events of one file that the roster shows at most: the worst. */
const MOST_EVENTS = 50;

// By the file's events: they change with its survey and its card alone.
const made = new WeakMap<readonly SurveyEvent[], readonly RosterEvent[]>();

/** What happens at one instant on several tracks, over all files; the same list where nothing changed. */
export function rosterEvents(
  files: readonly FileWork[],
  before: readonly RosterEvent[],
): readonly RosterEvent[] {
  const events = files.flatMap((file) => eventsOf(file));
  return events.length === before.length && events.every((event, i) => event === before[i]) ? before : events;
}

function eventsOf({ id, events }: FileWork): readonly RosterEvent[] {
  const known = made.get(events);
  if (known) return known;
  const severity = ['note', 'warning', 'error'];
  const fresh = events
    .filter(({ tracks }) => tracks > 2)
    .toSorted((a, b) => severity.indexOf(b.level) - severity.indexOf(a.level) || b.tracks - a.tracks)
    .slice(0, MOST_EVENTS)
    .flatMap((event) => rosterEvent(id, event));
  made.set(events, fresh);
  return fresh;
}

function rosterEvent(file: string, event: SurveyEvent): RosterEvent[] {
  const { clip, family, time, level, owner, places } = event;
  const says = sayEvent({ ...event, owner: trackName(owner) });
  if (says === undefined) return [];
  const tracks = [...new Set(places.map(({ track }) => track))];
  const id = (track: string): string => rowId({ file, clip, track });
  return [
    {
      id: JSON.stringify([file, clip, family, time]),
      says,
      level,
      owner: id(owner),
      rows: tracks.map((track) => ({ id: id(track), track })),
    },
  ];
}
