import { bakedTrack, type DemoTrack, type Orientation } from './demo-track.js';
import { moveAt } from './minimum-jerk.js';
import { after, panTiltRoll, turnAbout } from './orientation.js';
import { seededNumbers } from './seeded-numbers.js';

const RATE = 50;
/** Degrees an axis. */
const GRAIN = 0.06;
/** Own axes and degrees of the outliers, by key. */
const OUTLIERS: ReadonlyMap<number, readonly [axis: readonly [number, number, number], degrees: number]> =
  new Map([
    [412, [[-2.2, 1.5, -1.6], 3.1]],
    [1033, [[1.8, -1.9, 5.3], 5.9]],
    [1760, [[-1, -1, -1.1], 1.8]],
  ]);
const FROZEN_FROM = 1795;
const FROZEN_TO = 1800;

/** Where the head was meant to point: three pans and two tilts, 34.4 deg/s and 18 deg/s² at most. */
function meant(time: number): Orientation {
  const pan = moveAt(time, 4, 13, 70) + moveAt(time, 18, 24, -110) + moveAt(time, 33, 38, 25);
  const tilt = moveAt(time, 6, 14, -12) + moveAt(time, 20, 27, 20);
  return panTiltRoll(pan + hum(time), tilt);
}

/** The mount's resonance in the pan: 11 Hz, 0.4°, from 26 s to 31 s. */
function hum(time: number): number {
  return time < 26 || time >= 31 ? 0 : 0.4 * Math.sin(2 * Math.PI * 11 * (time - 26));
}

/** The harbour crane's camera head as captured for 45 s: grain, three outliers, a hum and a stream that froze for five frames. */
export function craneTracks(): readonly DemoTrack[] {
  const random = seededNumbers(20_24);
  const captured = bakedTrack('crane-head', 'crane-head', 45 * RATE, RATE, (time, key) => {
    const [x, y, z] = [random.normal(), random.normal(), random.normal()];
    const grain = turnAbout([x, y, z], GRAIN * Math.sqrt(x * x + y * y + z * z));
    const outlier = OUTLIERS.get(key);
    const seen = after(meant(time), grain);
    return outlier === undefined ? seen : after(seen, turnAbout(...outlier));
  });
  const frozen = captured.orientations.slice(FROZEN_FROM, FROZEN_FROM + 1);
  const orientations = captured.orientations.map((orientation, key) =>
    key > FROZEN_FROM && key <= FROZEN_TO ? (frozen[0] ?? orientation) : orientation,
  );
  return [{ ...captured, orientations }];
}
