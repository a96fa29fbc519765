import {
  type RotationTrack,
  SlewcurveError,
  expMap,
  keyOrientation,
  logMap,
  multiply,
  relative,
  replaceTrack,
  slerp,
} from '@slewcurve/core';
import { actedKeys, checkQuaternions, firstKey, placeOf } from '../acted-keys.js';
import { sentenceOf } from '../clauses.js';
import { editResult } from '../edit-result.js';
import { polynomialWeights } from '../polynomial-weights.js';
import type { Step } from '../step.js';
import { playableNeighbour, storedValue, writeKey } from '../stored-key.js';
import type { EditResult, Verb } from '../verb.js';

/** A second neighbour counts where its gap to the first is at most so many times the first's gap to the key, and at least one such part. */
const GAP_RATIO = 3;

/** Neighbours further off than this, radians (120°), have no common tangent space worth a polynomial. */
const FAR = (2 * Math.PI) / 3;

/**
 * Replaces each listed key by what its neighbours say. EDITS' formula, q* = q_k·exp((4(y₋₁ + y₁) − y₋₂ − y₂)/6) with
 * y_j = log(q_k⁻¹ q_{k+j}), is the cubic through the four neighbours, read at the key. Here its weights are those of the true times
 * (Lagrange; the same for even gaps), and it is repeated from the short way between the inner neighbours until it stands still, so that
 * the result does not hang on the bad key itself.
 *
 * Listed keys and keys that can't be played don't count as neighbours. Next to an end or a cut: the parabola through the nearest three.
 * A second neighbour whose gap is over three times (or under a third of) the first's is left out, and where one lies over 120° off, the
 * inner two alone count: then the key lies on the short way between them. STEP: the pose of the key before stays. CUBICSPLINE: the
 * tangents are ½·q·(ω, 0), ω the polynomial's rate at the key.
 */
export const liftOut: Verb = Object.freeze({
  name: 'lift out',
  summary: 'Replaces one bad key by what its neighbours say; every other key stays as stored.',
  alsoCalled: ['pop', 'spike', 'glitch', 'outlier', 'despike', 'remove key', 'one bad key'],
  opening: 'Lift out',
  reads: ['keys'] as const,
  needsAllowing: false,
  keysApart: true,
  insertsKeys: false,
  say: (step: Step) => sentenceOf('Lift out', step),
  apply(track: RotationTrack, step: Step): EditResult {
    checkQuaternions(track);
    firstKey(track, step);
    const acted = actedKeys(track, step);
    const listed = new Set(step.keys);
    const values = Float64Array.from(track.values);
    for (const key of acted) {
      const { orientation, rate, nearest } = liftedKey(track, key, listed);
      writeKey(values, track, key, orientation, storedValue(track, nearest), rate);
    }
    return editResult(track, replaceTrack(track, { values }));
  },
});

interface LiftedKey {
  readonly orientation: Float64Array;
  /** Own frame, rad/s. */
  readonly rate: Float64Array;
  /** The neighbour whose stored sign it takes. */
  readonly nearest: number;
}

function liftedKey(track: RotationTrack, key: number, listed: ReadonlySet<number>): LiftedKey {
  const before = neighbours(track, key, -1, listed);
  const after = neighbours(track, key, 1, listed);
  const nearest = before[0] ?? after[0];
  if (nearest === undefined)
    throw new SlewcurveError(
      'step.no-neighbours',
      `Key ${key} has no other key beside it to go by.`,
      placeOf(track, key),
    );
  if (track.interpolation === 'STEP' || !Number.isFinite(track.times[key]))
    return {
      orientation: keyOrientation(new Float64Array(4), track, nearest),
      rate: new Float64Array(3),
      nearest,
    };
  const inner = [before[0], after[0]].filter((neighbour) => neighbour !== undefined);
  const wide =
    before.length > 0 && after.length > 0
      ? [...before.slice(0, 2), ...after.slice(0, 2)]
      : [...before, ...after];
  return {
    ...(polynomialAt(track, key, wide) ?? polynomialAt(track, key, inner) ?? shortWay(track, key, inner)),
    nearest,
  };
}

/** Up to three keys on one side, nearest first. */
function neighbours(track: RotationTrack, key: number, way: 1 | -1, listed: ReadonlySet<number>): number[] {
  const found: number[] = [];
  let at: number | undefined = key;
  let firstGap: number | undefined;
  while (found.length < 3) {
    const next: number | undefined = playableNeighbour(track, at, way, listed);
    if (next === undefined) break;
    const gap = Math.abs(track.times[next] - track.times[at]);
    firstGap ??= gap;
    if (gap > GAP_RATIO * firstGap || gap * GAP_RATIO < firstGap) break;
    found.push(next);
    at = next;
  }
  return found;
}

/** Orientation and rate at a key's time of the polynomial through others; undefined where one is too far off. */
function polynomialAt(
  track: RotationTrack,
  key: number,
  nodes: readonly number[],
): Pick<LiftedKey, 'orientation' | 'rate'> | undefined {
  const weights = polynomialWeights(
    nodes.map((node) => track.times[node]),
    track.times[key],
  );
  const { orientation } = shortWay(track, key, nodes);
  const turns = nodes.map(() => new Float64Array(3));
  // Each pass shrinks the rest by about a third of the angles' square; 60 passes end at float64's own step for all under 120°.
  for (let pass = 0; pass < 60; pass++) {
    const shift = new Float64Array(3);
    for (const [i, node] of nodes.entries()) {
      const turn = logMap(
        turns[i],
        relative(new Float64Array(4), orientation, keyOrientation(new Float64Array(4), track, node)),
      );
      if (Math.hypot(...turn) > FAR) return undefined;
      for (let axis = 0; axis < 3; axis++) shift[axis] += weights.value[i] * turn[axis];
    }
    multiply(orientation, orientation, expMap(new Float64Array(4), shift));
    if (Math.hypot(...shift) < 1e-15) break;
  }
  const rate = new Float64Array(3);
  turns.forEach((turn, i) => turn.forEach((angle, axis) => (rate[axis] += weights.slope[i] * angle)));
  return { orientation, rate };
}

/** Orientation and rate on the short way between the nearest keys before and after; beside the only neighbour: its pose, at rest. */
function shortWay(
  track: RotationTrack,
  key: number,
  nodes: readonly number[],
): Pick<LiftedKey, 'orientation' | 'rate'> {
  const before = nodes.filter((node) => node < key);
  const after = nodes.filter((node) => node > key);
  const from = before.length > 0 ? Math.max(...before) : Math.min(...after);
  const to = after.length > 0 ? Math.min(...after) : from;
  const orientation = keyOrientation(new Float64Array(4), track, from);
  if (from === to) return { orientation, rate: new Float64Array(3) };
  const end = keyOrientation(new Float64Array(4), track, to);
  const seconds = track.times[to] - track.times[from];
  const turn = logMap(new Float64Array(3), relative(new Float64Array(4), orientation, end));
  return {
    orientation: slerp(orientation, orientation, end, (track.times[key] - track.times[from]) / seconds),
    rate: turn.map((angle) => angle / seconds),
  };
}
