import { everyRole, type Limits, type Place, type Remedy, type Rule, type TrackContext } from '../../rule.js';
import { triedStep } from '../../tried-step.js';
import { cubicPlayed } from './cubic-played.js';

/** Moments of a segment that are looked at; the least is then found between its neighbours. */
const MOMENTS = 32;
const NARROW = 30;

/** A cubic of the four numbers that passes near zero. */
export const cubicCollapse: Rule = Object.freeze({
  id: 'pace.cubic-collapse',
  family: 'pace',
  level: 'warning',
  unit: 'length',
  alsoCalled: [
    'collapse',
    'CUBICSPLINE',
    'needle',
    'denormalised',
    'near zero',
    'tangents',
    'spline',
    'shrinks',
  ],
  summary:
    'Between two keys the cubic of the four numbers comes near zero, so that its direction whirls round.',
  limits: everyRole({ warning: 0.5, error: 0.2 }),
  reads: 'track',
  untouched: 'the orientation of every key',
  find(context: TrackContext, { warning = 0, error = 0 }: Limits): readonly Place[] {
    const { track } = context;
    const { times } = track;
    if (track.interpolation === 'EULER') return [];
    const breaks = new Set(track.breaks);
    const places: Place[] = [];
    for (const { playback } of cubicPlayed(context)) {
      const cubicAt = playback.id === 'finite-cubic' ? finiteCubic(context) : storedCubic(context);
      for (let k = 0; k + 1 < times.length; k++) {
        const cubic = breaks.has(k) ? undefined : cubicAt(k);
        if (cubic === undefined || staysLong(cubic, warning)) continue;
        const { u, length: value } = shortest(cubic);
        if (!(value < warning) || places.some(({ keys }) => keys[0] === k + 1)) continue;
        const span = [times[k] ?? 0, times[k + 1] ?? 0] as const;
        const time = span[0] + u * (span[1] - span[0]);
        const level = value < error ? 'error' : 'warning';
        places.push({ keys: [k + 1], time, span, value, limit: warning, level, playback: playback.id });
      }
    }
    return places.toSorted((a, b) => (a.keys[0] ?? 0) - (b.keys[0] ?? 0));
  },
  // q beside −q is what mostly makes it; where it does not, `set tangents` lays them anew.
  remedy: (context: TrackContext, { keys: [key = 0] }: Place): Remedy | undefined =>
    triedStep(
      context.track,
      changesSign(context, key - 1) ? { verb: 'same side' } : { verb: 'set tangents', keys: [key - 1, key] },
    ),
  message({ keys: [key = 0], value, limit, time }: Place): string {
    return `between key ${key - 1} and key ${key}, at ${time.toFixed(3)} s, the cubic shrinks to a length of ${Number(value.toPrecision(3))} (at least ${limit}) before it is made unit: there its direction whirls round`;
  },
  page: {
    what: 'A cubic through four numbers knows nothing of rotations. Between q and −q, between keys more than half a turn apart, or with tangents far too long, it passes near zero, where a hair decides the direction.',
    trace: 'A needle within the segment, thinner than any frame.',
    standard:
      'glTF 2.0, Appendix C, blends the stored numbers and makes the result unit; it takes no care of signs.',
    programs: 'All that follow the text whirl; those that skip the last step shrink and shear the mesh.',
    people: 'A limb that spins round once, or a mesh that collapses, for a moment.',
    test: 'The least length of the cubic between two keys, before it is made unit: a warning below 0.5, an error below 0.2.',
    source:
      'Common practice, no source. A cubic that fell to 0.062 turned at 5,110 deg/s where its keys went at 71 (measured).',
    spares: 'Tracks and playbacks that are not cubic, STEP tracks, declared cuts.',
    remedy:
      '`same side` where the two keys lie on opposite sides, tangents along with the values; else `set tangents`, or keys closer together.',
  },
});

/** Hermite data of a segment: value, tangent times gap, tangent times gap, value; unit values. */
type Cubic = readonly [Float64Array, Float64Array, Float64Array, Float64Array];

