import { type RotationTrack, SlewcurveError, keyGrain, medianGap, regime } from '@slewcurve/core';
import { placeOf } from '../acted-keys.js';
import { sentenceOf } from '../clauses.js';
import { editResult } from '../edit-result.js';
import { alignedKeys, checkTurning } from '../key-turns.js';
import { fastKeys, GUARD_RATE, guardKeys, movedKeys } from '../smoothing/guards.js';
import { localFitter, noiseLeft } from '../smoothing/local-fit.js';
import { sharesOf } from '../smoothing/shares.js';
import type { Step } from '../step.js';
import { isJoined } from '../stored-key.js';
import { turnAlong } from '../turn-along.js';
import type { EditResult, Verb } from '../verb.js';

const RADIANS = Math.PI / 180;

/** Key gaps of the average where nothing else is said: on even keys 8 % of the noise's power is left. */
const USUAL_GAPS = 6;

/** Seconds up to which an average is widened to reach a wanted grain. */
const WIDEST = 1;

/**
 * Takes grain off a dense track: q* = q·exp(Σ wⱼ·log(q⁻¹qⱼ)), the weights those of a parabola under a Gaussian of `sigma` seconds, so that a motion that is
 * slow against sigma stays; see `localFitter`. Instead of `sigma` the wanted `grain` can be given, degrees an axis: the narrowest average that leaves no
 * more than that of the noise which the track has. With neither: 6 key gaps, which leave a twelfth of the noise's power.
 *
 * Guards take no part and stay to the byte: what turns faster than `guard` (60 deg/s unless told) and sigma beside it, the spans in `guards` (whips,
 * contacts), kept keys, and wherever the average would move the motion itself, because what it takes off is no noise: it leans one way over sigma and more, or a key stands further
 * off than noise ever does, which is for `lift out` and `bridge`.
 * Beside a guard the edit fades in over `shoulders` (sigma unless told). No key turns by more than `within` degrees. Averages never reach over a
 * cut. Tangents of a CUBICSPLINE become ½·v·(ω, 0), ω the fitted parabola's rate.
 */
export const smooth: Verb = Object.freeze({
  name: 'smooth',
  summary: 'Averages noise away from key to key; fast moves, contacts and kept keys stay as stored.',
  alsoCalled: [
    'filter',
    'denoise',
    'jitter',
    'noise',
    'low-pass',
    'Savitzky-Golay',
    'Gaussian filter',
    'calm',
    'grain',
  ],
  opening: 'Smooth',
  reads: ['sigma', 'grain', 'within', 'guard', 'guards'] as const,
  needsAllowing: false,
  keysApart: false,
  insertsKeys: false,
  say: (step: Step) => sentenceOf('Smooth', step),
  apply(track: RotationTrack, step: Step): EditResult {
    checkTurning(track, 'smooth');
    checkDense(track);
    const sigma = sigmaOf(track, step);
    if (sigma === undefined) return editResult(track, track);
    const keys = alignedKeys(track);
    const isGuarded = fastKeys(track, keys, step.guard ?? GUARD_RATE, sigma);
    guardKeys(track, step.guards ?? [], isGuarded);
    for (const key of step.keep ?? []) isGuarded[key] = 1;
    const fits = fitted(track, keys, sigma, isGuarded);
    movedKeys(track, fits.turns, sigma, isGuarded);
    const shares = sharesOf(track, step, isGuarded, step.shoulders ?? sigma);
    const most = step.within === undefined ? Infinity : step.within * RADIANS;
    const turns = fits.turns.map((angle, i) => {
      const at = 3 * Math.floor(i / 3);
      const length = Math.hypot(...fits.turns.subarray(at, at + 3)) * shares[at / 3];
      return angle * shares[at / 3] * (length > most ? most / length : 1);
    });
    const after = turnAlong(track, turns, { rates: fits.rates });
    return editResult(track, after);
  },
});

/** @throws SlewcurveError `step.needs-dense-keys` */
function checkDense(track: RotationTrack): void {
  if (regime(track) === 'dense') return;
  throw new SlewcurveError(
    'step.needs-dense-keys',
    `The keys of this track lie ${medianGap(track).toPrecision(3)} s apart: each is a decision, not a reading with noise, and there is nothing to average. Use "ease through" for its corners.`,
    placeOf(track),
  );
}

/**
 * Seconds; undefined where the track is as calm as it should be.
 *
 * @throws SlewcurveError `step.too-grainy` where no average up to a second leaves so little
 */
function sigmaOf(track: RotationTrack, { sigma, grain }: Step): number | undefined {
  const gap = medianGap(track);
  if (sigma !== undefined) return sigma;
  if (grain === undefined) return USUAL_GAPS * gap;
  const has = keyGrain(track.times, alignedKeys(track), gap, (key) => isJoined(track, key)) / RADIANS;
  const wanted = (grain / has) ** 2;
  if (!(has > grain)) return undefined;
  let [narrow, wide] = [gap / 2, WIDEST];
  if (noiseLeft(wide, gap) > wanted)
    throw new SlewcurveError(
      'step.too-grainy',
      `Its grain is ${has.toPrecision(3)}° an axis; no average over ${WIDEST} s leaves ${grain}°. Ask for ${(has * Math.sqrt(noiseLeft(wide, gap))).toPrecision(2)}° or more, or go back to the source.`,
      placeOf(track),
    );
  for (let halving = 0; halving < 30; halving++) {
    const middle = (narrow + wide) / 2;
    if (noiseLeft(middle, gap) > wanted) narrow = middle;
    else wide = middle;
  }
  return wide;
}

/** What the average wants of every key outside the guards; zero inside. */
function fitted(
  track: RotationTrack,
  keys: Float64Array,
  sigma: number,
  isGuarded: Uint8Array,
): { turns: Float64Array; rates: Float64Array } {
  const turns = new Float64Array(3 * track.times.length);
  const rates = new Float64Array(3 * track.times.length);
  const isOpen = (key: number): boolean =>
    isGuarded[key] === 0 && isGuarded[key + 1] === 0 && isJoined(track, key);
  const fit = localFitter(track.times, keys, sigma, isOpen);
  for (let key = 0; key < track.times.length; key++) {
    if (isGuarded[key] !== 0) continue;
    const { turn, rate } = fit(key);
    turns.set(turn, 3 * key);
    rates.set(rate, 3 * key);
  }
  return { turns, rates };
}
