import { sayAngle, sayCount, sayRate } from '../chart/quantity.js';
import { trackName, type NoteLevel } from '../chart/chart-data.js';
import { sayEffect } from '../chart/note-words.js';
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
  /** Findings that nobody accepted. */
  readonly counts: Readonly<Record<NoteLevel, number>>;
  /** Findings that somebody accepted. */
  readonly accepted?: number;
  /** Places of them all: a finding is one fault of one track, and may stand at many. */
  readonly places: number;
  /** Ids of the rules that found something. */
  readonly rules: readonly string[];
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

/** "1 error, 2 notes, 18 mm at 14 places, 1 accepted", with what is seen of the worst and as many as the chart has carets; empty where nothing was found. */
export function countWords(row: RosterRow): string {
  const levels = (['error', 'warning', 'note'] as const).filter((level) => row.counts[level] > 0);
  const findings = levels.reduce((sum, level) => sum + row.counts[level], 0);
  const seen = row.effect && findings > 0 ? `, ${sayEffect(row.effect)}` : '';
  const places = row.places > findings ? ` at ${sayCount(row.places, 'place')}` : '';
  const accepted = row.accepted ? [`${row.accepted.toLocaleString('en')} accepted`] : [];
  const found = `${levels.map((level) => sayCount(row.counts[level], level)).join(', ')}${seen}${places}`;
  return [...(findings > 0 ? [found] : []), ...accepted].join(', ');
}
