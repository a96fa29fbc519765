import type { Curve } from '../curve/curve.js';
import { SlewcurveError } from '../errors.js';
import type { RotationTrack } from '../track/rotation-track.js';
import type { PlaybackId } from './playback.js';
import { PLAYBACKS } from './registry.js';

/**
 * The curve by which a playback plays a track. Faulty keys are left out (`playableTrack`), so a curve never gives NaN.
 *
 * @throws SlewcurveError `playback.unknown`, `playback.needs-tangents`, `playback.needs-angles`
 */
export function playAs(track: RotationTrack, id: PlaybackId): Curve {
  if (!Object.hasOwn(PLAYBACKS, id))
    throw new SlewcurveError(
      'playback.unknown',
      `${id} is not a playback; there are ${Object.keys(PLAYBACKS).join(', ')}.`,
      { track: track.id, clip: track.clip },
    );
  return PLAYBACKS[id].play(track);
}
