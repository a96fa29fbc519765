import type { Finding } from '@slewcurve/survey';
import { LEVELS, isAtLeast, type FileReport, type Report, type StepReport, type Totals } from './report.js';
import type { JobSettings } from './settings.js';
import { VERSION } from './version.js';

/** The report over several files: totals and verdict from their findings. A file that can't be read never passes. */
export function buildReport(
  files: readonly FileReport[],
  settings: JobSettings,
  steps?: readonly StepReport[],
): Report {
  const findings = files.flatMap((file) => file.findings);
  return {
    schemaVersion: 1,
    tool: { name: 'slewcurve', version: VERSION },
    playbacks: settings.playbacks,
    failAt: settings.failAt,
    files,
    totals: totalsOf(findings),
    verdict:
      files.every((file) => file.status === 'surveyed') && passes(findings, settings) ? 'pass' : 'fail',
    ...(steps !== undefined && { steps }),
  };
}

function totalsOf(findings: readonly Finding[]): Totals {
  const [error = 0, warning = 0, note = 0] = LEVELS.map(
    (level) => findings.filter((finding) => finding.level === level).length,
  );
  return { error, warning, note, stamped: 0 };
}

/** `failAt` and `allowWarnings` alone decide: the first so many warnings are let pass, errors and notes never. */
function passes(findings: readonly Finding[], settings: JobSettings): boolean {
  const failing = findings.filter((finding) => isAtLeast(finding.level, settings.failAt));
  const warnings = failing.filter((finding) => finding.level === 'warning').length;
  return failing.length - warnings + Math.max(0, warnings - settings.allowWarnings) === 0;
}
