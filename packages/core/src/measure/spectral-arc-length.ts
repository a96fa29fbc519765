import type { ReadonlyNumberStore } from '../number-store.js';

/** Settings of the spectral arc length; their defaults are the published ones. */
export interface SpectralArcLengthOptions {
  /** Hz; what lies above counts for nothing. Default 10. */
  readonly highest?: number;
  /** Share of the spectrum's largest size below which its tail is cut. Default 0.05. */
  readonly threshold?: number;
  /** Zeros are added up to the next power of two, times two to this. Default 4. */
  readonly padding?: number;
}

/**
 * Spectral arc length of a speed profile (never negative speeds, `rate` samples a second): minus the length of the curve that its
 * spectrum's size makes, both axes scaled to 1, up to the last place below `highest` at which it reaches `threshold`. Below −1; nearer to
 * −1 is smoother; neither size nor duration matters much. 0 where nothing moves.
 *
 * S. Balasubramanian et al., J. NeuroEng. Rehabil. 12:112, 2015 (defaults from the authors' code).
 */
export function spectralArcLength(
  speeds: ReadonlyNumberStore,
  rate: number,
  { highest = 10, threshold = 0.05, padding = 4 }: SpectralArcLengthOptions = {},
): number {
  if (speeds.length === 0) return 0;
  const size = 2 ** (Math.ceil(Math.log2(speeds.length)) + padding);
  const sizes: number[] = [];
  for (let bin = 0; bin < size && (bin * rate) / size <= highest; bin++)
    sizes.push(spectrumAt(speeds, bin / size));
  // Speeds are not negative, so the spectrum is largest at 0.
  const largest = sizes[0];
  if (!(largest > 0)) return 0;
  let last = 0;
  sizes.forEach((value, bin) => (last = value >= threshold * largest ? bin : last));
  let length = 0;
  for (let bin = 1; bin <= last; bin++)
    length += Math.hypot(1 / last, (sizes[bin] - sizes[bin - 1]) / largest);
  return -length;
}

/** |Σ v_n exp(−2πi·n·turns)|: one bin of a discrete Fourier transform. */
function spectrumAt(speeds: ReadonlyNumberStore, turns: number): number {
  let real = 0;
  let imaginary = 0;
  for (let n = 0; n < speeds.length; n++) {
    // Whole turns are taken off first: the phase of a long profile keeps its digits.
    const phase = 2 * Math.PI * ((n * turns) % 1);
    real += speeds[n] * Math.cos(phase);
    imaginary -= speeds[n] * Math.sin(phase);
  }
  return Math.hypot(real, imaginary);
}
