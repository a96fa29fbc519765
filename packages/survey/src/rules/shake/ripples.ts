import { medianGap } from '@slewcurve/core';
import type { TrackContext } from '../../rule.js';
import { segmentsOf } from '../../segments.js';
import { spectrum, type Spectrum } from './spectrum.js';

/** The strongest ripple of a window of segments. */
export interface Ripple {
  /** First segment of the window, and the key in its middle. */
  readonly from: number;
  readonly middle: number;
  readonly hertz: number;
  /** Share of the window's power within 1 Hz. */
  readonly share: number;
  /** Degrees. */
  readonly amplitude: number;
}

/** Seconds that a window lasts, windows a second, and windows that are passed over while nothing is near. */
const WINDOW = 2.5;
const WINDOWS_A_SECOND = 4;
const STRIDE = 5;
/** Share that one window must have for those around it to be looked at. */
const NEAR = 0.25;

/** Windows whose rate, parent axes, holds most of its power in one ripple of at least `amplitude`, by ascending time. */
export function ripplesOf(
  context: TrackContext,
  { hertz, share, amplitude }: { readonly hertz: number; readonly share: number; readonly amplitude: number },
): Ripple[] {
  const { times } = context.track;
  const gap = medianGap(context.track);
  const rates = segmentsOf(context).rates.slice();
  for (let i = 0; i < rates.length; i++) if (Number.isNaN(rates[i])) rates[i] = 0;
  const rate = 1 / gap;
  const window = Math.round(WINDOW * rate);
  // Half steps go up, whichever way a float32 clock leans.
  const step = Math.max(1, Math.round(rate / WINDOWS_A_SECOND + 1e-3));
  if (rate < 2 * hertz || rates.length < 3 * window) return [];
  const gate = gateOf(rates, window, rate, { hertz, share, amplitude });
  const read = spectrum(window, rate, hertz, NEAR);
  const known = new Map<number, Ripple>();
  const count = Math.floor((rates.length / 3 - window) / step) + 1;
  const look = (index: number): Ripple | undefined => {
    const from = index * step;
    if (index < 0 || index >= count || !gate(from)) return undefined;
    const length = (times[from + window] ?? 0) - (times[from] ?? 0);
    if (Math.abs(length - window * gap) > 0.02 * window * gap) return undefined;
    const before = known.get(index);
    if (before !== undefined) return before;
    const ripple = strongest(read, rates, from, window, rate);
    known.set(index, ripple);
    return ripple;
  };
  for (let index = 0; index < count + STRIDE; index += STRIDE) {
    const here = Math.min(index, count - 1);
    if ((look(here)?.share ?? 0) < NEAR) continue;
    for (let other = here - STRIDE; other <= here + STRIDE; other++) look(other);
  }
  const found = [...known.values()].filter((ripple) => ripple.share >= share && ripple.amplitude > amplitude);
  return found.toSorted((a, b) => a.from - b.from);
}

function strongest(read: Spectrum, rates: Float64Array, from: number, window: number, rate: number): Ripple {
  const { hertz, near, total } = read(rates, from);
  // A mean rate over one gap is the true rate times sin(πf/r)/(πf/r); the angle's amplitude is the rate's over 2πf.
  const held = (Math.PI * hertz) / rate;
  const amplitude = (2 * Math.sqrt(near)) / window / (2 * Math.PI * hertz) / (Math.sin(held) / held);
  return {
    from,
    middle: Math.round(from + window / 2),
    hertz,
    share: total > 0 ? near / total : 0,
    amplitude,
  };
}

/**
 * A cheap bound that lets no ripple by: its window varies by at least the ripple's own power, and, as most of its power lies above
 * the least frequency, its rate changes from segment to segment by the matching share of that.
 */
function gateOf(
  rates: Float64Array,
  window: number,
  rate: number,
  { hertz, share, amplitude }: { readonly hertz: number; readonly share: number; readonly amplitude: number },
): (from: number) => boolean {
  const held = (Math.PI * hertz) / rate;
  const slowest = 2 * Math.PI * hertz * amplitude * (Math.sin(held) / held);
  const leastPower = (window * slowest * slowest) / 2;
  const leastShare = 0.5 * share * 2 * (1 - Math.cos((2 * Math.PI * hertz) / rate));
  const count = rates.length / 3;
  const sums = [0, 1, 2].map(() => new Float64Array(count + 1));
  const squares = new Float64Array(count + 1);
  const changes = new Float64Array(count + 1);
  for (let k = 0; k < count; k++) {
    let square = 0;
    let change = 0;
    for (let axis = 0; axis < 3; axis++) {
      const sum = sums[axis]!;
      const value = rates[3 * k + axis] ?? 0;
      sum[k + 1] = (sum[k] ?? 0) + value;
      square += value * value;
      if (k > 0) change += (value - (rates[3 * k - 3 + axis] ?? 0)) ** 2;
    }
    squares[k + 1] = (squares[k] ?? 0) + square;
    changes[k + 1] = (changes[k] ?? 0) + change;
  }
  const over = (sum: Float64Array, from: number): number => (sum[from + window] ?? 0) - (sum[from] ?? 0);
  return (from) => {
    const mean = sums.reduce((all, sum) => all + over(sum, from) ** 2, 0) / window;
    const power = over(squares, from) - mean;
    // Half of the bound on the share: the window's ends count too.
    return power > 0.5 * leastPower && over(changes, from) > leastShare * power;
  };
}
