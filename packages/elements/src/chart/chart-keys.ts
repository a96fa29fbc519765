import type { ChartData } from './chart-data.js';
import { frameLength } from './chart-data.js';
import { rowAt, type FoldRow } from './fold.js';
import { firstKeyAfter, firstKeyAt } from './posts.js';

/** What a key press asks of the chart. Time reads like text, so these are the keys of text. */
export type ChartIntent =
  | { readonly kind: 'go'; readonly time: number; readonly widen: boolean }
  | { readonly kind: 'note'; readonly step: 1 | -1 }
  | { readonly kind: 'open-close-up' | 'back' | 'play' };

/** The part of a KeyboardEvent that matters. */
export interface KeyPress {
  readonly key: string;
  readonly ctrlKey: boolean;
  readonly metaKey: boolean;
  readonly shiftKey: boolean;
  readonly altKey: boolean;
}

/** What a press means with the cursor at `time`; undefined where the chart leaves it to others. */
export function chartIntent(
  press: KeyPress,
  time: number,
  data: ChartData,
  rows: readonly FoldRow[],
): ChartIntent | undefined {
  if (press.altKey) return undefined;
  const jump = press.ctrlKey || press.metaKey;
  const target = jump ? jumpTarget(press.key, time, data) : moveTarget(press.key, time, data, rows);
  if (target !== undefined) return { kind: 'go', time: hold(target, data), widen: press.shiftKey };
  if (jump) return undefined;
  switch (press.key) {
    case 'PageDown':
      return { kind: 'note', step: 1 };
    case 'PageUp':
      return { kind: 'note', step: -1 };
    case 'Enter':
      return { kind: 'open-close-up' };
    case 'Escape':
      return { kind: 'back' };
    case ' ':
      return { kind: 'play' };
    default:
      return undefined;
  }
}

function moveTarget(
  key: string,
  time: number,
  data: ChartData,
  rows: readonly FoldRow[],
): number | undefined {
  const row = rows[rowAt(rows, time)];
  const fold = row.to - row.from;
  switch (key) {
    case 'ArrowLeft':
      return frameBy(time, -1, data);
    case 'ArrowRight':
      return frameBy(time, 1, data);
    case 'ArrowUp':
      return time - fold >= data.motion.start ? time - fold : time;
    case 'ArrowDown':
      return time + fold;
    case 'Home':
      return row.from;
    case 'End':
      return row.to - frameLength(data);
    default:
      return undefined;
  }
}

function jumpTarget(key: string, time: number, data: ChartData): number | undefined {
  const { keys } = data;
  switch (key) {
    case 'ArrowLeft': {
      const before = firstKeyAt(keys, time) - 1;
      return before >= 0 ? keys[before] : data.motion.start;
    }
    case 'ArrowRight': {
      const after = firstKeyAfter(keys, time);
      return after < keys.length ? keys[after] : data.motion.end;
    }
    case 'Home':
      return data.motion.start;
    case 'End':
      return data.motion.end;
    default:
      return undefined;
  }
}

/** One frame on or back, landing on the clip's own grid, counted from the motion's start. */
export function frameBy(time: number, step: number, data: Pick<ChartData, 'frameRate' | 'motion'>): number {
  const frame = frameLength(data);
  const at = (time - data.motion.start) / frame;
  // 1e-4 of a frame: a time read back from a slider or a key counts as on the grid.
  const next = step > 0 ? Math.floor(at + 1e-4) + step : Math.ceil(at - 1e-4) + step;
  return data.motion.start + next * frame;
}

function hold(time: number, data: ChartData): number {
  return Math.min(data.motion.end, Math.max(data.motion.start, time));
}
