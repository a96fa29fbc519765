import { chordCurve } from '../curve/chord-curve.js';
import type { Playback } from './playback.js';

/** Chords made unit, the short way whatever the signs: sign-safe nlerp. */
export const CHORD: Playback = Object.freeze({
  id: 'chord',
  says: 'chords the short way',
  signSafe: () => true,
  play: chordCurve,
});
