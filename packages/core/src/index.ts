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
  type MatrixFlaws,
  type TrackSource,
} from './track/rotation-track.js';
export type { Curve, Frame, Peak, SegmentAcceleration } from './curve/curve.js';
export type { Playback, PlaybackId } from './playback/playback.js';
export { angleBetween } from './quaternion/angle-between.js';
export { conjugate } from './quaternion/conjugate.js';
export { dot } from './quaternion/dot.js';
export { expMap } from './quaternion/exp-map.js';
export { logMap, logMapLong } from './quaternion/log-map.js';
export { multiply } from './quaternion/multiply.js';
export { nlerp } from './quaternion/nlerp.js';
export { normalise } from './quaternion/normalise.js';
export { relative } from './quaternion/relative.js';
export { rotateVector } from './quaternion/rotate-vector.js';
export { slerp, slerpAsStored } from './quaternion/slerp.js';
export { squad } from './quaternion/squad.js';
export { cumulativeBezier } from './curve/cumulative-bezier.js';
export { cumulativeBSpline } from './curve/cumulative-b-spline.js';
export { fromAxisAngle, toAxisAngle } from './quaternion/axis-angle.js';
export { canonical } from './quaternion/canonical.js';
export { axisChange, changeAxes, changeAxesOfRate, changeBasis, mirror } from './quaternion/change-axes.js';
export { EULER_SEQUENCES, eulerSequence, type EulerSequence } from './quaternion/euler/euler-sequence.js';
export { fromEuler } from './quaternion/euler/from-euler.js';
export { poleDistance, toEuler } from './quaternion/euler/to-euler.js';
export { unwrapEuler } from './quaternion/euler/unwrap-euler.js';
export { fromMat3, fromMat4 } from './quaternion/from-matrix.js';
export { lookAlong, lookAlongPath, lookAt, lookLeastTwist } from './quaternion/look-at.js';
export { toMat3, toMat4 } from './quaternion/matrix.js';
export { mean } from './quaternion/mean.js';
export { slerpTurns } from './quaternion/slerp-turns.js';
export { matrixOrientation, SHEAR_FLOOR, splitMatrix, type SplitMatrix } from './quaternion/split-matrix.js';
export { swing, twist, twistAngle } from './quaternion/swing-twist.js';
export { turnAboutOwn, turnAboutParent, turnAboutWorld } from './quaternion/turn-about.js';
export { turnBetween } from './quaternion/turn-between.js';
export { alignSigns, signChanges, type AlignedTrack, type AlignSignsOptions } from './track/align-signs.js';
export { packed, STORAGE_MODELS, type StorageModel } from './track/packed.js';
export { ticked, TICK_READINGS, type TickReading } from './playback/ticked.js';
export { exactRate } from './time/exact-rate.js';
export { readTime, sayTime, TIME_FORMS, type TimeForm } from './time/time-text.js';
export { findSegment } from './track/find-segment.js';
export { FRAME_RATES, frameGrid } from './track/frame-grid.js';
export { keyOrientation } from './track/key-orientation.js';
export { nodeChain } from './track/node-chain.js';
export { accelerationFloor, angleFloor, rateFloor } from './track/noise-floor.js';
export { playableTrack } from './track/playable-track.js';
export { replaceTrack, type TrackChanges } from './track/replace-track.js';
export { segmentAngle } from './track/segment-angle.js';
export { spinTrack, type Spin } from './track/spin-track.js';
export {
  angleTrackToLinear,
  LARGEST_STEP,
  subdivideAngles,
  type SubdividedAngles,
} from './track/subdivide-angles.js';
export { turnsCurve } from './curve/turns-curve.js';
export { medianGap, regime, type Regime } from './track/regime.js';
export {
  BREAK_KINDS,
  localRoughness,
  type BreakKind,
  type LocalRoughness,
  type LocalRoughnessOptions,
} from './measure/local-roughness.js';
export { cumulativeHermite } from './curve/cumulative-hermite.js';
export { playAs } from './playback/play-as.js';
export { PLAYBACKS } from './playback/registry.js';
export { chartToRate, rateToChart } from './curve/chart-rate.js';
export { roundedCorners, type Corner, type RoundedCurve } from './curve/rounded-corners.js';
export type { KeyRates } from './curve/key-rate.js';
export { nestedBezier } from './curve/nested-bezier.js';
export {
  rotationSpline,
  type BSplineOptions,
  type LogChartOptions,
  type RotationSplineOptions,
  type ShapedSplineOptions,
  type SmoothSplineOptions,
  type SquadOptions,
} from './curve/rotation-spline.js';
export type { SplineShape } from './curve/shaped-spline.js';
export type { Convergence } from './curve/smooth-rates.js';
export type { SmoothSpline } from './curve/smooth-spline.js';
export { tensionContinuityBiasRates, type TensionContinuityBias } from './curve/tension-continuity-bias.js';
export { measure, type Measures } from './measure/measure.js';
export { axisWander, type AxisWander } from './measure/axis-wander.js';
export { dimensionlessJerk, logDimensionlessJerk } from './measure/dimensionless-jerk.js';
export { jerk, measureJerk, type JerkMeasures } from './measure/jerk.js';
export { panPixelsPerFrame, panWidthsPerSecond, sweepRate } from './measure/pan-speed.js';
export { pathEfficiency } from './measure/path-efficiency.js';
export { keyGrain } from './measure/key-grain.js';
export { meanRate, ratePercentile } from './measure/rate-percentile.js';
export { spectralArcLength, type SpectralArcLengthOptions } from './measure/spectral-arc-length.js';
export { speedProfile } from './measure/speed-profile.js';
export { cubicBezierEase } from './pace/cubic-bezier-ease.js';
export type { Limits } from './pace/capped-clock.js';
export type { DrawnSpeed } from './pace/drawn-profile.js';
export type { Ease } from './pace/ease.js';
export { EASES, type EaseName } from './pace/eases.js';
export { letAngleGo, type FreedCurve, type FreePress } from './pace/let-angle-go.js';
export type { Match, MatchedSide } from './pace/matched-clock.js';
export { pace, type Copied, type PacedCurve, type PaceLaw } from './pace/pace.js';
export type { AddedSpeed } from './pace/pressed-motion.js';
export { rampEase, type Ramps } from './pace/ramp-ease.js';
export { retimedCurve } from './pace/retimed-curve.js';
export type { PaceAt, Retiming } from './pace/retiming.js';
export type { Press } from './pace/shaped-speed.js';
export type { Span } from './pace/span-retiming.js';
export { type TurnedAngle, turnedAngle } from './pace/turned-angle.js';
