import { coreCopy, glMatrixCopy, threeCopy } from '../module-copies.js';
import { randomOrientation, seeded, turned } from '../motion-data.js';
import type { BenchCase, Contender } from '../rounds.js';

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
        callEach(
          'gl-matrix Float32Array',
          (await glMatrixCopy(`${id}-32`)).slerp,
          from,
          to,
          parts,
          new Float32Array(4),
        ),
        callEach(
          'gl-matrix number[]',
          (await glMatrixCopy(`${id}-plain`)).slerp,
          fromPlain,
          toPlain,
          parts,
          [0, 0, 0, 0],
        ),
        await threeObjects(id, from, to, parts),
        await threeFlat(id, from, to, parts),
        callEach(
          'ours Float32Array',
          (await coreCopy(`${id}-32`)).slerp,
          from,
          to,
          parts,
          new Float32Array(4),
        ),
        callEach(
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

function callEach<Q extends Float32Array | number[]>(
  name: string,
  slerp: (out: Q, a: Q, b: Q, t: number) => unknown,
  from: readonly Q[],
  to: readonly Q[],
  parts: Float64Array,
  out: Q,
): Contender {
  return {
    name,
    run: () => {
      let sum = 0;
      for (let i = 0; i < from.length; i++) {
        slerp(out, from[i], to[i], parts[i]);
        sum += out[0];
      }
      return sum;
    },
  };
}

async function threeObjects(
  id: string,
  from: readonly Float32Array[],
  to: readonly Float32Array[],
  parts: Float64Array,
): Promise<Contender> {
  const { Quaternion } = await threeCopy(`${id}-objects`);
  const objects = [from, to].map((list) => list.map(([x, y, z, w]) => new Quaternion(x, y, z, w)));
  const out = new Quaternion();
  const [a, b] = objects;
  return {
    name: 'three slerpQuaternions',
    run: () => {
      let sum = 0;
      for (let i = 0; i < a.length; i++) sum += out.slerpQuaternions(a[i], b[i], parts[i]).x;
      return sum;
    },
  };
}

async function threeFlat(
  id: string,
  from: readonly Float32Array[],
  to: readonly Float32Array[],
  parts: Float64Array,
): Promise<Contender> {
  const { Quaternion } = await threeCopy(`${id}-flat`);
  const [a, b] = [from, to].map((list) => Float32Array.from(list.flatMap((q) => [...q])));
  const out = new Float32Array(4);
  return {
    name: 'three slerpFlat',
    run: () => {
      let sum = 0;
      for (let i = 0; i < parts.length; i++) {
        Quaternion.slerpFlat(out, 0, a, 4 * i, b, 4 * i, parts[i]);
        sum += out[0];
      }
      return sum;
    },
  };
}
