import { SlewcurveError, angleBetween, conjugate, expMap, logMap, multiply, relative } from '@slewcurve/core';
import { verbNamed, type Step } from '@slewcurve/mend';
import { everyRole, type Limits, type Place, type Remedy, type Rule, type TrackContext } from '../../rule.js';
import { sayDegrees, saySeconds } from '../../say-number.js';
import { segmentsOf, type Segments } from '../../segments.js';
import { toMillisecond } from '../to-millisecond.js';
import { addressOf } from './try-remedy.js';

const DEGREES = 180 / Math.PI;
/** Turns of a marker set that looks the same from several sides, degrees. */
const SYMMETRIES = [90, 120, 180];
/** Degrees by which the second step may miss undoing the first, so that turning the stretch back leaves no more. */
const LEFT = 15;
const STILL = Float64Array.of(0, 0, 0, 1);

/** A stretch that was seen from the wrong side: one fixed turn on, the same turn off. */
export const turnedOver: Rule = Object.freeze({
  id: 'jump.turned-over',
  family: 'jump',
  level: 'warning',
  unit: 'deg',
  alsoCalled: ['pop', 'label swap', 'marker swap', 'axis swap', 'flipped span', 'upside down for a moment'],
  summary: 'For a stretch the track is turned by one fixed 90°, 120° or 180°, and then turned back.',
  limits: everyRole({ near: 10, pair: 15, seconds: 3, calm: 0.25 }),
  reads: 'track',
  untouched: 'all keys outside the stretch, and how those inside turn against each other',
  excusedBy: ['whips'] as const,
  find: turnedOverPlaces,
  remedy(context: TrackContext, { keys: [on = 0, off = 0] }: Place): Remedy | undefined {
    const { times } = context.track;
    // Halfway to the keys beside it, so that the stretch's own keys lie in it however a time is rounded.
    const half = (key: number): number => ((times[key] ?? 0) + (times[key + 1] ?? 0)) / 2;
    const span = toMillisecond([half(on - 1), half(off - 1)]);
    const ways = (['own', 'parent'] as const).flatMap((side) =>
      turnedBack(context, { verb: 're-seat', ...addressOf(context), keys: [on], side, span }, on, off),
    );
    ways.sort((a, b) => a.left - b.left);
    const [best, ...others] = ways;
    if (best === undefined) return undefined;
    return { step: best.step, price: best.price, alternatives: others.map(({ step }) => step) };
  },
  message({ keys: [on = 0, off = 0], value, limit, span }: Place): string {
    return `from key ${on} to key ${off - 1}, for ${saySeconds(span[1] - span[0])}, the track is turned over by ${sayDegrees(value)} (near ${limit}°), and turned back after`;
  },
  page: {
    what: 'A tracker that takes a symmetric set of markers for its own mirror or quarter turn, two labels that swap, a solver that guesses the axes anew, and all comes right again after a while.',
    trace: 'Two needles of one frame with calm motion between.',
    standard: 'glTF 2.0 says nothing about it: the file is valid, and a validator is silent.',
    programs: 'Every program plays it as it stands.',
    people: 'A limb or a prop that lies the wrong way round for a moment.',
    test: 'In a dense track two steps of one frame, each within 10° of 90°, 120° or 180° once the motion around is taken off, each four times as fast as both neighbours, less than 3 s apart, the second undoing the first to 15° about the track’s own axes or its parent’s.',
    source: 'The symmetries are geometry; the limits are common practice, no source.',
    spares: 'Real flips, which take more than one frame; sparse and STEP tracks; declared cuts and whips.',
    remedy:
      '`re-seat` with the stretch as its span turns it back by one rotation, which keeps the motion inside it: about the track’s own axes or its parent’s, whichever leaves less of a step at its end. Which side was seen wrongly only its maker knows, so that `--proposed` takes it only if allowed.',
  },
});

interface SymmetricStep {
  readonly segment: number;
  readonly angle: number;
  readonly symmetry: number;
  /** The step's turn without the motion around: in own and in parent axes. */
  readonly own: Float64Array;
  readonly parent: Float64Array;
}

