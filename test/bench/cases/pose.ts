import type * as contenders from '../contenders/pose.js';
import type { PoseCase } from '../contenders/pose.js';
import { again } from '../module-copies.js';
import { keyTimes, playbackTimes, scrubTimes, seeded, walk } from '../motion-data.js';
import type { BenchCase } from '../rounds.js';

const own = (): Promise<typeof contenders> => again('contenders/pose.js');

const JOINTS = 80;
const POSES = 50;

/** 80 joints at one time, all with the same key times, as exported motion has them. */
export async function sharedKeyPoses(): Promise<BenchCase[]> {
  const cases: BenchCase[] = [];
  const kinds = [
    ['pose-60-playback', 60, 5, 'playback'],
    ['pose-60-scrub', 60, 5, 'scrub'],
    ['pose-60-scrub-wide', 60, 60, 'scrub'],
    ['pose-60-scrub-small', 60, 0.6, 'scrub'],
    ['pose-5400-scrub', 5400, 5, 'scrub'],
  ] as const;
  for (const [id, keys, degrees, how] of kinds) {
    const random = seeded(keys * 1000 + degrees);
    const times = keyTimes(keys, true, random);
    const pick = how === 'playback' ? playbackTimes : scrubTimes;
    const shared: PoseCase = {
      tag: id,
      keyTimes: times,
      joints: Array.from({ length: JOINTS }, () => walk(keys, (degrees * Math.PI) / 180, random)),
      at: pick(times, POSES, random),
    };
    cases.push({
      id,
      title: `80 joints, ${keys} shared keys about ${degrees}° apart, ${how}`,
      unit: 'joint',
      items: JOINTS * POSES,
      contenders: [
        await (await own()).glMatrixViews(shared),
        await (await own()).threeFlat(shared),
        await (await own()).threeEach(shared),
        await (await own()).ours(shared, 'float64'),
        await (await own()).ours(shared, 'float32'),
      ],
      pairs: [
        ['ours float64', 'gl-matrix'],
        ['ours float32', 'gl-matrix'],
        ['ours float64', 'three, slerpFlat'],
        ['ours float32', 'three, slerpFlat'],
        ['ours float64', 'three, 80 interpolants'],
        ['ours float32', 'three, 80 interpolants'],
      ],
    });
  }
  return cases;
}
