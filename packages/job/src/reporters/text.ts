import { sayStep } from '@slewcurve/mend';
import type { Finding } from '@slewcurve/survey';
import type { FileReport, Report, StepReport, TrackReport } from '../report.js';

/** The report as people read it: one sentence a finding, the verdict last. */
export function textReport(report: Report): string {
  return [
    ...(report.steps ?? []).map(sayDone),
    ...report.files.flatMap(sayFile),
    sayVerdict(report),
    '',
  ].join('\n');
}

/** The roster as text: one row a track, then what `textReport` says. */
export function textRoster(report: Report): string {
  return [...report.files.flatMap(fileRoster), textReport(report)].join('\n');
}

function sayFile(file: FileReport): string[] {
  if (file.error) return [`${file.file}: can't be read. ${file.error.message} error ${file.error.code}`];
  const problems = (file.problems ?? []).map(({ code, message }) => `${file.file}: ${message} ${code}`);
  return [...problems, ...file.findings.map((finding) => sayFinding(file, finding))];
}

function sayFinding(file: FileReport, finding: Finding): string {
  const remedy =
    finding.remedy === undefined ? '' : `; try: ${lowerFirst(sayStep(finding.remedy)).replace(/\.$/, '')}`;
  const more = finding.count > 1 ? ` (the worst of ${finding.count} places)` : '';
  return `${file.file}: ${finding.track} in ${finding.clip}, ${whenOf(finding)}: ${finding.message.replace(/\.$/, '')}${more}. ${finding.level} ${finding.rule}${remedy}`;
}

function sayDone(step: StepReport): string {
  const keys = step.changed === 1 ? '1 key changed' : `${step.changed} keys changed`;
  return `${sayStep(step.step)} ${keys}, the largest by ${number(step.largest)}°; outside its span ${number(step.outside)}°; ${number(step.added)} s added.`;
}

function sayVerdict({ files, totals, verdict }: Report): string {
  const unreadable = files.filter((file) => file.status === 'unreadable').length;
  const counts = [
    counted(totals.error, 'error'),
    counted(totals.warning, 'warning'),
    counted(totals.note, 'note'),
  ].join(', ');
  return `verdict: ${verdict}. ${counts} in ${counted(files.length, 'file')}, ${totals.stamped} stamped${unreadable === 0 ? '' : `; ${unreadable} could not be read`}`;
}

const COLUMNS: readonly { readonly head: string; cell(track: TrackReport): string }[] = [
  { head: 'keys', cell: (track) => String(track.keys) },
  { head: 'from s', cell: (track) => track.start.toFixed(3) },
  { head: 'to s', cell: (track) => track.end.toFixed(3) },
  { head: 'turned °', cell: (track) => number(track.travelled) },
  { head: 'median °/s', cell: (track) => number(track.medianRate) },
  { head: 'peak °/s', cell: (track) => number(track.peakRate) },
  { head: 'peak at s', cell: (track) => track.peakAt.toFixed(3) },
  { head: 'floor °/s', cell: (track) => number(track.noiseFloor) },
];

function fileRoster(file: FileReport): string[] {
  if (file.error) return [];
  const rows = file.tracks.map((track) => ({
    cells: [...COLUMNS.map((column) => column.cell(track)), faultsOf(file, track)],
    name: `${track.track} in ${track.clip}`,
  }));
  const heads = [...COLUMNS.map((column) => column.head), 'found'];
  const widths = heads.map((head, i) =>
    Math.max(head.length, ...rows.map((row) => row.cells[i]?.length ?? 0)),
  );
  const line = (cells: readonly string[], name: string): string =>
    `${cells.map((cell, i) => cell.padStart(widths[i] ?? 0)).join('  ')}  ${name}`;
  return [
    `${file.file}: ${counted(file.tracks.length, 'rotation track')} in ${counted(file.clips.length, 'clip')}`,
    line(heads, 'track'),
    ...rows.map((row) => line(row.cells, row.name)),
    '',
  ];
}

function faultsOf(file: FileReport, track: TrackReport): string {
  const found = file.findings.filter(
    (finding) => finding.track === track.track && finding.clip === track.clip,
  );
  const count = (level: string): number => found.filter((finding) => finding.level === level).length;
  const parts = [`${count('error')}e`, `${count('warning')}w`, `${count('note')}n`].filter(
    (part) => !part.startsWith('0'),
  );
  return parts.join(' ') || '-';
}

function counted(count: number, what: string): string {
  return `${count} ${what}${count === 1 ? '' : 's'}`;
}

/** At most six significant digits, without an exponent for anything a person meets. */
function number(value: number): string {
  const digits = Math.abs(value) >= 100 ? 0 : Math.abs(value) >= 10 ? 1 : 2;
  if (value !== 0 && Math.abs(value) < 0.005) return value.toPrecision(2);
  return value.toLocaleString('en-GB', { minimumFractionDigits: digits, maximumFractionDigits: digits });
}

/** A finding of no key is of the whole track. */
function whenOf({ keys, time }: Finding): string {
  return keys.length === 0 ? 'all along' : seconds(time);
}

function seconds(time: number): string {
  return `${time.toFixed(3)} s`;
}

function lowerFirst(text: string): string {
  return text.charAt(0).toLowerCase() + text.slice(1);
}
