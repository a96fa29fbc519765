import { median } from '../../median.js';
import { everyRole, type Limits, type Place, type Remedy, type Rule, type TrackContext } from '../../rule.js';
import { segmentsOf } from '../../segments.js';
import { triedStep } from '../../tried-step.js';

const DEGREES = 180 / Math.PI;

/** Tangents that are all too short or too long by one factor. */
export const tangentScale: Rule = Object.freeze({
  id: 'pace.tangent-scale',
  family: 'pace',
  level: 'warning',
  unit: 'times',
  alsoCalled: ['overshoot', 'stop-and-go', 'tangents', 'spline', 'tangent length', 'wrong tangent scale'],
  summary:
    'The tangents of a cubic track are too short or too long by one factor for the way between its keys.',
  limits: everyRole({ most: 5, least: 0.2, moving: 2 }),
  reads: 'track',
  untouched: 'the orientation of every key',
  find(context: TrackContext, { most = 0, least = 0, moving = 0 }: Limits): readonly Place[] {
    const { track } = context;
    if (track.interpolation !== 'CUBICSPLINE') return [];
    const { speeds } = segmentsOf(context);
    const ratios: number[] = [];
    for (let key = 1; key < speeds.length; key++) {
      const usual = ((speeds[key - 1] ?? 0) + (speeds[key] ?? 0)) / 2;
      if (!(usual > moving)) continue;
      ratios.push((tangentRate(track.values, 12 * key) + tangentRate(track.values, 12 * key, 8)) / 2 / usual);
    }
    const value = median(ratios);
    if (!(value > most || value < least)) return [];
    const [start, end] = [track.times[0] ?? 0, track.times.at(-1) ?? 0];
    const limit = value > most ? most : least;
    return [{ keys: [], time: start, span: [start, end], value, limit, level: 'warning' }];
  },
  remedy: ({ track }: TrackContext): Remedy | undefined => triedStep(track, { verb: 'set tangents' }),
  message({ value, limit }: Place): string {
    return `its tangents turn ${Number(value.toPrecision(3))} times as fast as the way between its keys, in the median (limit ${limit}): they look scaled by a wrong factor`;
  },
  page: {
    what: 'Tangents written per frame instead of per second, multiplied or divided by the key gap, or left at zero on every key.',
    trace: 'A stop at every key and a rush between, or needles where it shoots over.',
    standard:
      'glTF 2.0, Appendix C, multiplies CUBICSPLINE tangents by the key gap: in the file they are per second.',
    programs: 'All that follow the text show it.',
    people: 'Motion that goes by fits and starts, or explodes.',
    test: 'In a CUBICSPLINE track, over interior keys whose neighbouring segments move faster than 2 deg/s in the mean: the median of the tangents’ own turn rate, ½·v·(ω, 0) solved for ω, over that mean is below 0.2 or above 5.',
    source:
      'The formula is glTF 2.0’s; the limits are common practice, no source. A forgotten division by the gap read 260 instead of 188 deg/s in the 95th percentile, a doubled one 3,463 (measured).',
    spares: 'Holds, whose tangents are rightly zero; tracks that are not CUBICSPLINE.',
    remedy:
      '`set tangents` lays them anew from the turns between the keys, which no wrong factor has touched; values stay to the bit.',
  },
});

/** Turn rate that a key's tangent stands for, deg/s: |2·v⁻¹·m| without its real part, v the unit value. */
function tangentRate(values: Float64Array, at: number, tangent = 0): number {
  const [x = 0, y = 0, z = 0, w = 0] = values.subarray(at + 4, at + 8);
  const [a = 0, b = 0, c = 0, d = 0] = values.subarray(at + tangent, at + tangent + 4);
  const length = x * x + y * y + z * z + w * w;
  const turn = Math.hypot(
    w * a - x * d - (y * c - z * b),
    w * b - y * d - (z * a - x * c),
    w * c - z * d - (x * b - y * a),
  );
  return ((2 * turn) / length) * DEGREES;
}
