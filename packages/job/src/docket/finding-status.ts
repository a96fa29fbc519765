import { matchesPattern } from '@slewcurve/mend';
import type { ReportedFinding, StepReport } from '../report.js';

/** A finding, and what became of it. */
export interface FindingStatus {
  readonly finding: ReportedFinding;
  readonly isOpen: boolean;
  /** `open`, `mended by step 2`, `stamped: the hit is meant (Ada, 2026-05-17)`, `new`. */
  readonly status: string;
}

/**
 * What became of each finding under a job card: those of before, then those that only the mended file has.
 *
 * @param after findings once the card has run; undefined where there is none
 */
export function statusOf(
  before: readonly ReportedFinding[],
  after: readonly ReportedFinding[] | undefined,
  proofs: readonly StepReport[],
): FindingStatus[] {
  const left = new Map((after ?? before).map((finding) => [nameOf(finding), finding]));
  const known = new Set(before.map(nameOf));
  return [
    ...before.map((finding) => {
      const now = left.get(nameOf(finding));
      if (now === undefined) return { finding, isOpen: false, status: mendedBy(finding, proofs) };
      const stamp = sayStamps(now);
      return { finding: now, isOpen: now.muted === undefined, status: stamp ?? now.muted ?? 'open' };
    }),
    ...(after ?? [])
      .filter((finding) => !known.has(nameOf(finding)))
      .map((finding) => ({ finding, isOpen: true, status: 'new since the card' })),
  ];
}

function nameOf({ rule, clip, track }: ReportedFinding): string {
  return JSON.stringify([rule, clip, track]);
}

/** The steps on the finding's track that run its remedy's verb; where there is none, all steps on the track. */
function mendedBy(finding: ReportedFinding, proofs: readonly StepReport[]): string {
  const onTrack = [...proofs.keys()].filter((i) => {
    const step = proofs[i]?.step;
    return step && matchesPattern(step.clip, finding.clip) && matchesPattern(step.track, finding.track);
  });
  const byRemedy = onTrack.filter((i) => proofs[i]?.step.verb === finding.remedy?.verb);
  const steps = (byRemedy.length > 0 ? byRemedy : onTrack).map((i) => i + 1);
  if (steps.length === 0) return 'gone';
  return `mended by ${steps.length === 1 ? 'step' : 'steps'} ${steps.join(', ')}`;
}

function sayStamps({ muted, occurrences }: ReportedFinding): string | undefined {
  if (muted !== 'stamped') return undefined;
  const said = occurrences.flatMap(({ stamp }) =>
    stamp ? [`${stamp.reason} (${stamp.by}, ${stamp.date})`] : [],
  );
  return `stamped: ${[...new Set(said)].join('; ')}`;
}
