import { rateFloor } from '@slewcurve/core';
import type { Step } from '@slewcurve/mend';
import { median } from '../../median.js';
import { everyRole, type Limits, type Place, type Remedy, type Rule, type TrackContext } from '../../rule.js';
import { sayDegrees } from '../../say-number.js';
import { segmentsOf } from '../../segments.js';
import { addressOf } from '../jump/try-remedy.js';
import { hasSeam } from './closes.js';
import { tried } from './try-close-loop.js';

const DEGREES = 180 / Math.PI;
const BESIDE = 3;

/** A loop that stands still for one step at its end. */
export const doubledEnd: Rule = Object.freeze({
  id: 'seam.doubled-end',
  family: 'seam',
  level: 'warning',
  unit: 'deg',
  alsoCalled: ['loop', 'cycle', 'walk cycle', 'seamless', 'duplicate end frame', 'doubled last key', 'stall'],
  summary: 'The last key of a moving loop repeats the one before it, so that it stalls for one step.',
  limits: everyRole({ share: 0.1, moving: 2 }),
  reads: 'track',
  untouched: 'all other keys of the track, byte for byte',
  find: stallsOf,
  remedy(context: TrackContext, { keys }: Place, limits: Limits): Remedy | undefined {
    const moves = (after: TrackContext): boolean => stallsOf(after, limits).length === 0;
    const closed: Step = { verb: 'close loop', ...addressOf(context), spread: 'tail' };
    const dropped = { verb: 'trim', ...addressOf(context), keys };
    return tried(context, closed, moves)[0] ?? tried(context, dropped, moves)[0];
  },
  message({ keys: [key = 0], value, limit }: Place): string {
    return `the last key, ${key}, turns ${sayDegrees(value)} from key ${key - 1} in a loop that moves on both sides (a tenth of its usual step is ${sayDegrees(limit)}): it stalls once a cycle`;
  },
  page: {
    what: 'A bake that wrote its last frame twice, or a loop whose end key was copied once too often: the clip is one step too long.',
    trace: 'One step at zero, once a loop.',
    standard: 'glTF 2.0 knows no loops: whether a clip repeats is up to who plays it.',
    programs:
      'Those that wrap from the last key to the first show the stall; those that play N − 1 keys may hide it.',
    people: 'A stutter of one frame a cycle, plainest in steady turns.',
    test: 'In a declared loop, the last step is slower than a tenth of the median of its three neighbours on each side, the seam taken as closed, while those move faster than 2 deg/s.',
    source: 'Common practice, no source.',
    spares: 'Loops that slow down to their end, clips that nobody declared to be a loop, STEP tracks.',
    remedy:
      '`close loop` where the last key should be the first pose: it becomes that, and nothing else changes. `trim` where the key before is the first pose already: the clip gets one key shorter, which is a choice, so that `--proposed` takes it only if allowed.',
  },
});

function stallsOf(context: TrackContext, { share = 0, moving = 0 }: Limits): readonly Place[] {
  if (!hasSeam(context)) return [];
  const { times } = context.track;
  const { turns, speeds } = segmentsOf(context);
  const last = speeds.length - 1;
  if (last < 2 * BESIDE) return [];
  const sides = [...speeds.subarray(last - BESIDE, last), ...speeds.subarray(0, BESIDE)];
  const usual = median(sides);
  const floor = rateFloor(context.track, last) * DEGREES;
  if (!((speeds[last] ?? 0) < share * usual && usual > moving && share * usual > floor)) return [];
  const [from, to] = [times[last] ?? 0, times[last + 1] ?? 0];
  return [
    {
      keys: [last + 1],
      time: to,
      span: [from, to],
      value: turns[last] ?? 0,
      limit: share * usual * (to - from),
      level: 'warning',
    },
  ];
}
