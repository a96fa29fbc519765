import { writeKeys, type SharedTimes, type WriteGroup } from './group.js';
import { locate, timeLookup } from './time-lookup.js';

/** STEP tracks: the key at or before `t`, to the bit. */
export function step({ times, values, slots }: SharedTimes): WriteGroup {
  const lookup = timeLookup(times);
  const [start, end] = lookup.span;
  const stride = 4 * values.length;
  const keys = new Float64Array(stride * times.length);
  values.forEach((track, i) => {
    for (let at = 0; at < track.length; at++) keys[(at >> 2) * stride + 4 * i + (at & 3)] = track[at];
  });
  return (t, out, at) => {
    const key = !(t > start) ? 0 : t >= end ? times.length - 1 : locate(lookup, t);
    writeKeys(keys, key * stride, slots, out, at);
  };
}
