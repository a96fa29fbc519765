import type { Finding, Level, LoopGuess, Occurrence, SurveyEvent } from '@slewcurve/survey';
import type { Convention } from './conventions.js';
import type { PlaybackMatrix } from './playback-matrix.js';
import type { Bend, Meeting, Price, Step } from '@slewcurve/mend';
import type { Caution } from './cautions.js';

/** One clip of a report. `keys` and `tracks` count rotation tracks. */
export interface ClipReport {
  readonly clip: string;
  readonly seconds: number;
  readonly frameRate?: number;
  readonly tracks: number;
  readonly keys: number;
  /** Where the clip looks like a loop that nobody declared: a question, nothing is judged by it. */
  readonly loopGuess?: LoopGuess;
}

/** One track of a report, as played by the first playback. Degrees, deg/s, deg/s², seconds. */
export interface TrackReport {
  readonly clip: string;
  readonly track: string;
  readonly node: number;
  readonly interpolation: string;
  readonly keys: number;
  readonly start: number;
  readonly end: number;
  readonly travelled: number;
  readonly peakRate: number;
  readonly peakAt: number;
  readonly medianRate: number;
  readonly worstRateJump: number;
  readonly peakAcceleration: number;
  readonly rmsAcceleration: number;
  readonly accelerationIs: 'step' | 'exact';
  /** Largest rate floor of any segment: nothing under it is claimed. */
  readonly noiseFloor: number;
  readonly signChanges: number;
  readonly widestSegment: number;
}

/** Something in the file that could not be read and did not stop the rest. */
export interface ProblemReport {
  readonly code: string;
  /** Left out of what stopped the reading. */
  readonly level?: Level;
  readonly message: string;
}

/** Who accepted a place, when and why. */
export interface StampWords {
  readonly reason: string;
  readonly by: string;
  /** A day, as ISO 8601 writes it. */
  readonly date: string;
}

/** A place of a finding, and whether somebody accepted it or the baseline knows it. */
export interface ReportedOccurrence extends Occurrence {
  readonly stamp?: StampWords;
  readonly known?: true;
}

/** A finding, muted once all its places are stamped, or stamped and known from the baseline. */
export interface ReportedFinding extends Finding {
  readonly occurrences: readonly ReportedOccurrence[];
  readonly muted?: 'stamped' | 'known';
}

/** A place that the baseline knows and that nobody finds any more. */
export interface GonePlace {
  readonly file: string;
  readonly fingerprint: string;
  readonly rule: string;
  readonly clip: string;
  readonly track: string;
}

/** Which part of all files a report is of: the `number`th of `of`, counted from 1. */
export interface Shard {
  readonly number: number;
  readonly of: number;
}

/** One file of a report. */
export interface FileReport {
  readonly file: string;
  readonly status: 'surveyed' | 'unreadable';
  readonly error?: ProblemReport;
  readonly problems?: readonly ProblemReport[];
  /** By which conventions it is read, and who says so. */
  readonly conventions?: readonly Convention[];
  /** Worst speed and departure by playback and tick rate, where it was asked for. */
  readonly matrix?: readonly PlaybackMatrix[];
  readonly clips: readonly ClipReport[];
  readonly tracks: readonly TrackReport[];
  /** One a role; left out where none is. */
  readonly cautions?: readonly Caution[];
  readonly findings: readonly ReportedFinding[];
  /** Findings of several tracks within one frame; left out where there are none. */
  readonly events?: readonly SurveyEvent[];
}

/** What one step of a job card did. Degrees and seconds. */
export interface StepReport {
  readonly step: Step;
  /** Keys whose stored numbers differ now, inserted ones included. */
  readonly changed: number;
  /** Largest turn of a key. */
  readonly largest: number;
  /** Largest change of the motion outside the step's span. */
  readonly outside: number;
  /** Seconds that the clip became longer. */
  readonly added: number;
  /** Keys that are gone, as numbered before the step, by track; left out where none are. */
  readonly dropped?: readonly {
    readonly clip: string;
    readonly track: string;
    readonly keys: readonly number[];
  }[];
  /**
   * What it costs, the worst of the tracks: seconds, degrees, bytes. The degrees of a pace are how far what is stored departs from the path at the wanted
   * pace, those of any other edit how far the motion departs from what it was.
   */
  readonly price?: Price;
  /** Pace verbs alone: where the new pace takes a bend of the path fast, new seconds and deg/s; worst first. */
  readonly bends?: readonly Bend[];
  /** match alone: what both sides of the worst join turn at now. deg/s, degrees. */
  readonly meeting?: Meeting;
}

/** Counts of open findings by level, and of muted ones: how many are stamped, how many known from the baseline. */
export interface Totals {
  readonly error: number;
  readonly warning: number;
  readonly note: number;
  readonly stamped: number;
  /** Only with a baseline. */
  readonly known?: number;
}

/** What `check --format json` prints: see the published schema `schema/report.json`. */
export interface Report {
  readonly schemaVersion: 1;
  readonly tool: { readonly name: 'slewcurve'; readonly version: string };
  readonly playbacks: readonly string[];
  readonly failAt: Level;
  readonly files: readonly FileReport[];
  readonly totals: Totals;
  readonly verdict: 'pass' | 'fail';
  /** A part alone: the files of one machine of several. */
  readonly shard?: Shard;
  /** With a baseline alone: what it knows and is gone. */
  readonly gone?: readonly GonePlace[];
  /** What to mind before a motion is played on a machine or in a headset; left out where none is. */
  readonly cautions?: readonly Caution[];
  /** `mend` alone: what each step did. */
  readonly steps?: readonly StepReport[];
}

/** Levels from bad to mild. */
export const LEVELS: readonly Level[] = Object.freeze(['error', 'warning', 'note']);

/** Whether `level` is as bad as `than` or worse. */
export function isAtLeast(level: Level, than: Level): boolean {
  return LEVELS.indexOf(level) <= LEVELS.indexOf(than);
}
