import type { RotationTrack } from '@slewcurve/core';
import type { Step } from './step.js';

/** What an edit did to one track, measured by the edit itself. */
export interface EditResult {
  /** The edited track; the same object where nothing changed. */
  readonly track: RotationTrack;
  /** Keys of the new track whose stored numbers differ from the old track's (inserted keys count). Ascending. */
  readonly changed: readonly number[];
  /** Keys of the new track that the old one did not have. Ascending. */
  readonly inserted: readonly number[];
  /** Largest turn of any key of the old track, degrees. Keys that had no orientation before are left out. */
  readonly largest: number;
  /** Seconds added to the clip. 0 for every verb that keeps times. */
  readonly added: number;
  /** First and last time between which the motion as written may differ, seconds; left out where it can't differ anywhere. */
  readonly span?: readonly [number, number];
}

/** A kind of edit: one file under `edits/`, one line in the registry. */
export interface Verb {
  /** The name on job cards: "lift out". */
  readonly name: string;
  /** What it is for, one sentence. */
  readonly summary: string;
  /** What the trade calls it elsewhere; feeds `explain`. */
  readonly alsoCalled: readonly string[];
  /** What its sentence begins with: "Lift out". Unlike every other verb's. */
  readonly opening: string;
  /** Which of the step's own numbers it reads, apart from `span`, `shoulders` and `keep`, which every verb reads. */
  readonly reads: readonly (keyof Step)[];
  /** True where `--proposed` may only use it when allowed by name. */
  readonly needsAllowing: boolean;
  /** True where each of `keys` is acted on by itself, so that two steps on one track can be one. */
  readonly keysApart: boolean;
  /** True where it puts in keys, so that later key numbers shift. */
  readonly insertsKeys: boolean;
  /** The step in a sentence, as people read it. `parseSentence` reads it back. */
  say(step: Step): string;
  /**
   * @throws SlewcurveError `step.…` where the step can't be applied to this track; nothing is half done.
   */
  apply(track: RotationTrack, step: Step): EditResult;
}
