import { stepCurve } from '../curve/step-curve.js';
import type { Playback } from './playback.js';

/** Every key held until the next. */
export const STEP: Playback = Object.freeze({
  id: 'step',
  says: 'held keys',
  signSafe: () => true,
  play: stepCurve,
});
