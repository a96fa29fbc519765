import type { TimeForm } from '@slewcurve/core';
import type { Report } from '../report.js';
import { csvReport } from './csv.js';
import { jsonReport } from './json.js';
import { markdownReport } from './markdown.js';
import { sarifReport } from './sarif.js';
import { textReport, type Paint } from './text.js';

/** What a reporter may want to know besides the report. */
export interface ReporterOptions {
  /** Absolute path, forward slashes, of the folder that files are given relative to. */
  readonly folder?: string;
  /** Colours of a terminal. */
  readonly paint?: Paint;
  /** How text writes times; seconds where nothing is said. */
  readonly time?: TimeForm;
}

/** A form that a report is printed in. */
export type ReportFormat = 'text' | 'json' | 'sarif' | 'csv' | 'markdown';

/** Every form of a report: a new one is a file and a line here. */
export const REPORTERS: Readonly<Record<ReportFormat, (report: Report, options: ReporterOptions) => string>> =
  Object.freeze({
    text: (report, { paint, time }) => textReport(report, paint, time),
    json: jsonReport,
    sarif: (report, { folder }) => sarifReport(report, folder),
    csv: csvReport,
    markdown: markdownReport,
  });

/** Names of the forms, the default first. */
export const REPORT_FORMATS: readonly ReportFormat[] = Object.freeze([
  'text',
  'json',
  'sarif',
  'csv',
  'markdown',
]);
