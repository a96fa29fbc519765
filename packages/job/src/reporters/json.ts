import type { Report } from '../report.js';

/** The report as JSON text, two spaces deep, with a last line break. */
export function jsonReport(report: Report): string {
  return `${JSON.stringify(report, null, 2)}\n`;
}
