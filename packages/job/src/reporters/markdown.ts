import { LEVELS, type FileReport, type Report } from '../report.js';
import { sayFault, sayRemedy, sayWhen } from './say-finding.js';
import { escapedMarkdown, markdownTable } from './markdown-text.js';
import { sayVerdict } from './say-verdict.js';

/** The report as GitHub-flavoured Markdown: the verdict, a table of files, then a table of open findings for each file that has any. */
export function markdownReport(report: Report): string {
  const speaking = report.files.filter(
    (file) => file.status === 'unreadable' || (file.problems ?? []).length > 0 || file.findings.length > 0,
  );
  const silent = report.files.length - speaking.length;
  const sections = [
    '# Slewcurve report',
    escapedMarkdown(sayVerdict(report)),
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
  return markdownTable([['file', 'errors', 'warnings', 'notes', 'muted'], ...rows]);
}

function fileSection(file: FileReport): string[] {
  const open = file.findings.filter(({ muted }) => muted === undefined);
  const told = [
    ...(file.error ? [`${escapedMarkdown(file.error.message)} ${escapedMarkdown(file.error.code)}`] : []),
    ...(file.problems ?? []).map(
      ({ code, level = 'note', message }) => `${escapedMarkdown(message)} ${level} ${escapedMarkdown(code)}`,
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
  return [
    `## ${escapedMarkdown(file.file)}`,
    ...told,
    ...(rows.length > 0 ? [markdownTable([head, ...rows])] : []),
  ];
}

function goneSection(gone: NonNullable<Report['gone']>): string {
  const rows = gone.map(({ file, rule, clip, track }) => [file, rule, clip, track]);
  return `## Gone since the baseline\n\n${markdownTable([['file', 'rule', 'clip', 'track'], ...rows])}`;
}
