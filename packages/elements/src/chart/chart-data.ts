import type { TimeForm } from '@slewcurve/core';
import type { Motion } from './motion.js';
import type { RemedyWay } from './remedy-ways.js';

/** How bad a finding is. */
export type NoteLevel = 'error' | 'warning' | 'note';

/** One place of a finding, seconds of the file's clock. */
export interface NotePlace {
  readonly time: number;
  readonly span: readonly [number, number];
  readonly level: NoteLevel;
}

/** A finding as the margin shows it. */
export interface MarginNote {
  /** Fingerprint or another name that stays the same; events carry it. */
  readonly id: string;
  readonly rule: string;
  readonly level: NoteLevel;
  /** The finding in a sentence. */
  readonly message: string;
  /** The worst place. */
  readonly time: number;
  /** All places that are drawn. */
  readonly places: readonly NotePlace[];
  /** Places in all, where more were found than are drawn. */
  readonly count: number;
  /** Stamped: accepted with a reason; its note is struck through. */
  readonly status: 'open' | 'mended' | 'stamped';
  /** The edit that would take it away, as a sentence, and what the button that opens it says: "Lift out key 19". */
  readonly remedy?: RemedyWay;
  /** Other edits that would, where a person must choose: each a button of its own. */
  readonly others?: readonly RemedyWay[];
  /** What is seen of it: millimetres at the farthest joint, pixels of a picture. */
  readonly effect?: { readonly value: number; readonly unit: string };
  /** What happens at the same instant on other tracks too: on how many in all, when, and the track to look at first. */
  readonly event?: { readonly tracks: number; readonly time: number; readonly owner: string };
  /** Places that somebody accepted, and why: "the hit is meant (Ada, 2026-05-17)". */
  readonly accepted?: { readonly places: number; readonly reasons: readonly string[] };
}

/** Another motion to compare with. */
export interface OtherMotion {
  readonly motion: Motion;
  /** "before", or the playback: "finite cubic". */
  readonly name: string;
  /** Times of its keys, seconds, ascending, where they are not the chart's. */
  readonly keys?: Float64Array;
}

/** One track as the chart shows it. Immutable: a change is a new object. */
export interface ChartData {
  /** Path of the node; the last part is the title. */
  readonly track: string;
  readonly clip: string;
  readonly file: string;
  /** The motion as played, after the edits. */
  readonly motion: Motion;
  /** "as written", "short way". */
  readonly playback: string;
  /** Times of the keys, seconds, ascending. */
  readonly keys: Float64Array;
  /** Keys whose stored numbers are kept by the sentence at hand. Ascending. */
  readonly kept?: readonly number[];
  /** Keys after which there is a cut. Ascending. */
  readonly cuts?: readonly number[];
  /** Frames per second, where the clip has a grid; a frame is 1/60 s elsewhere. */
  readonly frameRate?: number;
  /** How times are written. Default seconds; without a grid always seconds. */
  readonly timeForm?: TimeForm;
  /** deg/s below which nothing is claimed. */
  readonly noiseFloor: number;
  /** A speed that should not be passed, deg/s, and whose it is: "house rule", "maker's limit". */
  readonly limit?: { readonly speed: number; readonly name: string };
  /** Before the edits. */
  readonly before?: OtherMotion;
  /** The motion is what the edit at hand would make of `before`; nothing is done yet. */
  readonly tried?: boolean;
  /** The same keys under another playback. */
  readonly second?: OtherMotion;
  /** Seconds of one loop, where the clip repeats. */
  readonly loop?: number;
  /** Names of the rates about the own axes. */
  readonly rateNames: readonly [string, string, string];
  readonly notes: readonly MarginNote[];
}

/** Names of the rates: pan, tilt and roll for cameras and heads, about own x, y, z for everything else. */
export function rateNames(role: string): readonly [string, string, string] {
  // Own y is up and own x points right, so turning about y pans and about x tilts; a camera looks along −z (glTF 2.0).
  return role.startsWith('camera') ? ['tilt', 'pan', 'roll'] : ['about own x', 'about own y', 'about own z'];
}

/** The last part of a node path, as people call it. */
export function trackName(track: string): string {
  const last = track.slice(track.lastIndexOf('/') + 1);
  return last.replaceAll('~1', '/').replaceAll('~0', '~') || 'nameless track';
}

/** Seconds of one frame of this clip. */
export function frameLength(data: Pick<ChartData, 'frameRate'>): number {
  return data.frameRate !== undefined && data.frameRate > 0 ? 1 / data.frameRate : 1 / 60;
}

/** The 95th percentile of the speeds of a motion, deg/s: what is usual for it. In `columns` looks of equal length. */
export function usualSpeed(motion: Motion, columns = 1024): number {
  const { greatest } = motion.columns(motion.start, motion.end, columns);
  return greatest.toSorted()[Math.floor(0.95 * (columns - 1))];
}

/** Greatest speed of the whole motion, deg/s, in `columns` looks. */
export function peakSpeed(motion: Motion, columns = 512): { readonly speed: number; readonly time: number } {
  let column = 0;
  const { greatest } = motion.columns(motion.start, motion.end, columns);
  for (let i = 1; i < columns; i++) if (greatest[i] > greatest[column]) column = i;
  const width = (motion.end - motion.start) / columns;
  return { speed: greatest[column], time: motion.start + (column + 0.5) * width };
}
