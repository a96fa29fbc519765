// RULES "Explanations compete", 19, 20, 22, 23, 24 (family jump).
import { entry, isDense, type Entry } from './entry.js';
import type { Track } from './read-scene.js';
import { claims, type Claim } from './roughness.js';
import { isStill, median, spread } from './turns.js';

const LONE_KEY = { joint: 1, prop: 1, 'camera-screen': 0.25, machine: 0.25 };
const SHELF = { joint: 2, prop: 2, 'camera-screen': 0.5, machine: 0.5 };

export function jumps(track: Track, isCoarse: boolean): Entry[] {
  if (isCoarse) return [];
  const frozen = freezes(track);
  const taken = frozen.flatMap(({ keys }) => [keys[0] - 3, keys[keys.length - 1] + 3]);
  const free = ({ key }: Claim): boolean => !frozen.length || key < taken[0] || key > taken[1];
  const found = isDense(track) ? claims(track).filter(free) : [];
  return [
    ...frozen,
    ...turnedOver(track),
    ...firstKey(track),
    ...cutSmear(track),
    ...jump(track, 'jump.lone-key', found, 'lone key', LONE_KEY[track.role], 16),
    ...jump(track, 'jump.shelf', found, 'shelf', SHELF[track.role], 8),
  ];
}

function jump(
  track: Track,
  rule: string,
  found: readonly Claim[],
  kind: Claim['kind'],
  limit: number,
  gain: number,
): Entry[] {
  const places = found.filter(
    (claim) =>
      claim.kind === kind &&
      claim.size > limit &&
      claim.size > 2 * track.floor &&
      claim.gain >= gain &&
      claim.lead >= 1.5,
  );
  if (!places.length) return [];
  const worst = Math.max(...places.map(({ size }) => size));
  const calm = (key: number): boolean =>
    Math.min(...[key - 2, key].map((k) => track.speeds[k] ?? Infinity)) < 2;
  const level = kind === 'shelf' && places.every(({ key }) => calm(key)) ? 'note' : 'warning';
  const keys = places.map(({ key }) => key);
  return [entry(track, rule, keys, worst, 'deg', 0.01 * worst, { level, means: 'fitted offset' })];
}

/** Two or more keys equal to the one before them inside motion, and a catch-up. The keys are those that repeat. */
function freezes(track: Track): Entry[] {
  if (!isDense(track)) return [];
  const { speeds } = track;
  for (let k = 1; k < speeds.length; k++) {
    let end = k;
    while (end < speeds.length && isStill(speeds[end])) end++;
    const beside = [...speeds.slice(Math.max(0, k - 6), k), ...speeds.slice(end + 1, end + 7)];
    const sides = [speeds.slice(Math.max(0, k - 6), k), speeds.slice(end + 1, end + 7)];
    const moving = sides.every((side) => side.length > 0 && median(side) > 2);
    if (end - k >= 2 && moving && speeds[end] > 2 * median(beside)) {
      const keys = Array.from({ length: end - k }, (_, i) => k + 1 + i);
      const value = speeds[end];
      return [
        entry(track, 'jump.freeze', keys, value, 'deg/s', 0.01 * value, { means: 'speed of the catch-up' }),
      ];
    }
    k = end;
  }
  return [];
}

/** Two steps near 90°, 120° or 180°, each calm on both sides, within 3 s, that lead back to the same side. */
function turnedOver(track: Track): Entry[] {
  if (!isDense(track)) return [];
  const { speeds, steps, times } = track;
  const wide = steps.flatMap((step, k) => {
    const turn = Math.hypot(...step);
    const calm = Math.max(speeds[k - 1] ?? 0, speeds[k + 1] ?? 0) < 0.25 * speeds[k];
    return calm && [90, 120, 180].some((symmetry) => Math.abs(turn - symmetry) <= 10) ? [k] : [];
  });
  const at = wide.findIndex((k, i) => {
    const off = wide[i + 1];
    if (off === undefined || times[off + 1] - times[k] >= 3) return false;
    const [on, back] = [steps[k], steps[off]];
    return spread(on, [-back[0], -back[1], -back[2]]) < 15;
  });
  if (at < 0) return [];
  const value = Math.hypot(...steps[wide[at]]);
  return [entry(track, 'jump.turned-over', [wide[at] + 1, wide[at + 1] + 1], value, 'deg', 1)];
}

function firstKey(track: Track): Entry[] {
  const turn = Math.hypot(...track.steps[0]);
  const next = median(track.steps.slice(1, 8).map((step) => Math.hypot(...step)));
  return turn > 20 && turn > 10 * next ? [entry(track, 'jump.first-key', [0], turn, 'deg', 1e-3)] : [];
}

/** Hand keys lie on no grid: two frames are taken as 2/30 s. */
export function cutSmear(track: Track): Entry[] {
  if (track.role !== 'camera-screen') return [];
  const at = track.steps.findIndex((step, k) => {
    const calm = 0.25 * track.speeds[k];
    const short = track.times[k + 1] - track.times[k] <= 2 / 30;
    const [before, later] = [track.speeds[k - 1] ?? 0, track.speeds[k + 1] ?? 0];
    return Math.hypot(...step) > 20 && short && before < calm && later < calm;
  });
  if (at < 0) return [];
  return [entry(track, 'jump.cut-smear', [at + 1], Math.hypot(...track.steps[at]), 'deg', 1e-2)];
}
