import { SlewcurveError } from '../errors.js';
import type { ReadonlyNumberStore } from '../number-store.js';
import type { RotationTrack } from '../track/rotation-track.js';
import type { Curve } from './curve.js';
import { keyBSpline } from './key-b-spline.js';
import type { KeyRates } from './key-rate.js';
import { logChartSpline } from './log-chart-spline.js';
import { shapedSpline, type SplineShape } from './shaped-spline.js';
import { smoothSpline, type SmoothSpline } from './smooth-spline.js';
import { splineKeys } from './spline-keys.js';
import { squadSpline } from './squad-spline.js';

interface Looping {
  /** The last key is the first again: both take the rate across the seam. Default false; without effect where there are breaks. */
  readonly loop?: boolean;
}

/** Spherical quadrangles; acceleration jumps at keys. */
export interface SquadOptions extends Looping {
  readonly kind: 'squad';
  /** Default `secant`. */
  readonly rates?: KeyRates;
}

/** Cumulative cubics with three numbers to shape every key; acceleration jumps at keys. */
export interface ShapedSplineOptions extends Looping, SplineShape {
  readonly kind: 'tension-continuity-bias';
}

/** Continuous acceleration through every key. */
export interface SmoothSplineOptions extends Looping {
  readonly kind: 'c2';
  /** Largest change of a key's rate in a pass that counts as none, rad/s. Default 1e-9. */
  readonly tolerance?: number;
  /** Passes at the most. Default 40: turns of up to 120° a segment take 14 or fewer, up to 178° 26. */
  readonly passes?: number;
}

/** Continuous acceleration near the keys, not through them. */
export interface BSplineOptions extends Looping {
  readonly kind: 'b-spline';
}

/** Cubics of rotation vectors about one orientation; good within some 60° of it. */
export interface LogChartOptions extends Looping {
  readonly kind: 'log-chart';
  /** Default `secant`. */
  readonly rates?: Exclude<KeyRates, 'uniform'>;
  /** `[x, y, z, w]`. Default: the mean of the keys. */
  readonly reference?: ReadonlyNumberStore;
}

/** The kind of spline, and what that kind can be told. */
export type RotationSplineOptions =
  SquadOptions | ShapedSplineOptions | SmoothSplineOptions | BSplineOptions | LogChartOptions;

/**
 * A smooth curve by the keys of a track, the short way between each two, whatever their signs; through the keys, but for kind
 * `b-spline`. First and last key, and keys beside breaks, take the rate of their one segment. Keys that cannot be played are left
 * out (`playableTrack`). Kind `c2` says how it converged. What each kind is, and its source, stands at its own function.
 *
 * @throws SlewcurveError `spline.unknown-kind`
 */
export function rotationSpline(track: RotationTrack, options: SmoothSplineOptions): SmoothSpline;
export function rotationSpline(track: RotationTrack, options: RotationSplineOptions): Curve;
export function rotationSpline(track: RotationTrack, options: RotationSplineOptions): Curve {
  const spline = splineKeys(track, options.loop === true);
  switch (options.kind) {
    case 'squad':
      return squadSpline(spline, options.rates ?? 'secant');
    case 'tension-continuity-bias':
      return shapedSpline(spline, options);
    case 'c2':
      return smoothSpline(spline, options.tolerance ?? 1e-9, options.passes ?? 40);
    case 'b-spline':
      return keyBSpline(spline);
    case 'log-chart':
      return logChartSpline(spline, options.rates ?? 'secant', options.reference);
    default:
      throw new SlewcurveError(
        'spline.unknown-kind',
        'The kind of a rotation spline is one of squad, tension-continuity-bias, c2, b-spline, log-chart.',
      );
  }
}
