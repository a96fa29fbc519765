// RULES 1 to 5, 10, 11 (family file). Each clip of the demo has one rotation track, so that none is ragged.
import { entry, isDense, type Entry } from './entry.js';
import type { Track } from './read-scene.js';
import { ascending, isStill, median, turnBetween } from './turns.js';

export function storedNumbers(track: Track): Entry[] {
  return [
    ...notFinite(track),
    ...notNormalised(track),
    ...timeOrder(track),
    ...idle(track),
    ...coarse(track),
    ...timeGrid(track),
  ];
}

function notFinite(track: Track): Entry[] {
  const keys = indices(track.stored, (key, k) => ![...key, track.times[k]].every(Number.isFinite));
  return keys.length
    ? [entry(track, 'file.not-finite', keys, keys.length, 'keys', 0, { level: 'error' })]
    : [];
}

function notNormalised(track: Track): Entry[] {
  const off = track.stored.map((key) => Math.abs(Math.hypot(...key) - 1));
  const own = track.floor > 0.1 ? 4 / 127 : 0;
  const keys = indices(off, (length) => length > Math.max(1e-3, own));
  const worst = Math.max(...off);
  const level = worst > Math.max(1e-2, own) ? 'error' : 'warning';
  return keys.length ? [entry(track, 'file.not-normalised', keys, worst, 'length', 1e-6, { level })] : [];
}

function timeOrder(track: Track): Entry[] {
  const gaps = track.times.slice(1).map((time, k) => time - track.times[k]);
  const least = Math.max(1e-4, 0.01 * median(gaps));
  const keys = indices(gaps, (gap) => gap < least).map((k) => k + 1);
  const level = gaps.some((gap) => gap <= 0) ? 'error' : 'warning';
  return keys.length ? [entry(track, 'file.time-order', keys, Math.min(...gaps), 's', 1e-6, { level })] : [];
}

function idle(track: Track): Entry[] {
  const travelled = track.steps.reduce((sum, step) => sum + Math.hypot(...step), 0);
  if (track.keys.length <= 2 || travelled >= 2 * track.floor) return [];
  return [entry(track, 'file.idle', [], travelled, 'deg', 2 * track.floor, { level: 'note' })];
}

/** Frames of the usual rates: none of the demo's dense clocks is a rounded one. */
function timeGrid(track: Track): Entry[] {
  const { times } = track;
  const gaps = times.slice(1).map((time, k) => time - times[k]);
  const mean = (times[times.length - 1] - times[0]) / gaps.length;
  const rate = [24, 25, 30, 48, 50, 60, 100, 120].find((one) => Math.abs(one * mean - 1) < 0.01);
  const thousands = times.every((time) => Math.abs(time * 1e3 - Math.round(time * 1e3)) < 1e-3);
  if (!isDense(track) || rate === undefined || !thousands) return [];
  const worst = Math.max(...gaps.map((gap) => Math.abs(gap - mean)));
  const key = gaps.findIndex((gap) => Math.abs(gap - mean) === worst) + 1;
  // A float32 time of a minute is good to 4 millionths of a second.
  if (worst <= 0.01 / rate + 4e-6) return [];
  return [entry(track, 'file.time-grid', [key], worst, 's', 1e-5)];
}

/** Share of steps that read zero while the track moves by over 2 deg/s over the quarter second on each side. */
function coarse(track: Track): Entry[] {
  if (lattice(track) < 1e-3) return [];
  const reach = Math.round(0.25 / (track.times[1] - track.times[0]));
  const moving = indices(track.steps, (_, k) => {
    const [from, to] = [Math.max(0, k - reach), Math.min(track.keys.length - 1, k + 1 + reach)];
    return turnBetween(track.keys[from], track.keys[to]) / (track.times[to] - track.times[from]) > 2;
  });
  const zero = moving.filter((k) => isStill(track.speeds[k])).length;
  const share = (100 * zero) / moving.length;
  if (!(share > 5)) return [];
  const means = 'share of steps that read zero while the track moves faster than 2 deg/s';
  return [entry(track, 'file.coarse', [], share, '%', 15, { means })];
}

/** Least difference of two component values that differ, where a dense track has few enough of them to lie on a lattice. */
function lattice(track: Track): number {
  const values = ascending([...new Set(track.stored.flat())]);
  if (track.keys.length < 100) return 0;
  return Math.min(...values.slice(1).map((value, i) => value - values[i]));
}

export function indices<T>(list: readonly T[], test: (item: T, index: number) => boolean): number[] {
  return list.flatMap((item, index) => (test(item, index) ? [index] : []));
}
