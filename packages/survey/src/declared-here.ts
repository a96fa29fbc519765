import { medianGap, type Clip, type RotationTrack } from '@slewcurve/core';
import { matchesPattern } from '@slewcurve/mend';
import type { HouseRules } from './house-rules.js';
import type { DeclaredHere, Place, Rule, TrackContext } from './rule.js';

/** What the house rules, and the clip's own marks, say of one track. */
export function declaredHere(
  track: RotationTrack,
  clip: Clip,
  { declared }: HouseRules,
  clips: readonly Clip[] = [],
): DeclaredHere {
  const isHere = (entry: { readonly clip: string; readonly track: string }): boolean =>
    matchesPattern(entry.clip, track.clip) && matchesPattern(entry.track, track.id);
  const inClip = (pattern: string, name = track.clip): boolean => matchesPattern(pattern, name);
  const inOthers = (which: (other: string, at: number) => boolean): RotationTrack[] =>
    clips.flatMap((other, at) =>
      other.name !== track.clip && which(other.name, at)
        ? other.tracks.filter(({ id }) => id === track.id)
        : [],
    );
  const joins = declared.joins.filter((one) => inClip(one.from) && matchesPattern(one.track, track.id));
  const blends = declared.blends.filter(
    (one) => one.clips.some((name) => inClip(name)) && matchesPattern(one.track, track.id),
  );
  const own = clips.findIndex(({ name }) => name === track.clip);
  return {
    joins: joins.length === 0 ? [] : inOthers((name) => joins.some(({ to }) => inClip(to, name))),
    blends:
      blends.length === 0
        ? []
        : inOthers((name, at) => at > own && blends.some((one) => one.clips.some((it) => inClip(it, name)))),
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
