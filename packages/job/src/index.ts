export { buildReport } from './build-report.js';
export { kestrelPointRules } from './demo/house-rules.js';
export { kestrelPoint } from './demo/kestrel-point.js';
export { desk, type Desk } from './desk.js';
export { explanationText } from './explanation-text.js';
export { mendFile, type MendedFile } from './mend-file.js';
export { mendProposed, type ProposedMend } from './mend-proposed.js';
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
  type ProblemReport,
  type Report,
  type StepReport,
  type Totals,
  type TrackReport,
} from './report.js';
export { jsonReport } from './reporters/json.js';
export { textReport, textRoster } from './reporters/text.js';
export { rosterRow, type RosterRow } from './roster-row.js';
export type { JobSettings } from './settings.js';
export { sha256Of } from './sha256-of.js';
export { surveyFile, unreadableFile } from './survey-file.js';
export { takeBack, undoPlan, type UndoPlan } from './undo-plan.js';
export { VERSION } from './version.js';
export { UNWATCHED, type Watch } from './watch.js';
