import { frameLength, type ChartData } from './chart-data.js';

type Span = readonly [number, number];

/** A few seconds around the cursor, or the span with room at both sides; at least twelve frames. */
export function closeUpSpan(time: number, span: Span | undefined, fold: number, data: ChartData): Span {
  const least = 12 * frameLength(data);
  const room = span ? Math.max(least, (span[1] - span[0]) * 1.5) : Math.max(least, Math.min(2, fold / 4));
  const middle = span ? (span[0] + span[1]) / 2 : time;
  const from = Math.max(data.motion.start, Math.min(middle - room / 2, data.motion.end - room));
  return [from, Math.min(data.motion.end, from + room)];
}

/** The span moved by `share` of itself, or made `factor` times as long about `about`; held to the motion. */
export function moveSpan(
  span: Span,
  motion: { readonly start: number; readonly end: number },
  share: number,
  factor = 1,
  about: number = (span[0] + span[1]) / 2,
): Span {
  const whole = motion.end - motion.start;
  const length = Math.min(whole, Math.max(1e-3, (span[1] - span[0]) * factor));
  const held = Math.min(span[1], Math.max(span[0], about));
  const part = (held - span[0]) / (span[1] - span[0] || 1);
  const from = held - part * length + share * length;
  const first = Math.max(motion.start, Math.min(from, motion.end - length));
  return [first, first + length];
}
