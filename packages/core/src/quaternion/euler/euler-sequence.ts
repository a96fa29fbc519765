import { SlewcurveError } from '../../errors.js';

/** The axes that three angles turn about, in order: upper case intrinsic (about the turned axes), lower case extrinsic (fixed). */
export type EulerSequence =
  | 'XYZ'
  | 'XZY'
  | 'YXZ'
  | 'YZX'
  | 'ZXY'
  | 'ZYX'
  | 'XYX'
  | 'XZX'
  | 'YXY'
  | 'YZY'
  | 'ZXZ'
  | 'ZYZ'
  | 'xyz'
  | 'xzy'
  | 'yxz'
  | 'yzx'
  | 'zxy'
  | 'zyx'
  | 'xyx'
  | 'xzx'
  | 'yxy'
  | 'yzy'
  | 'zxz'
  | 'zyz';

/** All 24 sequences of axes: intrinsic first, those of three axes before those of two. */
export const EULER_SEQUENCES: readonly EulerSequence[] = Object.freeze([
  'XYZ',
  'XZY',
  'YXZ',
  'YZX',
  'ZXY',
  'ZYX',
  'XYX',
  'XZX',
  'YXY',
  'YZY',
  'ZXZ',
  'ZYZ',
  'xyz',
  'xzy',
  'yxz',
  'yzx',
  'zxy',
  'zyx',
  'xyx',
  'xzx',
  'yxy',
  'yzy',
  'zxz',
  'zyz',
]);

/**
 * The sequence that `text` names.
 *
 * @throws SlewcurveError `euler.unknown-sequence`
 */
export function eulerSequence(text: string): EulerSequence {
  const found = EULER_SEQUENCES.find((name) => name === text);
  if (found !== undefined) return found;
  throw new SlewcurveError(
    'euler.unknown-sequence',
    `"${text}" is not a sequence of axes: write three letters, no letter twice in a row, as XYZ (about turned axes) or xyz (about fixed axes).`,
  );
}

/** Axis, 0 to 2, of one letter; kernels read the letters by their codes so that nothing is allocated. @internal */
export function axisOf(sequence: string, letter: 0 | 1 | 2): number {
  return (sequence.charCodeAt(letter) | 32) - 120;
}

/** Whether the angles turn about the turned axes. @internal */
export function isIntrinsic(sequence: string): boolean {
  return sequence.charCodeAt(0) < 97;
}

/** Whether first and last letter are the same. @internal */
export function hasTwoAxes(sequence: string): boolean {
  return sequence.charCodeAt(0) === sequence.charCodeAt(2);
}

/** +1 where the axes `first`, `second` and the one that is neither follow as x, y, z do, -1 otherwise. @internal */
export function handOf(first: number, second: number): 1 | -1 {
  return (first + 1) % 3 === second ? 1 : -1;
}
