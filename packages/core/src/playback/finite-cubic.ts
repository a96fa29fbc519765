import { finiteCubicCurve } from '../curve/finite-cubic.js';
import type { Playback } from './playback.js';

/** Smooth component cubics with tangents from the neighbouring keys: a player that smooths components and knows nothing of signs. */
export const FINITE_CUBIC: Playback = Object.freeze({
  id: 'finite-cubic',
  says: 'smooth cubics through the stored numbers',
  signSafe: () => false,
  play: finiteCubicCurve,
});
