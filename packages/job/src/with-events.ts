import { gatherEvents } from '@slewcurve/survey';
import type { FileReport } from './report.js';

/** The report with its findings' owners, and with what of them happens at once on several tracks. */
export function withEvents(report: FileReport): FileReport {
  const rates = new Map(
    report.clips.flatMap(({ clip, frameRate }) =>
      frameRate === undefined ? [] : [[clip, frameRate] as const],
    ),
  );
  const { events, findings } = gatherEvents(report.findings, rates);
  const { events: _before, ...others } = report;
  return { ...others, findings, ...(events.length > 0 && { events }) };
}
