import { type Interpolation, type RotationTrack, expMap, multiply, rotationTrack } from '@slewcurve/core';
import * as fc from 'fast-check';

const DEGREE = Math.PI / 180;

/** A smooth motion: a steady turn in parent axes after two slow swings in own axes. Degrees, hertz, radians. */
export interface Motion {
  readonly spin: readonly [number, number, number];
  readonly swing: readonly [number, number, number];
  readonly hertz: number;
  readonly phase: number;
}

export function poseAt({ spin, swing, hertz, phase }: Motion, time: number): Float64Array {
  const wave = Math.sin(2 * Math.PI * hertz * time + phase);
  const other = Math.cos(Math.PI * hertz * time);
  const [x, y, z] = swing;
  const spun = expMap(
    new Float64Array(4),
    spin.map((rate) => rate * time * DEGREE),
  );
  const swung = expMap(new Float64Array(4), [x * wave * DEGREE, y * other * DEGREE, z * wave * DEGREE]);
  return multiply(spun, spun, swung);
}

/** The motion keyed at `times`, every key on the side of the one before; tangents are the motion's own. */
export function keyed(motion: Motion, times: readonly number[], interpolation: Interpolation): RotationTrack {
  let before = poseAt(motion, times[0]);
  const values = times.flatMap((time) => {
    const pose = poseAt(motion, time);
    const sign = pose.reduce((sum, component, i) => sum + component * before[i], 0) < 0 ? -1 : 1;
    before = pose.map((component) => component * sign);
    if (interpolation !== 'CUBICSPLINE') return [...before];
    const tangent = tangentAt(motion, time).map((component) => component * sign);
    return [...tangent, ...before, ...tangent];
  });
  return rotationTrack({ times, values, interpolation, id: 'Arm', clip: 'Wave' });
}

/** d/dt of the quaternion by a central difference: 1e-9 relative, near enough for a tangent. */
function tangentAt(motion: Motion, time: number): Float64Array {
  const h = 1e-4;
  const later = poseAt(motion, time + h);
  return poseAt(motion, time - h).map((component, i) => (later[i] - component) / (2 * h));
}

export const motions: fc.Arbitrary<Motion> = fc.record({
  spin: triple(60),
  swing: triple(40),
  hertz: fc.double({ min: 0.1, max: 0.6, noNaN: true }),
  phase: fc.double({ min: 0, max: 6, noNaN: true }),
});

/** Key times: a 30 Hz grid, nearly even, or sparse with gaps up to four times as long as others. */
export function keyTimes(minKeys = 14): fc.Arbitrary<number[]> {
  const gaps = fc.array(fc.double({ min: 0.5, max: 2, noNaN: true }), { minLength: minKeys, maxLength: 40 });
  return fc.tuple(gaps, fc.constantFrom('grid', 'nearly even', 'sparse')).map(([shares, kind]) => {
    let time = 0.25;
    return shares.map((share) => {
      time += kind === 'grid' ? 1 / 30 : kind === 'sparse' ? 0.15 * share : (0.9 + 0.1 * share) / 30;
      return time;
    });
  });
}

export const interpolations: fc.Arbitrary<Interpolation> = fc.constantFrom('LINEAR', 'CUBICSPLINE', 'STEP');

/** Smooth tracks, dense and sparse, even and uneven, under every interpolation of glTF 2.0. */
export const smoothTracks: fc.Arbitrary<RotationTrack> = fc
  .tuple(motions, keyTimes(), interpolations)
  .map(([motion, times, interpolation]) => keyed(motion, times, interpolation));

/** A grid of `count` times at `hertz`, from 0. */
export function grid(count: number, hertz = 30): number[] {
  return Array.from({ length: count }, (_, key) => key / hertz);
}

/** The track with one key's orientation turned, in own axes, degrees; tangents turned along. */
export function turned(
  track: RotationTrack,
  keys: readonly number[],
  degrees: readonly [number, number, number],
  side: 'own' | 'parent' = 'own',
): RotationTrack {
  const turn = expMap(
    new Float64Array(4),
    degrees.map((angle) => angle * DEGREE),
  );
  const values = Float64Array.from(track.values);
  const size = values.length / track.times.length;
  for (const key of keys)
    for (let at = key * size; at < key * size + size; at += 4) {
      const stored = values.slice(at, at + 4);
      values.set(
        multiply(stored, ...(side === 'own' ? ([stored, turn] as const) : ([turn, stored] as const))),
        at,
      );
    }
  return rotationTrack({ ...track, values });
}

function triple(most: number): fc.Arbitrary<[number, number, number]> {
  const one = fc.double({ min: -most, max: most, noNaN: true });
  return fc.tuple(one, one, one);
}
