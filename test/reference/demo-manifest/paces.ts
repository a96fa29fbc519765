// RULES 25, 31, 34, 44 (speed), 46, 47, 48.
import { entry, isDense, type Entry } from './entry.js';
import { cutSmear } from './jumps.js';
import type { Track } from './read-scene.js';
import { grainOf } from './shakes.js';
import { indices } from './stored-numbers.js';
import { between, spread, turned, type Vec } from './turns.js';

const ELBOW = { joint: [60, 0.4], prop: [60, 0.4], 'camera-screen': [5, 0.2], machine: [Infinity, 0] };

export function paces(track: Track, isCoarse: boolean): Entry[] {
  const always = [...speedLimit(track), ...overhead(track)];
  if (isCoarse) return always;
  return [
    ...always,
    ...elbow(track),
    ...hardStop(track),
    ...axisKick(track),
    ...picture(track),
    ...roll(track),
  ];
}

function elbow(track: Track): Entry[] {
  if (isDense(track)) return [];
  const [least, share] = ELBOW[track.role];
  const { rates, speeds } = track;
  const change = rates.map((b, k) => {
    const a = rates[k - 1] ?? b;
    return Math.hypot(b[0] - a[0], b[1] - a[1], b[2] - a[2]);
  });
  const keys = indices(
    change,
    (step, k) => step > least && step > share * Math.max(speeds[k], speeds[k - 1] ?? 0),
  );
  if (!keys.length) return [];
  const worst = Math.max(...keys.map((k) => change[k]));
  return [entry(track, 'pace.elbow', keys, worst, 'deg/s', 1e-4 * worst)];
}

/** Measured grain of a captured track is taken off: three times its rate, 1.41σ·fps an axis. */
function hardStop(track: Track): Entry[] {
  if (track.role !== 'camera-screen' && track.role !== 'machine') return [];
  const { speeds, times } = track;
  const noise = isDense(track) ? (3 * 1.41 * Math.sqrt(3) * grainOf(track)) / (times[1] - times[0]) : 0;
  const ends: [number, number][] = [
    [0, speeds[0]],
    [speeds.length, speeds[speeds.length - 1]],
  ];
  const found = ends.filter(([, speed]) => speed > 5 + noise);
  if (!found.length) return [];
  const worst = Math.max(...found.map(([, speed]) => speed));
  return [entry(track, 'pace.hard-stop', found.map(([key]) => key), worst, 'deg/s', 1e-3 * worst)]; // prettier-ignore
}

/** At keys of sparse tracks. */
function axisKick(track: Track): Entry[] {
  if (isDense(track)) return [];
  const { rates, speeds } = track;
  const kick = rates.map((rate, k) => {
    const [a, b] = [speeds[k - 1] ?? 0, speeds[k]];
    const level = Math.min(a, b) > 10 && Math.abs(a - b) < 0.2 * Math.max(a, b);
    return level ? spread(rates[k - 1], rate) : 0;
  });
  const keys = indices(kick, (angle) => angle > 30);
  return keys.length ? [entry(track, 'pace.axis-kick', keys, Math.max(...kick), 'deg', 0.01)] : [];
}

function speedLimit(track: Track): Entry[] {
  if (track.speedLimit === undefined) return [];
  const peak = Math.max(...track.speeds);
  if (peak <= 1.005 * track.speedLimit) return [];
  // Of speeds that float32 makes differ, the earliest.
  const key = track.speeds.findIndex((speed) => speed > peak * (1 - 1e-5)) + 1;
  return [entry(track, 'limit.speed', [key], peak, 'deg/s', 0.005 * peak)];
}

/** Hand keys have no frame rate: they are taken to be shown at 30 a second or fewer. */
function picture(track: Track): Entry[] {
  if (track.role !== 'camera-screen' || track.view === undefined) return [];
  // One width of the picture in 7 s, at its middle.
  const limit = (((2 * 180) / Math.PI) * Math.tan((track.view * Math.PI) / 360)) / 7;
  const found: { key: number; speed: number }[] = [];
  for (let k = 0; k < track.speeds.length; k++) {
    let end = k;
    while (track.speeds[end] > limit) end++;
    const fast = track.speeds.slice(k, end);
    // The segment of a cut is over in a thirtieth of a second; what is fast around it counts.
    if (end > k && track.times[end] - track.times[k] > 1)
      found.push({ key: k + 1, speed: Math.max(...fast) });
    k = end;
  }
  if (!found.length) return [];
  const worst = Math.max(...found.map(({ speed }) => speed));
  const means = 'fastest segment; keys: the first of each fast span';
  return [entry(track, 'limit.picture', found.map(({ key }) => key), worst, 'deg/s', 0.01 * worst, { means })]; // prettier-ignore
}

/**
 * Spans over half a second with the roll over the limit while the camera looks below 80°, every hundredth of a second. What a cut
 * stored as motion rolls through in its thirtieth of a second is the cut's own finding.
 */
function roll(track: Track): Entry[] {
  if (track.role !== 'camera-screen') return [];
  const rolls: { time: number; roll: number; key: number }[] = [];
  const cut = cutSmear(track)[0]?.keys[0];
  for (let k = 0; k < track.steps.length; k++) {
    if (k + 1 === cut) continue;
    const gap = track.times[k + 1] - track.times[k];
    const pieces = Math.ceil(100 * gap);
    for (let i = 0; i < pieces; i++) {
      const q = between(track.keys[k], track.keys[k + 1], i / pieces);
      const [right, up, ahead] = [turned(q, [1, 0, 0]), turned(q, [0, 1, 0]), turned(q, [0, 0, -1])];
      const seen = Math.abs(ahead[1]) < Math.sin((80 * Math.PI) / 180);
      const degrees = (Math.atan2(right[1], up[1]) * 180) / Math.PI;
      rolls.push({
        time: track.times[k] + (gap * i) / pieces,
        roll: seen ? Math.abs(degrees) : 0,
        key: k + 1,
      });
    }
  }
  const found: { key: number; roll: number }[] = [];
  for (let n = 0; n < rolls.length; n++) {
    let end = n;
    while (end < rolls.length && rolls[end].roll > 0.5) end++;
    const worst = rolls.slice(n, end).reduce((a, b) => (b.roll > a.roll ? b : a), rolls[n]);
    if (end > n && rolls[end - 1].time - rolls[n].time > 0.5) found.push(worst);
    n = end;
  }
  if (!found.length) return [];
  const worst = Math.max(...found.map((place) => place.roll));
  const means = 'largest roll; keys: where each rolled span is worst';
  return [entry(track, 'horizon.roll', found.map(({ key }) => key), worst, 'deg', 0.05, { means })]; // prettier-ignore
}

/** Elevation over 80° while the head turns over four times as fast as its line of sight. */
function overhead(track: Track): Entry[] {
  if (track.role !== 'machine' && track.role !== 'camera-screen') return [];
  const sight = track.keys.map((key): Vec => turned(key, [0, 0, -1]));
  const ratios = track.speeds.map((speed, k) => {
    const moved = spread(sight[k], sight[k + 1]) / (track.times[k + 1] - track.times[k]);
    const high = Math.min(sight[k][1], sight[k + 1][1]) > Math.sin((80 * Math.PI) / 180);
    return high && moved > 0 ? speed / moved : 0;
  });
  const most = Math.max(...ratios);
  if (most <= 4) return [];
  const means = 'largest ratio of the head’s speed to that of its line of sight';
  return [entry(track, 'horizon.overhead', [ratios.indexOf(most) + 1], most, 'times', 0.01 * most, { means })]; // prettier-ignore
}
