import { coversUnlisted, namedPlaces, type NamedPlace } from './named-place.js';
import { checkVersion, readFields } from './read-fields.js';
import type { FileReport, GonePlace, ReportedFinding } from './report.js';
import { isOpen, settleFinding } from './settle-finding.js';

/** What was there when a project began to look: it is no news. Published schema: `schema/baseline.json`. */
export interface Baseline {
  readonly schemaVersion: 1;
  readonly files: readonly { readonly file: string; readonly places: readonly NamedPlace[] }[];
}

const FIELDS: Readonly<Record<string, readonly string[]>> = {
  '': ['schemaVersion', 'files'],
  files: ['file', 'places'],
  places: ['fingerprint', 'places', 'rule', 'clip', 'track'],
};

/**
 * A baseline out of JSON.
 *
 * @param name of the file, for the errors
 * @throws SlewcurveError `baseline.bad-shape`, `baseline.unknown-key`, `baseline.bad-version`
 */
export function parseBaseline(json: unknown, name: string): Baseline {
  const kind = { code: 'baseline', name };
  const top = readFields(json, FIELDS, kind);
  checkVersion(json, kind);
  const files = top.list('files', (file) => ({
    file: file.text('file'),
    places: file.list('places', (place) => {
      const places = place.optionalCount('places');
      return {
        fingerprint: place.text('fingerprint'),
        ...(places !== undefined && { places }),
        rule: place.text('rule'),
        clip: place.optionalText('clip') ?? '',
        track: place.optionalText('track') ?? '',
      };
    }),
  }));
  return { schemaVersion: 1, files };
}

/** Everything that a survey found and nobody stamped, by file. Files without any are left out. */
export function baselineOf(files: readonly FileReport[]): Baseline {
  const entries = files.map(({ file, findings }) => ({
    file: plainName(file),
    places: findings
      .filter(({ muted }) => muted !== 'stamped')
      .flatMap((finding) => {
        const stamped = new Set(
          finding.occurrences.filter(({ stamp }) => stamp).map(({ fingerprint }) => fingerprint),
        );
        return namedPlaces(finding).filter(({ fingerprint }) => !stamped.has(fingerprint));
      }),
  }));
  const byName = entries.toSorted((a, b) => (a.file < b.file ? -1 : 1));
  return { schemaVersion: 1, files: byName.filter(({ places }) => places.length > 0) };
}

/** A baseline as JSON text. */
export function baselineJson(baseline: Baseline): string {
  return `${JSON.stringify(baseline, null, 2)}\n`;
}

/**
 * File reports with what the baseline knows marked, and what the baseline knows and nobody finds any more.
 *
 * @param whole whether `files` is all there is: else a file that is missing is some other run's, not gone
 */
export function withBaseline(
  files: readonly FileReport[],
  baseline: Baseline,
  whole: boolean,
): { readonly files: readonly FileReport[]; readonly gone: readonly GonePlace[] } {
  const known = new Map(
    baseline.files.map(({ file, places }) => [
      plainName(file),
      new Map(places.map((place) => [place.fingerprint, place])),
    ]),
  );
  const marked = files.map((report) => {
    const places = known.get(plainName(report.file));
    if (!places) return report;
    return { ...report, findings: report.findings.map((finding) => knownFinding(finding, places)) };
  });
  const found = new Map(files.map((report) => [plainName(report.file), report]));
  const gone = [...known].flatMap(([file, places]) => {
    const report = found.get(file);
    if (report === undefined && !whole) return [];
    // What can't be read may hold it still.
    if (report?.status === 'unreadable') return [];
    const there = new Set(
      (report?.findings ?? []).flatMap((finding) =>
        namedPlaces(finding).map(({ fingerprint }) => fingerprint),
      ),
    );
    return [...places.values()]
      .filter(({ fingerprint }) => !there.has(fingerprint))
      .map(({ fingerprint, rule, clip, track }) => ({ file, fingerprint, rule, clip, track }));
  });
  return { files: marked, gone };
}

function knownFinding(finding: ReportedFinding, places: ReadonlyMap<string, NamedPlace>): ReportedFinding {
  if (finding.muted !== undefined) return finding;
  const occurrences = finding.occurrences.map((place) =>
    isOpen(place) && places.has(place.fingerprint) ? { ...place, known: true as const } : place,
  );
  return settleFinding({ ...finding, occurrences }, coversUnlisted(finding, places));
}

/** `./clips/walk.glb` and `clips/walk.glb` are one file. */
function plainName(file: string): string {
  return file.replace(/^(?:\.\/)+/, '');
}
