import { findSegment } from '../track/find-segment.js';
import type { InnerClock, Span } from './span-retiming.js';
import { stretchesClock } from './stretches-clock.js';

/** A clock for a part of a span. */
export interface PartClock {
  readonly span: Span;
  readonly clock: InnerClock;
}

/** One clock over a span out of clocks for parts of it, ascending and apart; between them time runs as it did. */
export function joinedClocks([from, to]: Span, parts: readonly PartClock[]): InnerClock {
  const all: PartClock[] = [];
  let done = from;
  const steady = (end: number): void => {
    if (end > done)
      all.push({
        span: [done, end],
        clock: stretchesClock(done, [{ kind: 'steady', seconds: end - done, old: end - done }]),
      });
  };
  for (const part of parts) {
    steady(part.span[0]);
    all.push(part);
    done = part.span[1];
  }
  steady(to);
  const olds = Float64Array.of(...all.map(({ span }) => span[0]), to);
  const news = newTimes(all, olds);
  const last = all.length - 1;
  return {
    seconds: news[last + 1],
    knots: [
      ...all.flatMap(({ clock }, i) => clock.knots.slice(0, -1).map((knot) => news[i] + knot)),
      news[last + 1],
    ],
    continuity: 0,
    oldTime(since) {
      const i = Math.min(last, findSegment(news, since));
      return Math.min(olds[i + 1], all[i].clock.oldTime(since - news[i]));
    },
    newTime(old) {
      const i = Math.min(last, findSegment(olds, old));
      return Math.min(news[i + 1], news[i] + all[i].clock.newTime(old));
    },
    paceAt(since, out) {
      const i = Math.min(last, findSegment(news, since));
      all[i].clock.paceAt(since - news[i], out);
    },
  };
}

/** New times since the start at which parts begin, and the end: the old ones to the bit as long as every part takes the time that it took. */
function newTimes(parts: readonly PartClock[], olds: Float64Array): Float64Array {
  const news = new Float64Array(olds.length);
  let keeps = true;
  parts.forEach(({ clock, span }, i) => {
    keeps &&= clock.seconds === span[1] - span[0];
    news[i + 1] = keeps ? olds[i + 1] - olds[0] : news[i] + clock.seconds;
  });
  return news;
}
