import { sayTime, type TimeForm } from '@slewcurve/core';
import type { Level } from '@slewcurve/survey';
import {
  isAtLeast,
  type FileReport,
  type GonePlace,
  type Report,
  type ReportedFinding,
  type TrackReport,
} from '../report.js';
import { sayConventions } from '../conventions.js';
import { gatherByRule, sayGathered, type Gathered } from './gathered.js';
import { textMatrix } from './matrix-text.js';
import { printable } from './printable.js';
import { sayEvent, sayLoopGuesses } from './say-event.js';
import { sayCaution } from './say-caution.js';
import { sayDone } from './say-done.js';
import { sayFault, sayPlace, sayRemedy } from './say-finding.js';
import { sayFigure } from './say-figure.js';
import { counted, sayVerdict } from './say-verdict.js';

/** How words of a level, or of the verdict, are coloured for a terminal; elsewhere they stand as they are. */
export type Paint = (text: string, as: Level | Report['verdict']) => string;

const PLAIN: Paint = (text) => text;

/**
 * The report as people read it: one sentence an open finding, those too mild to fail gathered by rule; then what each step did, `results` line
 * by line, and the verdict last.
 */
export function textReport(
  report: Report,
  paint: Paint = PLAIN,
  time: TimeForm = 'seconds',
  results: readonly string[] = [],
): string {
  const { files, failAt } = report;
  return [
    ...files.flatMap((file) => sayFile(file, failAt, paint, time)),
    ...(files.some((file) => mildOf(file, failAt).some(({ findings }) => findings.length > 1))
      ? [GATHERED]
      : []),
    ...(report.gone ?? []).map(sayGone),
    ...(report.steps ?? []).map(sayDone),
    ...results,
    ...(report.cautions ?? []).map(sayCaution),
    paint(sayVerdict(report), report.verdict),
    '',
  ].join('\n');
}

const GATHERED =
  'Findings too mild to fail are gathered by rule: --fail-at note lists every one, --format json has them all.';

/** The roster as text: one row a track, then what `textReport` says. */
export function textRoster(report: Report, paint: Paint = PLAIN, time: TimeForm = 'seconds'): string {
  const rosters = report.files.flatMap((file) => [
    ...fileRoster(file, time),
    ...textMatrix(file, time).map(printable),
  ]);
  return [...rosters, textReport(report, paint, time)].join('\n');
}

function sayFile(file: FileReport, failAt: Level, paint: Paint, time: TimeForm): string[] {
  if (file.error)
    return [
      `${printable(`${file.file}: can't be read. ${file.error.message}`)} ${paint(`error ${file.error.code}`, 'error')}`,
    ];
  const problems = (file.problems ?? []).map(
    ({ code, level = 'note', message }) =>
      `${printable(`${file.file}: ${message}`)} ${paint(`${level} ${code}`, level)}`,
  );
  const failing = openOf(file).filter(({ level }) => isAtLeast(level, failAt));
  const mild = mildOf(file, failAt).map(({ rule, level, findings }) => {
    const [first, ...more] = findings;
    if (more.length === 0) return sayFinding(file, first, paint, time);
    const said = sayGathered(findings, sayPlace(first, time, frameRateOf(file, first.clip)));
    return `${printable(`${file.file}: ${said}`)} ${paint(`${level} ${rule}`, level)}`;
  });
  const remarks = [
    ...(file.events ?? [])
      .filter(({ level }) => isAtLeast(level, failAt))
      .map((event) => sayEvent(event, time, frameRateOf(file, event.clip))),
    sayLoopGuesses(file.clips),
  ].flatMap((said) => (said === undefined ? [] : [printable(`${file.file}: ${said}.`)]));
  return [
    ...problems,
    ...failing.map((finding) => sayFinding(file, finding, paint, time)),
    ...mild,
    ...remarks,
  ];
}

function openOf(file: FileReport): ReportedFinding[] {
  return file.findings.filter(({ muted }) => muted === undefined);
}

function mildOf(file: FileReport, failAt: Level): Gathered[] {
  return gatherByRule(openOf(file).filter(({ level }) => !isAtLeast(level, failAt)));
}

function sayFinding(file: FileReport, finding: ReportedFinding, paint: Paint, time: TimeForm): string {
  const remedy = sayRemedy(finding);
  const said = printable(
    `${file.file}: ${sayPlace(finding, time, frameRateOf(file, finding.clip))}: ${sayFault(finding)}.`,
  );
  const kind = paint(`${finding.level} ${finding.rule}`, finding.level);
  return `${said} ${kind}${remedy === '' ? '' : printable(`; try: ${remedy}`)}`;
}

function sayGone({ file, rule, clip, track }: GonePlace): string {
  return printable(`${file}: ${track} in ${clip}: gone since the baseline was written. ${rule}`);
}

function frameRateOf({ clips }: FileReport, name: string): number | undefined {
  return clips.find(({ clip }) => clip === name)?.frameRate;
}

interface Column {
  readonly head: string;
  cell(track: TrackReport): string;
  /** A time, which has its unit in the head where that is always the same. */
  time?(track: TrackReport): number;
}

const COLUMNS: readonly Column[] = [
  { head: 'keys', cell: (track) => String(track.keys) },
  { head: 'from', time: (track) => track.start, cell: (track) => track.start.toFixed(3) },
  { head: 'to', time: (track) => track.end, cell: (track) => track.end.toFixed(3) },
  { head: 'turned °', cell: (track) => sayFigure(track.travelled) },
  { head: 'median °/s', cell: (track) => sayFigure(track.medianRate) },
  { head: 'peak °/s', cell: (track) => sayFigure(track.peakRate) },
  { head: 'peak at', time: (track) => track.peakAt, cell: (track) => track.peakAt.toFixed(3) },
  { head: 'floor °/s', cell: (track) => sayFigure(track.noiseFloor) },
];

function fileRoster(file: FileReport, form: TimeForm): string[] {
  if (file.error) return [];
  const rows = file.tracks.map((track) => ({
    cells: [
      ...COLUMNS.map((column) =>
        column.time && form !== 'seconds'
          ? sayTime(column.time(track), form, frameRateOf(file, track.clip))
          : column.cell(track),
      ),
      faultsOf(file, track),
    ],
    name: printable(`${track.track} in ${track.clip}`),
  }));
  const heads = [
    ...COLUMNS.map((column) => (column.time && form === 'seconds' ? `${column.head} s` : column.head)),
    'found',
  ];
  const widths = heads.map((head, i) =>
    Math.max(head.length, ...rows.map((row) => row.cells[i]?.length ?? 0)),
  );
  const line = (cells: readonly string[], name: string): string =>
    `${cells.map((cell, i) => cell.padStart(widths[i] ?? 0)).join('  ')}  ${name}`;
  return [
    `${printable(file.file)}: ${counted(file.tracks.length, 'rotation track')} in ${counted(file.clips.length, 'clip')}`,
    ...readAs(file),
    line(heads, 'track'),
    ...rows.map((row) => line(row.cells, row.name)),
    '',
  ];
}

function readAs({ conventions = [] }: FileReport): string[] {
  return conventions.length === 0 ? [] : [`read by: ${sayConventions(conventions)}`];
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
