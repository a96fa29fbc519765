export type { NumberStore, ReadonlyNumberStore } from './number-store.js';
export { SlewcurveError, type ErrorPlace } from './errors.js';
export { EXACT_STORAGE, type Storage } from './track/storage.js';
export type { Clip, Mark, SceneNode } from './track/clip.js';
export {
  VALUES_PER_KEY,
  rotationTrack,
  storedTrack,
  type Interpolation,
  type RotationTrack,
  type RotationTrackInput,
  type TrackSource,
} from './track/rotation-track.js';
export type { Curve, Frame, Peak } from './curve/curve.js';
export type { Playback, PlaybackId } from './playback/playback.js';
