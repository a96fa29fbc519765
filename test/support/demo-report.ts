import { bufferSource, openAnimation } from '@slewcurve/formats';
import {
  kestrelPoint,
  surveyFile,
  type FileReport,
  type JobSettings,
  type ReportedFinding,
} from '@slewcurve/job';
import { NO_HOUSE_RULES } from '@slewcurve/survey';

/** What the command goes by where no flag is given. */
export const PLAIN_SETTINGS: JobSettings = {
  playbacks: ['as-written'],
  failAt: 'warning',
  allowWarnings: 0,
  houseRules: NO_HOUSE_RULES,
};

let surveyed: Promise<FileReport> | undefined;

/** The survey of the demo scene under a name; made once. */
export async function demoReport(name = 'kestrel-point.glb'): Promise<FileReport> {
  surveyed ??= openAnimation(bufferSource(kestrelPoint()), { name }).then((file) =>
    surveyFile(name, file, PLAIN_SETTINGS),
  );
  return { ...(await surveyed), file: name };
}

/** A finding with as many places as `prints` names, worst first, warnings all. */
export function findingWith(
  prints: readonly string[],
  change: Partial<ReportedFinding> = {},
): ReportedFinding {
  const occurrences = prints.map((fingerprint, i) => ({
    keys: [i + 1],
    time: i + 0.5,
    span: [i, i + 1] as const,
    value: 9 - i,
    level: 'warning' as const,
    fingerprint,
    message: `key ${i + 1} stands off`,
  }));
  return {
    rule: 'jump.lone-key',
    level: 'warning',
    clip: 'walk',
    track: 'hip',
    keys: [1],
    span: [0, 1],
    time: 0.5,
    value: 9,
    unit: 'deg',
    limit: 1,
    playback: 'as-written',
    owner: 'hip',
    count: prints.length,
    occurrences,
    message: 'key 1 stands off',
    fingerprint: 'f'.repeat(16),
    ...change,
  };
}

/** A surveyed file with these findings and nothing else. */
export function fileReportWith(findings: readonly ReportedFinding[], file = 'walk.glb'): FileReport {
  return { file, status: 'surveyed', clips: [], tracks: [], findings };
}
