import type { RotationTrack, SceneNode } from '@slewcurve/core';
import type { Step } from './step.js';

/** What an edit did to one track, measured by the edit itself. */
export interface EditResult {
  /** The edited track; the same object where nothing changed. */
  readonly track: RotationTrack;
  /** Keys of the new track whose stored numbers differ from the old track's (inserted keys count). Ascending. */
  readonly changed: readonly number[];
  /** Keys of the new track that the old one did not have. Ascending. */
  readonly inserted: readonly number[];
  /** Where keys were dropped or changed places: the old number of every key of the new track, -1 for one that was put in. */
  readonly oldKeys?: readonly number[];
  /** restate alone: the change of axes that it went through, which whatever else has axes must follow. */
  readonly axes?: string;
  /** Keys of the old track that the new one lacks. Ascending. */
  readonly dropped?: readonly number[];
  /** Largest turn of any key of the old track, degrees. Keys that had no orientation before are left out. */
  readonly largest: number;
  /** Seconds added to the clip. 0 for every verb that keeps times. */
  readonly added: number;
  /** First and last time between which the motion as written may differ, seconds; left out where it can't differ anywhere. */
  readonly span?: readonly [number, number];
  /** Pace verbs alone: how time runs now. */
  readonly repaced?: Repaced;
  /** Pace verbs alone: what the new pace costs. */
  readonly price?: Price;
  /** match alone: what both sides of the join turn at now. */
  readonly meeting?: Meeting;
  /** Pace verbs alone: where the new pace takes a bend of the path fast: shown before it is taken. Worst first. */
  readonly bends?: readonly Bend[];
}

/** What a pace verb did to time. */
export interface Repaced {
  /** Old time at a new time and the other way round; whoever is taken along follows it. */
  readonly retiming: TimeMap;
  /** Old times between which the pace changed; what follows is shifted. */
  readonly acted: readonly [number, number];
  readonly with: 'node' | 'track' | 'clip';
}

/** What stands around a track, for edits that look beyond it. */
export interface EditScene {
  /** The file's node tree; a track's id is its node's path. */
  readonly nodes: readonly SceneNode[];
  /** Every track as the step found it. */
  readonly tracks: readonly RotationTrack[];
  /** Those of them that the step names. */
  readonly named: readonly RotationTrack[];
}

/** A map between the clocks before and after an edit, seconds. Where it runs back, `turnsBack`. */
export interface TimeMap {
  /** The old time that plays at a new one. */
  oldTime(t: number): number;
  /** The first new time at which an old one plays. */
  newTime(old: number): number;
  /** True where later old times come earlier: played backwards. */
  readonly turnsBack: boolean;
  /** Where all that was played until then plays backwards again: a new time, seconds. `newTime` gives the way there. */
  readonly turnsAt?: number;
}

/** What a new pace costs. Letting the angle go costs no seconds. */
export interface Price {
  /** Seconds added; fewer than 0 where time is saved. */
  readonly seconds: number;
  /** How far, in degrees, the motion as stored departs from the path at the wanted pace, at the worst place. */
  readonly degrees: number;
  /** Bytes that times and values take more in the track's own storage. */
  readonly bytes: number;
  /** Where corners were rounded: how far, in degrees, the path is off the worst of them. */
  readonly rounded?: number;
}

/** Both sides of a join. */
export interface Meeting {
  /** Speeds just before and just after it, deg/s. */
  readonly before: number;
  readonly after: number;
  /** Angle between the axes that they turn about, own axes, degrees: no pace can change it. 0 where a side rests. */
  readonly axis: number;
}

/** A place where the turn changes its direction at once, or nearly so. */
export interface Bend {
  /** New seconds. */
  readonly time: number;
  /** By how much the rate changes there, deg/s: speed × change of direction. */
  readonly jump: number;
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
  /** True where keys get other times or another order, so that a format whose tracks share rows may not hold the result. */
  readonly movesTimes?: boolean;
  /** True where it makes sense on all tracks of a file or on none. */
  readonly wholeFile?: boolean;
  /** The step in a sentence, as people read it. `parseSentence` reads it back. */
  say(step: Step): string;
  /**
   * @param scene what stands around the track; left out: nothing is known of it
   * @throws SlewcurveError `step.…` where the step can't be applied to this track; nothing is half done.
   */
  apply(track: RotationTrack, step: Step, scene?: EditScene): EditResult;
}
