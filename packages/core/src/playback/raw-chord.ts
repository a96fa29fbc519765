import { rawChordCurve } from '../curve/chord-curve.js';
import type { Playback } from './playback.js';

/** Chords between the stored numbers, made unit: a player that blends components and knows nothing of signs. */
export const RAW_CHORD: Playback = Object.freeze({
  id: 'raw-chord',
  says: 'chords between the stored numbers',
  signSafe: () => false,
  play: rawChordCurve,
});
