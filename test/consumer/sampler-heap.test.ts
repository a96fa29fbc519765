import { spawnSync } from 'node:child_process';
import { expect, test } from 'vitest';

/** Run by plain Node, from the built package; prints by how many bytes the heap grew. */
const PROGRAM = `
import { rotationTrack } from '@slewcurve/core';
import { poseSampler, sampler, squadSampler } from '@slewcurve/core/sampler';

const times = Float64Array.from({ length: 200 }, (_, i) => i / 30 + (i % 7) / 300);
const values = Float64Array.from({ length: 800 }, (_, i) => Math.sin(i * 1.3) + (i % 4 === 3 ? 2 : 0));
const linear = rotationTrack({ times, values });
const step = rotationTrack({ times, values, interpolation: 'STEP' });
const cubic = rotationTrack({
  times,
  values: Float64Array.from({ length: 2400 }, (_, i) => (i % 12 === 7 ? 1 : Math.sin(i))),
  interpolation: 'CUBICSPLINE',
});
const single = sampler(linear);
const single32 = sampler(linear, { precision: 'float32' });
const pose = poseSampler([linear, step, cubic, linear]);
const squad = squadSampler(linear, { rates: 'secant' });
const [one, many, all] = [new Float64Array(4), new Float32Array(16), new Float64Array(64)];
const four = Float64Array.of(0.1, 3, 2, 9);

function work(samples) {
  let t = 0;
  for (let n = 0; n < samples; n += 12) {
    t = (t + 0.37) % 7;
    single.sample(t, one);
    single32.sample(t, one);
    squad.sample(t, one);
    single.sampleMany(four, many);
    pose.samplePose(t, many);
    pose.samplePoses(four, all);
  }
}

work(200_000);
gc();
const before = process.memoryUsage().heapUsed;
work(1_000_000);
gc();
console.log(process.memoryUsage().heapUsed - before);
`;

test.each([1, 2, 3])('a million samples leave less than 64 kB on the heap: run %i of 3', () => {
  const { status, stdout, stderr } = spawnSync(
    process.execPath,
    ['--expose-gc', '--input-type=module', '--eval', PROGRAM],
    { encoding: 'utf8' },
  );
  expect(stderr).toBe('');
  expect(status).toBe(0);
  expect(stdout).toMatch(/^-?\d+\n$/);
  expect(Number(stdout)).toBeLessThan(64 * 1024);
});
