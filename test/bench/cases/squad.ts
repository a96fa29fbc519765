import type * as contenders from '../contenders/squad.js';
import { again } from '../module-copies.js';
import { keyTimes, scrubTimes, seeded, walk } from '../motion-data.js';
import type { BenchCase } from '../rounds.js';

const own = (): Promise<typeof contenders> => again('contenders/squad.js');

const SAMPLES = 2000;
const KEYS = 60;

/** Squad through the keys of one track, compiled, one call a pair of keys, and gl-matrix's `sqlerp`. */
export async function squadCases(): Promise<BenchCase[]> {
  const cases: BenchCase[] = [];
  for (const degrees of [5, 30]) {
    const id = `squad-${degrees}`;
    const random = seeded(degrees);
    const times = keyTimes(KEYS, true, random);
    const values = walk(KEYS, (degrees * Math.PI) / 180, random);
    const at = scrubTimes(times, SAMPLES, random);
    cases.push({
      id,
      title: `squad, ${KEYS} keys about ${degrees}° apart, random times`,
      unit: 'squad',
      items: SAMPLES,
      contenders: [
        await (await own()).glMatrixSqlerp(id, times, values, at),
        await (await own()).ours(id, times, values, at),
      ],
      pairs: [['ours compiled', 'gl-matrix sqlerp']],
    });
  }
  return cases;
}
