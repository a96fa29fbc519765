import type { Curve } from '../curve/curve.js';
import { findSegment } from '../track/find-segment.js';
import { firstNotBelow } from './first-not-below.js';
import type { InnerClock } from './span-retiming.js';
import { timeWithin } from './turned-angle.js';

/** A curve at places along a span, with the speed at which each piece between two places is to begin and end. */
export interface PlacedSpeeds {
  /** Old times, ascending. */
  readonly times: Float64Array;
  /** Angle turned from each place to the next. */
  readonly angles: Float64Array;
  /** rad/s; two for each piece. */
  readonly speeds: Float64Array;
  /** Pieces that keep their time to the bit, whatever their speeds. */
  readonly same: Uint8Array;
}

/**
 * The clock that passes places at given speeds: inside a piece the acceleration along the path is constant. A piece that turns by nothing keeps
 * its time.
 */
export function clockAtSpeeds(curve: Curve, { times, angles, speeds, same }: PlacedSpeeds): InnerClock {
  const count = angles.length;
  const news = new Float64Array(count + 1);
  const keeps = (i: number): boolean =>
    same[i] === 1 || !(angles[i] > 0) || !(speeds[2 * i] + speeds[2 * i + 1] > 0);
  for (let i = 0; i < count; i++) {
    const seconds = keeps(i)
      ? times[i + 1] - times[i]
      : (2 * angles[i]) / (speeds[2 * i] + speeds[2 * i + 1]);
    news[i + 1] = news[i] + seconds;
  }
  const gapOf = (i: number): number => news[i + 1] - news[i];
  const slopeOf = (i: number): number => (speeds[2 * i + 1] - speeds[2 * i]) / gapOf(i);
  return {
    seconds: news[count],
    knots: pieceEnds(news, same, speeds),
    continuity: 0,
    oldTime(since) {
      const i = findSegment(news, since);
      const past = Math.min(since, news[count]) - news[i];
      if (keeps(i)) return times[i] + (past / gapOf(i)) * (times[i + 1] - times[i]);
      const turned = past * (speeds[2 * i] + (past * slopeOf(i)) / 2);
      if (!(turned > 0)) return times[i];
      if (turned >= angles[i]) return times[i + 1];
      return timeWithin(curve, times[i], times[i + 1], turned, angles[i]);
    },
    newTime(old) {
      const i = Math.max(0, firstNotBelow(times, old) - 1);
      if (old >= times[i + 1]) return news[i + 1];
      if (keeps(i)) return news[i] + ((old - times[i]) / (times[i + 1] - times[i])) * gapOf(i);
      const left = curve.length(times[i], old);
      const root = Math.sqrt(Math.max(0, speeds[2 * i] ** 2 + 2 * slopeOf(i) * left));
      return Math.min(news[i + 1], news[i] + (left === 0 ? 0 : (2 * left) / (speeds[2 * i] + root)));
    },
    paceAt(since, out) {
      const i = findSegment(news, since);
      if (keeps(i)) {
        out.by = 'time';
        out.speed = 1;
        out.acceleration = 0;
        return;
      }
      out.by = 'angle';
      out.speed = speeds[2 * i] + (since - news[i]) * slopeOf(i);
      out.acceleration = slopeOf(i);
    },
  };
}

/** A change of the acceleration along the path by more than this share of the greatest one is a jump. */
const JUMP = 0.2;

/** Where pieces that keep their time, that run at one speed, and that do neither, follow each other, and where the acceleration jumps between those. */
function pieceEnds(news: Float64Array, same: Uint8Array, speeds: Float64Array): number[] {
  const slopes = new Float64Array(same.length);
  let most = 0;
  for (let i = 0; i < same.length; i++) {
    const gap = news[i + 1] - news[i];
    if (same[i] === 1 || !(gap > 0)) continue;
    slopes[i] = (speeds[2 * i + 1] - speeds[2 * i]) / gap;
    most = Math.max(most, Math.abs(slopes[i]));
  }
  const knots = [0];
  for (let i = 1; i < same.length; i++) {
    const jumps = same[i] === 0 && Math.abs(slopes[i] - slopes[i - 1]) > JUMP * most;
    if (jumps || kindOf(i, same, speeds) !== kindOf(i - 1, same, speeds)) knots.push(news[i]);
  }
  knots.push(news[news.length - 1]);
  return knots;
}

/** -1 where a piece keeps its time, the speed where it runs at one, -2 otherwise. */
function kindOf(i: number, same: Uint8Array, speeds: Float64Array): number {
  if (same[i] === 1) return -1;
  return speeds[2 * i] === speeds[2 * i + 1] ? speeds[2 * i] : -2;
}
