import { trackName, type MarginNote } from './chart-data.js';
import { sayCount, sayTime } from './quantity.js';

/** "18 mm", "12 px". */
export function sayEffect({ value, unit }: { readonly value: number; readonly unit: string }): string {
  return `${value >= 10 ? Math.round(value).toLocaleString('en') : String(Number(value.toPrecision(2)))} ${unit}`;
}

/** "18 mm at the farthest joint": what is seen of a finding; undefined where that can't be told. */
export function effectWords({ effect }: Pick<MarginNote, 'effect'>): string | undefined {
  if (!effect) return undefined;
  return `${sayEffect(effect)} ${effect.unit === 'px' ? 'in a picture of 1,080 rows' : 'at the farthest joint'}`;
}

/** "one of 20 tracks at 1.20 s; owner Hips": the event that a finding is part of; undefined where it stands alone. */
export function eventWords({ event }: Pick<MarginNote, 'event'>): string | undefined {
  if (!event) return undefined;
  return `one of ${sayCount(event.tracks, 'track')} at ${sayTime(event.time, 2)}; owner ${trackName(event.owner)}`;
}

/** "Accepted: the hit is meant (Ada, 2026-05-17)", "1 of 5 places accepted: …"; undefined where nothing is. */
export function acceptedWords(note: Pick<MarginNote, 'accepted' | 'count' | 'status'>): string | undefined {
  const { accepted, count, status } = note;
  if (!accepted) return undefined;
  const said = accepted.reasons.join('; ');
  if (status === 'stamped') return `Accepted: ${said}`;
  return `${accepted.places.toLocaleString('en')} of ${sayCount(count, 'place')} accepted: ${said}`;
}
