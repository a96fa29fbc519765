import type { Step } from '@slewcurve/mend';
import type { KeyPress } from '../chart/chart-keys.js';
import type { Motion } from '../chart/motion.js';
import { firstKeyAfter, firstKeyAt } from '../chart/posts.js';
import type { HandLaw } from './pace-sketch.js';

type Span = readonly [number, number];

/** A place on the paper. */
export interface Place {
  /** Seconds. */
  readonly time: number;
  /** deg/s. */
  readonly speed: number;
}

/** What an edit by hand works on. */
export interface Ground {
  /** The motion before the edit. */
  readonly motion: Motion;
  readonly keys: Float64Array;
  /** Seconds. */
  readonly frame: number;
  /** Where somebody chose that edits act. */
  readonly span?: Span | undefined;
  /** Which law a press keeps to. */
  readonly ends: 'same' | 'run' | 'go';
  /** How far a press reaches where nobody said, seconds. */
  readonly reach: number;
  /** What a pixel stands for: numbers are rounded to it. */
  readonly pixel: Place;
}

/** The step that an edit by hand is, but for the names of clip and track. */
export type HandEdit = Omit<Step, 'clip' | 'track'>;

/** One edit made by hand, with one handle. Immutable: a move makes another. */
export interface Hand {
  readonly kind: 'press' | 'limit' | 'hold' | 'draw' | 'retime';
  /** Where the handle stands: seconds before the edit; whether its speed is the trace's there, its own, or none (on the baseline). */
  readonly time: number;
  readonly stands: 'trace' | 'baseline' | { readonly speed: number };
  /** A stroke goes on from where the last one ended, and may begin anywhere. */
  readonly gathers?: boolean;
  /** The speed as it was drawn. */
  readonly drawn?: readonly Place[];
  /** The handle stands this much later on the new clock, seconds. */
  readonly later?: number;
  /** Undefined while it changes nothing. */
  readonly law?: HandLaw | undefined;
  readonly edit: HandEdit;
  /** What the handle is, and what it says now. */
  readonly label: string;
  readonly says: string;
  /** The same, as short as stands beside the handle. */
  readonly tag: string;
  /** The one number that the handle sets, for its slider. */
  readonly amount: number;
  /** This hand, as it was when it was grabbed at `from`, drawn to `to`. */
  dragged(from: Place, to: Place): Hand;
  /** Moved by a key of the keyboard, ten times as far with Shift; undefined where the key is none of its. */
  nudged(press: KeyPress): Hand | undefined;
}

/** The span drawn out to keys, as far as there are any. */
export function outToKeys({ keys, motion }: Ground, [from, to]: Span): Span {
  const first = firstKeyAfter(keys, from) - 1;
  const last = firstKeyAt(keys, to);
  return [
    first >= 0 ? keys[first] : (keys[0] ?? motion.start),
    last < keys.length ? keys[last] : (keys[keys.length - 1] ?? motion.end),
  ];
}

/** The span drawn in to keys, as the verbs do it; as it is where it holds fewer than two. */
export function inToKeys({ keys }: Ground, [from, to]: Span): Span {
  const [first, last] = [firstKeyAt(keys, from), firstKeyAfter(keys, to) - 1];
  return first < last ? [keys[first], keys[last]] : [from, to];
}

/** A span of keys in whole milliseconds, no key left out: what a sentence can say, and a verb draws in to the same keys. */
export function sayable([from, to]: Span): Span {
  return [tidy(Math.floor(from * 1000 + 1e-6) / 1000, 1e-3), tidy(Math.ceil(to * 1000 - 1e-6) / 1000, 1e-3)];
}

/** The whole of the keys. */
export function wholeSpan({ keys, motion }: Ground): Span {
  return [keys[0] ?? motion.start, keys[keys.length - 1] ?? motion.end];
}

/** Rounded to a power of ten not above `least`, so that numbers are as long as the hand is fine. */
export function tidy(value: number, least: number): number {
  const power = Math.floor(Math.log10(least > 0 && Number.isFinite(least) ? least : 1) + 1e-9);
  const step = 10 ** power;
  return Number((Math.round(value / step) * step).toFixed(Math.max(0, -power)));
}

/** Steps that an arrow key asks for, across and up; 0 and 0 for other keys. */
export function stepsOfKey({ key, shiftKey, ctrlKey, metaKey, altKey }: KeyPress): readonly [number, number] {
  if (ctrlKey || metaKey || altKey) return [0, 0];
  const far = shiftKey ? 10 : 1;
  const across = { ArrowRight: far, ArrowLeft: -far }[key] ?? 0;
  const up = { ArrowUp: far, ArrowDown: -far }[key] ?? 0;
  return [across, up];
}

export function toRadians(degrees: number): number {
  return (degrees * Math.PI) / 180;
}

/** A signed number with its sign said: "+14", "−3". */
export function signed(value: number, say: (size: number) => string): string {
  return `${value < 0 ? '−' : '+'}${say(Math.abs(value))}`;
}
