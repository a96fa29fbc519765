import { VALUES_PER_KEY, angleBetween, keyOrientation, type RotationTrack } from '@slewcurve/core';
import { everyRole, type Limits, type Place, type Remedy, type Rule, type TrackContext } from '../../rule.js';
import { isFirstOfClip, restated, someKeys } from './whole-clip.js';

const DEGREES = 180 / Math.PI;
/** What a first number that is w, and a last one that is not, come to in the mean. */
const LIKE_W = 0.9;
const NOT_LIKE_W = 0.3;
/** Degrees within which a pose read in the other order stands near its rest. */
const NEAR = 60;

/** Four numbers read in the wrong order. */
export const componentOrder: Rule = Object.freeze({
  id: 'file.component-order',
  family: 'file',
  level: 'warning',
  unit: '%',
  alsoCalled: ['wxyz', 'xyzw', 'w first', 'scalar first', 'quaternion order', 'component order', 'swizzle'],
  summary: 'The four numbers of a whole clip look as if w stood first and were read last.',
  limits: everyRole({ share: 60, tracks: 10, far: 90 }),
  reads: 'stored',
  untouched: 'every number: they only change places',
  find(context: TrackContext, { share = 0, tracks: fewest = 0, far = 0 }: Limits): readonly Place[] {
    const { clip, nodes } = context;
    if (!isFirstOfClip(context)) return [];
    const tracks = clip.tracks.filter((track) => track.interpolation !== 'EULER' && track.times.length > 0);
    if (tracks.length < fewest) return [];
    const first = means(tracks, 0);
    const last = means(tracks, 3);
    const isSwapped = mean(first) > LIKE_W && mean(last) < NOT_LIKE_W;
    const swapped = (100 * first.filter((value, i) => value > (last[i] ?? 0)).length) / tracks.length;
    const offRest = (100 * tracks.filter((track) => standsOff(track, nodes, far)).length) / tracks.length;
    const value = isSwapped ? swapped : offRest;
    if (!(value > share)) return [];
    const facts = { tracks: tracks.length };
    return [
      {
        keys: [],
        time: clip.start,
        span: [clip.start, clip.end],
        value,
        limit: share,
        level: 'warning',
        facts,
      },
    ];
  },
  remedy: (): Remedy | undefined => restated({ components: 'wxyz' }),
  message({ value, limit, facts }: Place): string {
    return `${value.toFixed(0)} % of the clip’s ${facts?.['tracks']} tracks (limit ${limit} %) read as if their four numbers began with w: turned far from rest as they stand, near it with w first`;
  },
  page: {
    what: 'Two habits: x y z w and w x y z. Numbers written by one and read by the other are unit quaternions still, so that nothing fails.',
    trace:
      'Wild or oddly calm: a small turn becomes one of nearly half a turn about a wandering axis, and the other way round.',
    standard: 'glTF 2.0 stores x, y, z, w.',
    programs: 'All play what is stored.',
    people: 'A figure in a knot, or all its limbs turned over.',
    test: 'Of a clip with ten tracks of quaternions or more: the first number is above 0.9 in the mean of its size and the last below 0.3; or over 60 % of the tracks begin more than 90° from their node’s rest, and within 60° of it once w is taken first. Told once a clip, on its first track.',
    source:
      'Joints stand near the identity for most of a motion, so that w is the large number: common practice, no source.',
    spares: 'Clips of fewer than ten tracks: a prop may truly lie upside down. Tracks of angles.',
    remedy: '`restate` with the components named, for the whole file, never for single tracks.',
  },
});

/** Mean size of one of the four numbers, a track each. */
function means(tracks: readonly RotationTrack[], part: number): number[] {
  return tracks.map((track) => {
    const size = VALUES_PER_KEY[track.interpolation];
    const at = size === 12 ? 4 : 0;
    return mean(someKeys(track).map((key) => Math.abs(track.values[size * key + at + part] ?? 0)));
  });
}

function mean(values: readonly number[]): number {
  return values.reduce((sum, value) => sum + value, 0) / values.length;
}

/** Whether a track begins far from its node's rest, and near it with w taken first. */
function standsOff(track: RotationTrack, nodes: TrackContext['nodes'], far: number): boolean {
  const rest = nodes[track.source.node]?.rotation;
  if (rest === undefined) return false;
  const [a = 0, b = 0, c = 0, d = 0] = keyOrientation(new Float64Array(4), track, 0);
  const degrees = (pose: readonly number[]): number => angleBetween(pose, rest) * DEGREES;
  return degrees([a, b, c, d]) > far && degrees([b, c, d, a]) < NEAR;
}
