export type { Caution, CautionRole } from './cautions.js';
export { baselineJson, baselineOf, parseBaseline, withBaseline, type Baseline } from './baseline.js';
export { buildReport, type ReportParts } from './build-report.js';
export {
  compareFiles,
  compareTracks,
  type ComparedFile,
  type Comparison,
  type ComparisonFinding,
  type ComparisonLimits,
  type TrackAddress,
  type TrackComparison,
} from './compare.js';
export { kestrelPointRules } from './demo/house-rules.js';
export { kestrelPoint } from './demo/kestrel-point.js';
export {
  UPS,
  conventionsOf,
  sayConventions,
  type Convention,
  type SaidConventions,
  type Up,
} from './conventions.js';
export {
  USUAL_TICKS,
  playbackMatrix,
  type MatrixCell,
  type MatrixSettings,
  type PlaybackMatrix,
} from './playback-matrix.js';
export { desk, type Desk } from './desk.js';
export { docketHtml } from './docket/docket-html.js';
export { docketMarkdown } from './docket/docket-markdown.js';
export { docketOf, type DocketBlock, type DocketParts, type FileBytes } from './docket/docket.js';
export { tracePicture } from './docket/trace-picture.js';
export { explanationText } from './explanation-text.js';
export { mendFile, type MendedFile } from './mend-file.js';
export { mendProposed, type ProposedMend } from './mend-proposed.js';
export { mergeReports, type NamedReport } from './merge-reports.js';
export type { NamedPlace } from './named-place.js';
export { openFile, type OpenedFile } from './open-file.js';
export { propose, type Declined, type Proposal } from './propose.js';
export type {
  AskName,
  Asks,
  BytesAnswer,
  CardAnswer,
  FromDesk,
  OpenedAnswer,
  ToDesk,
  TrackAnswer,
  TrackName,
} from './protocol.js';
export {
  LEVELS,
  isAtLeast,
  type ClipReport,
  type FileReport,
  type GonePlace,
  type ProblemReport,
  type Report,
  type ReportedFinding,
  type ReportedOccurrence,
  type Shard,
  type StampWords,
  type StepReport,
  type Totals,
  type TrackReport,
} from './report.js';
export { comparisonText } from './reporters/comparison-text.js';
export { csvReport } from './reporters/csv.js';
export { jsonReport } from './reporters/json.js';
export { markdownReport } from './reporters/markdown.js';
export { REPORTERS, REPORT_FORMATS, type ReportFormat, type ReporterOptions } from './reporters/registry.js';
export { sayEvent, sayLoopGuess } from './reporters/say-event.js';
export { sarifReport } from './reporters/sarif.js';
export { textReport, textRoster, type Paint } from './reporters/text.js';
export { rosterRow, type RosterRow } from './roster-row.js';
export type { JobSettings } from './settings.js';
export { tryTable, type TableTrial } from './table-trial.js';
export { sha256Of } from './sha256-of.js';
export {
  addStamps,
  parseStamps,
  stampFindings,
  stampsFileName,
  stampsFor,
  stampsJson,
  withStamps,
  withoutStamps,
  type Stamp,
} from './stamps.js';
export { surveyFile, unreadableFile } from './survey-file.js';
export type { TrialAnswer } from './try-step.js';
export { takeBack, undoPlan, type UndoPlan } from './undo-plan.js';
export { VERSION } from './version.js';
export { UNWATCHED, type Watch } from './watch.js';
