import type { Curve } from '../curve/curve.js';
import type { RotationTrack } from '../track/rotation-track.js';

/** Ids of the playbacks that are built; the only spelling anywhere. */
export type PlaybackId =
  | 'as-written'
  | 'short-way'
  | 'long-way'
  | 'chord'
  | 'raw-chord'
  | 'stored-cubic'
  | 'finite-cubic'
  | 'euler-linear'
  | 'step';

/** How some program plays a file: its interpolation and its sign rule. */
export interface Playback {
  readonly id: PlaybackId;
  /** In words, for a sentence: "as played by …". */
  readonly says: string;
  /** Whether `q` and `-q` at a key of this track play the same. */
  signSafe(track: RotationTrack): boolean;
  /** @throws SlewcurveError `playback.needs-tangents`, `playback.needs-angles` where the playback needs them and the track has none. */
  play(track: RotationTrack): Curve;
}
