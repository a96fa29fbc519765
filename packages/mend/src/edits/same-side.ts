import { type RotationTrack, dot, replaceTrack } from '@slewcurve/core';
import { actedKeys, checkQuaternions } from '../acted-keys.js';
import { sentenceOf } from '../clauses.js';
import { editResult } from '../edit-result.js';
import type { Step } from '../step.js';
import { storedLength, storedValue } from '../stored-key.js';
import type { EditResult, Verb } from '../verb.js';

/**
 * Negates whole keys (both tangents too) where the stored quaternion points away from the one before it: `q` and `-q` are one
 * orientation, so every key stands as it stood, to the bit. Of `keys` (left out: all) from the first to the last, each against the key
 * before it as that stands by then.
 */
export const sameSide: Verb = Object.freeze({
  name: 'same side',
  summary: 'Negates stored quaternions whose sign changes from key to key; no orientation changes.',
  alsoCalled: [
    'align signs',
    'hemisphere',
    'sign flip',
    'flip',
    'shortest path',
    'make continuous',
    'neighbourhood',
    'canonical',
  ],
  opening: 'Bring to one side',
  reads: ['keys'] as const,
  needsAllowing: false,
  keysApart: true,
  insertsKeys: false,
  say: (step: Step) => sentenceOf('Bring to one side', step),
  apply(track: RotationTrack, step: Step): EditResult {
    checkQuaternions(track);
    const acted = new Set(actedKeys(track, step));
    const size = track.values.length / track.times.length;
    const values = Float64Array.from(track.values);
    let before: Float64Array | undefined;
    for (let key = 0; key < track.times.length; key++) {
      if (!(storedLength(track, key) > 0)) continue;
      const value = storedValue(track, key, values);
      if (acted.has(key) && before && dot(before, value) < 0)
        for (let at = key * size; at < key * size + size; at++) values[at] = -values[at];
      before = value;
    }
    // Slerp and STEP play q and -q alike; the standard's cubic joins the numbers as they stand (glTF 2.0, Appendix C).
    return editResult(track, replaceTrack(track, { values }), {
      moves: track.interpolation === 'CUBICSPLINE',
    });
  },
});
