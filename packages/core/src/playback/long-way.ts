import { turnsCurve } from '../curve/turns-curve.js';
import type { Playback } from './playback.js';

/** Great arcs between the keys, the long way round whatever their signs: 360° less the short angle, against it. */
export const LONG_WAY: Playback = Object.freeze({
  id: 'long-way',
  says: 'great arcs the long way',
  signSafe: () => true,
  play: (track) => turnsCurve(track, -1),
} satisfies Playback);
