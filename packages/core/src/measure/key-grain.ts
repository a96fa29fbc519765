/** rad/s: faster motion has fourth differences of its own. */
const SLOW = 60 * (Math.PI / 180);
/** Keys on each side over which speed is judged. */
const AROUND = 6;
/** Fewer slow keys tell nothing. */
const FEWEST = 8;
/** Gaps that differ by more than this share are left out. */
const EVEN = 0.02;
/**
 * What white noise of one radian an axis leaves of p = |y₋₂ − 4y₋₁ + 6y₀ − 4y₁ + y₂|/6: each axis √70/6 = 1.394, and the median length
 * of a normal vector of three is 1.538 (the chi distribution of three degrees of freedom).
 */
const MEDIAN_OF_NOISE = 1.538 * (Math.sqrt(70) / 6);

/**
 * Standard deviation of the noise on dense keys, radians an axis: the median over all keys slower than 60 deg/s of what a cubic through the four neighbours
 * misses. 0 where fewer than eight such keys tell it.
 *
 * @param times seconds, ascending
 * @param orientations unit quaternions, four numbers a key, each on the side of the one before
 * @param gap the usual one, seconds; keys at other gaps are left out
 * @param isJoined whether motion runs from a key to the next
 */
export function keyGrain(
  times: Float64Array,
  orientations: Float64Array,
  gap: number,
  isJoined: (key: number) => boolean,
): number {
  const q = orientations;
  const missed = new Float64Array(times.length);
  let count = 0;
  for (let key = 2; key + 2 < times.length; key++) {
    if (!isSlowAt(times, q, key) || !isEven(times, key, gap) || !areJoined(key, isJoined)) continue;
    let square = 0;
    // Twice the chord is the turn here: under 60 deg/s the two differ by less than 1e-4° a key even at 24 frames a second.
    for (let i = 4 * key; i < 4 * key + 4; i++) {
      const d = q[i - 8] - 4 * q[i - 4] + 6 * q[i] - 4 * q[i + 4] + q[i + 8];
      square += d * d;
    }
    missed[count++] = (2 * Math.sqrt(square)) / 6;
  }
  if (count < FEWEST) return 0;
  const ascending = missed.subarray(0, count);
  ascending.sort();
  const middle = count >> 1;
  const median = count % 2 === 1 ? ascending[middle] : (ascending[middle - 1] + ascending[middle]) / 2;
  return median / MEDIAN_OF_NOISE;
}

/** Over some keys on each side, so that the noise itself is not taken for motion. */
function isSlowAt(times: Float64Array, q: Float64Array, key: number): boolean {
  const from = Math.max(0, key - AROUND);
  const to = Math.min(times.length - 1, key + AROUND);
  let square = 0;
  for (let i = 0; i < 4; i++) square += (q[4 * to + i] - q[4 * from + i]) ** 2;
  return 2 * Math.sqrt(square) < SLOW * (times[to] - times[from]);
}

function isEven(times: Float64Array, key: number, gap: number): boolean {
  for (let k = key - 2; k < key + 2; k++)
    if (Math.abs(times[k + 1] - times[k] - gap) > EVEN * gap) return false;
  return true;
}

function areJoined(key: number, isJoined: (key: number) => boolean): boolean {
  return isJoined(key - 2) && isJoined(key - 1) && isJoined(key) && isJoined(key + 1);
}
