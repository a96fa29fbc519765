import { everyRole, type Limits, type Place, type Remedy, type Rule, type TrackContext } from '../../rule.js';

/** Tangents at the ends of a cubic track that should be zero. */
export const endTangent: Rule = Object.freeze({
  id: 'pace.end-tangent',
  family: 'pace',
  level: 'note',
  unit: 'numbers',
  alsoCalled: ['end tangents', 'first in-tangent', 'last out-tangent', 'identity tangents', 'tangents'],
  summary: 'A cubic track has tangents where none are used, or the identity in place of tangents.',
  limits: everyRole({ size: 1e-6 }),
  reads: 'track',
  untouched: 'the orientation of every key',
  find({ track }: TrackContext, { size = 0 }: Limits): readonly Place[] {
    if (track.interpolation !== 'CUBICSPLINE' || track.times.length === 0) return [];
    const { times, values } = track;
    const last = times.length - 1;
    const at = (key: number, value: number, identity: number): Place => {
      const time = times[key] ?? 0;
      const facts = { identity };
      return { keys: [key], time, span: [time, time], value, limit: size, level: 'note', facts };
    };
    const places: Place[] = [];
    for (let key = 0; key <= last; key++) {
      const tangents = [
        values.subarray(12 * key, 12 * key + 4),
        values.subarray(12 * key + 8, 12 * key + 12),
      ];
      const unused = [key === 0 ? tangents[0] : undefined, key === last ? tangents[1] : undefined];
      const length = Math.max(
        ...unused.map((tangent) => (tangent === undefined ? 0 : Math.hypot(...tangent))),
      );
      if (tangents.every(isIdentity)) places.push(at(key, 1, 1));
      else if (length > size) places.push(at(key, length, 0));
    }
    return places;
  },
  remedy({ track }: TrackContext, { keys, facts }: Place): Remedy {
    const step = { verb: 'set tangents', clip: track.clip, track: track.id, keys };
    if (facts?.['identity'] === 1 || track.times.length === 1) return { step, price: 0 };
    return { step: { ...step, tangents: keys[0] === 0 ? 'in' : 'out' }, price: 0 };
  },
  message({ keys, value, facts }: Place): string {
    if (facts?.['identity'] === 1)
      return `both tangents of key ${keys[0]} are the identity (0, 0, 0, 1), which is an orientation and no tangent`;
    return `key ${keys[0]} has a tangent of length ${Number(value.toPrecision(3))} beyond the end of the track, where none is used`;
  },
  page: {
    what: 'An exporter that wrote tangents where no segment lies, or that filled them with the identity quaternion instead of zeros.',
    trace: 'Nothing in most programs; an odd speed at the first or last key in those that loop.',
    standard:
      'glTF 2.0, Appendix C: the first in-tangent and the last out-tangent should be zeros, as they are not used.',
    programs: 'Most pass over them.',
    people: 'Usually nothing. Identity tangents inside a track bend the way between its keys.',
    test: 'In a CUBICSPLINE track, the first in-tangent or the last out-tangent longer than 1e-6, or both tangents of a key equal to (0, 0, 0, 1). Always a note.',
    source: 'glTF 2.0.',
    spares: 'Tracks that are not CUBICSPLINE.',
    remedy:
      '`set tangents` sets those that are not used to zero, so that nothing plays otherwise, and lays identities anew from the turns beside them.',
  },
});

function isIdentity([x, y, z, w]: Float64Array): boolean {
  return x === 0 && y === 0 && z === 0 && w === 1;
}
