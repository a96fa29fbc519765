// RULES 36, 37, 38 (family shake).
import { entry, isDense, type Entry } from './entry.js';
import type { Track } from './read-scene.js';
import { fourthDifferences } from './roughness.js';
import { inner, median, size, spread, turnBetween, weighted, type Vec } from './turns.js';

const GRAIN = { joint: 0.1, prop: 0.1, 'camera-screen': 0.02, machine: 0.02 };
const HUM = { joint: 0.3, prop: 0.3, 'camera-screen': 0.05, machine: 0.05 };
const CREEP = { joint: 0.5, prop: 0.5, 'camera-screen': 0.25, machine: 0.5 };

export function shakes(track: Track, isCoarse: boolean): Entry[] {
  if (!isDense(track) || isCoarse) return [];
  return [...grain(track), ...hum(track), ...creep(track)];
}

/** σ per axis, degrees, over keys slower than 60 deg/s: what a cubic through the four neighbours misses. */
export function grainOf(track: Track): number {
  const missed = track.keys.flatMap((_, key) => {
    const d = fourthDifferences(track, key).get(0);
    const slow = Math.max(track.speeds[key - 1] ?? 0, track.speeds[key] ?? 0) < 60;
    return d && slow ? [size(d) / 6] : [];
  });
  return missed.length < 8 ? 0 : median(missed) / (1.538 * 1.394);
}

function grain(track: Track): Entry[] {
  const rate = 1 / (track.times[1] - track.times[0]);
  // 1 at 60 fps, 2.5 at 30, 5 at 24: between them by straight lines.
  const scale =
    rate >= 59.9 ? 1 : rate >= 30 ? 1 + (1.5 * (60 - rate)) / 30 : Math.min(5, 2.5 + (2.5 * (30 - rate)) / 6);
  const sigma = grainOf(track);
  if (sigma <= GRAIN[track.role] * scale) return [];
  return [entry(track, 'shake.grain', [], sigma, 'deg', 0.006, { means: 'standard deviation per axis' })];
}

interface Ripple {
  /** Key in the middle of the window. */
  readonly middle: number;
  readonly frequency: number;
  readonly share: number;
  readonly amplitude: number;
}

function hum(track: Track): Entry[] {
  const rate = 1 / (track.times[1] - track.times[0]);
  const window = Math.round(2.5 * rate);
  const heard: Ripple[] = [];
  for (let from = 0; from + window <= track.rates.length; from += Math.round(rate / 4)) {
    const ripple = strongest(track.rates.slice(from, from + window), rate, from + window / 2);
    if (ripple.share >= 0.6 && ripple.amplitude > HUM[track.role]) heard.push(ripple);
  }
  if (!heard.length) return [];
  const worst = heard.reduce((a, b) => (b.share > a.share ? b : a));
  const keys = [heard[0].middle, heard[heard.length - 1].middle].map(Math.round);
  const share = Math.round(100 * worst.share);
  const means = `frequency where it is purest (${worst.amplitude.toFixed(2)}°, ${share} % of the power); keys: middles of the first and last window of 2.5 s that hold it`;
  return [entry(track, 'shake.hum', keys, worst.frequency, 'Hz', 0.2, { means })];
}

/** Largest peak over 4 Hz of the rate's spectrum (mean taken off, no taper), with its share of the power within 1 Hz. */
function strongest(rates: readonly Vec[], rate: number, middle: number): Ripple {
  const count = rates.length;
  const mean = weighted(rates.map((v) => [1 / count, v]));
  const centred = rates.map((v): Vec => [v[0] - mean[0], v[1] - mean[1], v[2] - mean[2]]);
  const powerAt = (hertz: number): number => {
    const turn = (-2 * Math.PI * hertz) / rate;
    const real = weighted(centred.map((v, n) => [Math.cos(turn * n), v]));
    const imaginary = weighted(centred.map((v, n) => [Math.sin(turn * n), v]));
    return inner(real, real) + inner(imaginary, imaginary);
  };
  const bins = Array.from({ length: Math.floor(count / 2) }, (_, i) => ((i + 1) * rate) / count);
  const power = bins.map(powerAt);
  const total = power.reduce((a, b) => a + b, 0);
  const bin = highest(bins, (hertz, i) => (hertz > 4 ? power[i] : 0));
  // Between the bins: fiftieths of the two bins around the highest.
  const fine = Array.from({ length: 101 }, (_, i) => bin + ((i - 50) * rate) / count / 50);
  const frequency = highest(fine, powerAt);
  const near = power.reduce((sum, p, i) => (Math.abs(bins[i] - frequency) <= 1 ? sum + p : sum), 0);
  // A mean rate over one frame is the true rate times sin(πf/r)/(πf/r); amplitude of the angle = of the rate / 2πf.
  const held = (Math.PI * frequency) / rate;
  const amplitude = (2 * Math.sqrt(near)) / count / (2 * Math.PI * frequency) / (Math.sin(held) / held);
  return { middle, frequency, share: total > 0 ? near / total : 0, amplitude };
}

function highest(hertz: readonly number[], power: (hertz: number, index: number) => number): number {
  const powers = hertz.map(power);
  return hertz[powers.indexOf(Math.max(...powers))];
}

/** Spans of two seconds or more that turn at 0.02 to 1.5 deg/s about one axis. */
function creep(track: Track): Entry[] {
  const { rates, speeds, keys, times } = track;
  let from = 0;
  let worst: { span: [number, number]; net: number } | undefined;
  for (let k = 0; k <= rates.length; k++) {
    const goes =
      k < rates.length &&
      speeds[k] >= 0.02 &&
      speeds[k] <= 1.5 &&
      spread(rates[k], rates[Math.min(from, k)]) < 20;
    if (goes) continue;
    const net = turnBetween(keys[from], keys[k]);
    if (k > from && times[k] - times[from] >= 2 && net >= CREEP[track.role] && net > (worst?.net ?? 0))
      worst = { span: [from, k], net };
    from = k + 1;
  }
  if (!worst) return [];
  return [entry(track, 'shake.creep', worst.span, worst.net, 'deg', 0.05, { means: 'net turn of the span' })];
}
