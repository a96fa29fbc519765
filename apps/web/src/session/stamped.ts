import { stampFindings, type ReportedFinding, type Stamp } from '@slewcurve/job';
import type { Finding } from '@slewcurve/survey';
import { trackKey } from './file-work.js';

type ByTrack<F> = ReadonlyMap<string, readonly F[]>;

/** Findings by track with their stamped places marked. Tracks that no stamp is for keep their very list, so that nothing of them is drawn anew. */
export function stamped(found: ByTrack<Finding>, stamps: readonly Stamp[]): ByTrack<ReportedFinding> {
  const byTrack = new Map<string, Stamp[]>();
  for (const stamp of stamps)
    for (const key of tracksOf(stamp, found)) byTrack.set(key, [...(byTrack.get(key) ?? []), stamp]);
  const marked = new Map<string, readonly ReportedFinding[]>(found);
  for (const [key, own] of byTrack) {
    const findings = found.get(key);
    if (findings) marked.set(key, stampFindings(findings, own));
  }
  return marked;
}

/** The stamps that fit nothing that is found: what they accepted is gone, or has changed. */
export function idleStamps(found: ByTrack<Finding>, stamps: readonly Stamp[]): Stamp[] {
  return stamps.filter(
    (stamp) =>
      !tracksOf(stamp, found).some((key) =>
        (found.get(key) ?? []).some(
          ({ fingerprint, occurrences }) =>
            fingerprint === stamp.fingerprint ||
            occurrences.some((place) => place.fingerprint === stamp.fingerprint),
        ),
      ),
  );
}

/** How many findings are accepted whole, and how many in part alone. */
export function acceptedOf(findings: Iterable<ReportedFinding>): {
  readonly whole: number;
  readonly inPart: number;
} {
  let [whole, inPart] = [0, 0];
  for (const { muted, occurrences } of findings)
    if (muted === 'stamped') whole++;
    else if (occurrences.some(({ stamp }) => stamp !== undefined)) inPart++;
  return { whole, inPart };
}

/** A fingerprint holds its track's name; stamps written by hand may leave the name out. */
function tracksOf({ clip, track }: Stamp, found: ByTrack<Finding>): string[] {
  return clip === '' && track === '' ? [...found.keys()] : [trackKey(clip, track)];
}
