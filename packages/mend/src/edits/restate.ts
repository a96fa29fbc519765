import {
  type RotationTrack,
  SlewcurveError,
  axisChange,
  changeAxes,
  changeAxesOfRate,
  replaceTrack,
} from '@slewcurve/core';
import { placeOf } from '../acted-keys.js';
import { sentenceOf } from '../clauses.js';
import { DEGREES, editResult } from '../edit-result.js';
import type { Step } from '../step.js';
import type { EditResult, Verb } from '../verb.js';
import { refuseParts } from '../whole-track.js';

/**
 * Reads a whole file's numbers by other conventions. `components`: the four numbers stand in another order. `angles`: they have another unit. `axes`: the
 * axes are others, q* = M·q·M⁻¹ for parent and own axes alike; angles keep their numbers up to the sign, and their sequence names the new axes. Every
 * change moves numbers or signs alone, so that all relative speeds stay to the bit (a unit multiplies them).
 */
export const restate: Verb = Object.freeze({
  name: 'restate',
  summary: 'Reads the numbers of a whole file by other axes, another order of components or another unit.',
  alsoCalled: [
    'up axis',
    'Z up',
    'Y up',
    'handedness',
    'change axes',
    'wxyz',
    'component order',
    'degrees',
    'radians',
    'convert units',
  ],
  opening: 'Restate',
  reads: ['axes', 'components', 'angles'] as const,
  needsAllowing: true,
  keysApart: false,
  insertsKeys: false,
  wholeFile: true,
  say: (step: Step) => sentenceOf('Restate', step),
  apply(track: RotationTrack, step: Step): EditResult {
    refuseParts(track, step, ['keys', 'span', 'keep']);
    const { axes, components, angles } = step;
    if (axes === undefined && components === undefined && angles === undefined)
      throw new SlewcurveError(
        'step.needs-convention',
        'Say what is restated: axes ("x z -y"), components ("wxyz") or angles ("degrees" or "radians").',
        placeOf(track),
      );
    const isAngles = track.interpolation === 'EULER';
    let values = track.values;
    if (components !== undefined && !isAngles) values = reordered(values, components);
    if (angles !== undefined && isAngles)
      values = values.map((angle) => (angles === 'radians' ? angle * DEGREES : angle / DEGREES));
    let { sequence } = track;
    if (axes !== undefined && isAngles)
      ({ values, sequence } = turnedAngles(values, sequence ?? 'XYZ', axes));
    else if (axes !== undefined) values = turnedComponents(values, axes);
    const after = replaceTrack(track, { values, ...(sequence !== undefined && { sequence }) });
    return { ...editResult(track, after), ...(axes !== undefined && { axes }) };
  },
});

/** Four numbers that stand in the order of `components`, as x, y, z, w; tangents too. */
function reordered(values: Float64Array, components: string): Float64Array {
  const from = ['x', 'y', 'z', 'w'].map((part) => components.indexOf(part));
  return values.map((_, i) => values[i - (i % 4) + from[i % 4]]);
}

/** Tangents go over as values do: the change is linear. */
function turnedComponents(values: Float64Array, axes: string): Float64Array {
  const change = axisChange(axes);
  const after = values.slice();
  for (let at = 0; at < values.length; at += 4) {
    const q = after.subarray(at, at + 4);
    changeAxes(q, q, change);
  }
  return after;
}

/** A turn by a about an old axis is a turn by ±a about a new one. */
function turnedAngles(
  values: Float64Array,
  sequence: string,
  axes: string,
): { values: Float64Array; sequence: string } {
  const change = axisChange(axes);
  const turned = Array.from(sequence.toLowerCase(), (letter) => {
    const axis = changeAxesOfRate(
      [0, 0, 0],
      ['x', 'y', 'z'].map((name) => Number(name === letter)),
      change,
    );
    const index = axis.findIndex((part) => part !== 0);
    return { letter: 'xyz'[index], sign: axis[index] };
  });
  const letters = turned.map(({ letter }) => letter).join('');
  return {
    values: values.map((angle, i) => turned[i % 3].sign * angle),
    sequence: sequence === sequence.toUpperCase() ? letters.toUpperCase() : letters,
  };
}
