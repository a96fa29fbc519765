import { levelRank } from '../chart/carets.js';
import { worstLevel, type RosterRow } from './roster-row.js';

/** Orders of the roster. */
export type RosterOrder = 'wrong' | 'effect' | 'peak' | 'name' | 'file';

/** Orders and what the page calls them. */
export const ROSTER_ORDERS: readonly { readonly order: RosterOrder; readonly says: string }[] = [
  { order: 'wrong', says: 'what is wrong' },
  { order: 'effect', says: 'what is seen' },
  { order: 'peak', says: 'greatest speed' },
  { order: 'name', says: 'name' },
  { order: 'file', says: 'order in the file' },
];

/** The rows in an order; rows that tie keep the order they came in. */
export function rankRows(rows: readonly RosterRow[], order: RosterOrder): RosterRow[] {
  const compare = COMPARE[order];
  return compare ? rows.toSorted(compare) : [...rows];
}

const COMPARE: Readonly<Record<RosterOrder, ((a: RosterRow, b: RosterRow) => number) | undefined>> = {
  wrong: (a, b) => wrongness(b) - wrongness(a) || darkest(b) - darkest(a),
  effect: (a, b) => (b.effect?.value ?? -1) - (a.effect?.value ?? -1) || wrongness(b) - wrongness(a),
  peak: (a, b) => b.peak - a.peak,
  name: (a, b) => a.track.localeCompare(b.track) || a.clip.localeCompare(b.clip),
  file: undefined,
};

/** One error outranks any number of warnings, one warning any number of notes; counts decide within a level. */
function wrongness(row: RosterRow): number {
  const level = worstLevel(row);
  if (!level) return 0;
  const count = Math.min(row.counts[level], 9999);
  return (levelRank(level) + 1) * 1e4 + count;
}

/** Ink paler than this is the usual of one track or another; tracks that have no darker keep the order of the file. */
const STANDS_OUT = 0.5;

/** How far a row's greatest speed stands above what is usual there: its darkest ink. */
function darkest(row: RosterRow): number {
  return row.ink.darkest > STANDS_OUT ? row.ink.darkest : 0;
}

/** Families that have findings, with how many rows have them, most first. */
export function familiesOf(rows: readonly RosterRow[]): { readonly family: string; readonly rows: number }[] {
  const counts = new Map<string, number>();
  for (const row of rows)
    for (const [family, count] of Object.entries(row.families))
      if (count > 0) counts.set(family, (counts.get(family) ?? 0) + 1);
  return [...counts]
    .map(([family, count]) => ({ family, rows: count }))
    .toSorted((a, b) => b.rows - a.rows || a.family.localeCompare(b.family));
}
