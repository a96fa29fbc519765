import { findSegment, type RotationTrack } from '@slewcurve/core';
import { everyRole, type Limits, type Place, type Remedy, type Rule, type TrackContext } from '../../rule.js';

/** Two clips that are mixed and stored on opposite sides. */
export const blendSide: Rule = Object.freeze({
  id: 'seam.blend-side',
  family: 'seam',
  level: 'warning',
  unit: 'length',
  alsoCalled: [
    'blend',
    'crossfade',
    'cross-fade',
    'weighted sum',
    'antipodal',
    'hemisphere',
    'flip in the blend',
  ],
  summary:
    'Two clips that are mixed store nearly the same pose with opposite signs, so that their weighted sum nearly vanishes.',
  limits: everyRole({ length: 0.7 }),
  reads: 'track',
  untouched: 'both clips',
  find(context: TrackContext, { length: least = 0 }: Limits): readonly Place[] {
    const { track, declared } = context;
    if (track.interpolation === 'EULER' || track.times.length === 0) return [];
    return declared.blends.flatMap((layer) => {
      if (layer.interpolation === 'EULER' || layer.times.length === 0) return [];
      const { key, length } = shortest(track, layer);
      if (!(length < least)) return [];
      const time = track.times[key] ?? 0;
      const place: Place = {
        keys: [key],
        time,
        span: [time, time],
        value: length,
        limit: least,
        level: 'warning',
        other: layer.clip,
      };
      return [place];
    });
  },
  // `same side` minds the keys of one track; which clip should give way to another only a person can say.
  remedy: (): Remedy | undefined => undefined,
  message({ keys: [key], value, limit, other }: Place): string {
    return `mixed half and half with ${other} its key ${key} leaves a quaternion of length ${value.toPrecision(2)} (limit ${limit}): the two are stored on opposite sides`;
  },
  page: {
    what: 'q and −q are the same pose, and each clip keeps to a side of its own. A mix that adds weighted quaternions as they stand takes the long way between two that lie on opposite sides, through next to nothing.',
    trace: 'Nothing in either clip; in the mix one needle, as its weight passes the middle.',
    standard: 'glTF 2.0 does not mix clips.',
    programs: 'Some turn one layer to the other’s side before they add, some add as stored.',
    people: 'A limb that whirls round once in the middle of a transition.',
    test: 'For clips that the house rules declare under `blends`, both from their starts: at each key of the earlier clip, the length of half of both, the sign of the later one that which it has after its key before. Below 0.7, which is a dot product of −0.02. Two poses 5° apart on opposite sides leave 0.022.',
    source: 'Geometry: the sum of two unit quaternions is shortest at equal weights, √((1 + dot) / 2).',
    spares: 'Clips that are not declared to be mixed; tracks of angles, which have no side.',
    remedy:
      'Turn to one side before mixing, which is the mixer’s to do; or negate all keys of one clip at the source, tangents too. `same side` keeps the keys of one track together and does not know of the other.',
  },
});

/** The key of a track at which an even mix with a layer is shortest, both from their starts. */
function shortest(
  track: RotationTrack,
  layer: RotationTrack,
): { readonly key: number; readonly length: number } {
  let [best, length] = [0, Infinity];
  const shift = (layer.times[0] ?? 0) - (track.times[0] ?? 0);
  const last = layer.times.at(-1) ?? 0;
  for (let key = 0; key < track.times.length; key++) {
    const time = (track.times[key] ?? 0) + shift;
    if (time > last) break;
    const own = storedPose(track, key);
    const other = poseAt(layer, time);
    const mixed = Math.hypot(...own.map((part, i) => (part + (other[i] ?? 0)) / 2));
    if (mixed < length) [best, length] = [key, mixed];
  }
  return { key: best, length };
}

/** Unit, its sign as stored. */
function storedPose({ values, interpolation }: RotationTrack, key: number): number[] {
  const at = interpolation === 'CUBICSPLINE' ? 12 * key + 4 : 4 * key;
  const pose = Array.from(values.subarray(at, at + 4));
  const size = Math.hypot(...pose);
  return pose.map((part) => part / size);
}

/** Between two keys the mean by their shares, the later one on the side of the earlier: what sides are told by needs no more. */
function poseAt(track: RotationTrack, time: number): number[] {
  const key = Math.max(0, findSegment(track.times, time));
  const from = storedPose(track, key);
  const next = Math.min(track.times.length - 1, key + 1);
  const to = storedPose(track, next);
  const [start = 0, end = 0] = [track.times[key], track.times[next]];
  const share =
    end > start && track.interpolation !== 'STEP' ? Math.min(1, (time - start) / (end - start)) : 0;
  const side = from.reduce((sum, part, i) => sum + part * (to[i] ?? 0), 0) < 0 ? -1 : 1;
  const mean = from.map((part, i) => (1 - share) * part + share * side * (to[i] ?? 0));
  const size = Math.hypot(...mean);
  return mean.map((part) => part / size);
}
