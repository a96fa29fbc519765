import { SlewcurveError } from '@slewcurve/core';
import type { FileReport, Report } from './report.js';

/** A report as it came from `--format json`, and the file that held it. */
export interface NamedReport {
  readonly name: string;
  readonly json: unknown;
}

/**
 * The files of several reports in the order that one run over all of them has. Parts (`--shard`) are dealt out file by file and are
 * laid together the same way, whatever the order they are named in; other reports follow each other.
 *
 * @throws SlewcurveError `merge.not-a-report`, `merge.other-settings` where they were made in different ways,
 *   `merge.missing-shard`, `merge.same-shard`, `merge.same-file`
 */
export function mergeReports(named: readonly NamedReport[]): {
  readonly files: readonly FileReport[];
  readonly like: Pick<Report, 'playbacks' | 'failAt'>;
} {
  const reports = named.map(({ name, json }) => ({ name, report: reportOf(name, json) }));
  const first = reports[0];
  if (!first) throw new SlewcurveError('merge.not-a-report', 'There is no report to merge.');
  for (const other of reports) checkAlike(first, other);
  const sharded = reports.some(({ report }) => report.shard);
  const files = sharded ? dealtBack(reports) : reports.flatMap(({ report }) => report.files);
  checkNames(files);
  return { files, like: first.report };
}

interface Named {
  readonly name: string;
  readonly report: Report;
}

function dealtBack(reports: readonly Named[]): FileReport[] {
  const of = reports[0]?.report.shard?.of ?? reports.length;
  const byNumber = new Map<number, Named>();
  for (const one of reports) {
    const { shard } = one.report;
    const other = byNumber.get(shard?.number ?? 0);
    if (shard?.of !== of)
      throw new SlewcurveError(
        'merge.other-settings',
        `${one.name} is ${shard ? `part ${shard.number} of ${shard.of}` : 'no part'}, and the first report is a part of ${of}.`,
        { file: one.name },
      );
    if (other)
      throw new SlewcurveError(
        'merge.same-shard',
        `${other.name} and ${one.name} are both part ${shard.number} of ${of}.`,
        { file: one.name },
      );
    byNumber.set(shard.number, one);
  }
  const parts = Array.from({ length: of }, (_, i) => byNumber.get(i + 1)?.report.files);
  const missing = parts.flatMap((part, i) => (part ? [] : [i + 1]));
  if (missing.length > 0)
    throw new SlewcurveError(
      'merge.missing-shard',
      `There is no report of part ${missing.join(', ')} of ${of}: its run may have ended early. Run it again before merging.`,
    );
  const most = Math.max(...parts.map((part) => part?.length ?? 0));
  return Array.from({ length: most }, (_, round) => parts.flatMap((part) => part?.[round] ?? [])).flat();
}

function checkAlike(first: Named, other: Named): void {
  if (how(first.report) === how(other.report)) return;
  throw new SlewcurveError(
    'merge.other-settings',
    `${first.name} was made with ${how(first.report)}, and ${other.name} with ${how(other.report)}. Only reports made the same way can be merged.`,
    { file: other.name },
  );
}

function how({ tool, playbacks, failAt }: Report): string {
  return `version ${tool.version}, ${playbacks.join(', ')}, fail at ${failAt}`;
}

function checkNames(files: readonly FileReport[]): void {
  const seen = new Set<string>();
  for (const { file } of files) {
    if (seen.has(file))
      throw new SlewcurveError('merge.same-file', `Two of the reports tell of ${file}.`, { file });
    seen.add(file);
  }
}

function reportOf(name: string, json: unknown): Report {
  if (isReport(json)) return json;
  throw new SlewcurveError(
    'merge.not-a-report',
    `${name} is no report of version 1 as slewcurve check --format json prints it.`,
    { file: name },
  );
}

/** As much as is read of it. Its text is our own; what the schema says beyond this is taken on trust. */
function isReport(json: unknown): json is Report {
  return (
    isRecord(json) &&
    json['schemaVersion'] === 1 &&
    isRecord(json['tool']) &&
    json['tool']['name'] === 'slewcurve' &&
    Array.isArray(json['playbacks']) &&
    typeof json['failAt'] === 'string' &&
    isShard(json['shard']) &&
    Array.isArray(json['files']) &&
    json['files'].every(isFileReport)
  );
}

function isShard(json: unknown): boolean {
  if (json === undefined) return true;
  return (
    isRecord(json) &&
    Number.isInteger(json['number']) &&
    Number.isInteger(json['of']) &&
    Number(json['number']) >= 1 &&
    Number(json['number']) <= Number(json['of']) &&
    Number(json['of']) <= 100_000
  );
}

function isFileReport(json: unknown): boolean {
  return (
    isRecord(json) &&
    typeof json['file'] === 'string' &&
    (json['status'] === 'surveyed' || json['status'] === 'unreadable') &&
    Array.isArray(json['clips']) &&
    Array.isArray(json['tracks']) &&
    Array.isArray(json['findings']) &&
    json['findings'].every(isFinding)
  );
}

function isFinding(json: unknown): boolean {
  return (
    isRecord(json) &&
    ['rule', 'level', 'clip', 'track', 'message', 'fingerprint'].every(
      (key) => typeof json[key] === 'string',
    ) &&
    ['time', 'value', 'limit', 'count'].every((key) => typeof json[key] === 'number') &&
    Array.isArray(json['keys']) &&
    Array.isArray(json['occurrences']) &&
    json['occurrences'].every((place) => isRecord(place) && typeof place['fingerprint'] === 'string')
  );
}

function isRecord(value: unknown): value is Readonly<Record<string, unknown>> {
  return typeof value === 'object' && value !== null && !Array.isArray(value);
}
