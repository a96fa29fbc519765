// RULES 12, 13, 18 (family turn).
import { entry, type Entry } from './entry.js';
import type { Track } from './read-scene.js';
import { indices } from './stored-numbers.js';

export function waysRound(track: Track): Entry[] {
  return [...signFlip(track), ...half(track), ...lost(track)];
}

/** The playback is the sampler's own, which takes the short way, so a sign change is a note; near a half turn the other rule tells. */
function signFlip(track: Track): Entry[] {
  const angles = track.steps.map((step) => Math.hypot(...step));
  const keys = indices(track.steps, (_, k) => {
    const dot = track.stored[k].reduce((sum, c, i) => sum + c * track.stored[k + 1][i], 0);
    return dot < 0 && angles[k] < 174;
  }).map((k) => k + 1);
  if (!keys.length) return [];
  const longest = 360 - Math.min(...keys.map((k) => angles[k - 1]));
  return [
    entry(track, 'turn.sign-flip', keys, longest, 'deg', 1e-3, { level: 'note', means: 'the long way' }),
  ];
}

function half(track: Track): Entry[] {
  const [note, warning, error] = track.role === 'machine' ? [120, 150, 170] : [150, 165, 175];
  const angles = track.steps.map((step) => Math.hypot(...step));
  const keys = indices(angles, (angle) => angle >= note || 180 - angle < 10 * track.floor).map((k) => k + 1);
  if (!keys.length) return [];
  const worst = Math.max(...angles);
  const level = worst >= error ? 'error' : worst >= warning ? 'warning' : 'note';
  return [entry(track, 'turn.half', keys, worst, 'deg', 1e-3, { level })];
}

function lost(track: Track): Entry[] {
  if (track.rpm === undefined) return [];
  const angles = track.steps.map((step) => Math.hypot(...step));
  const keys = indices(angles, (angle) => angle > 120.01).map((k) => k + 1);
  if (!keys.length) return [];
  return [entry(track, 'turn.lost', keys, Math.max(...angles), 'deg', 1e-3, { means: 'widest step' })];
}
