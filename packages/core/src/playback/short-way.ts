import { slerpCurve } from '../curve/slerp-curve.js';
import type { Playback } from './playback.js';

/** Great arcs between the keys, the short way whatever their signs: slerp, and what most players do with LINEAR. */
export const SHORT_WAY: Playback = Object.freeze({
  id: 'short-way',
  says: 'great arcs the short way',
  signSafe: () => true,
  play: slerpCurve,
});
