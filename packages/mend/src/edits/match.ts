import {
  type Curve,
  type MatchedSide,
  type RotationTrack,
  SlewcurveError,
  pace,
  playAs,
} from '@slewcurve/core';
import { placeOf } from '../acted-keys.js';
import { sentenceOf } from '../clauses.js';
import { DEGREES } from '../edit-result.js';
import { type Join, joinAt, meetingOf, ratesAt, roomAt } from '../pace/joins.js';
import { otherTrack } from '../pace/other-track.js';
import { paceSpan } from '../pace/pace-span.js';
import { storePaced } from '../pace/store-paced.js';
import type { Step } from '../step.js';
import type { EditResult, EditScene, Verb } from '../verb.js';

/** How far a join is shaped on either side where the step does not say, seconds. */
const USUAL_SHOULDERS = 0.5;

/**
 * Brings both sides of a join, a cut or a mark to one speed, by shaping within the shoulders; at the track's own start or end the seam of its loop. With
 * another track its own end (or start, `which` in) meets that one's start (or end), and the other stays as it is. The pose at the join keeps its time
 * unless time may run. The two axes stay as far apart as they are: the result says by how much.
 */
export const match: Verb = Object.freeze({
  name: 'match',
  summary: 'Brings both sides of a join, a cut or a loop seam to one speed; the path stays.',
  alsoCalled: ['cut on motion', 'match speed', 'match cut', 'match velocity', 'blend speeds'],
  opening: 'Match the speeds of',
  reads: ['at', 'meet', 'fromTrack', 'fromClip', 'which', 'ends', 'with', 'store'] as const,
  needsAllowing: true,
  keysApart: false,
  insertsKeys: true,
  say: (step: Step) => sentenceOf('Match the speeds of', step),
  apply(track: RotationTrack, step: Step, scene?: EditScene): EditResult {
    const span = paceSpan(track, step);
    checkEnds(track, step);
    const path = playAs(track, 'as-written');
    const other = otherTrack(track, step, scene);
    const sides = other === track ? ownSides(track, path, step) : facingSides(path, other, step);
    const reach = Math.min(step.shoulders ?? USUAL_SHOULDERS, roomAt(sides.join, span));
    const paced = pace(path, {
      kind: 'match',
      sides: sides.at.map((side) => ({ ...side, reach })),
      ends: step.ends === 'run' ? 'run' : 'same',
      span,
    });
    const result = storePaced(track, span, paced, step, 'smooth');
    return { ...result, meeting: sides.meeting(result.track, (old) => paced.retiming.newTime(old)) };
  },
});

interface Sides {
  readonly join: Join;
  readonly at: readonly Omit<MatchedSide, 'reach'>[];
  /** What both sides turn at on the stored result. */
  meeting(after: RotationTrack, newTime: (old: number) => number): ReturnType<typeof meetingOf>;
}

function checkEnds(track: RotationTrack, { ends }: Step): void {
  if (ends !== 'go') return;
  throw new SlewcurveError(
    'step.bad-ends',
    'Matching keeps the angle. Keep the same ends, or let time run.',
    placeOf(track),
  );
}

function ownSides(track: RotationTrack, path: Curve, { at, meet }: Step): Sides {
  if (at === undefined)
    throw new SlewcurveError(
      'step.needs-join',
      'Say where: at, the time of the join in seconds; the start or the end for the seam of a loop. Or name another track.',
      placeOf(track),
    );
  const join = joinAt(track, at);
  const { before, after } = meetingOf(ratesAt(path, join));
  const rate = (meet ?? (before + after) / 2) / DEGREES;
  return {
    join,
    at: [
      { at: join.before, side: 'before', rate },
      { at: join.after, side: 'after', rate },
    ],
    meeting: (edited, newTime) =>
      meetingOf(
        ratesAt(playAs(edited, 'as-written'), { before: newTime(join.before), after: newTime(join.after) }),
      ),
  };
}

function facingSides(path: Curve, other: RotationTrack, step: Step): Sides {
  const there = playAs(other, 'as-written');
  const isStart = step.which === 'in';
  const ratesOf = (own: Curve): ReturnType<typeof ratesAt> => {
    const [ends, begins] = [ratesAt(own, wholeOf(own)), ratesAt(there, wholeOf(there))];
    return isStart ? [begins[0], ends[1]] : [ends[0], begins[1]];
  };
  const { before, after } = meetingOf(ratesOf(path));
  const rate = (step.meet ?? (isStart ? before : after)) / DEGREES;
  const at = isStart ? path.start : path.end;
  return {
    join: { before: at, after: at },
    at: [{ at, side: isStart ? 'after' : 'before', rate }],
    meeting: (edited) => meetingOf(ratesOf(playAs(edited, 'as-written'))),
  };
}

/** The seam of a whole curve: its end and its start. */
function wholeOf({ start, end }: Curve): Join {
  return { before: end, after: start };
}
