import { bakedTrack, type DemoTrack } from './demo-track.js';
import { moveAt } from './minimum-jerk.js';
import { turnAbout } from './orientation.js';

const NODE = 'weather-vane';
const RATE = 60;
const KEYS = 20 * RATE;
/** The pin that the vane turns on, and the axis, a little aslant, about which its sensor creeps. */
const PIN = [0, 1, 0] as const;
const CREEP = [0, 1, 0.1] as const;

/** End of the first gust, seconds: from here on the vane sways. */
const SETTLES = 5.35;

/** Degrees: 170° in 0.35 s and 150° back in 0.30 s, both real. */
function blown(time: number): number {
  return moveAt(time, 5, SETTLES, 170) + moveAt(time, 11, 11.3, -150) + sway(time - SETTLES);
}

/** 3° at 0.9 Hz, fading in over 0.2 s so that it starts without a step, and out over 3 s. */
function sway(since: number): number {
  if (since <= 0) return 0;
  return 3 * Math.sin(2 * Math.PI * 0.9 * since) * (1 - Math.exp(-since / 0.2)) * Math.exp(-since / 3);
}

/** The weather vane: a gusty day, the same day in eight bits, and a calm day on which it still creeps. */
export function vaneTracks(): readonly DemoTrack[] {
  const gusts = bakedTrack('vane-gusts', NODE, KEYS, RATE, (time) => turnAbout(PIN, blown(time)));
  const coarse: DemoTrack = { ...gusts, clip: 'vane-coarse', storage: 'int8' };
  const creep = bakedTrack('vane-creep', NODE, KEYS, RATE, (time) => turnAbout(CREEP, 0.25 * time));
  return [gusts, coarse, creep];
}
