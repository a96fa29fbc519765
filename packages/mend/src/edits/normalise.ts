import { type RotationTrack, SlewcurveError, type Storage, replaceTrack } from '@slewcurve/core';
import { actedKeys, checkQuaternions, placeOf } from '../acted-keys.js';
import { sentenceOf } from '../clauses.js';
import { editResult } from '../edit-result.js';
import type { Step } from '../step.js';
import { isPlayable, storedLength } from '../stored-key.js';
import type { EditResult, Verb } from '../verb.js';

/**
 * Divides keys by their length: the angle stays. Of the whole track, those that are off by more than the storage rounds anyway; a
 * listed key always. Under CUBICSPLINE both tangents are divided along, which leaves the rate at the key; between keys of unlike length
 * the path changes.
 */
export const normaliseKeys: Verb = Object.freeze({
  name: 'normalise',
  summary: 'Makes stored quaternions unit length; no angle changes.',
  alsoCalled: ['normalize', 'unit length', 'renormalise', 'unit quaternion'],
  opening: 'Normalise',
  reads: ['keys'] as const,
  needsAllowing: false,
  keysApart: true,
  insertsKeys: false,
  say: (step: Step) => sentenceOf('Normalise', step),
  apply(track: RotationTrack, step: Step): EditResult {
    checkQuaternions(track);
    const size = track.values.length / track.times.length;
    const rounding = storageStep(track.storage);
    const values = Float64Array.from(track.values);
    for (const key of actedKeys(track, step)) {
      const length = storedLength(track, key);
      if (!isPlayable(track, key)) {
        if (step.keys) throw noDirection(track, key);
        continue;
      }
      if (!step.keys && Math.abs(length - 1) <= rounding) continue;
      for (let at = key * size; at < key * size + size; at++) values[at] /= length;
    }
    return editResult(track, replaceTrack(track, { values }), {
      moves: track.interpolation === 'CUBICSPLINE',
    });
  },
});

/**
 * Distance of two neighbouring numbers of the storage, near 1. Four components rounded by half of it change the length by one step at
 * most.
 */
function storageStep({ component, decimals = 6, lattice = 0 }: Storage): number {
  const steps: Readonly<Record<Storage['component'], number>> = {
    float64: 2 ** -52,
    float32: 2 ** -23,
    int16: 1 / 32767,
    uint16: 1 / 65535,
    int8: 1 / 127,
    uint8: 1 / 255,
    text: 10 ** -decimals,
  };
  return Math.max(steps[component], lattice);
}

function noDirection(track: RotationTrack, key: number): SlewcurveError {
  return new SlewcurveError(
    'step.no-direction',
    `Key ${key} has no direction to keep: it is zero or not finite. Bridge it instead.`,
    placeOf(track, key),
  );
}
