import type { PlayedTrack, TrackContext } from '../../rule.js';

/** The chosen playbacks that join this track's keys by cubics, whose speed may do anything between two keys. */
export function cubicPlayed({ track, played }: TrackContext): readonly PlayedTrack[] {
  return played.filter(({ holds, playback: { id } }) => {
    if (holds) return false;
    if (id === 'finite-cubic') return true;
    return track.interpolation === 'CUBICSPLINE' && (id === 'as-written' || id === 'stored-cubic');
  });
}
