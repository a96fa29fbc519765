/*
 * Great arcs without a sine, a square root or a division at sampling time. With Ω the angle between two unit quaternions (half the
 * turn between the orientations), h = Ω/2 and k = 2u − 1, K. Shoemake's weights (SIGGRAPH 1985) are
 *
 *   sin((1−u)Ω)/sin Ω = cos(hk)/(2 cos h) − sin(hk)/(2 sin h)
 *   sin(uΩ)/sin Ω     = cos(hk)/(2 cos h) + sin(hk)/(2 sin h)
 *
 * (the sine of a sum over the sine of a double angle), so that the orientation is
 *
 *   cos(hk) · (q₀ + q₁)/(2 cos h) + k · sin(hk)/(hk) · (q₁ − q₀)·h/(2 sin h)
 *
 * h and the two quaternions are stored with the segment; cos(hk) and sin(hk)/(hk) are the polynomials below in v = (hk)². Nothing
 * is singular at h = 0, and h is at most π/4: the short way is at most half a turn.
 *
 * The coefficients are fitted, and fitted again by the tests, in test/core/sampler/half-angle.test.ts. Errors are absolute.
 */

/** v ≤ π²/16, 9.5e-17 and 1.2e-17. Summed in pairs, so that the multiplications need not wait for each other. */
export function cosineWide64(v: number): number {
  const vv = v * v;
  return (
    1 -
    v * 0.4999999999999925 +
    vv * (0.04166666666647229 - v * 0.0013888888869977203) +
    vv * vv * (0.000024801578537896428 - v * 2.7555233758347315e-7 + vv * 2.0630445898727675e-9)
  );
}

export function sineWide64(v: number): number {
  const vv = v * v;
  return (
    1 -
    v * 0.16666666666666616 +
    vv * (0.008333333333320361 - v * 0.00019841269828648964) +
    vv * vv * (0.0000027557313375841273 - v * 2.505071687324723e-8 + vv * 1.5894730103714056e-10)
  );
}

/** Greatest h of `cosineNear64` and `sineNear64`: turns up to 14.2° between keys, as baked animation has. */
export const NEAR_64 = 0.062;

/** v ≤ NEAR_64², 8.5e-17 and 9.4e-18. */
export function cosineNear64(v: number): number {
  return 1 - v * 0.49999999999964784 + v * v * (0.041666666208607615 - v * 0.0013886982257377);
}

export function sineNear64(v: number): number {
  return 1 - v * 0.16666666666662755 + v * v * (0.008333333282437141 - v * 0.00019839151338677433);
}

/** v ≤ π²/16, 2.8e-8 and 3.1e-9: below the rounding of a float32 (6e-8). */
export function cosineWide32(v: number): number {
  return (
    0.9999999723670755 - v * 0.49999856523043695 + v * v * (0.041655019039857924 - v * 0.0013585819693724152)
  );
}

export function sineWide32(v: number): number {
  return (
    0.9999999969210367 - v * 0.16666650682753953 + v * v * (0.008332036122427326 - v * 0.00019503936149151482)
  );
}

/** Greatest h of `cosineNear32` and `sineNear32`: turns up to 45.8° between keys. */
export const NEAR_32 = 0.2;

/** v ≤ NEAR_32², 5.6e-9 and 8e-10. The first coefficient is 1, so that a segment that does not turn holds its key to the bit. */
export function cosineNear32(v: number): number {
  return 1 - v * (0.4999987513881451 - v * 0.041583402744719326);
}

export function sineNear32(v: number): number {
  return 1 - v * (0.16666648824949146 - v * 0.008321436284472496);
}

/** Greatest sin²h of `arcOverSine64`: 63.6° between the orientations. */
export const NEAR_SINE_64 = 0.075;

/** h / sin h from s = sin²h ≤ NEAR_SINE_64, 1.6e-17: for arcs whose h is known only when they are sampled. */
export function arcOverSine64(s: number): number {
  const ss = s * s;
  return (
    1 +
    s * 0.16666666666665017 +
    ss * (0.07500000000583387 + s * 0.04464285634917489) +
    ss *
      ss *
      (0.0303819984245349 +
        s * 0.02237010345018458 +
        ss * (0.017398490352411117 + s * 0.013378673572309105)) +
    ss * ss * ss * ss * 0.01549045964277512
  );
}