function symmetricSteps(segments: Segments, { near = 0, calm = 0 }: Limits): SymmetricStep[] {
  const { turns, speeds } = segments;
  const found: SymmetricStep[] = [];
  for (let k = 0; k < turns.length; k++) {
    if (!((turns[k] ?? 0) > 90 - 2 * near)) continue;
    const beside = calm * (speeds[k] ?? 0);
    if ((speeds[k - 1] ?? 0) >= beside || (speeds[k + 1] ?? 0) >= beside) continue;
    const own = stepAlone(segments, k);
    const angle = angleBetween(own, Float64Array.of(0, 0, 0, 1)) * DEGREES;
    const symmetry = SYMMETRIES.find((turn) => Math.abs(turn - angle) <= near);
    if (symmetry === undefined) continue;
    const key = keyAt(segments, k);
    const parent = multiply(
      new Float64Array(4),
      multiply(new Float64Array(4), key, own),
      conjugate(key, key),
    );
    found.push({ segment: k, angle, symmetry, own, parent });
  }
  return found;
}

/** A segment's turn, own axes of its earlier key, less the mean turn of its two neighbours. */
function stepAlone(segments: Segments, k: number): Float64Array {
  const turn = turnOf(segments, k);
  const around = [k - 1, k + 1].filter((other) => (segments.turns[other] ?? Number.NaN) >= 0);
  const usual = new Float64Array(3);
  for (const other of around)
    for (const [axis, angle] of logMap(new Float64Array(3), turnOf(segments, other)).entries())
      usual[axis] = (usual[axis] ?? 0) - angle / around.length;
  return multiply(turn, turn, expMap(new Float64Array(4), usual));
}

function turnOf(segments: Segments, k: number): Float64Array {
  return relative(new Float64Array(4), keyAt(segments, k), keyAt(segments, k + 1));
}

function keyAt({ orientations }: Segments, key: number): Float64Array {
  return orientations.slice(4 * key, 4 * key + 4);
}

/** Whether the second step takes the first one back, about own axes or about the parent's. */
function undoes(on: SymmetricStep, off: SymmetricStep, pair: number): boolean {
  return Math.min(turnLeft(on.own, off.own), turnLeft(on.parent, off.parent)) <= pair;
}

/** What two turns one after the other amount to, degrees. */
function turnLeft(a: Float64Array, b: Float64Array): number {
  return angleBetween(multiply(new Float64Array(4), a, b), Float64Array.of(0, 0, 0, 1)) * DEGREES;
}

function turnedOverPlaces(context: TrackContext, limits: Limits): readonly Place[] {
  if (context.regime !== 'dense' || context.played.every(({ holds }) => holds)) return [];
  const { times } = context.track;
  const segments = segmentsOf(context);
  const turns = symmetricSteps(segments, limits);
  const places: Place[] = [];
  for (let i = 0; i + 1 < turns.length; i++) {
    const [on, off] = [turns[i]!, turns[i + 1]!];
    const span = [times[on.segment] ?? 0, times[off.segment + 1] ?? 0] as const;
    if (!(span[1] - span[0] < (limits['seconds'] ?? 0) && undoes(on, off, limits['pair'] ?? 0))) continue;
    const time = times[on.segment + 1] ?? 0;
    const keys = [on.segment + 1, off.segment + 1];
    places.push({ keys, time, span, value: on.angle, limit: on.symmetry, level: 'warning' });
    i++;
  }
  return places;
}

/** What turning a stretch back costs, and how far its two steps stand off then, degrees; empty where the edit can't be taken or leaves either turned. */
function turnedBack(
  context: TrackContext,
  step: Step,
  on: number,
  off: number,
): { step: Step; left: number; price: number }[] {
  try {
    const { track, largest } = verbNamed(step.verb).apply(context.track, step);
    const segments = segmentsOf({ ...context, track });
    const left = [on, off].map((key) => angleBetween(stepAlone(segments, key - 1), STILL) * DEGREES);
    return Math.max(...left) < LEFT ? [{ step, left: Math.max(...left), price: largest }] : [];
  } catch (error) {
    if (error instanceof SlewcurveError) return [];
    throw error;
  }
}
