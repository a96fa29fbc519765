import type { Curve } from '../curve/curve.js';
import { findSegment } from '../track/find-segment.js';
import { EASES } from './eases.js';
import type { Span } from './span-retiming.js';

/** Below this share of the greatest speed nothing turns, as far as an axis can be told. */
const STILL = 1e-9;

/** A press that is added to a speed: rad/s at its place, fading to nothing at its reach. Seconds. */
export interface AddedSpeed {
  readonly at: number;
  readonly reach: number;
  readonly by: number;
}

/** A motion turned about the axis that it has at each moment at another speed, ω* = n·(v + b)₊. Own axes. */
export interface PressedMotion {
  /** Times at which the press begins or ceases to leave no speed. */
  readonly emptied: readonly number[];
  /** Whether the speed touches zero on its way, where the axis may turn over at once. */
  readonly stops: boolean;
  /** Writes the rate that there was, rad/s. */
  oldRate(out: Float64Array, t: number): void;
  /** Writes the rate as pressed, rad/s. */
  rate(out: Float64Array, t: number): void;
  /** Writes its change, rad/s². */
  acceleration(out: Float64Array, t: number): void;
}

/**
 * The pressed motion of a curve. `times`, ascending, are places along the pressed stretch: where nothing turns, the axis is that of the last place
 * that turns, before the first such place that place's. Undefined where nothing turns at any of them.
 */
export function pressedMotion(
  curve: Curve,
  [from, to]: Span,
  times: Float64Array,
  press: AddedSpeed,
): PressedMotion | undefined {
  const now = new Float64Array(3);
  const axis = new Float64Array(3);
  const speedAt = (t: number): number => {
    curve.rate(now, t, 'own');
    return Math.hypot(now[0], now[1], now[2]);
  };
  const speeds = times.map(speedAt);
  const still = STILL * speeds.reduce((most, speed) => Math.max(most, speed), 0);
  const axes = heldAxes(curve, times, speeds, still);
  if (!axes) return undefined;
  /** Writes the axis at `t` and gives the speed that there was. */
  const direct = (t: number): number => {
    const speed = speedAt(t);
    const held = 3 * Math.max(0, Math.min(times.length - 1, findSegment(times, t)));
    for (let k = 0; k < 3; k++) axis[k] = speed > still ? now[k] / speed : axes[held + k];
    return speed;
  };
  const isPressed = (t: number): boolean => t >= from && t < to;
  const left = (t: number): number => speedAt(t) + addedAt(press, t);
  return {
    emptied: zeros(left, times),
    stops: speeds.some((speed, i) => !(speed > still) && isPressed(times[i])),
    oldRate: (out, t) => void curve.rate(out, t, 'own'),
    rate(out, t) {
      curve.rate(out, t, 'own');
      if (!isPressed(t)) return;
      const speed = Math.max(0, direct(t) + addedAt(press, t));
      for (let k = 0; k < 3; k++) out[k] = axis[k] * speed;
    },
    acceleration(out, t) {
      curve.acceleration(out, t, 'own');
      if (!isPressed(t)) return;
      const speed = direct(t);
      const added = addedAt(press, t);
      if (!(speed + added > 0)) {
        out.fill(0);
        return;
      }
      const along = axis[0] * out[0] + axis[1] * out[1] + axis[2] * out[2];
      // ω̇* = ω̇ + ṅ·b + n·ḃ, with ṅ what of ω̇ is square to n, over v.
      const share = speed > still ? added / speed : 0;
      const rise = slopeAt(press, t);
      for (let k = 0; k < 3; k++) out[k] += share * (out[k] - along * axis[k]) + rise * axis[k];
    },
  };
}

/** The axis at each place, three numbers a place. */
function heldAxes(
  curve: Curve,
  times: Float64Array,
  speeds: Float64Array,
  still: number,
): Float64Array | undefined {
  const first = speeds.findIndex((speed) => speed > still);
  if (first < 0) return undefined;
  const axes = new Float64Array(3 * times.length);
  let from = first;
  speeds.forEach((speed, i) => {
    if (speed > still) from = i;
    const axis = axes.subarray(3 * i, 3 * i + 3);
    curve.rate(axis, times[from], 'own');
    for (let k = 0; k < 3; k++) axis[k] /= speeds[from];
  });
  return axes;
}

function addedAt({ at, reach, by }: AddedSpeed, t: number): number {
  return by * (1 - EASES['minimum-jerk'].position(Math.min(1, Math.abs(t - at) / reach)));
}

function slopeAt({ at, reach, by }: AddedSpeed, t: number): number {
  const off = (t - at) / reach;
  return (-by * Math.sign(off) * EASES['minimum-jerk'].speed(Math.min(1, Math.abs(off)))) / reach;
}

/** Times between places at which a function passes zero. */
function zeros(f: (t: number) => number, times: Float64Array): number[] {
  const found: number[] = [];
  for (let i = 0; i + 1 < times.length; i++) {
    let [low, high] = [times[i], times[i + 1]];
    const isAbove = f(low) > 0;
    if (isAbove === f(high) > 0) continue;
    for (let round = 0; round < 50; round++) {
      const middle = (low + high) / 2;
      if (f(middle) > 0 === isAbove) low = middle;
      else high = middle;
    }
    found.push((low + high) / 2);
  }
  return found;
}
