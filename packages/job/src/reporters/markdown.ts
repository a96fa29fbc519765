import { LEVELS, type FileReport, type Report } from '../report.js';
import { sayFault, sayRemedy, sayWhen } from './say-finding.js';
import { sayVerdict } from './say-verdict.js';

/** The report as GitHub-flavoured Markdown: the verdict, a table of files, then a table of open findings for each file that has any. */
export function markdownReport(report: Report): string {
  const speaking = report.files.filter(
    (file) => file.status === 'unreadable' || (file.problems ?? []).length > 0 || file.findings.length > 0,
  );
  const silent = report.files.length - speaking.length;
  const sections = [
    '# Slewcurve report',
    escaped(sayVerdict(report)),
    ...(speaking.length > 0 ? [fileTable(speaking)] : []),
    ...(silent > 0 && speaking.length > 0 ? [`Nothing was found in ${silent} more.`] : []),
    ...speaking.flatMap(fileSection),
    ...(report.gone && report.gone.length > 0 ? [goneSection(report.gone)] : []),
  ];
  return `${sections.join('\n\n')}\n`;
}

function fileTable(files: readonly FileReport[]): string {
  const rows = files.map((file) => [
    file.file,
    ...(file.error
      ? ["can't be read", '', '']
      : LEVELS.map((level) =>
          String(
            file.findings.filter((finding) => finding.level === level && !finding.muted).length +
              (file.problems ?? []).filter((problem) => (problem.level ?? 'note') === level).length,
          ),
        )),
    String(file.findings.filter(({ muted }) => muted).length),
  ]);
  return table([['file', 'errors', 'warnings', 'notes', 'muted'], ...rows]);
}

function fileSection(file: FileReport): string[] {
  const open = file.findings.filter(({ muted }) => muted === undefined);
  const told = [
    ...(file.error ? [`${escaped(file.error.message)} ${escaped(file.error.code)}`] : []),
    ...(file.problems ?? []).map(
      ({ code, level = 'note', message }) => `${escaped(message)} ${level} ${escaped(code)}`,
    ),
  ];
  if (told.length === 0 && open.length === 0) return [];
  const rows = open.map((finding) => [
    finding.level,
    finding.track,
    finding.clip,
    sayWhen(finding),
    sayFault(finding),
    finding.rule,
    sayRemedy(finding),
  ]);
  const head = ['level', 'track', 'clip', 'at', 'what', 'rule', 'try'];
  return [`## ${escaped(file.file)}`, ...told, ...(rows.length > 0 ? [table([head, ...rows])] : [])];
}

function goneSection(gone: NonNullable<Report['gone']>): string {
  const rows = gone.map(({ file, rule, clip, track }) => [file, rule, clip, track]);
  return `## Gone since the baseline\n\n${table([['file', 'rule', 'clip', 'track'], ...rows])}`;
}

function table([head = [], ...rows]: readonly (readonly string[])[]): string {
  return [row(head), `|${' --- |'.repeat(head.length)}`, ...rows.map(row)].join('\n');
}

function row(cells: readonly string[]): string {
  return `| ${cells.map(escaped).join(' | ')} |`;
}

/** Text as it is: nothing in it is read as Markdown or HTML, and it stays on one line (CommonMark 0.31, "Backslash escapes"). */
function escaped(text: string): string {
  return text.replace(/[\r\n\t\f\v\u2028\u2029]+/g, ' ').replace(/[\\`*_[\]<>|&#~!]/g, '\\$&');
}
