import { rotateVector } from '@slewcurve/core';

export type Vector = readonly [number, number, number];
type Quaternion = readonly [number, number, number, number];

/** From where the globe is looked at: degrees round from the front (+z) towards +x, and up from the horizon. */
export interface View {
  readonly round: number;
  readonly up: number;
}

/** Three quarters from the front and a little above. */
export const FIRST_VIEW: View = { round: 30, up: 22 };

/** A point as seen: right and up in globe radii, `near` towards the eye (below 0: behind the globe's middle). */
export interface Seen {
  readonly right: number;
  readonly up: number;
  readonly near: number;
}

/** A vector in parent axes as seen from far away (parallel lines stay parallel): right-handed, +y up. */
export function seenFrom(view: View, v: Vector): Seen {
  const a = (view.round * Math.PI) / 180;
  const e = (view.up * Math.PI) / 180;
  // Turned by −round about y, then by up about x.
  const x = v[0] * Math.cos(a) - v[2] * Math.sin(a);
  const z = v[0] * Math.sin(a) + v[2] * Math.cos(a);
  return {
    right: x,
    up: v[1] * Math.cos(e) - z * Math.sin(e),
    near: v[1] * Math.sin(e) + z * Math.cos(e),
  };
}

/** A view turned by hand: degrees round and up; up is held short of the poles, where round means nothing. */
export function turnView(view: View, round: number, up: number): View {
  const turned = (view.round + round) % 360;
  return { round: turned < 0 ? turned + 360 : turned, up: Math.min(85, Math.max(-85, view.up + up)) };
}

/** Where the tip of an own axis stands in parent axes. */
export function tipOf(orientation: Quaternion, axis: Vector): Vector {
  return rotateVector<[number, number, number]>([0, 0, 0], orientation, axis);
}

/** Times of the cross-ticks of a path, every `step` seconds of the file's own clock. */
export function crossTicks(from: number, to: number, step: number): number[] {
  const first = Math.ceil(from / step - 1e-9);
  const last = Math.floor(to / step + 1e-9);
  return Array.from({ length: Math.max(0, last - first + 1) }, (_, i) => (first + i) * step);
}

/** Points of the horizon, a level ring through the globe's middle. */
export function horizonRing(count = 72): Vector[] {
  return Array.from({ length: count + 1 }, (_, i) => {
    const a = (i / count) * 2 * Math.PI;
    return [Math.sin(a), 0, Math.cos(a)];
  });
}
