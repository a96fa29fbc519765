import type { Limits, Place, Remedy, Rule, RoleLimits, TrackContext } from '../../rule.js';
import { sayDegrees, sayRate } from '../../say-number.js';
import { spareKeys } from './thinned.js';

/** Keys without which the track plays alike. */
export const tooMany: Rule = Object.freeze({
  id: 'keys.too-many',
  family: 'keys',
  level: 'note',
  unit: '%',
  alsoCalled: [
    'oversampled',
    'redundant keys',
    'dense keys',
    'reduce keys',
    'key reduction',
    'compress',
    'baked',
  ],
  summary: 'Many keys could go without a difference that counts.',
  limits: Object.freeze({
    joint: within(0.25, 10),
    prop: within(0.25, 10),
    'camera-screen': within(0.1, 1),
    'camera-headset': within(0.1, 1),
    eye: within(0.25, 10),
    machine: within(0.02, 1),
  }),
  reads: 'track',
  untouched: 'the motion, within the tolerances',
  find(context: TrackContext, limits: Limits): readonly Place[] {
    const { share = Infinity, angle = 0, rate = 0 } = limits;
    const { times, interpolation } = context.track;
    if (!Number.isFinite(share) || interpolation !== 'LINEAR' || times.length < 3) return [];
    const spare = spareKeys(context, limits);
    const value = (100 * spare) / times.length;
    if (!(value >= share) || spare === 0) return [];
    const [start, end] = [times[0] ?? 0, times.at(-1) ?? 0];
    const facts = { spare, all: times.length, angle, rate };
    return [{ keys: [], time: start, span: [start, end], value, limit: share, level: 'note', facts }];
  },
  // `thin` is not built yet.
  remedy: (): Remedy | undefined => undefined,
  message({ value, limit, facts = {} }: Place): string {
    return `${facts['spare']} of its ${facts['all']} keys (${value.toFixed(0)} %, limit ${limit} %) could go and it would play within ${sayDegrees(facts['angle'] ?? 0)} and ${sayRate(facts['rate'] ?? 0)}`;
  },
  page: {
    what: 'A capture or a bake stores a key a frame, whether the motion needs it or not.',
    trace: 'A line that is straight from key to key over long stretches.',
    standard: 'glTF 2.0 sets no limit: keys may stand as far apart as interpolation carries.',
    programs: 'Many thin tracks at import, each by a tolerance of its own.',
    people: 'Nothing; the file is larger and slower to load than it has to be.',
    test: 'Asked for alone: the share of keys, in per cent, is set in the house rules (30 is usual). From each key that stays, the farthest is sought, up to 256 keys on, to which one slerp keeps all poses within the role’s angle and all speeds within the role’s rate; between keys too, by the bound e·sec(θ/4). Always a note.',
    source:
      'The bound is geometry. The tolerances are those of the seam rules, which are common practice, no source.',
    spares:
      'Tracks of CUBICSPLINE, STEP and angles; every track where the house rules name no share. Fewer keys may do than the count says, never more.',
    remedy:
      'Thin it where it is packed for delivery, and hold the result against the source: `slewcurve compare SOURCE PACKED --angle … --rate …`. The verb `thin` is not built yet.',
  },
});

/** Nothing is named unless the house rules say from which share of keys on. Degrees and deg/s. */
function within(angle: number, rate: number): RoleLimits {
  return { share: Infinity, angle, rate };
}
