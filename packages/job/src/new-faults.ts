import type { Finding, Occurrence } from '@slewcurve/survey';

/** Findings of level warning or error in `after` with a place that `before` did not have. */
export function newFaults(before: readonly Finding[], after: readonly Finding[]): Finding[] {
  return after.filter((finding) => {
    if (finding.level === 'note') return false;
    const known = before.filter(
      (other) => other.rule === finding.rule && other.clip === finding.clip && other.track === finding.track,
    );
    const places = known.flatMap((other) => other.occurrences);
    return finding.occurrences.some(
      (place) => place.level !== 'note' && !places.some((other) => isSamePlace(other, place)),
    );
  });
}

/** The same fault as before an edit: over the same time and no larger, but for rounding. */
function isSamePlace(before: Occurrence, after: Occurrence): boolean {
  const overlap = before.span[0] <= after.span[1] && after.span[0] <= before.span[1];
  return overlap && before.level !== 'note' && after.value <= before.value * 1.001;
}
