import { type RotationTrack, angleBetween, playAs } from '@slewcurve/core';
import { DEGREES } from '../edit-result.js';
import type { EditProof } from '../proof.js';
import { storedValue } from '../stored-key.js';
import type { Repaced } from '../verb.js';
import { stored } from './new-keys.js';

/** Samples in each segment of the re-timed track. */
const SAMPLES = 8;

/** Degrees: see `proveEdit`. Shifted float32 times round by 4e-6 s at a minute, so beyond the span the motion is shown to that. */
const OUTSIDE_LIMIT = 1e-7;
const TIME_ROUNDING = 2 ** -23;

/**
 * Proves a pace edit: the old motion at the old time against the new one. Beyond the span that it acted on nothing but the clock may be other; keys there
 * and kept keys must have their stored values. Inside, the difference is the price.
 */
export function provePace(
  before: RotationTrack,
  after: RotationTrack,
  { retiming, acted }: Repaced,
  keep: readonly number[],
): EditProof {
  const travelled = new Map<number, number>();
  after.times.forEach((time, key) => travelled.set(time, key));
  const kept = new Set(keep);
  const strays: number[] = [];
  const keptChanged: number[] = [];
  before.times.forEach((time, key) => {
    const isOutside = time < acted[0] || time > acted[1];
    if (!isOutside && !kept.has(key)) return;
    const at = travelled.get(stored(before, retiming.newTime(time)));
    const isSame =
      at !== undefined &&
      storedValue(after, at).every((part, i) => Object.is(part, storedValue(before, key)[i]));
    if (isSame) return;
    if (isOutside) strays.push(key);
    if (kept.has(key)) keptChanged.push(key);
  });
  const found = { outside: 0, outsideAt: NaN, inside: 0, insideAt: NaN };
  const [was, is] = [playAs(before, 'as-written'), playAs(after, 'as-written')];
  const [p, q] = [new Float64Array(4), new Float64Array(4)];
  let limit = OUTSIDE_LIMIT;
  for (let key = 0; key + 1 < after.times.length; key++)
    for (let sample = 0; sample < SAMPLES; sample++) {
      const t = after.times[key] + ((after.times[key + 1] - after.times[key]) * (sample + 0.5)) / SAMPLES;
      const old = retiming.oldTime(t);
      const angle = angleBetween(was.orientation(p, old), is.orientation(q, t)) * DEGREES;
      const isInside = old >= acted[0] && old <= acted[1];
      if (isInside && angle > found.inside) [found.inside, found.insideAt] = [angle, t];
      if (!isInside && angle > found.outside) {
        [found.outside, found.outsideAt] = [angle, t];
        limit = OUTSIDE_LIMIT + 2 * TIME_ROUNDING * Math.abs(t) * was.peak(was.start, was.end).rate * DEGREES;
      }
    }
  const holds = strays.length === 0 && keptChanged.length === 0 && found.outside <= limit;
  return { holds, strays, keptChanged, sameTimes: false, ...found };
}
