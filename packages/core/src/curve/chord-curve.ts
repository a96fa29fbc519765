import { unitScale } from '../quaternion/unit-scale.js';
import { keyOrientation, valueOffset } from '../track/key-orientation.js';
import { playableTrack } from '../track/playable-track.js';
import type { RotationTrack } from '../track/rotation-track.js';
import type { NumberStore } from '../number-store.js';
import type { Curve } from './curve.js';
import { integrate } from './integrate.js';
import { durations, segmentedCurve, type SegmentMotion } from './segmented-curve.js';
import { copyKey, unitKeys } from './unit-keys.js';

/**
 * Chords between the keys, made unit at every time (`nlerp`), sign-safe: the short way, slower at a segment's ends than in its
 * middle. Keys that cannot be played are left out (`playableTrack`).
 */
export function chordCurve(track: RotationTrack): Curve {
  const played = playableTrack(track);
  return joinedByChords(played, unitKeys(played), true);
}

/**
 * Chords between the stored numbers, made unit at every time, no care taken of signs or lengths: across a sign change the turn
 * goes the long way through numbers of almost no length. Where they have none at all, the orientation of the key before stands.
 */
export function rawChordCurve(track: RotationTrack): Curve {
  const played = playableTrack(track);
  return joinedByChords(played, storedNumbers(played), false);
}

/** The four numbers of each key as stored, or its orientation where it does not store a quaternion. */
export function storedNumbers(track: RotationTrack): Float64Array {
  if (track.interpolation === 'EULER') return unitKeys(track);
  const keys = new Float64Array(4 * track.times.length);
  for (let key = 0; key < track.times.length; key++) {
    const at = valueOffset(track, key);
    const numbers = track.values.subarray(at, at + 4);
    // An orientation does not change with its length; numbers whose squares would leave float64 are brought back first.
    if (Math.hypot(...numbers) > 1e70) keys.set(keyOrientation(new Float64Array(4), track, key), 4 * key);
    else keys.set(numbers, 4 * key);
  }
  return keys;
}

function joinedByChords(track: RotationTrack, keys: Float64Array, signSafe: boolean): Curve {
  return segmentedCurve({
    times: track.times,
    breaks: track.breaks,
    continuity: 0,
    key: (out, key) => void keyOrientation(out, track, key),
    motion: chordMotion(keys, durations(track.times), signSafe),
  });
}

/**
 * A chord p = (1 − u)p₀ + u p₁ stays in the plane of its ends, so with v = vec(p₀*p₁), constant:
 * ω = 2v/(h|p|²), since ω = 2 vec(p*p′)/|p|² for any 4-vector curve made unit, ω′ = −ω·(|p|²)′/|p|², and the angle turned since
 * p₀ is 2·atan2(u|v|, (1 − u)|p₀|² + u p₀·p₁). The speed is greatest where |p| is least.
 */
