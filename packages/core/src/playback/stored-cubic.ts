import { storedCubicCurve } from '../curve/stored-cubic.js';
import { SlewcurveError } from '../errors.js';
import type { Playback } from './playback.js';

/** Cubics by the tangents that the file stores, no care taken of signs: glTF 2.0's CUBICSPLINE. Refuses tracks without tangents. */
export const STORED_CUBIC: Playback = Object.freeze({
  id: 'stored-cubic',
  says: 'cubics by the stored tangents',
  signSafe: () => false,
  play(track) {
    if (track.interpolation !== 'CUBICSPLINE')
      throw new SlewcurveError(
        'playback.needs-tangents',
        `stored-cubic plays stored tangents, and a ${track.interpolation} track has none; choose another playback.`,
        { track: track.id, clip: track.clip },
      );
    return storedCubicCurve(track);
  },
} satisfies Playback);
