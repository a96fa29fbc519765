import { bakedTrack, type DemoTrack, type Orientation } from './demo-track.js';
import { after, otherSign, turnAbout } from './orientation.js';

/** One stride in 36 frames of 1/30 s. */
const FRAMES = 36;
const RATE = 30;
const LEG = 'left-fore';

/** The legs' names: the beetle walks on six. */
export const LEGS: readonly string[] = [
  'left-fore',
  'left-mid',
  'left-hind',
  'right-fore',
  'right-mid',
  'right-hind',
];

/** The stride of the beetle's left fore leg: three joints, each with a fault of its own. */
export function beetleTracks(): readonly DemoTrack[] {
  const badSeat = turnAbout([1, 0, 0.2], 9);
  return [
    // Sound motion; from key 20 on the other sign is stored.
    bakedTrack('beetle-hip', `${LEG}-hip`, FRAMES + 1, RATE, (_, key) => {
      const hip = bent(18 * Math.sin(stride(key)) + 2 * Math.sin(2 * stride(key)));
      return key < 20 ? hip : otherSign(hip);
    }),
    // Drifts by 3° over the stride.
    bakedTrack('beetle-knee', `${LEG}-knee`, FRAMES + 1, RATE, (_, key) =>
      bent(-25 - 22 * Math.sin(stride(key) + 0.8) + (3 * key) / FRAMES),
    ),
    // From key 22 on the contact sits 9° off.
    bakedTrack('beetle-ankle', `${LEG}-ankle`, FRAMES + 1, RATE, (_, key) => {
      const ankle = bent(8 * Math.sin(stride(key) + 1.6));
      return key < 22 ? ankle : after(badSeat, ankle);
    }),
  ];
}

/** A hinge about its own x. Degrees. */
export function bent(degrees: number): Orientation {
  return turnAbout([1, 0, 0], degrees);
}

/** Where in the stride a key lies, radians; the last key is the first again. */
function stride(key: number): number {
  return (2 * Math.PI * (key % FRAMES)) / FRAMES;
}
