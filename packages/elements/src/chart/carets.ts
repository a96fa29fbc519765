import type { MarginNote, NoteLevel } from './chart-data.js';
import type { FoldRow } from './fold.js';

/** A proof-reader's caret under the trace. CSS pixels from the row's left. */
export interface Caret {
  readonly note: string;
  /** As printed beside it and in the margin. */
  readonly number: number;
  readonly level: NoteLevel;
  readonly status: MarginNote['status'];
  readonly x: number;
  /** How many carets this one stands for: neighbours of one note that would cover one another. */
  readonly stands: number;
  /** Carets of other notes that stand on the same spot; this one is the worst of them. */
  readonly others: number;
}

/** Carets of one note closer than this are one, px. */
const CARET_ROOM = 14;
/** Carets of different notes closer than this are drawn as one, px. */
const SAME_SPOT = 5;
/** Spans narrower than this are a caret alone, px. */
const SPAN_ROOM = 12;

/** Carets of the notes that have places in a row, left to right. */
export function caretsOfRow(notes: readonly NumberedNote[], row: FoldRow, width: number): Caret[] {
  const carets: Caret[] = [];
  const at = (time: number): number => ((time - row.from) / (row.to - row.from)) * width;
  for (const { note, number } of notes) {
    let last: { caret: Caret; index: number } | undefined;
    for (const place of note.places.toSorted((a, b) => a.time - b.time)) {
      if (place.time < row.from || place.time >= row.to) continue;
      const x = at(place.time);
      if (last && x - last.caret.x < CARET_ROOM) {
        last.caret = {
          ...last.caret,
          stands: last.caret.stands + 1,
          level: worse(last.caret.level, place.level),
        };
        carets[last.index] = last.caret;
        continue;
      }
      const caret: Caret = {
        note: note.id,
        number,
        level: place.level,
        status: note.status,
        x,
        stands: 1,
        others: 0,
      };
      last = { caret, index: carets.push(caret) - 1 };
    }
  }
  return crowded(carets.toSorted((a, b) => a.x - b.x));
}

/** One caret where those of several notes could not be told apart: thousands of findings in a row are still a row. */
function crowded(carets: readonly Caret[]): Caret[] {
  const drawn: Caret[] = [];
  for (const caret of carets) {
    const last = drawn[drawn.length - 1];
    if (!last || caret.x - last.x >= SAME_SPOT) {
      drawn.push(caret);
      continue;
    }
    const first = RANK[caret.level] > RANK[last.level] ? caret : last;
    drawn[drawn.length - 1] = {
      ...first,
      x: last.x,
      stands: last.stands + caret.stands,
      others: last.others + caret.others + 1,
    };
  }
  return drawn;
}

/** A stretch of a finding in a row, ruled under the trace. */
export interface CaretSpan {
  readonly note: string;
  readonly status: MarginNote['status'];
  readonly from: number;
  readonly to: number;
}

/** Stretches wide enough to be ruled; they go on through all the rows that they touch. */
export function spansOfRow(notes: readonly NumberedNote[], row: FoldRow, width: number): CaretSpan[] {
  const at = (time: number): number => ((time - row.from) / (row.to - row.from)) * width;
  return notes.flatMap(({ note }) =>
    note.places
      .filter(({ span }) => span[1] > row.from && span[0] < row.to)
      .map(({ span }) => ({
        note: note.id,
        status: note.status,
        from: Math.max(0, at(span[0])),
        to: Math.min(width, at(span[1])),
      }))
      .filter(({ from, to }) => to - from >= SPAN_ROOM),
  );
}

/** A note with the number that it has on the page. */
export interface NumberedNote {
  readonly number: number;
  readonly note: MarginNote;
}

/** Notes numbered as they are met when reading: by time of their worst place, worse first where equal. */
export function numberNotes(notes: readonly MarginNote[]): NumberedNote[] {
  return notes
    .toSorted((a, b) => a.time - b.time || RANK[b.level] - RANK[a.level] || a.rule.localeCompare(b.rule))
    .map((note, i) => ({ number: i + 1, note }));
}

const RANK: Readonly<Record<NoteLevel, number>> = { error: 2, warning: 1, note: 0 };

/** The worse of two levels. */
export function worse(a: NoteLevel, b: NoteLevel): NoteLevel {
  return RANK[a] >= RANK[b] ? a : b;
}

/** Rank of a level, worst highest. */
export function levelRank(level: NoteLevel): number {
  return RANK[level];
}

/**
 * The caret's strokes as SVG paths with its point at (x, y), `size` tall: error a solid caret, warning a caret with one leg, note
 * a caret of dots. Shape alone tells the level.
 */
export function caretPath(level: NoteLevel, x: number, y: number, size: number): string {
  const half = size * 0.55;
  const foot = y + size;
  if (level === 'error') return `M${x} ${y}L${x + half} ${foot}L${x - half} ${foot}Z`;
  if (level === 'warning') return `M${x - half} ${foot}L${x} ${y}L${x + half * 0.35} ${y + size * 0.35}`;
  const dot = size * 0.14;
  return [
    [x, y + dot],
    [x - half * 0.5, y + size / 2],
    [x + half * 0.5, y + size / 2],
    [x - half, foot - dot],
    [x + half, foot - dot],
  ]
    .map(
      ([cx, cy]) => `M${cx - dot} ${cy}a${dot} ${dot} 0 1 0 ${2 * dot} 0a${dot} ${dot} 0 1 0 ${-2 * dot} 0`,
    )
    .join('');
}
