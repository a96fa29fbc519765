import type { AngleProfile } from './angle-profile.js';
import type { Ease } from './ease.js';

/** `angle` radians in `seconds` by an ease that never runs back. */
export function easedProfile(angle: number, seconds: number, ease: Ease): AngleProfile {
  const speed = angle / seconds;
  return {
    seconds,
    knots: ease.knots.map((knot) => knot * seconds),
    continuity: ease.jumps === 'speed' ? 0 : ease.jumps === 'acceleration' ? 1 : 2,
    angleAt: (t) => (t >= seconds ? angle : Math.max(0, angle * ease.position(Math.max(0, t / seconds)))),
    timeOf: (wanted) => seconds * shareOf(ease, angle > 0 ? wanted / angle : 0),
    speedAt: (t) => speed * ease.speed(t / seconds),
    accelerationAt: (t) => (speed / seconds) * ease.acceleration(t / seconds),
  };
}

/** The share of time by which a share of the turn is done: Newton inside a bracket. */
function shareOf(ease: Ease, wanted: number): number {
  if (!(wanted > 0)) return 0;
  if (wanted >= 1) return 1;
  let low = 0;
  let high = 1;
  let u = wanted;
  for (let i = 0; i < 100; i++) {
    const miss = ease.position(u) - wanted;
    if (miss === 0) return u;
    if (miss > 0) high = u;
    else low = u;
    const next = u - miss / ease.speed(u);
    const after = next > low && next < high ? next : (low + high) / 2;
    if (Math.abs(after - u) <= 1e-16) return after;
    u = after;
  }
  return u;
}
