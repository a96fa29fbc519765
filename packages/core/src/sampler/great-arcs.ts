import { ARC, writeArc } from './arc-record.js';
import type { SharedTimes } from './group.js';

/**
 * Fills `arcs` with the arcs of LINEAR tracks that share their times, segment after segment, in it track after track, and `keys`
 * likewise with the orientations of the keys, for times that are exactly a key's. `near` is the greatest h of the short
 * polynomials: the first h of a segment is negative where some track turns further in it; only h² is asked for.
 */
export function fillArcs(
  { times, values }: SharedTimes,
  arcs: Float64Array | Float32Array,
  keys: Float64Array | Float32Array,
  near: number,
): void {
  const tracks = values.length;
  for (let key = 0; key < times.length; key++) {
    const first = key * tracks * ARC;
    let far = false;
    values.forEach((own, track) => {
      for (let i = 0; i < 4; i++) keys[4 * (key * tracks + track) + i] = own[4 * key + i];
      if (key + 1 < times.length && writeArc(arcs, first + ARC * track, own, 4 * key) > near) far = true;
    });
    if (far) arcs[first] *= -1;
  }
}