function chordMotion(keys: Float64Array, gaps: Float64Array, signSafe: boolean): SegmentMotion {
  const a = new Float64Array(4);
  const b = new Float64Array(4);
  const p = new Float64Array(4);
  let dot = 0;
  let sine = 0;
  let least = 0;

  function load(i: number): void {
    copyKey(a, keys, i);
    copyKey(b, keys, i + 1);
    dot = a[0] * b[0] + a[1] * b[1] + a[2] * b[2] + a[3] * b[3];
    if (signSafe && dot < 0) {
      copyKey(b, keys, i + 1, -1);
      dot = -dot;
    }
  }
  function loadAt(i: number, u: number): number {
    load(i);
    for (let k = 0; k < 4; k++) p[k] = (1 - u) * a[k] + u * b[k];
    return p[0] * p[0] + p[1] * p[1] + p[2] * p[2] + p[3] * p[3];
  }
  function axis(out: NumberStore): void {
    out[0] = a[3] * b[0] - a[0] * b[3] - (a[1] * b[2] - a[2] * b[1]);
    out[1] = a[3] * b[1] - a[1] * b[3] - (a[2] * b[0] - a[0] * b[2]);
    out[2] = a[3] * b[2] - a[2] * b[3] - (a[0] * b[1] - a[1] * b[0]);
    sine = Math.sqrt(out[0] ** 2 + out[1] ** 2 + out[2] ** 2);
    // The chord passes zero at the distance |v|/|p₁ − p₀|; half of its square keeps a rounded p from making a rate infinite.
    least = Math.max(
      (0.5 * sine * sine) / (chord(0) ** 2 + chord(1) ** 2 + chord(2) ** 2 + chord(3) ** 2),
      1e-60,
    );
  }
  const chord = (k: number): number => b[k] - a[k];
  const v = new Float64Array(3);

  return {
    orientation(out, i, u) {
      loadAt(i, u);
      let scale = unitScale(p[0], p[1], p[2], p[3]);
      if (scale === 0) {
        p.set(a);
        scale = unitScale(p[0], p[1], p[2], p[3]);
      }
      for (let k = 0; k < 4; k++) out[k] = p[k] * scale;
    },
    rate(out, i, u) {
      const squared = loadAt(i, u);
      axis(v);
      for (let k = 0; k < 3; k++) out[k] = sine === 0 ? 0 : (2 * v[k]) / (gaps[i] * Math.max(squared, least));
    },
    acceleration(out, i, u) {
      const exact = loadAt(i, u);
      const slope = 2 * (p[0] * chord(0) + p[1] * chord(1) + p[2] * chord(2) + p[3] * chord(3));
      axis(v);
      const squared = Math.max(exact, least);
      const scale = sine === 0 ? 0 : ((-2 / gaps[i]) * (slope / squared)) / (gaps[i] * squared);
      for (let k = 0; k < 3; k++) out[k] = v[k] * scale;
    },
    length(i, u0, u1) {
      load(i);
      axis(v);
      const squared = a[0] * a[0] + a[1] * a[1] + a[2] * a[2] + a[3] * a[3];
      const turned = (u: number): number => Math.atan2(u * sine, (1 - u) * squared + u * dot);
      return sine === 0 ? 0 : 2 * (turned(u1) - turned(u0));
    },
    peakAt(i, u0, u1) {
      load(i);
      const { nearest, squared } = nearestToZero(a, b);
      return squared === 0 ? u0 : Math.max(u0, Math.min(u1, nearest));
    },
    accelerationOver(i) {
      load(i);
      axis(v);
      const { nearest, squared } = nearestToZero(a, b);
      return sine === 0
        ? { u: 0, peak: 0, meanSquare: 0 }
        : chordAcceleration(nearest, sine / squared, gaps[i]);
    },
  };
}

/** Fraction of the line through a and b that is nearest to zero, and the square of the chord's length. */
function nearestToZero(a: Float64Array, b: Float64Array): { nearest: number; squared: number } {
  let along = 0;
  let squared = 0;
  for (let k = 0; k < 4; k++) {
    along -= a[k] * (b[k] - a[k]);
    squared += (b[k] - a[k]) ** 2;
  }
  return { nearest: along / squared, squared };
}

/**
 * With x = u − `nearest`, where the chord is nearest to zero, and m its distance there, both over its length, |p|² ∝ x² + m² and
 * |ω′| = 4m|x| / (h²(x² + m²)²): greatest at x = ±m/√3, and with x = m tan θ the integral of its square over x is
 * 16/(m³h⁴) ∫ sin²θ cos⁴θ dθ (derived for this project; checked against dense sums).
 */
function chordAcceleration(
  nearest: number,
  m: number,
  h: number,
): { u: number; peak: number; meanSquare: number } {
  const size = (u: number): number => {
    const x = u - nearest;
    return ((4 / h) * ((m * Math.abs(x)) / (x * x + m * m) / (x * x + m * m))) / h;
  };
  const turning = [nearest - m / Math.sqrt(3), nearest + m / Math.sqrt(3)].filter((u) => u > 0 && u < 1);
  const u = [0, ...turning, 1].reduce((best, other) => (size(other) > size(best) ? other : best));
  const share = integrate(
    (angle) => (Math.sin(angle) * Math.cos(angle) ** 2) ** 2,
    Math.atan(-nearest / m),
    Math.atan((1 - nearest) / m),
  );
  const scale = 4 / (h * h);
  return { u, peak: size(u), meanSquare: ((scale / m) * (scale / m) * share) / m };
}
