import type { Curve } from '../curve/curve.js';
import type { AngleProfile } from './angle-profile.js';
import type { Span } from './span-retiming.js';
import type { TurnedAngle } from './turned-angle.js';

/**
 * The profile of another curve's pace over a span, spread over `angle` radians and `seconds`: v₂(u) = v₁(u)·(S₂/T₂)/(S₁/T₁) with u the share of the
 * time. The curve has to turn in that span.
 */
export function copiedProfile(
  curve: Curve,
  turned: TurnedAngle,
  [from, to]: Span,
  angle: number,
  seconds: number,
): AngleProfile {
  const before = turned.angleAt(from);
  const whole = turned.angleAt(to) - before;
  const slower = (to - from) / seconds;
  const scale = angle / whole;
  const rate = new Float64Array(3);
  const acceleration = new Float64Array(3);
  const there = (t: number): number => (t >= seconds ? to : from + Math.max(0, t) * slower);
  const inside = [...curve.knots].filter((knot) => knot > from && knot < to);
  return {
    seconds,
    knots: [0, ...inside.map((knot) => (knot - from) / slower), seconds],
    // Where a speed touches zero it has a corner, however smooth the motion is.
    continuity: curve.continuity >= 1 ? 1 : 0,
    angleAt: (t) =>
      t >= seconds ? angle : Math.min(angle, Math.max(0, scale * (turned.angleAt(there(t)) - before))),
    timeOf: (wanted) => {
      if (!(wanted > 0)) return 0;
      if (wanted >= angle) return Math.min(seconds, (turned.timeAt(before + whole) - from) / slower);
      return (turned.timeAt(before + wanted / scale) - from) / slower;
    },
    speedAt(t) {
      curve.rate(rate, there(t), 'own');
      return scale * slower * Math.hypot(rate[0], rate[1], rate[2]);
    },
    accelerationAt(t) {
      curve.rate(rate, there(t), 'own');
      curve.acceleration(acceleration, there(t), 'own');
      const speed = Math.hypot(rate[0], rate[1], rate[2]);
      const along = rate[0] * acceleration[0] + rate[1] * acceleration[1] + rate[2] * acceleration[2];
      return speed > 0 ? (scale * slower * slower * along) / speed : 0;
    },
  };
}
