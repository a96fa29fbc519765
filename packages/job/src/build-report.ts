import {
  LEVELS,
  isAtLeast,
  type FileReport,
  type GonePlace,
  type Report,
  type ReportedFinding,
  type Shard,
  type StepReport,
  type Totals,
} from './report.js';
import type { Level } from '@slewcurve/survey';
import { mergedCautions } from './cautions.js';
import type { JobSettings } from './settings.js';
import { VERSION } from './version.js';

/** What a report may be of besides files. */
export interface ReportParts {
  readonly steps?: readonly StepReport[];
  readonly shard?: Shard;
  /** What a baseline knew and is gone, and whether that fails the run. */
  readonly baseline?: { readonly gone: readonly GonePlace[]; readonly exact: boolean };
}

/**
 * The report over several files: totals and verdict from their open findings and from problems of the files themselves. A file that can't be read never passes; nor does an exact
 * baseline that knows more than there is.
 */
export function buildReport(
  files: readonly FileReport[],
  settings: Pick<Report, 'playbacks' | 'failAt'> & Pick<JobSettings, 'allowWarnings'>,
  { steps, shard, baseline }: ReportParts = {},
): Report {
  const findings = files.flatMap((file) => file.findings);
  const levels = [
    ...findings.filter(isOpenFinding).map(({ level }) => level),
    ...files.flatMap(({ problems = [] }) => problems.map(({ level = 'note' }) => level)),
  ];
  const fits = baseline === undefined || !baseline.exact || baseline.gone.length === 0;
  const cautions = mergedCautions(files);
  const readable = files.every((file) => file.status === 'surveyed');
  return {
    schemaVersion: 1,
    tool: { name: 'slewcurve', version: VERSION },
    playbacks: settings.playbacks,
    failAt: settings.failAt,
    ...(shard !== undefined && { shard }),
    files,
    totals: {
      ...totalsOf(levels),
      stamped: muted(findings, 'stamped'),
      ...(baseline !== undefined && { known: muted(findings, 'known') }),
    },
    verdict: readable && fits && passes(levels, settings) ? 'pass' : 'fail',
    ...(baseline !== undefined && { gone: baseline.gone }),
    ...(cautions.length > 0 && { cautions }),
    ...(steps !== undefined && { steps }),
  };
}

function totalsOf(levels: readonly Level[]): Pick<Totals, Level> {
  const [error = 0, warning = 0, note = 0] = LEVELS.map(
    (level) => levels.filter((each) => each === level).length,
  );
  return { error, warning, note };
}

function isOpenFinding({ muted: how }: ReportedFinding): boolean {
  return how === undefined;
}

function muted(findings: readonly ReportedFinding[], how: ReportedFinding['muted']): number {
  return findings.filter((finding) => finding.muted === how).length;
}

/** `failAt` and `allowWarnings` alone decide: the first so many warnings are let pass, errors and notes never. */
function passes(
  levels: readonly Level[],
  { failAt, allowWarnings }: Pick<JobSettings, 'failAt' | 'allowWarnings'>,
): boolean {
  const failing = levels.filter((level) => isAtLeast(level, failAt));
  const warnings = failing.filter((level) => level === 'warning').length;
  return failing.length - warnings + Math.max(0, warnings - allowWarnings) === 0;
}
