import type { Remedy, TrackContext } from '../../rule.js';

/** A smooth way through the same keys; undefined where one interpolation a track, or keys that can't be played, stand against it. */
export function easeThroughKeys({ stored, track }: TrackContext): Remedy | undefined {
  if (stored.interpolation !== 'LINEAR' || stored !== track) return undefined;
  return { step: { verb: 'ease through', clip: track.clip, track: track.id }, price: 0 };
}
