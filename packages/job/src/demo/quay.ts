import type { DemoTrack } from './demo-track.js';
import { panTiltRoll } from './orientation.js';

/** Seconds, pan, tilt, roll in degrees: set by hand, unevenly. The roll creeps to 3.5°; after 14 s another shot begins. */
const KEYS: readonly (readonly [time: number, pan: number, tilt: number, roll: number])[] = [
  [0, 0, -5, 0],
  [2, 25, -8, 0],
  [5, 60, -10, 0.6],
  [6, 75, -4, 1.2],
  [9, 70, 0, 2],
  [10.5, 40, 3, 2.8],
  [14, 35, 2, 3.5],
  [14 + 1 / 30, -120, -15, 0],
  [18, -100, -12, 0.2],
  [20, -95, -10, 0.4],
  [24, -60, -5, 0.8],
];

/** The flight of the camera along the quay: eleven keys, and a cut stored as two keys a thirtieth of a second apart. */
export function quayTracks(): readonly DemoTrack[] {
  return [
    {
      clip: 'quay-flight',
      node: 'quay-camera',
      times: KEYS.map(([time]) => time),
      orientations: KEYS.map(([, pan, tilt, roll]) => panTiltRoll(pan, tilt, roll)),
      storage: 'float32',
    },
  ];
}
