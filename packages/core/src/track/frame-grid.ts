import type { ReadonlyNumberStore } from '../number-store.js';

/** Frame rates that cameras, screens and capture use, frames per second. */
export const FRAME_RATES: readonly number[] = Object.freeze([
  23.976, 24, 25, 29.97, 30, 48, 50, 59.94, 60, 90, 100, 120,
]);

/** Largest departure of a key gap from whole frames, as a share of a frame. */
const TOLERANCE = 0.01;
/** Share of the gaps that must lie on the grid: a stray key does not hide it. */
const SHARE = 0.9;
/** Rates this near (24 and 23.976) are one grid, told apart by the mean over all gaps. */
const TWIN = 0.002;

interface Fit {
  readonly rate: number;
  /** How far the frame rate that the gaps give lies from `rate`, as a share of it. */
  readonly miss: number;
}

/**
 * Frames per second of the grid that the keys of one or more tracks lie on: of the usual rates, the lowest whose frames all
 * gaps between neighbouring keys are whole multiples of, to 1 % of a frame. Undefined without keys apart, off every grid,
 * and where several rates that have no common frame fit (keys a second apart fit 24, 25 and 30 alike).
 *
 * Gaps are judged and not times, so that a slow drift of the clock (1/120 s written as 0.0083333) does no harm.
 *
 * @param clocks Key times in seconds; unordered and not finite ones are passed over.
 */
export function frameGrid(clocks: readonly ReadonlyNumberStore[]): number | undefined {
  const gaps = gapsOf(clocks);
  if (gaps.length === 0) return undefined;
  const fits = FRAME_RATES.map((rate) => fitOf(rate, gaps)).filter((fit) => fit !== undefined);
  const best = fits.filter(
    (fit) => !fits.some((other) => other.miss < fit.miss && Math.abs(other.rate / fit.rate - 1) < TWIN),
  );
  const lowest = best[0];
  if (!lowest) return undefined;
  const nested = best.every(({ rate }) => {
    const ratio = rate / lowest.rate;
    return Math.abs(ratio / Math.round(ratio) - 1) < TWIN;
  });
  return nested ? lowest.rate : undefined;
}

interface Gap {
  readonly seconds: number;
  /** Rounding of its two ends as float32, seconds. */
  readonly rounding: number;
}

function gapsOf(clocks: readonly ReadonlyNumberStore[]): Gap[] {
  const gaps: Gap[] = [];
  for (const times of clocks)
    for (let key = 1; key < times.length; key++) {
      const seconds = times[key] - times[key - 1];
      if (seconds > 0 && Number.isFinite(seconds))
        gaps.push({ seconds, rounding: 2 ** -23 * Math.max(Math.abs(times[key]), Math.abs(times[key - 1])) });
    }
  return gaps;
}

function fitOf(rate: number, gaps: readonly Gap[]): Fit | undefined {
  let on = 0;
  let frames = 0;
  let seconds = 0;
  for (const gap of gaps) {
    const exact = gap.seconds * rate;
    const whole = Math.round(exact);
    if (whole < 1 || Math.abs(exact - whole) > TOLERANCE + gap.rounding * rate) continue;
    on++;
    frames += whole;
    seconds += gap.seconds;
  }
  if (on < SHARE * gaps.length) return undefined;
  return { rate, miss: Math.abs(frames / seconds / rate - 1) };
}
