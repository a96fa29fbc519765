import type * as contenders from '../contenders/track.js';
import type { TrackCase } from '../contenders/track.js';
import { again } from '../module-copies.js';
import { keyTimes, playbackTimes, scrubTimes, seeded, walk } from '../motion-data.js';
import type { BenchCase } from '../rounds.js';

const own = (): Promise<typeof contenders> => again('contenders/track.js');

/** Times asked in one batch: more than any cache holds the keys of, in the long tracks. */
const SAMPLES = 4000;

/** One track, its segment looked up: forwards at 60 frames a second, and at random times. */
export async function trackCases(): Promise<BenchCase[]> {
  const cases: BenchCase[] = [];
  for (const keys of [10, 100, 10_000, 1_000_000])
    for (const even of [false, true])
      for (const how of ['playback', 'scrub'] as const) cases.push(await trackCase(keys, even, how));
  return cases;
}

async function trackCase(keys: number, even: boolean, how: 'playback' | 'scrub'): Promise<BenchCase> {
  const id = `track-${keys}-${even ? 'even' : 'uneven'}-${how}`;
  const random = seeded(keys + (even ? 1 : 2));
  const times = keyTimes(keys, even, random);
  const values = walk(keys, (5 * Math.PI) / 180, random);
  const at = (how === 'playback' ? playbackTimes : scrubTimes)(times, SAMPLES, random);
  const shared: TrackCase = { tag: id, times, values, at };
  return {
    id,
    title: `one track, ${keys} ${even ? 'even' : 'uneven'} keys, ${how}`,
    unit: 'sample',
    items: SAMPLES,
    contenders: [
      await (await own()).glMatrixSearched(shared),
      await (await own()).threeInterpolant(shared),
      await (await own()).ours(shared, 'float64'),
      await (await own()).ours(shared, 'float32'),
    ],
    pairs: [
      ['ours float64', 'three interpolant'],
      ['ours float32', 'three interpolant'],
      ['ours float64', 'gl-matrix'],
      ['ours float32', 'gl-matrix'],
    ],
  };
}
