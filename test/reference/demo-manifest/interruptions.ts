// RULES 30 (comb) and 35 (reverse).
import { entry, isDense, type Entry } from './entry.js';
import type { Track } from './read-scene.js';
import { grainOf } from './shakes.js';
import { indices } from './stored-numbers.js';
import { inner, isStill, size, turnBetween, type Vec } from './turns.js';

/** `claimed`: keys that a jump explains. */
export function interruptions(track: Track, claimed: readonly number[]): Entry[] {
  return isDense(track) ? [...comb(track), ...reverse(track, claimed)] : [];
}

/** Steps that repeat while the track moves, at one period. */
function comb(track: Track): Entry[] {
  const { steps, speeds, keys, times } = track;
  const reach = Math.round(0.25 / ((times[times.length - 1] - times[0]) / steps.length));
  const moving = indices(speeds, (_, k) => {
    const [from, to] = [Math.max(0, k - reach), Math.min(steps.length, k + 1 + reach)];
    return turnBetween(keys[from], keys[to]) / (times[to] - times[from]) > 2;
  });
  const still = moving.filter((k) => isStill(size(steps[k])));
  const gaps = still.slice(1).map((k, i) => k - still[i]);
  const share = still.length / moving.length;
  const regular = Math.max(0, ...gaps.map((gap) => gaps.filter((other) => other === gap && gap > 1).length));
  if (still.length < 5 || share < 0.05 || share > 0.6 || regular <= 0.8 * gaps.length) return [];
  return [entry(track, 'pace.comb', [still[0] + 1, still[still.length - 1] + 1], 100 * share, '%', 1)];
}

/** Every stretch of under 0.15 s that goes back against half a second before it and after it, three keys or more from a jump. */
function reverse(track: Track, claimed: readonly number[]): Entry[] {
  const { times, rates, speeds } = track;
  const limit = Math.max(0.3, 2 * track.floor, 8 * grainOf(track));
  const turn = (k: number): Vec => scaled(rates[k], times[k + 1] - times[k]);
  const found: { from: number; to: number; back: number }[] = [];
  for (let from = 1; from < speeds.length; from++) {
    for (let to = from + 1; to < speeds.length && times[to] - times[from] < 0.15; to++) {
      const before = speeds.map((_, k) => k).filter((k) => k < from && times[from] - times[k] <= 0.5);
      const after = speeds.map((_, k) => k).filter((k) => k >= to && times[k + 1] - times[to] <= 0.5);
      if (inner(turn(from), turn(from - 1)) >= 0 || inner(turn(to - 1), turn(from - 1)) >= 0) break;
      const axis = sum([...before, ...after].map(turn));
      const way = (parts: readonly number[]): number => inner(sum(parts.map(turn)), axis) / size(axis);
      const back = -way(Array.from({ length: to - from }, (_, i) => from + i));
      const isOneWay = [...before, ...after].every((k) => way([k]) >= 0);
      const isJump = claimed.some((key) => key >= from - 3 && key <= to + 3);
      if (!isJump && back > limit && isOneWay && way(before) >= 5 * back && way(after) >= 5 * back)
        found.push({ from, to, back });
    }
  }
  if (!found.length) return [];
  const worst = Math.max(...found.map(({ back }) => back));
  return [entry(track, 'pace.reverse', found.flatMap(({ from, to }) => [from, to]), worst, 'deg', 0.05)]; // prettier-ignore
}

function sum(parts: readonly Vec[]): Vec {
  return parts.reduce<Vec>(([a, b, c], [x, y, z]) => [a + x, b + y, c + z], [0, 0, 0]);
}

function scaled([x, y, z]: Vec, factor: number): Vec {
  return [x * factor, y * factor, z * factor];
}
