import type * as contenders from '../contenders/slerp.js';
import { again, coreCopy, glMatrixCopy } from '../module-copies.js';
import { seeded, randomOrientation, turned } from '../motion-data.js';
import type { BenchCase } from '../rounds.js';

const own = (): Promise<typeof contenders> => again('contenders/slerp.js');

const PAIRS = 2048;

/** One slerp a call, pairs in cache. */
export async function slerpCases(): Promise<BenchCase[]> {
  const cases: BenchCase[] = [];
  const bands = [
    ['slerp-small', '0.2° to 3°', 0.2, 3, false],
    ['slerp-middle', '5° to 60°', 5, 60, false],
    ['slerp-all', '0° to 180°, half of them with one sign turned', 0, 180, true],
  ] as const;
  for (const [id, title, low, high, flipped] of bands) {
    const random = seeded(low * 1000 + high);
    const from = Array.from({ length: PAIRS }, () => randomOrientation(random));
    const to = from.map((q) => {
      const b = turned(q, ((low + (high - low) * random()) * Math.PI) / 180, random);
      return flipped && random() < 0.5 ? b.map((number) => -number) : b;
    });
    const parts = Float64Array.from({ length: PAIRS }, random);
    const [fromPlain, toPlain] = [from, to].map((list) => list.map((q) => Array.from(q)));
    cases.push({
      id,
      title: `one slerp, ${title}`,
      unit: 'slerp',
      items: PAIRS,
      contenders: [
        (await own()).callEach(
          'gl-matrix Float32Array',
          (await glMatrixCopy(`${id}-32`)).slerp,
          from,
          to,
          parts,
          new Float32Array(4),
        ),
        (await own()).callEach(
          'gl-matrix number[]',
          (await glMatrixCopy(`${id}-plain`)).slerp,
          fromPlain,
          toPlain,
          parts,
          [0, 0, 0, 0],
        ),
        await (await own()).threeObjects(id, from, to, parts),
        await (await own()).threeFlat(id, from, to, parts),
        (await own()).callEach(
          'ours Float32Array',
          (await coreCopy(`${id}-32`)).slerp,
          from,
          to,
          parts,
          new Float32Array(4),
        ),
        (await own()).callEach(
          'ours number[]',
          (await coreCopy(`${id}-plain`)).slerp,
          fromPlain,
          toPlain,
          parts,
          [0, 0, 0, 0],
        ),
      ],
      pairs: [
        ['ours Float32Array', 'gl-matrix Float32Array'],
        ['ours number[]', 'gl-matrix number[]'],
        ['ours number[]', 'three slerpQuaternions'],
        ['ours Float32Array', 'three slerpFlat'],
      ],
    });
  }
  return cases;
}
