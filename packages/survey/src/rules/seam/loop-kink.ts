import type { Limits, Place, Remedy, Rule, TrackContext } from '../../rule.js';
import { sayRate } from '../../say-number.js';
import { kinksOf } from './kinks.js';
import { tryCloseLoop } from './try-close-loop.js';

/** A loop that ends where it starts, but at another rate. */
export const loopKink: Rule = Object.freeze({
  id: 'seam.loop-kink',
  family: 'seam',
  level: 'warning',
  unit: 'deg/s',
  alsoCalled: [
    'loop',
    'cycle',
    'walk cycle',
    'seamless',
    'loop hitch',
    'loop stutter',
    'speed gap at the seam',
  ],
  summary: 'A clip that repeats comes back to its start at another angular rate than it leaves it with.',
  limits: Object.freeze({
    joint: { rate: 10, share: 0.1 },
    prop: { rate: 1, share: 0.05 },
    'camera-screen': { rate: 1, share: 0.05 },
    'camera-headset': { rate: 1, share: 0.05 },
    eye: 'off',
    machine: { rate: 1, share: 0.05 },
  }),
  reads: 'track',
  untouched: 'the poses at both ends, and all keys before the last quarter',
  find: kinksOf,
  remedy(context: TrackContext, _: Place, limits: Limits): Remedy | undefined {
    return tryCloseLoop(context, (closed) => kinksOf(closed, limits).length === 0);
  },
  message({ value, limit }: Place): string {
    return `where the loop starts again its angular rate steps by ${sayRate(value)} (limit ${sayRate(limit)})`;
  },
  page: {
    what: 'Both ends of a loop agree in pose and not in motion: eased to a stop at one end only, cut where the motion was faster, closed by hand at the last key.',
    trace: 'A step of the level from the clip’s end to its start.',
    standard: 'glTF 2.0 knows no loops: whether a clip repeats is up to who plays it.',
    programs: 'Most start again at the first key as it stands.',
    people: 'A hitch once a cycle: the motion stops, turns off or lurches.',
    test: 'In a declared loop that closes: the angular rate at the end and at the start differ by more than 10 deg/s and 10 % of the faster for joints (1 deg/s and 5 % for all else), as played. In dense tracks also by more than three times the usual change between neighbouring steps, of the four on each side.',
    source:
      'Common practice, no source; a machine’s own acceleration limit should replace the one given here.',
    spares: 'Loops that stay open (`seam.loop-gap`), clips that nobody declared to be a loop, STEP tracks.',
    remedy:
      '`close loop` leads the rate of the last keys into that of the first ones, over the last quarter of the clip; both end poses stay. Sparse keys turn corners anyway: ease through them first.',
  },
});
