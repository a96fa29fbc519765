import type { ReportedFinding } from './report.js';

/** A place of a finding by its fingerprint, as stamps and baselines name it. */
export interface NamedPlace {
  readonly fingerprint: string;
  /** Only where `fingerprint` is a whole finding's, which has more places than a report lists: how many. */
  readonly places?: number;
  readonly rule: string;
  readonly clip: string;
  readonly track: string;
}

/** A finding's places by name: every listed one, and the finding itself where it has more than are listed. */
export function namedPlaces(finding: ReportedFinding): NamedPlace[] {
  const { rule, clip, track, count, occurrences } = finding;
  const listed = occurrences.map(({ fingerprint }) => ({ fingerprint, rule, clip, track }));
  if (count <= occurrences.length) return listed;
  return [...listed, { fingerprint: finding.fingerprint, places: count, rule, clip, track }];
}

/** Whether a finding's places that no report lists are covered: the finding itself is named, with as many places or more. */
export function coversUnlisted(
  { count, occurrences, fingerprint }: ReportedFinding,
  named: ReadonlyMap<string, Pick<NamedPlace, 'places'>>,
): boolean {
  return count <= occurrences.length || (named.get(fingerprint)?.places ?? 0) >= count;
}
