import type { FileReport, Report, ReportedFinding } from '../report.js';
import { sayFault, sayRemedy } from './say-finding.js';

const COLUMNS: readonly {
  readonly head: string;
  cell(file: FileReport, finding: ReportedFinding): string;
}[] = [
  { head: 'file', cell: ({ file }) => word(file) },
  { head: 'level', cell: (_, { level }) => level },
  { head: 'rule', cell: (_, { rule }) => rule },
  { head: 'clip', cell: (_, { clip }) => word(clip) },
  { head: 'track', cell: (_, { track }) => word(track) },
  { head: 'time_s', cell: (_, { time }) => String(time) },
  { head: 'frame', cell: (_, { frame }) => String(frame ?? '') },
  { head: 'keys', cell: (_, { keys }) => keys.join(' ') },
  { head: 'value', cell: (_, { value }) => String(value) },
  { head: 'unit', cell: (_, { unit }) => unit },
  { head: 'limit', cell: (_, { limit }) => String(limit) },
  { head: 'playback', cell: (_, { playback }) => playback },
  { head: 'places', cell: (_, { count }) => String(count) },
  { head: 'muted', cell: (_, { muted }) => muted ?? '' },
  { head: 'fingerprint', cell: (_, { fingerprint }) => fingerprint },
  { head: 'message', cell: (_, finding) => word(sayFault(finding)) },
  { head: 'try', cell: (_, finding) => word(sayRemedy(finding)) },
];

/**
 * The report as comma-separated values (RFC 4180): a head, then one row a finding. A file that can't be read has one row whose rule is
 * the error's code.
 */
export function csvReport(report: Report): string {
  const head = COLUMNS.map((column) => column.head);
  const rows = report.files.flatMap((file) => [
    ...(file.error ? [unreadableRow(file.file, file.error)] : []),
    ...file.findings.map((finding) => COLUMNS.map((column) => column.cell(file, finding))),
  ]);
  return [head, ...rows].map((cells) => `${cells.map(quoted).join(',')}\r\n`).join('');
}

function unreadableRow(file: string, error: { readonly code: string; readonly message: string }): string[] {
  const known: Readonly<Record<string, string>> = {
    file: word(file),
    level: 'error',
    rule: error.code,
    message: word(error.message),
  };
  return COLUMNS.map(({ head }) => known[head] ?? '');
}

/**
 * Text that a file's author chose, behind an apostrophe where a spreadsheet would run it as a formula (OWASP, "CSV Injection").
 */
function word(text: string): string {
  return /^[=+\-@\t\r]/.test(text) ? `'${text}` : text;
}

function quoted(cell: string): string {
  return /[",\r\n]/.test(cell) ? `"${cell.replaceAll('"', '""')}"` : cell;
}
