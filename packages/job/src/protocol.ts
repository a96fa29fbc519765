import type { RotationTrack, SceneNode } from '@slewcurve/core';
import type { TableOptions } from '@slewcurve/formats';
import type { JobCard, Step } from '@slewcurve/mend';
import type { Finding, SurveyEvent, Word } from '@slewcurve/survey';
import type { Convention, SaidConventions } from './conventions.js';
import type { MatrixSettings, PlaybackMatrix } from './playback-matrix.js';
import type { TableTrial } from './table-trial.js';
import type { ClipReport, FileReport, StepReport, TrackReport } from './report.js';
import type { RosterRow } from './roster-row.js';
import type { JobSettings } from './settings.js';
import type { Stamp } from './stamps.js';
import type { TrialAnswer } from './try-step.js';

/** A track by name, with its length: known as soon as the file is open. */
export interface TrackName {
  readonly clip: string;
  readonly track: string;
  readonly keys: number;
}

/** What is known of a file as soon as it is open. */
export interface OpenedAnswer {
  readonly name: string;
  readonly format: string;
  readonly size: number;
  readonly nodes: readonly SceneNode[];
  readonly clips: readonly ClipReport[];
  readonly tracks: readonly TrackName[];
  readonly problems: readonly { readonly code: string; readonly message: string }[];
  readonly conventions: readonly Convention[];
}

/** A track as the file has it and as the job card leaves it. Their arrays are copies, handed over. */
export interface TrackAnswer {
  readonly before: RotationTrack;
  readonly after: RotationTrack;
  /** The tracks above it in its clip, as the card leaves them: what the world's axes hang on. */
  readonly above: readonly RotationTrack[];
}

/** What became of a card: the tracks that read otherwise than under the card before, and each step's proof. */
export interface CardAnswer<Row = RosterRow> {
  readonly tracks: readonly {
    readonly report: TrackReport;
    readonly row: Row;
    readonly findings: readonly Finding[];
  }[];
  readonly steps: readonly StepReport[];
  /** Warnings and errors that the file did not have before the card. */
  readonly raised: readonly Finding[];
  /** What happens at once on several tracks, of the whole file as the card leaves it. */
  readonly events: readonly SurveyEvent[];
}

/** The mended file's bytes and what takes them back. */
export interface BytesAnswer {
  readonly bytes: Uint8Array;
  readonly sha256: string;
  readonly original: { readonly size: number; readonly sha256: string };
  /** Text of the undo plan. */
  readonly undo: string;
  readonly card: JobCard;
}

/** Everything that can be asked of the desk, and what it answers. `Blob` is what the caller has for bytes, `Row` what it makes of a row. */
export interface Asks<Blob, Row = RosterRow> {
  open: {
    ask: {
      file: string;
      name: string;
      blob: Blob;
      siblings: Readonly<Record<string, Blob>>;
      said?: SaidConventions;
    };
    answer: OpenedAnswer;
  };
  /** What a table of text becomes by what is said of it; nothing is opened. */
  'try-table': { ask: { name: string; blob: Blob; table: TableOptions }; answer: TableTrial };
  'open-demo': { ask: { file: string }; answer: OpenedAnswer };
  /** Rows are told as they come; the answer is the whole report. */
  survey: { ask: { file: string; settings: JobSettings }; answer: FileReport };
  track: { ask: { file: string; clip: string; track: string }; answer: TrackAnswer };
  /** What a step would make of a track as the card leaves it; nothing is kept. */
  try: { ask: { file: string; clip: string; track: string; step: Step }; answer: TrialAnswer };
  card: { ask: { file: string; steps: readonly Step[] }; answer: CardAnswer<Row> };
  propose: {
    ask: { file: string; allow: readonly string[]; stamps: readonly Stamp[] };
    answer: { steps: readonly Step[]; declined: readonly { step: Step; why: string }[] };
  };
  bytes: { ask: { file: string }; answer: BytesAnswer };
  /** Size and hash of bytes as they are now, to see whether a file on disk changed. */
  hash: { ask: { blob: Blob }; answer: { size: number; sha256: string } };
  close: { ask: { file: string }; answer: null };
  /** Worst speed and departure of a track, as the card leaves it, by playback and tick rate. */
  matrix: {
    ask: { file: string; clip: string; track: string; settings: MatrixSettings };
    answer: PlaybackMatrix;
  };
  /** What things are called, and what else; for a find field. */
  words: { ask: object; answer: readonly Word[] };
  /** Answered at once while the desk lives. */
  ping: { ask: object; answer: null };
}

/** Names of what can be asked. */
export type AskName = keyof Asks<unknown>;

/** To the desk. `stop` ends the ask of that id with `job.stopped`. */
export type ToDesk<Blob> =
  | {
      [Name in AskName]: { readonly id: number; readonly name: Name; readonly ask: Asks<Blob>[Name]['ask'] };
    }[AskName]
  | { readonly id: number; readonly name: 'stop' };

/** From the desk, always about the ask of that id. */
export type FromDesk<Row = RosterRow> =
  | {
      readonly id: number;
      readonly told: 'progress';
      readonly done: number;
      readonly total: number;
      readonly what: string;
    }
  | { readonly id: number; readonly told: 'row'; readonly row: Row }
  | { readonly id: number; readonly told: 'answer'; readonly answer: Asks<unknown, Row>[AskName]['answer'] }
  | { readonly id: number; readonly told: 'error'; readonly code: string; readonly message: string };
