import { storedTrack, type RotationTrack, type RotationTrackInput } from './rotation-track.js';

/** What `replaceTrack` can change; what is not given stays. */
export type TrackChanges = Partial<
  Pick<RotationTrackInput, 'times' | 'values' | 'breaks' | 'interpolation' | 'sequence' | 'storage'>
>;

/**
 * A new frozen track with some parts changed; what is not named is shared with `track`, which stays as it is. Checked as
 * `storedTrack` checks.
 *
 * @throws SlewcurveError `track.bad-length`, `track.unknown-interpolation`, `track.bad-break`
 */
export function replaceTrack(track: RotationTrack, changes: TrackChanges): RotationTrack {
  return storedTrack({ ...track, ...changes });
}
