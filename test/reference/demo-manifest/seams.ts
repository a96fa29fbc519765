// RULES 39, 40, 41 (family seam), for declared loops.
import { entry, isDense, type Entry } from './entry.js';
import type { Track } from './read-scene.js';
import { median, turnBetween, type Vec } from './turns.js';

const GAP = { joint: 0.5, prop: 0.25, 'camera-screen': 0.1, machine: 0.02 };
const KINK = { joint: [10, 0.1], prop: [0, 0.05], 'camera-screen': [1, 0.05], machine: [Infinity, 0] };

export function seams(track: Track): Entry[] {
  if (!track.loop) return [];
  return [...gap(track), ...kink(track), ...doubledEnd(track)];
}

function loopGap(track: Track): number {
  return turnBetween(track.keys[track.keys.length - 1], track.keys[0]);
}

/** Whether the loop's orientation fits, so that keys may be read across the seam. */
export function closes(track: Track): boolean {
  return track.loop && loopGap(track) <= GAP[track.role];
}

function gap(track: Track): Entry[] {
  if (closes(track)) return [];
  return [entry(track, 'seam.loop-gap', [track.keys.length - 1], loopGap(track), 'deg', 1e-3)];
}

/** "Orientation fits, rate does not." */
function kink(track: Track): Entry[] {
  if (!closes(track)) return [];
  const { rates } = track;
  const [first, last] = [rates[0], rates[rates.length - 1]];
  const step = change(last, first);
  const [least, share] = KINK[track.role];
  const around = [0, 1, 2, 3].flatMap((i) => {
    const end = rates.length - 1 - i;
    return [change(rates[i], rates[i + 1]), change(rates[end], rates[end - 1])];
  });
  const usual = isDense(track) ? 3 * median(around) : 0;
  const most = Math.max(Math.hypot(...first), Math.hypot(...last));
  if (step <= least || step <= share * most || step <= usual) return [];
  return [entry(track, 'seam.loop-kink', [track.keys.length - 1], step, 'deg/s', 0.01 * step)];
}

function doubledEnd(track: Track): Entry[] {
  const { speeds } = track;
  const last = speeds.length - 1;
  const neighbours = [1, 2, 3].flatMap((i) => [speeds[last - i], speeds[i - 1]]);
  if (speeds[last] >= 0.1 * median(neighbours)) return [];
  const turn = Math.hypot(...track.steps[last]);
  return [
    entry(track, 'seam.doubled-end', [last + 1], turn, 'deg', 1e-3, { means: 'turn of the last step' }),
  ];
}

function change(a: Vec, b: Vec): number {
  return Math.hypot(a[0] - b[0], a[1] - b[1], a[2] - b[2]);
}