function storedCubic({ track: { times, values } }: TrackContext): (k: number) => Cubic {
  return (k) => {
    const gap = (times[k + 1] ?? 0) - (times[k] ?? 0);
    const at = (from: number): Float64Array => values.slice(12 * k + from, 12 * k + from + 4);
    const scale = 1 / Math.hypot(...at(4));
    return [
      at(4).map((x) => x * scale),
      at(8).map((x) => x * gap * scale),
      at(12).map((x) => x * gap * scale),
      at(16).map((x) => x * scale),
    ];
  };
}

/** Tangents by finite differences of the stored values, one-sided at ends and breaks, as that playback has them. */
function finiteCubic({ track }: TrackContext): (k: number) => Cubic {
  const { times, values, breaks, interpolation } = track;
  const [size, offset] = interpolation === 'CUBICSPLINE' ? [12, 4] : [4, 0];
  const broken = new Set(breaks);
  const value = (key: number): Float64Array => values.slice(size * key + offset, size * key + offset + 4);
  const tangent = (key: number, gap: number): Float64Array => {
    const before = key === 0 || broken.has(key - 1) ? key : key - 1;
    const after = key + 1 >= times.length || broken.has(key) ? key : key + 1;
    const later = value(after);
    const earlier = value(before);
    const share = gap / ((times[after] ?? 0) - (times[before] ?? 0));
    return later.map((x, i) => (x - (earlier[i] ?? 0)) * share);
  };
  return (k) => {
    const gap = (times[k + 1] ?? 0) - (times[k] ?? 0);
    return [value(k), tangent(k, gap), tangent(k + 1, gap), value(k + 1)];
  };
}

function changesSign(context: TrackContext, k: number): boolean {
  const { interpolation, values } = context.track;
  const [size, offset] = interpolation === 'CUBICSPLINE' ? [12, 4] : [4, 0];
  let along = 0;
  for (let i = 0; i < 4; i++)
    along += (values[size * k + offset + i] ?? 0) * (values[size * (k + 1) + offset + i] ?? 0);
  return along < 0;
}

/** Whether the four control points of the Bézier form all lie beyond `least` along the middle of both keys: then so does the cubic. */
function staysLong([from, leaving, arriving, to]: Cubic, least: number): boolean {
  const middle = from.map((x, i) => x + (to[i] ?? 0));
  const length = Math.hypot(...middle);
  if (length === 0) return false;
  const along = (point: Float64Array): number =>
    point.reduce((sum, x, i) => sum + x * (middle[i] ?? 0), 0) / length;
  const points = [
    from,
    from.map((x, i) => x + (leaving[i] ?? 0) / 3),
    to.map((x, i) => x - (arriving[i] ?? 0) / 3),
    to,
  ];
  return points.every((point) => along(point) >= least);
}

function shortest(cubic: Cubic): { readonly u: number; readonly length: number } {
  const lengthAt = (u: number): number => {
    const [a, b, c, d] = hermite(u);
    return Math.hypot(
      ...[0, 1, 2, 3].map(
        (i) =>
          a * (cubic[0][i] ?? 0) + b * (cubic[1][i] ?? 0) + c * (cubic[2][i] ?? 0) + d * (cubic[3][i] ?? 0),
      ),
    );
  };
  let [u, length] = [0, Infinity];
  for (let i = 1; i < MOMENTS; i++) {
    const here = lengthAt(i / MOMENTS);
    if (here < length) [u, length] = [i / MOMENTS, here];
  }
  for (let step = 0.5 / MOMENTS, i = 0; i < NARROW; i++, step /= 2)
    for (const other of [u - step, u + step]) {
      const here = lengthAt(other);
      if (here < length) [u, length] = [other, here];
    }
  return { u, length };
}

/** glTF 2.0, Appendix C: weights of value, tangent, tangent, value. */
function hermite(u: number): readonly [number, number, number, number] {
  const [u2, u3] = [u * u, u * u * u];
  return [2 * u3 - 3 * u2 + 1, u3 - 2 * u2 + u, u3 - u2, 3 * u2 - 2 * u3];
}
