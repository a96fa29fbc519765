import { fourier } from './fourier.js';

/** The strongest line of a window of vectors: where it lies, the power within 1 Hz of it and that of the whole window. */
export type Spectrum = (
  vectors: Float64Array,
  from: number,
) => { readonly hertz: number; readonly near: number; readonly total: number };

/** Hertz on either side of a line that belong to it. */
const BESIDE = 1;
/** Places between two bins at which the line is looked for. */
const FINE = 50;

/**
 * Discrete Fourier spectrum of `count` vectors at `rate` a second, their mean taken off, no taper; lines above `least` hertz, placed exactly where they hold a share of at
 * least `worth`. Power is
 * |Σ v·e^(−2πifn/rate)|², over all three axes.
 */
export function spectrum(count: number, rate: number, least: number, worth: number): Spectrum {
  const transform = fourier(count);
  const centred = new Float64Array(3 * count);
  const real = new Float64Array(count);
  const imaginary = new Float64Array(count);
  const powers = new Float64Array(Math.floor(count / 2) + 1);
  const hertzOf = (bin: number): number => (bin * rate) / count;

  /** Powers of all bins: x and y go as one complex signal, whose power at ±f holds that of both; z as another. */
  const fillPowers = (): void => {
    powers.fill(0);
    for (const pair of [true, false]) {
      for (let n = 0; n < count; n++) {
        real[n] = centred[3 * n + (pair ? 0 : 2)] ?? 0;
        imaginary[n] = pair ? (centred[3 * n + 1] ?? 0) : 0;
      }
      transform(real, imaginary);
      for (let bin = 1; bin < powers.length; bin++) {
        const re = real[bin]!;
        const im = imaginary[bin]!;
        const reBack = real[count - bin]!;
        const imBack = imaginary[count - bin]!;
        powers[bin] = (powers[bin] ?? 0) + (re * re + im * im + reBack * reBack + imBack * imBack) / 2;
      }
    }
  };

  return (vectors, from) => {
    centre(centred, vectors, from, count);
    fillPowers();
    let total = 0;
    for (let bin = 1; bin < powers.length; bin++) total += powers[bin] ?? 0;
    const best = strongestLine(powers, (least * count) / rate);
    if (best === 0) return { hertz: least, near: 0, total };
    // A line lies within half a bin of its highest: where those around it hold little, it need not be looked for.
    const rough = powerWithin(powers, rate / count, hertzOf(best), BESIDE + rate / count);
    if (rough < worth * total) return { hertz: hertzOf(best), near: rough, total };
    const hertz = Math.max(least, finest(centred, count, rate, hertzOf(best)));
    return { hertz, near: powerWithin(powers, rate / count, hertz, BESIDE), total };
  };
}

/** Power of the bins, `width` hertz apart, within a distance of a frequency. */
function powerWithin(powers: Float64Array, width: number, hertz: number, distance: number): number {
  let sum = 0;
  for (let bin = 1; bin < powers.length; bin++)
    if (Math.abs(bin * width - hertz) <= distance) sum += powers[bin] ?? 0;
  return sum;
}

/** The bin above `least` bins with the most power; 0 where there is none. The skirt of a slower line is no line of its own. */
function strongestLine(powers: Float64Array, least: number): number {
  let best = 0;
  for (let bin = Math.floor(least) + 1; bin < powers.length; bin++) {
    const power = powers[bin] ?? 0;
    if (power > (powers[bin - 1] ?? 0) && (best === 0 || power > (powers[best] ?? 0))) best = bin;
  }
  return best;
}

function centre(out: Float64Array, vectors: Float64Array, from: number, count: number): void {
  for (let axis = 0; axis < 3; axis++) {
    let sum = 0;
    for (let n = 0; n < count; n++) sum += vectors[3 * (from + n) + axis] ?? 0;
    for (let n = 0; n < count; n++) out[3 * n + axis] = (vectors[3 * (from + n) + axis] ?? 0) - sum / count;
  }
}

/** The strongest frequency within one bin of `hertz`. */
function finest(centred: Float64Array, count: number, rate: number, hertz: number): number {
  let best = hertz;
  let most = -1;
  for (let i = -FINE; i <= FINE; i++) {
    const here = hertz + (i * rate) / count / FINE;
    const power = linePower(centred, count, (2 * Math.PI * here) / rate);
    if (power > most) [best, most] = [here, power];
  }
  return best;
}

function linePower(centred: Float64Array, count: number, turn: number): number {
  const [cosine, sine] = [Math.cos(turn), Math.sin(turn)];
  const sums = new Float64Array(6);
  let c = 1;
  let s = 0;
  for (let n = 0; n < count; n++) {
    for (let axis = 0; axis < 3; axis++) {
      const value = centred[3 * n + axis] ?? 0;
      sums[axis] = (sums[axis] ?? 0) + c * value;
      sums[3 + axis] = (sums[3 + axis] ?? 0) + s * value;
    }
    const turned = c * cosine - s * sine;
    s = s * cosine + c * sine;
    c = turned;
  }
  return sums.reduce((all, sum) => all + sum * sum, 0);
}
