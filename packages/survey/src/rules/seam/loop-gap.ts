import type { Limits, Place, Remedy, Rule, TrackContext } from '../../rule.js';
import { sayDegrees } from '../../say-number.js';
import { jumpsOf } from '../jump/measure.js';
import { seamOf } from '../jump/seam-of.js';
import { tryReSeat } from '../jump/try-re-seat.js';
import { hasSeam, seamLimit } from './closes.js';
import { kinksOf } from './kinks.js';
import { tryCloseLoop } from './try-close-loop.js';

/** A loop that does not end where it starts. */
export const loopGap: Rule = Object.freeze({
  id: 'seam.loop-gap',
  family: 'seam',
  level: 'warning',
  unit: 'deg',
  alsoCalled: ['loop', 'cycle', 'walk cycle', 'seamless', 'loop pop', 'open loop', 'loop seam'],
  summary: 'A clip that repeats does not end in the orientation in which it starts.',
  limits: Object.freeze({
    joint: { gap: 0.5 },
    prop: { gap: 0.25 },
    'camera-screen': { gap: 0.1 },
    'camera-headset': { gap: 0.1 },
    eye: 'off',
    machine: { gap: 0.02 },
  }),
  reads: 'track',
  untouched: 'the keys before the stretch over which the gap is spread, byte for byte',
  find(context: TrackContext, { gap = 0 }: Limits): readonly Place[] {
    if (!hasSeam(context)) return [];
    const value = seamOf(context.track);
    const limit = seamLimit(context, gap);
    if (!(value > limit)) return [];
    const { times } = context.track;
    const last = times.length - 1;
    const end = times[last] ?? 0;
    return [{ keys: [last], time: end, span: [times[last - 1] ?? 0, end], value, limit, level: 'warning' }];
  },
  remedy(context: TrackContext): Remedy | undefined {
    const kink = context.limits('seam.loop-kink');
    const closing = tryCloseLoop(
      context,
      (closed) => kink === undefined || kinksOf(closed, kink).length === 0,
    );
    const seated = seatedAnew(context);
    if (seated === undefined || closing === undefined) return seated ?? closing;
    return { ...seated, alternatives: [...(seated.alternatives ?? []), closing.step] };
  },
  message({ keys, value, limit }: Place): string {
    return `the loop ends ${sayDegrees(value)} off its start: key ${keys[0]} against key 0 (limit ${sayDegrees(limit)})`;
  },
  page: {
    what: 'A clip that is played over and over jumps each time it begins anew: cut at the wrong frame, edited at one end only, or a captured step that never repeats exactly.',
    trace:
      'One needle a loop, at the seam; nothing inside the clip. The file alone never shows it, as no segment joins its end to its start.',
    standard: 'glTF 2.0 knows no loops: whether a clip repeats is up to who plays it.',
    programs: 'Most start again at the first key without a transition.',
    people: 'A twitch once a cycle. A motorised head gets it as a blow: close the loop before it runs.',
    test: 'In a declared loop, the angle from the last key to the first: more than 0.5° for joints, 0.25° for props, 0.1° for cameras, 0.02° for machines, and more than twice the noise floor.',
    source: 'Common practice, no source.',
    spares:
      'Clips that nobody declared to be a loop, by house rules or `--loop`; spins, which come round to where they started; STEP tracks.',
    remedy:
      '`close loop` spreads the gap over the last quarter of the clip, or evenly over all of it (`spread`), and leads the rate at the end of dense keys into that of the start. The price is the largest turn of a key. Where a shelf alone keeps the loop open, `re-seat` closes both. A travelling turn that is meant to go on (a heading) should not be closed.',
  },
});

/** Where a shelf alone keeps the loop open, what closes the shelf. */
function seatedAnew(context: TrackContext): Remedy | undefined {
  const limits = context.limits('jump.shelf');
  const shelf = limits && jumpsOf(context).find(({ kind }) => kind === 'shelf');
  return limits && shelf && tryReSeat(context, shelf.key, limits);
}
