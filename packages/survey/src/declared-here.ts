import { medianGap, type Clip, type RotationTrack } from '@slewcurve/core';
import { matchesPattern } from '@slewcurve/mend';
import type { HouseRules } from './house-rules.js';
import type { DeclaredHere, Place, Rule, TrackContext } from './rule.js';

/** What the house rules, and the clip's own marks, say of one track. */
export function declaredHere(track: RotationTrack, clip: Clip, { declared }: HouseRules): DeclaredHere {
  const isHere = (entry: { readonly clip: string; readonly track: string }): boolean =>
    matchesPattern(entry.clip, track.clip) && matchesPattern(entry.track, track.id);
  return {
    holds: declared.holds.filter(isHere).map(({ span }) => span),
    whips: declared.whips.filter(isHere).map(({ span }) => span),
    spins: declared.spins.filter(isHere).map(({ rpm }) => rpm),
    marks: [
      ...clip.marks.map(({ time }) => time),
      ...declared.marks.filter((mark) => matchesPattern(mark.clip, track.clip)).map(({ time }) => time),
    ],
  };
}

/** Whether a declared whip that a place lies in, or a mark within one key gap of it, says that it is meant. */
export function isExcused({ excusedBy }: Rule, { time, span }: Place, context: TrackContext): boolean {
  const { whips, marks } = context.declared;
  if (excusedBy === undefined || whips.length + marks.length === 0) return false;
  const slack = medianGap(context.track) * 1.01;
  return (
    (excusedBy.includes('whips') &&
      whips.some(([from, to]) => span[0] >= from - slack && span[1] <= to + slack)) ||
    (excusedBy.includes('marks') && marks.some((mark) => Math.abs(mark - time) <= slack))
  );
}
