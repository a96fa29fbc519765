import { type Curve, angleBetween } from '@slewcurve/core';

/** How the rate steps at one knot, spread over half of either gap: 2(ω₊ − ω₋)/(h₋ + h₊), rad/s², own axes. */
export interface AccelerationStep {
  readonly time: number;
  /** Seconds over which it is spread. */
  readonly share: number;
  readonly vector: Float64Array;
}

/** Share of a gap by which the side before a knot is looked at. */
const JUST = 1e-9;

/** The step at every inner knot of a curve between two pieces that are played, in the order of time. */
export function accelerationSteps(curve: Curve): AccelerationStep[] {
  const { knots } = curve;
  const [before, after] = [new Float64Array(3), new Float64Array(3)];
  const steps: AccelerationStep[] = [];
  for (let i = 1; i + 1 < knots.length; i++) {
    const [early, time, late] = [knots[i - 1] ?? 0, knots[i] ?? 0, knots[i + 1] ?? 0];
    const just = time - JUST * (time - early);
    if (jumps(curve, just, time) || jumps(curve, late - JUST * (late - time), late)) continue;
    curve.rate(before, just, 'own');
    curve.rate(after, time, 'own');
    const share = (late - early) / 2;
    steps.push({ time, share, vector: after.map((part, k) => (part - (before[k] ?? 0)) / share) });
  }
  return steps;
}

/** A pose that is held and jumps: a cut, not a motion. */
function jumps(curve: Curve, just: number, time: number): boolean {
  if (curve.continuity >= 0) return false;
  const [a, b] = [new Float64Array(4), new Float64Array(4)];
  return angleBetween(curve.orientation(a, just), curve.orientation(b, time)) > 1e-6;
}
