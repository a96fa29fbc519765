import { eulerCurve } from '../curve/euler-curve.js';
import { SlewcurveError } from '../errors.js';
import type { Playback } from './playback.js';

/** Three angles joined as numbers, whole turns kept, as programs with a channel for each angle do. Refuses tracks without angles. */
export const EULER_LINEAR: Playback = Object.freeze({
  id: 'euler-linear',
  says: 'angles joined as numbers',
  signSafe: () => true,
  play(track) {
    if (track.interpolation !== 'EULER')
      throw new SlewcurveError(
        'playback.needs-angles',
        `euler-linear plays stored angles, and a ${track.interpolation} track has none; choose another playback.`,
        { track: track.id, clip: track.clip },
      );
    return eulerCurve(track);
  },
} satisfies Playback);
