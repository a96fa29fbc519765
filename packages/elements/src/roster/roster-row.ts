import { sayAngle, sayCount, sayRate } from '../chart/quantity.js';
import { trackName, type NoteLevel } from '../chart/chart-data.js';
import type { TrackInk } from './ink.js';

/** One track as the roster shows it. */
export interface RosterRow {
  /** A name that stays the same; events carry it. */
  readonly id: string;
  readonly file: string;
  readonly clip: string;
  readonly track: string;
  readonly seconds: number;
  /** From `trackInk`. */
  readonly ink: TrackInk;
  readonly counts: Readonly<Record<NoteLevel, number>>;
  /** Findings by family: `{ jump: 2, turn: 1 }`. */
  readonly families: Readonly<Record<string, number>>;
  /** Places of the findings, seconds from the clip's start. */
  readonly marks: readonly { readonly time: number; readonly level: NoteLevel }[];
  /** What is seen of the worst finding, where it can be told. */
  readonly effect?: { readonly value: number; readonly unit: string };
  /** deg/s. */
  readonly peak: number;
  /** Degrees turned in all. */
  readonly travel: number;
}

/** The worst level that a row has; undefined where nothing was found. */
export function worstLevel(row: RosterRow): NoteLevel | undefined {
  return (['error', 'warning', 'note'] as const).find((level) => row.counts[level] > 0);
}

/** A row in one sentence: "lowerleg.r in 1H_Melee_Attack_Chop: 1 warning, peak 2,022 deg/s". */
export function rowWords(row: RosterRow): string {
  return `${trackName(row.track)} in ${row.clip}: ${countWords(row) || 'nothing found'}, peak ${sayRate(row.peak)}, turns ${sayAngle(row.travel)}`;
}

/** "1 error, 2 notes"; empty where nothing was found. */
export function countWords(row: RosterRow): string {
  return (['error', 'warning', 'note'] as const)
    .filter((level) => row.counts[level] > 0)
    .map((level) => sayCount(row.counts[level], level))
    .join(', ');
}
