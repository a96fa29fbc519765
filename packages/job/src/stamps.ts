import { SlewcurveError } from '@slewcurve/core';
import { coversUnlisted, namedPlaces, type NamedPlace } from './named-place.js';
import { checkVersion, readFields } from './read-fields.js';
import type { FileReport, ReportedFinding, StampWords } from './report.js';
import { settleFinding } from './settle-finding.js';

/** A place that somebody accepted, with a reason. Published schema: `schema/stamps.json`. */
export interface Stamp extends NamedPlace, StampWords {}

const FIELDS: Readonly<Record<string, readonly string[]>> = {
  '': ['schemaVersion', 'stamps'],
  stamps: ['fingerprint', 'places', 'rule', 'clip', 'track', 'reason', 'by', 'date'],
};

/** The stamps of an asset stand in a file beside it: `walk.glb` has `walk.glb.stamps.json`. */
export function stampsFileName(file: string): string {
  return `${file}.stamps.json`;
}

/**
 * Stamps out of JSON.
 *
 * @param name of the file, for the errors
 * @throws SlewcurveError `stamps.bad-shape`, `stamps.unknown-key`, `stamps.bad-version`
 */
export function parseStamps(json: unknown, name: string): Stamp[] {
  const kind = { code: 'stamps', name };
  const top = readFields(json, FIELDS, kind);
  checkVersion(json, kind);
  return top.list('stamps', (stamp) => {
    const places = stamp.optionalCount('places');
    return {
      fingerprint: stamp.text('fingerprint'),
      ...(places !== undefined && { places }),
      rule: stamp.text('rule'),
      clip: stamp.optionalText('clip') ?? '',
      track: stamp.optionalText('track') ?? '',
      reason: stamp.text('reason'),
      by: stamp.text('by'),
      date: dateOf(stamp.text('date'), kind.name),
    };
  });
}

/** Stamps as JSON text, sorted by rule, clip, track and fingerprint, so that two people's changes merge line by line. */
export function stampsJson(stamps: readonly Stamp[]): string {
  const key = ({ rule, clip, track, fingerprint }: Stamp): string =>
    JSON.stringify([rule, clip, track, fingerprint]);
  const sorted = stamps.toSorted((a, b) => (key(a) < key(b) ? -1 : 1));
  return `${JSON.stringify({ schemaVersion: 1, stamps: sorted }, null, 2)}\n`;
}

/** The report of a file with its stamped places marked. A stamp that fits nothing any more is told among the problems. */
export function withStamps(report: FileReport, stamps: readonly Stamp[]): FileReport {
  if (stamps.length === 0 || report.status !== 'surveyed') return report;
  const findings = stampFindings(report.findings, stamps);
  const used = new Set(
    report.findings.flatMap((finding) => [
      finding.fingerprint,
      ...finding.occurrences.map(({ fingerprint }) => fingerprint),
    ]),
  );
  const idle = stamps.filter(({ fingerprint }) => !used.has(fingerprint));
  const problems = idle.map(({ fingerprint, rule, clip, track }) => ({
    code: 'stamps.unused',
    level: 'note' as const,
    message: `The stamp ${fingerprint} for ${rule} on ${track} in ${clip} fits nothing any more; it can be taken out of ${stampsFileName(report.file)}.`,
  }));
  return {
    ...report,
    ...(problems.length > 0 && { problems: [...(report.problems ?? []), ...problems] }),
    findings,
  };
}

/** Findings with their stamped places marked; one that no stamp is for is the same object. */
export function stampFindings(
  findings: readonly ReportedFinding[],
  stamps: readonly Stamp[],
): ReportedFinding[] {
  const byPrint = new Map(stamps.map((stamp) => [stamp.fingerprint, stamp]));
  return findings.map((finding) =>
    byPrint.has(finding.fingerprint) || finding.occurrences.some((place) => byPrint.has(place.fingerprint))
      ? stampedFinding(finding, byPrint)
      : finding,
  );
}

function stampedFinding(finding: ReportedFinding, stamps: ReadonlyMap<string, Stamp>): ReportedFinding {
  const occurrences = finding.occurrences.map((place) => {
    const stamp = stamps.get(place.fingerprint);
    if (stamp === undefined) return place;
    const { reason, by, date } = stamp;
    return { ...place, stamp: { reason, by, date } };
  });
  return settleFinding({ ...finding, occurrences }, coversUnlisted(finding, stamps));
}

/**
 * Stamps for what is named: one place by its fingerprint, or every place of a finding by the finding's, or of all findings of a rule
 * by the rule's id.
 *
 * @throws SlewcurveError `stamps.no-match`
 */
export function stampsFor(report: FileReport, named: string, words: StampWords): Stamp[] {
  const places = report.findings.flatMap((finding) => {
    const all = namedPlaces(finding);
    const whole = finding.rule === named || finding.fingerprint === named;
    return whole ? all : all.filter(({ fingerprint }) => fingerprint === named);
  });
  if (places.length > 0) return places.map((place) => ({ ...place, ...words }));
  throw new SlewcurveError(
    'stamps.no-match',
    `${report.file}: nothing is found that goes by ${named}. A stamp names a rule id, or a fingerprint as --format json and --format csv print it.`,
    { file: report.file },
  );
}

/** Older stamps and new ones; a new one takes the place of an older one for the same fingerprint. */
export function addStamps(older: readonly Stamp[], added: readonly Stamp[]): Stamp[] {
  const byPrint = new Map([...older, ...added].map((stamp) => [stamp.fingerprint, stamp]));
  return [...byPrint.values()];
}

/** The stamps that are left when those for what is named are taken back: one place by its fingerprint, or a whole finding by its own. */
export function withoutStamps(
  stamps: readonly Stamp[],
  findings: readonly ReportedFinding[],
  named: string,
): Stamp[] {
  const whole = findings.filter(({ fingerprint }) => fingerprint === named);
  const lifted = new Set([named, ...whole.flatMap(namedPlaces).map(({ fingerprint }) => fingerprint)]);
  // Where one place is open again, so is its finding as a whole.
  for (const finding of findings)
    if (finding.occurrences.some(({ fingerprint }) => fingerprint === named)) lifted.add(finding.fingerprint);
  return stamps.filter(({ fingerprint }) => !lifted.has(fingerprint));
}

/** A day as ISO 8601 writes it, or with a time after it. */
function dateOf(text: string, name: string): string {
  if (/^\d{4}-\d{2}-\d{2}(T.*)?$/.test(text) && !Number.isNaN(Date.parse(text))) return text;
  throw new SlewcurveError(
    'stamps.bad-shape',
    `${name}: a date must be written as 2026-05-17; it is ${text}.`,
  );
}
