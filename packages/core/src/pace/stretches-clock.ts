import { firstNotBelow } from './first-not-below.js';
import type { InnerClock } from './span-retiming.js';

/** One stretch of a clock that is told in stretches. Seconds. */
export interface Stretch {
  /** `steady`: the old time runs evenly; `rise`: from rest up to its speed; `fall`: down to rest; `rest`: it stands. */
  readonly kind: 'steady' | 'rise' | 'fall' | 'rest';
  /** New seconds, more than 0. */
  readonly seconds: number;
  /** Old seconds that are played; 0 in a rest. */
  readonly old: number;
}

/** How the old time runs over a rise of 1: the minimum-jerk step as its speed. It plays half of the time. */
const speedOf = (u: number): number => u ** 3 * (10 - 15 * u + 6 * u * u);
const placeOf = (u: number): number => u ** 4 * (2.5 - 3 * u + u * u);
const slopeOf = (u: number): number => 30 * (u * (1 - u)) ** 2;

/** Seconds that a rise or fall takes that plays `old` seconds and ends, or begins, at `speed`. */
export function rampSeconds(old: number, speed = 1): number {
  return (2 * old) / speed;
}

/** The clock that runs stretch after stretch from the old time `from`. Its speed and acceleration are continuous where those of the stretches fit. */
export function stretchesClock(from: number, stretches: readonly Stretch[]): InnerClock {
  const news = running(stretches.map(({ seconds }) => seconds));
  const olds = running(stretches.map(({ old }) => old));
  const last = stretches.length - 1;
  const pieceAt = (since: number): number => {
    let i = Math.max(0, firstNotBelow(news, since) - 1);
    if (i < last && news[i + 1] === since) i++;
    return i;
  };
  return {
    seconds: news[news.length - 1],
    knots: [...news],
    continuity: fits(stretches) ? 2 : 0,
    oldTime(since) {
      const i = pieceAt(since);
      const { kind, seconds, old } = stretches[i];
      const u = Math.min(1, (since - news[i]) / seconds);
      if (kind === 'steady') return from + olds[i] + u * old;
      if (kind === 'rise') return from + olds[i] + 2 * old * placeOf(u);
      return from + olds[i] + (kind === 'rest' ? 0 : old - 2 * old * placeOf(1 - u));
    },
    newTime(time) {
      const done = time - from;
      const i = Math.max(0, firstNotBelow(olds, done) - 1);
      const { kind, seconds, old } = stretches[i];
      const share = old > 0 ? Math.max(0, Math.min(1, (done - olds[i]) / old)) : 0;
      if (kind === 'rise') return news[i] + seconds * inverse(share);
      if (kind === 'fall') return news[i] + seconds * (1 - inverse(1 - share));
      return news[i] + seconds * share;
    },
    paceAt(since, out) {
      const i = pieceAt(since);
      const { kind, seconds, old } = stretches[i];
      const u = Math.min(1, (since - news[i]) / seconds);
      const steady = old / seconds;
      out.by = 'time';
      out.acceleration = 0;
      if (kind === 'steady' || kind === 'rest') {
        out.speed = steady;
        return;
      }
      out.speed = 2 * steady * speedOf(kind === 'rise' ? u : 1 - u);
      out.acceleration = ((kind === 'rise' ? 2 : -2) * steady * slopeOf(u)) / seconds;
    },
  };
}

/** Running sums, 0 first. */
function running(parts: readonly number[]): Float64Array {
  const sums = new Float64Array(parts.length + 1);
  parts.forEach((part, i) => (sums[i + 1] = sums[i] + part));
  return sums;
}

/** Whether each stretch begins at the speed at which the one before ends. */
function fits(stretches: readonly Stretch[]): boolean {
  const steady = ({ old, seconds, kind }: Stretch): number =>
    (kind === 'steady' || kind === 'rest' ? 1 : 2) * (old / seconds);
  return stretches.every((stretch, i) => {
    if (i === 0) return true;
    const before = stretches[i - 1];
    const ends = before.kind === 'fall' || before.kind === 'rest' ? 0 : steady(before);
    const begins = stretch.kind === 'rise' || stretch.kind === 'rest' ? 0 : steady(stretch);
    return Math.abs(ends - begins) <= 1e-9 * Math.max(ends, begins);
  });
}

/** The share of a rise's time by which a share of its old time is played. */
function inverse(share: number): number {
  if (!(share > 0)) return 0;
  if (share >= 1) return 1;
  let low = 0;
  let high = 1;
  let u = (share / 5) ** 0.25;
  for (let i = 0; i < 100; i++) {
    const miss = 2 * placeOf(u) - share;
    if (miss === 0) return u;
    if (miss > 0) high = u;
    else low = u;
    const next = u - miss / (2 * speedOf(u));
    const after = next > low && next < high ? next : (low + high) / 2;
    if (Math.abs(after - u) <= 1e-16) return after;
    u = after;
  }
  return u;
}
