import type { Curve } from '../curve/curve.js';

/** Mean angular speed over [t0, t1], rad/s: the angle turned over the time. 0 for no time. */
export function meanRate(curve: Curve, t0: number = curve.start, t1: number = curve.end): number {
  return t1 > t0 ? curve.length(t0, t1) / (t1 - t0) : 0;
}

/**
 * The angular speed, rad/s, below which a curve stays for `percent` of its time (0 to 100). The exact speed is asked at the middles of
 * `steps` equal parts of every segment, each counting by its time; say the number with the figure. 0 for a curve of no time.
 */
export function ratePercentile(curve: Curve, percent: number, steps: number = 64): number {
  const speeds: { speed: number; time: number }[] = [];
  const rate = new Float64Array(3);
  for (let i = 0; i + 1 < curve.knots.length; i++) {
    const from = curve.knots[i];
    const step = (curve.knots[i + 1] - from) / steps;
    for (let n = 0; n < steps; n++) {
      curve.rate(rate, from + (n + 0.5) * step, 'own');
      speeds.push({ speed: Math.hypot(rate[0], rate[1], rate[2]), time: step });
    }
  }
  // oxlint-disable-next-line unicorn/no-array-sort -- our own list: sorted where it is, no copy
  speeds.sort((a, b) => a.speed - b.speed);
  const wanted = (percent / 100) * speeds.reduce((sum, { time }) => sum + time, 0);
  let passed = 0;
  for (const { speed, time } of speeds) {
    passed += time;
    if (passed >= wanted) return speed;
  }
  return speeds.at(-1)?.speed ?? 0;
}
