import type { Track } from './read-scene.js';

export interface Entry {
  readonly clip: string;
  readonly track: string;
  readonly rule: string;
  readonly level: 'error' | 'warning' | 'note';
  /** Keys at fault, ascending: the later key of a segment. */
  readonly keys: readonly number[];
  /** Of the worst place. */
  readonly value: number;
  readonly unit: string;
  /** By how much another reading of the same rule may differ, in the same unit. */
  readonly tolerance: number;
  /** What `value` is, where the rule leaves a choice. */
  readonly means?: string;
}

/** An entry for `track`; value and tolerance are written with six and two digits. */
export function entry(
  { clip, track }: Track,
  rule: string,
  keys: readonly number[],
  value: number,
  unit: string,
  tolerance: number,
  more: Partial<Pick<Entry, 'level' | 'means'>> = {},
): Entry {
  const { level = 'warning', means } = more;
  return {
    clip,
    track,
    rule,
    level,
    keys,
    value: Number(value.toPrecision(6)),
    unit,
    tolerance: Number(tolerance.toPrecision(2)),
    ...(means !== undefined && { means }),
  };
}

/** Dense tracks: at least 20 keys a second, the one test of the two that the demo's tracks need. */
export function isDense({ times }: Track): boolean {
  return (times.length - 1) / (times[times.length - 1] - times[0]) >= 19.999;
}
