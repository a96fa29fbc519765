/**
 * How speeds stand on the paper: evenly up to a few times the usual speed, so that a pop does not flatten the rest (what is faster
 * leaves the paper at the top and is written there); evenly up to the greatest; or by powers of ten.
 */
export type ScaleKind = 'usual' | 'linear' | 'log';

/** A scale for speeds whose 95th percentile is `usual` and whose greatest is `peak`, deg/s. */
export function speedScale(kind: ScaleKind, usual: number, peak: number): SpeedScale {
  if (kind === 'log') return logScale(peak);
  return linearScale(kind === 'usual' ? Math.min(peak, usual * ROOM) : peak);
}

/** Of the usual speed: how much stands on the paper. */
const ROOM = 2.5;

/** deg/s to a share of the row's height, 0 at the baseline, 1 at the top; outside speeds are held at the ends. */
export interface SpeedScale {
  readonly kind: 'linear' | 'log';
  /** Speed at the baseline and at the top, deg/s. */
  readonly low: number;
  readonly high: number;
  share(speed: number): number;
  /** The speed that stands at a share of the height, deg/s. */
  speed(share: number): number;
}

/** Ends of the logarithmic scale, deg/s: below the first nothing is seen, above the second nothing turns by intent. */
export const LOG_LOW = 0.1;
export const LOG_HIGH = 10_000;

/** A linear scale from 0 to a round number at or above `peak`, deg/s. */
export function linearScale(peak: number): SpeedScale {
  const high = roundUp(Number.isFinite(peak) ? peak : 0);
  return {
    kind: 'linear',
    low: 0,
    high,
    share: (speed) => hold(speed / high),
    speed: (share) => share * high,
  };
}

/** A scale by powers of ten, 0.1 to 10,000 deg/s; to more where `peak` is more. */
export function logScale(peak: number): SpeedScale {
  const high = Math.max(LOG_HIGH, 10 ** Math.ceil(Math.log10(Math.max(1, Number.isFinite(peak) ? peak : 1))));
  const decades = Math.log10(high / LOG_LOW);
  return {
    kind: 'log',
    low: LOG_LOW,
    high,
    share: (speed) => (speed <= LOG_LOW ? 0 : hold(Math.log10(speed / LOG_LOW) / decades)),
    speed: (share) => LOG_LOW * 10 ** (share * decades),
  };
}

/** Speeds of the ruled lines above the baseline, deg/s, ascending, last at most the scale's top; about `count` of them. */
export function speedTicks(scale: SpeedScale, count = 3): number[] {
  if (scale.kind === 'linear') {
    const step = niceStep(scale.high / count);
    return range(1, Math.floor(scale.high / step + 1e-9)).map((i) => trim(i * step));
  }
  const ticks = [];
  for (let power = Math.log10(scale.low) + 1; 10 ** power <= scale.high * 1.0001; power++)
    ticks.push(trim(10 ** power));
  return ticks;
}

/** Times of the ticks of a row, seconds, ascending, both ends of the row included where they are round; about `count`. */
export function timeTicks(from: number, to: number, count: number): number[] {
  if (!(to > from)) return [];
  const step = niceStep((to - from) / Math.max(1, count));
  const first = Math.ceil(from / step - 1e-6);
  return range(first, Math.floor(to / step + 1e-6)).map((i) => trim(i * step));
}

/** Places after the point that tell ticks `step` seconds apart from one another. */
export function tickPlaces(step: number): number {
  return step >= 1 || !(step > 0) ? 0 : Math.min(6, Math.ceil(-Math.log10(step) - 1e-9));
}

/** 1, 2 or 5 times a power of ten, at or above `rough`. */
export function niceStep(rough: number): number {
  const power = 10 ** Math.floor(Math.log10(rough) + 1e-12);
  const lead = rough / power;
  const nice = [1, 2, 5].find((step) => lead <= step * (1 + 1e-9)) ?? 10;
  return nice * power;
}

/** The top of a linear scale: a little above `peak`, and round. */
function roundUp(peak: number): number {
  if (!(peak > 1e-6)) return 1;
  const power = 10 ** Math.floor(Math.log10(peak));
  const top = [1, 1.2, 1.5, 2, 2.5, 3, 4, 5, 6, 8].find((lead) => lead * power >= peak) ?? 10;
  return trim(top * power);
}

function hold(share: number): number {
  return share > 0 ? Math.min(1, share) : 0;
}

function range(first: number, last: number): number[] {
  return Array.from({ length: Math.max(0, last - first + 1) }, (_, i) => first + i);
}

/** Without the dust that steps of 0.1 leave behind. */
function trim(value: number): number {
  return Number(value.toPrecision(12));
}
