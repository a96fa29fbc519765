import type { Inked } from '@slewcurve/elements/plot';
import type {
  OpenedAnswer,
  FileReport,
  ReportedFinding,
  RosterRow,
  SaidConventions,
  Stamp,
  StepReport,
} from '@slewcurve/job';
import type { Finding, SurveyEvent } from '@slewcurve/survey';
import type { CardHistory } from './card-history.js';
import type { Progress } from './desk-client.js';

/** A track's row with its ink, as the worker makes it. */
export type InkedRow = Inked<RosterRow>;

/** Everything that the page holds of one file. A new object for every change. */
export interface FileWork {
  /** The file's name on the desk. */
  readonly id: string;
  readonly name: string;
  /** The bytes as opened; absent for the demo scene. */
  readonly blob?: Blob;
  readonly siblings: Readonly<Record<string, Blob>>;
  readonly handle?: FileSystemFileHandle;
  /** What was said of it where it is silent. */
  readonly said?: SaidConventions;
  readonly status: 'opening' | 'surveying' | 'ready' | 'broken' | 'stopped';
  readonly progress?: Progress;
  readonly error?: { readonly code: string; readonly message: string };
  readonly opened?: OpenedAnswer;
  readonly report?: FileReport;
  /** By `trackKey`, as the job card leaves the tracks. */
  readonly rows: ReadonlyMap<string, InkedRow>;
  readonly found: ReadonlyMap<string, readonly Finding[]>;
  /** The same with what is accepted marked. */
  readonly findings: ReadonlyMap<string, readonly ReportedFinding[]>;
  /** What happens at once on several tracks, as the job card leaves them. */
  readonly events: readonly SurveyEvent[];
  /** Places that somebody accepted. */
  readonly stamps: readonly Stamp[];
  /** Clips that are said to play as loops. */
  readonly loops: readonly string[];
  readonly history: CardHistory;
  readonly proofs: readonly StepReport[];
  readonly raised: readonly Finding[];
  /** Size and hash of what was last written over the file here. */
  readonly onDisk?: { readonly size: number; readonly sha256: string };
  /** Whether the card was saved as it is. */
  readonly saved: boolean;
}

/** One name for a track within its file. */
export function trackKey(clip: string, track: string): string {
  return JSON.stringify([clip, track]);
}
