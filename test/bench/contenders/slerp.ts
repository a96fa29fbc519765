import { threeCopy } from '../module-copies.js';
import type { Contender } from '../rounds.js';

export function callEach<Q extends Float32Array | number[]>(
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

export async function threeObjects(
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

export async function threeFlat(
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
