import {
  type PacedCurve,
  type RotationTrack,
  SlewcurveError,
  type Span,
  letAngleGo,
  pace,
  playAs,
} from '@slewcurve/core';
import { placeOf } from '../acted-keys.js';
import { sentenceOf } from '../clauses.js';
import { DEGREES } from '../edit-result.js';
import { paceSpan } from '../pace/pace-span.js';
import { storeFreed } from '../pace/store-freed.js';
import { storePaced } from '../pace/store-paced.js';
import type { Step } from '../step.js';
import type { EditResult, Verb } from '../verb.js';

/**
 * Presses the speed up or down at one time, with soft shoulders. With the same ends the angle is borrowed from the rest of the span, v* = v + b − k·w, so the
 * area stays; letting time run, the span gets shorter or longer; letting angle go, every time stays, the turn goes on further, or less far, about the axis
 * that it has, and all that follows is turned by what that comes to (q* = d·q, parent axes).
 */
export const shape: Verb = Object.freeze({
  name: 'shape',
  summary:
    'Presses the speed up or down at a place, or draws it anew; the path stays, unless the angle is let go.',
  alsoCalled: ['speed ramp', 'time remap', 'bulge', 'speed curve', 'accent'],
  opening: 'Shape the speed of',
  reads: ['at', 'by', 'reach', 'speeds', 'ends', 'with', 'store'] as const,
  needsAllowing: true,
  keysApart: false,
  insertsKeys: true,
  say: (step: Step) => sentenceOf('Shape the speed of', step),
  apply(track: RotationTrack, step: Step): EditResult {
    const span = paceSpan(track, step);
    const { at, by, reach, ends = 'same', shoulders, speeds } = step;
    if (speeds) return storePaced(track, span, drawnPace(track, span, speeds), step, 'smooth');
    if (at === undefined || by === undefined || reach === undefined)
      throw new SlewcurveError(
        'step.needs-press',
        'Say where, by how much and how far: at in seconds, by in deg/s, reach in seconds; or the speed as drawn: speeds.',
        placeOf(track),
      );
    const path = playAs(track, 'as-written');
    if (ends === 'go')
      return storeFreed(track, letAngleGo(path, { at, by: by / DEGREES, reach, span }), step);
    const press = { at, by: by / DEGREES, reach, ends, ...(shoulders !== undefined && { shoulders }) };
    const paced = pace(path, { kind: 'press', ...press, span });
    return storePaced(track, span, paced, step, 'smooth');
  },
});

/** The span at the drawn speed, scaled so that it turns as far as before. Before the first point and after the last the speed is theirs. */
function drawnPace(track: RotationTrack, span: Span, speeds: NonNullable<Step['speeds']>): PacedCurve {
  const [from, to] = span;
  const inside = speeds.filter(([time]) => time > from && time < to);
  const points = [[from, drawnAt(speeds, from)] as const, ...inside, [to, drawnAt(speeds, to)] as const];
  if (!points.some(([, speed]) => speed > 0))
    throw new SlewcurveError(
      'step.no-speed',
      `Between ${from} s and ${to} s no speed is drawn, so nothing would ever arrive. Draw some.`,
      placeOf(track),
    );
  return pace(playAs(track, 'as-written'), {
    kind: 'drawn',
    times: points.map(([time]) => time - from),
    speeds: points.map(([, speed]) => speed / DEGREES),
    span,
  });
}

function drawnAt(speeds: NonNullable<Step['speeds']>, time: number): number {
  const after = speeds.findIndex(([at]) => at >= time);
  if (after === 0) return speeds[0][1];
  if (after < 0) return speeds[speeds.length - 1][1];
  const [[t0, v0], [t1, v1]] = [speeds[after - 1], speeds[after]];
  return v0 + ((v1 - v0) * (time - t0)) / (t1 - t0);
}
