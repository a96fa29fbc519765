import type { ReportedFinding, ReportedOccurrence } from './report.js';

/**
 * A finding once its places are marked as stamped or known. It is muted when all its places are; else it is as bad as its worst open
 * place, and its own numbers are that place's.
 *
 * @param unlistedCovered whether its places beyond the listed ones are accepted too
 */
export function settleFinding(finding: ReportedFinding, unlistedCovered: boolean): ReportedFinding {
  const { occurrences } = finding;
  const open = occurrences.find(isOpen);
  if (open !== undefined) return open === occurrences[0] ? finding : ledBy(finding, open);
  if (unlistedCovered)
    return { ...finding, muted: occurrences.every(({ stamp }) => stamp !== undefined) ? 'stamped' : 'known' };
  // Places are listed worst first: those that are not listed are no worse than the last that is.
  return { ...finding, level: occurrences.at(-1)?.level ?? finding.level };
}

/** A place that nobody has accepted. */
export function isOpen({ stamp, known }: ReportedOccurrence): boolean {
  return stamp === undefined && known === undefined;
}

/** The finding with another place's numbers for its own. A place's limit and playback are the finding's where it has none of its own. */
function ledBy(finding: ReportedFinding, lead: ReportedOccurrence): ReportedFinding {
  const { remedy: _, price: __, alternatives: ___, ways: ____, confidence: _____, ...rest } = finding;
  const { fingerprint: ______, stamp: _______, known: ________, ...numbers } = lead;
  const { limit, playback } = finding;
  return {
    ...rest,
    ...numbers,
    limit: lead.limit ?? limit,
    playback: lead.playback ?? playback,
    occurrences: finding.occurrences.map((place) => ({ limit, playback, ...place })),
  };
}
