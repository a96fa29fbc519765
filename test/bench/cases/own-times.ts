import type * as contenders from '../contenders/own-times.js';
import type { OwnTimes } from '../contenders/own-times.js';
import { again } from '../module-copies.js';
import { keyTimes, playbackTimes, scrubTimes, seeded, walk } from '../motion-data.js';
import type { BenchCase } from '../rounds.js';

const own = (): Promise<typeof contenders> => again('contenders/own-times.js');

const JOINTS = 80;
const POSES = 50;

/** 80 joints at one time, each with uneven key times of its own. */
export async function ownTimePoses(): Promise<BenchCase[]> {
  const cases: BenchCase[] = [];
  for (const keys of [60, 5400])
    for (const how of ['playback', 'scrub'] as const) {
      const id = `own-times-${keys}-${how}`;
      const random = seeded(keys + 17);
      const joints = Array.from({ length: JOINTS }, () => ({
        times: keyTimes(keys, false, random),
        values: walk(keys, (5 * Math.PI) / 180, random),
      }));
      const pick = how === 'playback' ? playbackTimes : scrubTimes;
      const shared: OwnTimes = { tag: id, joints, at: pick(joints[0].times, POSES, random) };
      cases.push({
        id,
        title: `80 joints, ${keys} uneven keys of their own, ${how}`,
        unit: 'joint',
        items: JOINTS * POSES,
        contenders: [
          await (await own()).threeEach(shared),
          await (await own()).ours(shared, 'float64'),
          await (await own()).ours(shared, 'float32'),
        ],
        pairs: [
          ['ours float64', 'three, 80 interpolants'],
          ['ours float32', 'three, 80 interpolants'],
        ],
      });
    }
  return cases;
}
