import type { NumberStore, ReadonlyNumberStore } from '../number-store.js';

/*
 * Between a rotation vector r(t) and the rate ω (own axes) of q = Q·Exp(r(t)), θ = |r|:
 *   ω = J r′,  ω′ = J r″ + N(r, r′),  J = I − (1 − cos θ)/θ² [r] + (θ − sin θ)/θ³ [r]²
 * J from J. Solà et al., "A micro Lie theory", arXiv 1812.01537 (formulae from memory); N derived, the terms as in SciPy 1.10.1's
 * RotationSpline. Below 0.05 rad the differences lose digits and three terms of their series are exact to float64.
 */
const SERIES_BELOW = 0.05;

/** J·v: the own-axes rate of `Exp(r)` where `r` changes by `v`. Three numbers; `out` may be `v`, not `r`. */
export function chartToRate<T extends NumberStore>(
  out: T,
  r: ReadonlyNumberStore,
  v: ReadonlyNumberStore,
): T {
  const squared = r[0] * r[0] + r[1] * r[1] + r[2] * r[2];
  const angle = Math.sqrt(squared);
  const half = Math.sin(angle / 2);
  const once = angle < SERIES_BELOW ? 0.5 - squared / 24 + squared ** 2 / 720 : (2 * half * half) / squared;
  return bend(out, r, v, -once, sineGap(angle, squared));
}

/** J⁻¹·w: how `r` changes where `Exp(r)` turns at the own-axes rate `w`. Without bound near |r| = 2π. `out` may be `w`, not `r`. */
export function rateToChart<T extends NumberStore>(
  out: T,
  r: ReadonlyNumberStore,
  w: ReadonlyNumberStore,
): T {
  const squared = r[0] * r[0] + r[1] * r[1] + r[2] * r[2];
  const half = Math.sqrt(squared) / 2;
  const twice =
    half < SERIES_BELOW / 2
      ? 1 / 12 + squared / 720 + squared ** 2 / 30240
      : (1 - (half * Math.cos(half)) / Math.sin(half)) / squared;
  return bend(out, r, w, 0.5, twice);
}

/**
 * N(r, r′): the part of the own-axes acceleration of `Exp(r)` that comes of `r` turning itself:
 * (r·r′)(k₁c + k₂ r×c) + k₃ r′×c, c = r×r′. `out` may be neither input.
 */
export function chartTwist<T extends NumberStore>(out: T, r: ReadonlyNumberStore, v: ReadonlyNumberStore): T {
  const squared = r[0] * r[0] + r[1] * r[1] + r[2] * r[2];
  const angle = Math.sqrt(squared);
  const along = r[0] * v[0] + r[1] * v[1] + r[2] * v[2];
  const small = angle < SERIES_BELOW;
  const sine = Math.sin(angle);
  const cosine = Math.cos(angle);
  const k1 = small
    ? 1 / 12 - squared / 180 + squared ** 2 / 6720
    : (2 - 2 * cosine - angle * sine) / squared ** 2;
  const k2 = small
    ? -1 / 60 + squared / 1260 - squared ** 2 / 60480
    : (3 * sine - 2 * angle - angle * cosine) / (squared * squared * angle);
  const k3 = sineGap(angle, squared);
  const cx = r[1] * v[2] - r[2] * v[1];
  const cy = r[2] * v[0] - r[0] * v[2];
  const cz = r[0] * v[1] - r[1] * v[0];
  out[0] = along * (k1 * cx + k2 * (r[1] * cz - r[2] * cy)) + k3 * (v[1] * cz - v[2] * cy);
  out[1] = along * (k1 * cy + k2 * (r[2] * cx - r[0] * cz)) + k3 * (v[2] * cx - v[0] * cz);
  out[2] = along * (k1 * cz + k2 * (r[0] * cy - r[1] * cx)) + k3 * (v[0] * cy - v[1] * cx);
  return out;
}

/** (θ − sin θ)/θ³ */
function sineGap(angle: number, squared: number): number {
  return angle < SERIES_BELOW
    ? 1 / 6 - squared / 120 + squared ** 2 / 5040
    : (angle - Math.sin(angle)) / (squared * angle);
}

/** v + once·r×v + twice·r×(r×v) */
function bend<T extends NumberStore>(
  out: T,
  r: ReadonlyNumberStore,
  v: ReadonlyNumberStore,
  once: number,
  twice: number,
): T {
  const vx = v[0];
  const vy = v[1];
  const vz = v[2];
  const cx = r[1] * vz - r[2] * vy;
  const cy = r[2] * vx - r[0] * vz;
  const cz = r[0] * vy - r[1] * vx;
  out[0] = vx + once * cx + twice * (r[1] * cz - r[2] * cy);
  out[1] = vy + once * cy + twice * (r[2] * cx - r[0] * cz);
  out[2] = vz + once * cz + twice * (r[0] * cy - r[1] * cx);
  return out;
}
