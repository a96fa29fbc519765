import type { Curve } from '../curve/curve.js';
import { eulerCurve } from '../curve/euler-curve.js';
import { slerpCurve } from '../curve/slerp-curve.js';
import { stepCurve } from '../curve/step-curve.js';
import { storedCubicCurve } from '../curve/stored-cubic.js';
import type { Interpolation, RotationTrack } from '../track/rotation-track.js';
import type { Playback } from './playback.js';

const MODES: Readonly<Record<Interpolation, (track: RotationTrack) => Curve>> = Object.freeze({
  STEP: stepCurve,
  LINEAR: slerpCurve,
  CUBICSPLINE: storedCubicCurve,
  EULER: eulerCurve,
});

/** Each track by its own mode, exactly as the glTF 2.0 text says ("Animations", Appendix C); EULER angles joined as numbers. */
export const AS_WRITTEN: Playback = Object.freeze({
  id: 'as-written',
  says: 'the file as it is written',
  signSafe: (track) => track.interpolation !== 'CUBICSPLINE',
  play: (track) => MODES[track.interpolation](track),
} satisfies Playback);
