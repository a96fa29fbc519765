import { fromAxisAngle, multiply, slerp } from '@slewcurve/core';
import * as fc from 'fast-check';
import { expect, test } from 'vitest';
import {
  add,
  angleOf,
  negate,
  over,
  root,
  sineAndCosine,
  times,
  type Double2,
} from '../support/double-double.js';
import { seededRandom } from '../support/seeded-random.js';

// The reference is the definition a·Exp(t·Log(a⁻¹b)) worked out in double-double arithmetic (some 32 digits) by code that shares
// nothing with the kernels; it renormalises the float64 inputs itself.

/** `npm run long` runs the whole numbers of issue-sized evidence; the everyday run a fiftieth. */
const LONG = fc.readConfigureGlobal()?.numRuns !== undefined;
const DEGREES = 180 / Math.PI;

const STORAGES: readonly (readonly [string, (part: number) => number])[] = [
  ['float64', (part) => part],
  ['float32', Math.fround],
  ['int16', (part) => Math.max(-1, Math.round(part * 32767) / 32767)],
  ['int8', (part) => Math.max(-1, Math.round(part * 127) / 127)],
  ['text of 4 decimals', (part) => Math.round(part * 1e4) / 1e4],
];

/** Two orientations 1e-12 to 180° apart, log-uniform, about any axis, the second of either sign. */
function pair(random: () => number): { a: number[]; b: number[]; degrees: number } {
  const normal = (): number => Math.sqrt(-2 * Math.log(1 - random())) * Math.cos(2 * Math.PI * random());
  const a = [normal(), normal(), normal(), normal()];
  const degrees = Math.min(180, 10 ** (-12 + random() * (12 + Math.log10(180))));
  const turn = fromAxisAngle<number[]>([], [normal(), normal(), normal()], degrees / DEGREES);
  const length = Math.hypot(...a);
  const unit = a.map((part) => part / length);
  const sign = random() < 0.5 ? -1 : 1;
  return { a: unit, b: multiply<number[]>([], unit, turn).map((part) => sign * part), degrees };
}

test.each(STORAGES)(
  'A12: pairs stored as %s give finite in-betweens whose length is 1 to 4 eps',
  (_, store) => {
    const random = seededRandom(31);
    const out = [0, 0, 0, 0];
    let worst = 0;
    for (let n = 0; n < (LONG ? 1_000_000 : 20_000); n++) {
      const { a, b } = pair(random);
      slerp(out, a.map(store), b.map(store), random());
      worst = Math.max(worst, Math.abs(Math.hypot(out[0], out[1], out[2], out[3]) - 1));
      if (!(worst <= 1)) break;
    }
    // hypot itself rounds once.
    expect(worst).toBeLessThanOrEqual(4 * Number.EPSILON);
  },
);

test('A12: in-betweens of pairs 1e-12 to 180° apart are within 1e-13 degrees of the double-double evaluation', () => {
  const random = seededRandom(32);
  let worst = { error: 0, degrees: 0, t: 0 };
  for (let n = 0; n < (LONG ? 20_000 : 1_000); n++) {
    const { a, b, degrees } = pair(random);
    const t = random();
    const error = apart(slerp<number[]>([], a, b, t), reference(a, b, t)) * DEGREES;
    if (!(error <= worst.error)) worst = { error, degrees, t };
  }
  expect(worst.error).toBeLessThan(1e-13);
});

type Quaternion2 = readonly [Double2, Double2, Double2, Double2];

function unit2(q: readonly number[]): Quaternion2 {
  const [x, y, z, w] = q.map((part): Double2 => [part, 0]);
  const length = root(add(add(times(x, x), times(y, y)), add(times(z, z), times(w, w))));
  return [over(x, length), over(y, length), over(z, length), over(w, length)];
}

const sum = (...parts: readonly Double2[]): Double2 => parts.reduce((a, b) => add(a, b));

/** a·b, and a⁻¹·b where `back`. */
function product2(a: Quaternion2, b: Quaternion2, back: boolean): Quaternion2 {
  const [x, y, z] = back ? [negate(a[0]), negate(a[1]), negate(a[2])] : [a[0], a[1], a[2]];
  const w = a[3];
  return [
    sum(times(w, b[0]), times(x, b[3]), times(y, b[2]), negate(times(z, b[1]))),
    sum(times(w, b[1]), times(y, b[3]), times(z, b[0]), negate(times(x, b[2]))),
    sum(times(w, b[2]), times(z, b[3]), times(x, b[1]), negate(times(y, b[0]))),
    sum(times(w, b[3]), negate(times(x, b[0])), negate(times(y, b[1])), negate(times(z, b[2]))),
  ];
}

function reference(a: readonly number[], b: readonly number[], t: number): Quaternion2 {
  const from = unit2(a);
  let d = product2(from, unit2(b), true);
  if (d[3][0] < 0) d = [negate(d[0]), negate(d[1]), negate(d[2]), negate(d[3])];
  const length = root(add(add(times(d[0], d[0]), times(d[1], d[1])), times(d[2], d[2])));
  const { sine, cosine } = sineAndCosine(times([t, 0], angleOf(length, d[3])));
  const scale = over(sine, length);
  return product2(from, [times(d[0], scale), times(d[1], scale), times(d[2], scale), cosine], false);
}

/** Angle between a float64 answer, made unit, and the reference, radians; small. */
function apart(found: readonly number[], expected: Quaternion2): number {
  const [x, y, z, w] = product2(unit2(found), expected, true);
  return 2 * Math.atan2(Math.hypot(x[0], y[0], z[0]), Math.abs(w[0]));
}
